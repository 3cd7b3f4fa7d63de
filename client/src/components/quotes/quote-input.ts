import { quoteInputSchema, type QuoteInput } from '#shared/contracts/quotes'
import type { HintedOffer, QuoteHint } from '#shared/costing/quote-hints'
import type { CostChoice, LineEntry, QuoteEntry } from './quote-entry'

/** The quotation as the contract takes it; what is missing is still missing, for the contract to say. */
export type QuoteCandidate = ReturnType<typeof candidateOf>

const costOf = (choice: CostChoice, amount: string | null): string | null => (choice === 'amount' ? (amount ?? '') : choice === 'included' ? '0' : null)

function lineCandidate(lineId: string, entry: LineEntry) {
  const { quoted: _, breaks, oneTime, samples, oneTimeCost, samplesPrice, sampleLeadTimeDays, ...rest } = entry
  return {
    ...rest,
    lineId,
    priceBreaks: breaks.map((row) => ({ ...row })),
    oneTimeCost: costOf(oneTime, oneTimeCost),
    oneTimeCostText: oneTime === 'not-quoted' ? '' : entry.oneTimeCostText,
    samplesPrice: costOf(samples, samplesPrice),
    sampleLeadTimeDays: samples === 'not-quoted' ? null : sampleLeadTimeDays,
  }
}

/** The quoted parts in the order of the enquiry; the index is the one in the server's paths. */
export const quotedLineIds = (entry: QuoteEntry, lineIds: readonly string[]): string[] => lineIds.filter((id) => entry.lines[id]?.quoted)

export function candidateOf({ lines, ...terms }: QuoteEntry, lineIds: readonly string[]) {
  return { ...terms, lines: quotedLineIds({ lines, ...terms }, lineIds).map((id) => lineCandidate(id, lines[id]!)) }
}

const COST_QUESTIONS = [
  ['oneTime', 'oneTimeCost', 'Say whether a one-time cost is asked for, included in the price or not quoted.'],
  ['samples', 'samplesPrice', 'Say whether samples have a price, are free of charge or not quoted.'],
] as const

function costProblems(entry: QuoteEntry, lineIds: readonly string[]): [string, string][] {
  return quotedLineIds(entry, lineIds).flatMap((id, index) =>
    COST_QUESTIONS.flatMap(([choice, amount, question]): [string, string][] => {
      const line = entry.lines[id]!
      if (line[choice] === '') return [[`lines.${index}.${amount}`, question]]
      return line[choice] === 'amount' && line[amount] === null ? [[`lines.${index}.${amount}`, 'The amount is missing.']] : []
    }),
  )
}

export type QuoteReading = { kind: 'complete'; input: QuoteInput } | { kind: 'problems'; fields: Readonly<Record<string, string>> }

/** Reads the typed quotation by the contract's own rules, so that what is missing is said before it is sent. */
export function readQuote(entry: QuoteEntry, lineIds: readonly string[], { revision }: { revision: number }): QuoteReading {
  const parsed = quoteInputSchema.safeParse(candidateOf(entry, lineIds))
  const fields = new Map(costProblems(entry, lineIds))
  if (revision > 1 && entry.reason.trim() === '') fields.set('reason', 'Say why this revision replaces the one before.')
  for (const { path, message } of parsed.error?.issues ?? []) {
    const place = path.join('.')
    if (!fields.has(place)) fields.set(place, message)
  }
  return parsed.success && fields.size === 0 ? { kind: 'complete', input: parsed.data } : { kind: 'problems', fields: Object.fromEntries(fields) }
}

/** What the rules for hints look at, at the database's time of now. */
export const hintedOffer = (entry: QuoteEntry, lineIds: readonly string[], submittedAt: string): HintedOffer => ({ ...candidateOf(entry, lineIds), submittedAt })

/** The sentences of the hints by the entry that they belong to. */
export function textsByPath(hints: readonly QuoteHint[]): Record<string, string[]> {
  const texts: Record<string, string[]> = {}
  for (const { path, message } of hints) (texts[path] ??= []).push(message)
  return texts
}

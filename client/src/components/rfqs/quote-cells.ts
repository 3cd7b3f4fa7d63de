import type { Quote } from '#shared/contracts/quotes'
import type { Rfq } from '#shared/contracts/rfqs'
import { countryName } from '@/components/base/countries'
import { formatMoney, groupDigits } from '#shared/number-format'

type QuoteLine = Quote['lines'][number]

export const NOT_QUOTED = 'not quoted'
const NOT_GIVEN = '–'

export const pieces = (quantity: number): string => `${groupDigits(String(quantity))}\u00a0pcs`
const days = (value: number | null): string => (value === null ? NOT_GIVEN : `${value}\u00a0d`)

/** Price of one piece at a quantity: that of the highest break not above it, never between two; null without one. */
export function unitPriceAt(line: Pick<QuoteLine, 'priceBreaks'>, quantity: number): string | null {
  const reached = line.priceBreaks.filter(({ fromQuantity }) => fromQuantity <= quantity)
  return reached.at(-1)?.unitPrice ?? null
}

/** Nothing quoted is not zero, and zero is “included”. */
export function amountText(amount: string | null, currency: string): string {
  if (amount === null) return NOT_QUOTED
  return Number(amount) === 0 ? 'included' : formatMoney(amount, currency)
}

/** The breaks in the price unit that the vendor wrote them in: `from 1000 pcs: 109.00 USD per 100`. */
export function breaksAsWritten({ priceBreaks, priceUnit }: QuoteLine, currency: string): string[] {
  const per = priceUnit === 1 ? 'each' : `per ${priceUnit}`
  return priceBreaks.map(({ fromQuantity, price }) => `from ${pieces(fromQuantity)}: ${formatMoney(price, currency)} ${per}`)
}

/** The revision that counts of each vendor: the one that lies in the box. */
export const standing = (quotes: readonly Quote[]): Quote[] => quotes.filter(({ state }) => state === 'submitted')

export interface CellRow {
  label: string
  figure: boolean
  /** One entry per quotation; each a list of lines. */
  cells: string[][]
}

/** What each quotation says about one asked part, row by row; a vendor that left the part out has not quoted it. */
export function rowsOf(asked: Rfq['lines'][number], quotes: readonly Quote[]): CellRow[] {
  const row = (label: string, cell: (line: QuoteLine, quote: Quote) => string | string[], figure = true): CellRow => ({
    label,
    figure,
    cells: quotes.map((quote) => {
      const line = quote.lines.find(({ lineId }) => lineId === asked.id)
      return line ? [cell(line, quote)].flat() : [NOT_QUOTED]
    }),
  })
  const priceAt = (quantity: number) =>
    row(`Unit price at ${pieces(quantity)}${quantity === asked.orderQuantity ? ', compared here' : ''}`, (line, { currency }) => {
      const price = unitPriceAt(line, quantity)
      return price === null ? NOT_QUOTED : formatMoney(price, currency)
    })
  const compared = asked.quantities.includes(asked.orderQuantity) ? asked.quantities : [...asked.quantities, asked.orderQuantity].sort((a, b) => a - b)
  return [
    ...compared.map(priceAt),
    row('Price breaks as written', (line, { currency }) => breaksAsWritten(line, currency)),
    row('One-time cost', (line, { currency }) => [amountText(line.oneTimeCost, currency), line.oneTimeCostText].filter(Boolean)),
    row(`Samples, ${pieces(asked.sampleQuantity)}`, (line, { currency }) => amountText(line.samplesPrice, currency)),
    row('Lead time of samples', (line) => days(line.sampleLeadTimeDays)),
    row('Lead time of the first order', (line) => days(line.firstOrderLeadTimeDays)),
    row('Lead time of a repeat order', (line) => days(line.repeatLeadTimeDays)),
    row('Minimum order quantity', (line) => pieces(line.minimumOrderQuantity)),
    row('Pack quantity', (line) => (line.packQuantity === null ? NOT_GIVEN : pieces(line.packQuantity))),
    row('Country of origin', (line) => (line.countryOfOrigin ? countryName(line.countryOfOrigin) : NOT_GIVEN), false),
  ]
}

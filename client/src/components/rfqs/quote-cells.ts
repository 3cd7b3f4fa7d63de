import type { Quote } from '#shared/contracts/quotes'
import { formatMoney } from '#shared/number-format'

type Line = Quote['lines'][number]

/** Price of one piece at a quantity: that of the highest break not above it, never between two; null without one. */
export function unitPriceAt(line: Pick<Line, 'priceBreaks'>, quantity: number): string | null {
  const reached = line.priceBreaks.filter(({ fromQuantity }) => fromQuantity <= quantity)
  return reached.at(-1)?.unitPrice ?? null
}

/** Nothing quoted is not zero, and zero is “included”. */
export function amountText(amount: string | null, currency: string): string {
  if (amount === null) return 'not quoted'
  return Number(amount) === 0 ? 'included' : formatMoney(amount, currency)
}

/** The revision that counts of each vendor: the one that lies in the box. */
export const standing = (quotes: readonly Quote[]): Quote[] => quotes.filter(({ state }) => state === 'submitted')

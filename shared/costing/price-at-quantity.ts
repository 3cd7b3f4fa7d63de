import { Decimal } from '#shared/money'

/** One row of a price table: the price of a price unit from a quantity on. */
export interface PriceBreak {
  /** Pieces from which the price holds. */
  minimumQuantity: number
  /** Decimal text, for `priceBasis` pieces. */
  price: string
}

export type PriceAtQuantity =
  | { kind: 'price'; minimumQuantity: number; price: string }
  /** The order is smaller than the first break: there is no price for it. */
  | { kind: 'below-first-break'; firstQuantity: number }
  | { kind: 'missing' }

/**
 * The price at an order quantity: that of the highest break not above it, never interpolated.
 * Below the first break there is no price, whatever the nearest one says.
 *
 * @throws RangeError when the quantity is not a positive whole number
 */
export function priceAtQuantity(breaks: readonly PriceBreak[], orderQuantity: number): PriceAtQuantity {
  if (!Number.isSafeInteger(orderQuantity) || orderQuantity < 1) throw new RangeError(`orderQuantity must be a positive whole number: ${orderQuantity}`)
  if (breaks.length === 0) return { kind: 'missing' }

  const ascending = [...breaks].sort((a, b) => a.minimumQuantity - b.minimumQuantity)
  const found = ascending.findLast(({ minimumQuantity }) => minimumQuantity <= orderQuantity)
  if (!found) return { kind: 'below-first-break', firstQuantity: ascending[0]!.minimumQuantity }
  return { kind: 'price', minimumQuantity: found.minimumQuantity, price: found.price }
}

export interface BreakDoubt {
  minimumQuantity: number
  /** `dearer`: the price rises with the quantity. `below-moq`: the break cannot be ordered. */
  code: 'dearer-than-smaller-break' | 'below-minimum-order-quantity'
}

/** What a careful reader would ask about a price table before it is submitted. */
export function priceBreakDoubts(breaks: readonly PriceBreak[], minimumOrderQuantity: number | null): BreakDoubt[] {
  const ascending = [...breaks].sort((a, b) => a.minimumQuantity - b.minimumQuantity)
  const dearer = ascending.filter((row, index) => index > 0 && new Decimal(row.price).gt(ascending[index - 1]!.price))
  const unorderable = minimumOrderQuantity === null ? [] : ascending.filter((row) => row.minimumQuantity < minimumOrderQuantity)
  return [
    ...dearer.map(({ minimumQuantity }) => ({ minimumQuantity, code: 'dearer-than-smaller-break' as const })),
    ...unorderable.map(({ minimumQuantity }) => ({ minimumQuantity, code: 'below-minimum-order-quantity' as const })),
  ]
}

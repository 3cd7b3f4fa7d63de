import { Decimal } from '#shared/money'

/** Share of the median beyond which a price is asked about before it is celebrated. */
export const OUTLIER_SHARE = '0.4'

/** Median of exact decimals; the mean of the middle two when their number is even, null of none. */
export function medianOf(values: readonly Decimal[]): Decimal | null {
  const sorted = [...values].sort((a, b) => a.comparedTo(b))
  const middle = Math.floor(sorted.length / 2)
  if (sorted.length === 0) return null
  return sorted.length % 2 === 1 ? sorted[middle]! : sorted[middle]!.plus(sorted[middle - 1]!).div(2)
}

export interface OutlierFlag {
  /** Value over median, decimal text. */
  ratio: string
  side: 'below' | 'above'
}

/**
 * Flags values more than 40 % away from the median of all known ones, in the order given.
 * Fewer than three known values have no median worth the name: nothing is flagged. Missing values stay unflagged.
 */
export function priceOutliers(values: readonly (string | null)[]): (OutlierFlag | null)[] {
  const known = values.filter((value) => value !== null).map((value) => new Decimal(value))
  const median = known.length < 3 ? null : medianOf(known)
  if (median === null || !median.gt(0)) return values.map(() => null)

  return values.map((value) => {
    if (value === null) return null
    const ratio = new Decimal(value).div(median)
    if (ratio.minus(1).abs().lte(OUTLIER_SHARE)) return null
    return { ratio: ratio.toString(), side: ratio.lt(1) ? 'below' : 'above' }
  })
}

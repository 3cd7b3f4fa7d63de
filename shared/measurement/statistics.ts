/** Figures of a set of readings, in the readings' unit. */
export interface Summary {
  n: number
  mean: number | null
  /** Sample standard deviation, divided by n − 1; null below two readings. */
  deviation: number | null
  minimum: number | null
  maximum: number | null
  median: number | null
}

const meanOf = (values: readonly number[]) => values.reduce((sum, value) => sum + value, 0) / values.length

/**
 * n, mean, sample standard deviation, extremes and median of plain readings. Censored readings and verdicts
 * do not belong here. Source: ISO 3534-1:2006, 1.15 to 1.17.
 */
export function summarise(values: readonly number[]): Summary {
  const n = values.length
  if (n === 0) return { n, mean: null, deviation: null, minimum: null, maximum: null, median: null }
  const sorted = [...values].sort((a, b) => a - b)
  const mean = meanOf(values)
  const squares = values.reduce((sum, value) => sum + (value - mean) ** 2, 0)
  const middle = Math.floor(n / 2)
  return {
    n,
    mean,
    deviation: n < 2 ? null : Math.sqrt(squares / (n - 1)),
    minimum: sorted[0]!,
    maximum: sorted[n - 1]!,
    median: n % 2 === 1 ? sorted[middle]! : (sorted[middle - 1]! + sorted[middle]!) / 2,
  }
}

/** Mean range over standard deviation for subgroups of 2 to 10. Source: ISO 7870-2:2013, table 2. */
const D2: readonly number[] = [NaN, NaN, 1.128, 1.693, 2.059, 2.326, 2.534, 2.704, 2.847, 2.97, 3.078]

/**
 * Standard deviation within ordered subgroups of equal size, from their mean range.
 *
 *     s_within = R̄ / d2
 *
 * @throws RangeError when the subgroups are not of one size from 2 to 10
 */
export function deviationFromRanges(subgroups: readonly (readonly number[])[]): number {
  const size = subgroups[0]?.length ?? 0
  const d2 = D2[size]
  if (d2 === undefined || Number.isNaN(d2) || subgroups.some(({ length }) => length !== size)) throw new RangeError('subgroups must be of one size from 2 to 10')
  return meanOf(subgroups.map((group) => Math.max(...group) - Math.min(...group))) / d2
}

/**
 * Standard deviation within subgroups, pooled from their variances.
 *
 * @throws RangeError when no subgroup has two readings
 */
export function pooledDeviation(subgroups: readonly (readonly number[])[]): number {
  const groups = subgroups.filter(({ length }) => length > 1).map(summarise)
  const freedom = groups.reduce((sum, { n }) => sum + n - 1, 0)
  if (freedom === 0) throw new RangeError('no subgroup has two readings')
  return Math.sqrt(groups.reduce((sum, { n, deviation }) => sum + (n - 1) * deviation! ** 2, 0) / freedom)
}

import { summarise } from './statistics'

export interface LimitPair {
  minimum: number | null
  maximum: number | null
}

/** How the parts were made; decides what a figure about them may claim. */
export const SAMPLE_KINDS = ['hand-made', 'off-tool', 'pilot-lot', 'first-article', 'retained', 'destructive', 'agency'] as const
export type SampleKind = (typeof SAMPLE_KINDS)[number]

/** Readings from which a performance index from series parts is shown plainly, and below which none is shown. */
export const PLAIN_INDEX_FROM = 30
export const ANY_INDEX_FROM = 5

/**
 * Performance index of readings with the overall standard deviation; one-sided where only one limit exists,
 * null without limits.
 *
 *     Ppk = min(U − x̄, x̄ − L) / (3 s)
 *
 * Source: ISO 22514-2:2017.
 *
 * @throws RangeError when the deviation is not positive
 */
export function performanceIndex(mean: number, deviation: number, { minimum, maximum }: LimitPair): number | null {
  if (!(deviation > 0)) throw new RangeError(`deviation must be positive: ${deviation}`)
  const sides = [maximum === null ? null : maximum - mean, minimum === null ? null : mean - minimum].filter((side) => side !== null)
  return sides.length === 0 ? null : Math.min(...sides) / (3 * deviation)
}

/** Width of the limits over six standard deviations; null unless both limits exist. Source: ISO 22514-2:2017. */
export const spreadIndex = (deviation: number, { minimum, maximum }: LimitPair): number | null =>
  minimum === null || maximum === null ? null : (maximum - minimum) / (6 * deviation)

/** 95 % quantile of the standard normal distribution. */
const NORMAL_QUANTILE_95 = 1.6448536269514722

/**
 * One-sided lower 95 % confidence bound of a capability or performance index.
 *
 *     bound = C − 1.645 · √( 1/(9n) + C² / (2(n − 1)) ), with the quantile to more places
 *
 * Source: A. F. Bissell, How reliable is your capability index?, Applied Statistics 39 (1990) 331–340.
 */
export const lowerBound = (index: number, n: number): number => index - NORMAL_QUANTILE_95 * Math.sqrt(1 / (9 * n) + index ** 2 / (2 * (n - 1)))

export type Capability =
  /** Too few readings for any index: the values speak. */
  | { kind: 'values-only'; n: number }
  /** No index can be given. */
  | { kind: 'none'; n: number; reason: 'no-limits' | 'identical-readings' | 'resolution-too-coarse' }
  /** `preliminary`: small, or not from the series process; never shown without its bound, n and kind of sample. */
  | { kind: 'index'; n: number; ppk: number; lowerBound95: number; preliminary: boolean; sampleKind: SampleKind }

/**
 * What may be said about capability from plain readings: nothing below 5, a preliminary index with its bound
 * below 30 or when the parts do not come from the series process, else the index with its bound.
 * Fewer than five different readings, or steps wider than a tenth of the tolerance, are too coarse for it.
 */
export function assessCapability(values: readonly number[], limits: LimitPair, sampleKind: SampleKind): Capability {
  const { n, mean, deviation } = summarise(values)
  if (n < ANY_INDEX_FROM) return { kind: 'values-only', n }
  if (limits.minimum === null && limits.maximum === null) return { kind: 'none', n, reason: 'no-limits' }
  const distinct = [...new Set(values)].sort((a, b) => a - b)
  if (distinct.length === 1) return { kind: 'none', n, reason: 'identical-readings' }
  if (isCoarse(distinct, limits)) return { kind: 'none', n, reason: 'resolution-too-coarse' }

  const ppk = performanceIndex(mean!, deviation!, limits)!
  const series = sampleKind === 'pilot-lot' || sampleKind === 'first-article'
  return { kind: 'index', n, ppk, lowerBound95: lowerBound(ppk, n), preliminary: n < PLAIN_INDEX_FROM || !series, sampleKind }
}

function isCoarse(distinct: readonly number[], { minimum, maximum }: LimitPair): boolean {
  if (distinct.length < 5) return true
  if (minimum === null || maximum === null) return false
  const step = Math.min(...distinct.slice(1).map((value, index) => value - distinct[index]!))
  return step > (maximum - minimum) / 10
}

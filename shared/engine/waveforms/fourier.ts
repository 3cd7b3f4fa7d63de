import { requireCount } from '../require'
import { totalVariation } from './statistics'
import { waveformSegments } from './waveform'
import type { Waveform, WaveformSegment } from './waveform'

/**
 * f(t) = mean + Σ Re{(re_n + j·im_n)·exp(j·2π·n·t/T)}: peak values in the quantity's unit, phases against the start of the period,
 * so that the series of several currents of one period add as phasors. Index 0 holds the order `firstOrder`.
 */
export interface FourierSeries {
  firstOrder: number
  re: Float64Array
  im: Float64Array
}

/**
 * Fourier coefficients of `count` orders from `firstOrder` on, by the closed integral over each straight piece.
 * Exact but for rounding. Source: definition of the Fourier series, integrated by parts.
 *
 * @throws RangeError when count or first order is not a whole number above zero
 */
export function fourierSeries(waveform: Waveform, count: number, firstOrder = 1): FourierSeries {
  requireCount('count', count)
  requireCount('firstOrder', firstOrder)
  const series = { firstOrder, re: new Float64Array(count), im: new Float64Array(count) }
  const step = (2 * Math.PI) / waveform.periodS
  for (const segment of waveformSegments(waveform)) if (segment.from !== 0 || segment.to !== 0) addSegment(series, segment, step)
  for (let index = 0; index < count; index++) {
    const scale = 1 / (Math.PI * (firstOrder + index))
    series.re[index]! *= scale
    series.im[index]! *= scale
  }
  return series
}

/** Angles are turned on from order to order by a rotation, renewed after so many orders that rounding stays below 10⁻¹⁴. */
const RENEWED_AFTER = 32

function addSegment({ firstOrder, re, im }: FourierSeries, { startS, endS, durationS, from, to }: WaveformSegment, step: number): void {
  // Both ends by their middle and half their distance, since short pieces would lose digits.
  const middle = step * ((startS + endS) / 2)
  const half = step * (durationS / 2)
  const slope = (2 * (to - from)) / (step * durationS)
  const [middleCosine, middleSine, halfCosine, halfSine] = [Math.cos(middle), Math.sin(middle), Math.cos(half), Math.sin(half)]
  let [mc, ms, hc, hs] = [0, 0, 0, 0]
  for (let index = 0; index < re.length; index++) {
    const order = firstOrder + index
    if (index % RENEWED_AFTER === 0) {
      mc = Math.cos(order * middle)
      ms = Math.sin(order * middle)
      hc = Math.cos(order * half)
      hs = Math.sin(order * half)
    }
    const sum = (from + to) * hs
    const difference = (to - from) * hc - (slope * hs) / order
    re[index]! += mc * sum + ms * difference
    im[index]! += mc * difference - ms * sum
    const [nextMiddle, nextHalf] = [mc * middleCosine - ms * middleSine, hc * halfCosine - hs * halfSine]
    ms = ms * middleCosine + mc * middleSine
    hs = hs * halfCosine + hc * halfSine
    mc = nextMiddle
    hc = nextHalf
  }
}

/**
 * Upper bound of the mean square that all orders above `count` can hold together, in the quantity's unit squared.
 *
 *     amplitude_n ≤ V/(π n),  so  Σ_{n>N} amplitude_n²/2 ≤ V²/(2 π² N)
 *
 * V is the total variation. Source: bound of the Fourier coefficients of a function of bounded variation (Zygmund, Trigonometric Series, II.4).
 *
 * @throws RangeError when the count is not a whole number above zero
 */
export function harmonicTailMeanSquareBound(waveform: Waveform, count: number): number {
  requireCount('count', count)
  return totalVariation(waveform) ** 2 / (2 * Math.PI ** 2 * count)
}

/**
 * Order from which the amplitudes fall as 1/n² instead of 1/n: n_c = V1·T/(2π·V), where V is the total variation of the waveform and
 * V1 that of its slope; infinite where the waveform jumps, 0 for a constant. A ramp of duration t between two levels has n_c = T/(π·t).
 *
 * Source: the two bounds V/(π·n) and V1·T/(2π²·n²) of the coefficients meet there (Zygmund, Trigonometric Series, II.4).
 */
export function edgeOrder(waveform: Waveform): number {
  const variation = totalVariation(waveform)
  if (variation === 0) return 0
  const segments = waveformSegments(waveform)
  let slopeVariation = 0
  segments.forEach((segment, index) => {
    const before = segments[(index + segments.length - 1) % segments.length]!
    // A step of rounding is no jump.
    if (Math.abs(segment.from - before.to) > 1e-9 * variation) slopeVariation = Infinity
    slopeVariation += Math.abs((segment.to - segment.from) / segment.durationS - (before.to - before.from) / before.durationS)
  })
  return (slopeVariation * waveform.periodS) / (2 * Math.PI * variation)
}

/**
 * By how much more the orders above N count than order N, when each counts by a factor that grows as n^p and amplitudes fall as
 * 1/n up to the edge order and as 1/n² beyond: the mean of (n/N)^p over the squares of the amplitudes. Infinite where that
 * mean has no end (jumps with p ≥ 1).
 *
 * Source: integrals of powers.
 *
 * @throws RangeError unless the last order is a whole number above zero
 */
export function tailGrowth({ lastOrder, edge, power }: { lastOrder: number; edge: number; power: number }): number {
  requireCount('lastOrder', lastOrder)
  const p = Math.min(Math.max(power, 0), 2)
  if (edge === Infinity) return p < 1 ? 1 / (1 - p) : Infinity
  const c = edge / lastOrder
  // Orders in units of the last one; squares of the amplitudes are n^−2 up to c and c²·n^−4 beyond.
  if (c <= 1) return 3 / (3 - p)
  const upToEdge = Math.abs(p - 1) < 1e-9 ? Math.log(c) : (c ** (p - 1) - 1) / (p - 1)
  return (upToEdge + c ** (p - 1) / (3 - p)) / (1 - 1 / c + 1 / (3 * c))
}

import { waveformSegments } from './waveform'
import type { Waveform } from './waveform'

/** Integral over the period, in the quantity's unit times second. Exact. */
export const integralOverPeriod = (waveform: Waveform): number =>
  waveformSegments(waveform).reduce((sum, { durationS, from, to }) => sum + (durationS * (from + to)) / 2, 0)

/** Mean over the period, in the quantity's unit. Exact. */
export const mean = (waveform: Waveform): number => integralOverPeriod(waveform) / waveform.periodS

/** Mean of the square, in the quantity's unit squared. Exact: a ramp from a to b has (a² + ab + b²)/3. */
export const meanSquare = (waveform: Waveform): number =>
  waveformSegments(waveform).reduce((sum, { durationS, from, to }) => sum + (durationS * (from * from + from * to + to * to)) / 3, 0) /
  waveform.periodS

/** Root mean square over the period, in the quantity's unit. Exact. */
export const rms = (waveform: Waveform): number => Math.sqrt(meanSquare(waveform))

/** Root mean square without the mean, in the quantity's unit. Exact. */
export function acRms(waveform: Waveform): number {
  const meanValue = mean(waveform)
  const { periodS, points } = waveform
  return rms({ periodS, points: points.map(([tS, value]) => [tS, value - meanValue] as const) })
}

/** Greatest value with its sign. */
export const maximum = ({ points }: Waveform): number => points.reduce((top, [, value]) => Math.max(top, value), -Infinity)

/** Least value with its sign. */
export const minimum = ({ points }: Waveform): number => points.reduce((low, [, value]) => Math.min(low, value), Infinity)

/** Greatest magnitude. */
export const peak = (waveform: Waveform): number => Math.max(maximum(waveform), -minimum(waveform))

export const peakToPeak = (waveform: Waveform): number => maximum(waveform) - minimum(waveform)

/** Integral of the positive part over the period, in the quantity's unit times second: the volt-seconds of a winding voltage. Exact. */
export const positiveVoltSeconds = (waveform: Waveform): number =>
  waveformSegments(waveform).reduce((sum, { durationS, from, to }) => sum + durationS * meanOfPositivePart(from, to), 0)

function meanOfPositivePart(from: number, to: number): number {
  if (from >= 0 && to >= 0) return (from + to) / 2
  if (from <= 0 && to <= 0) return 0
  const top = Math.max(from, to)
  return (top * top) / (2 * Math.abs(to - from))
}

/** Sum of all ups and downs over the period, jumps and the step back to the start counted; it bounds the harmonics. */
export function totalVariation({ points }: Waveform): number {
  const stepBack = Math.abs(points[0]![1] - points[points.length - 1]![1])
  return points.slice(1).reduce((sum, [, value], index) => sum + Math.abs(value - points[index]![1]), stepBack)
}

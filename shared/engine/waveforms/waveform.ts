import { requirePositive } from '../require'

export type WaveformPoint = readonly [tS: number, value: number]

/**
 * One period of a piecewise-linear quantity. The points ascend in time from 0 to the period;
 * two points at one time are a jump, and so is a last value that differs from the first.
 */
export interface Waveform {
  periodS: number
  points: readonly WaveformPoint[]
}

export interface RampSegment {
  durationS: number
  from: number
  to: number
}

export interface WaveformSegment {
  startS: number
  endS: number
  durationS: number
  from: number
  to: number
}

/**
 * A checked waveform.
 *
 * @throws RangeError unless the points ascend from 0 to the period and every value is finite
 */
export function createWaveform(periodS: number, points: readonly WaveformPoint[]): Waveform {
  requirePositive('periodS', periodS)
  if (points.length < 2) throw new RangeError(`points must hold at least two: ${points.length}`)
  if (points[0]![0] !== 0) throw new RangeError(`points must start at 0 s: ${points[0]![0]}`)
  const endS = points[points.length - 1]![0]
  if (endS !== periodS) throw new RangeError(`points must end at periodS ${periodS}: ${endS}`)
  points.forEach(([tS, value], index) => {
    if (!Number.isFinite(value)) throw new RangeError(`points.${index} must have a finite value: ${value}`)
    if (index > 0 && !(tS >= points[index - 1]![0])) throw new RangeError(`points.${index} must not go back in time: ${tS}`)
  })
  return { periodS, points }
}

/** The same value all the time. */
export const constantWaveform = (periodS: number, value: number): Waveform => createWaveform(periodS, [[0, value], [periodS, value]])

/**
 * A waveform of ramps one after another; ramps without duration are left out. Times are the sums of the durations.
 *
 * @throws RangeError when a duration is negative or none is left
 */
export function waveformFromRamps(ramps: readonly RampSegment[]): Waveform {
  const points: WaveformPoint[] = []
  let tS = 0
  for (const { durationS, from, to } of ramps) {
    if (!(durationS >= 0)) throw new RangeError(`durationS must not be negative: ${durationS}`)
    if (durationS === 0) continue
    points.push([tS, from])
    tS += durationS
    points.push([tS, to])
  }
  return createWaveform(tS, points)
}

/** The straight pieces of a waveform; jumps leave no piece. */
export function waveformSegments({ points }: Waveform): WaveformSegment[] {
  const segments: WaveformSegment[] = []
  for (let i = 1; i < points.length; i++) {
    const [startS, from] = points[i - 1]!
    const [endS, to] = points[i]!
    if (endS > startS) segments.push({ startS, endS, durationS: endS - startS, from, to })
  }
  return segments
}

/** Value at a time; at a jump the value after it. Time is taken modulo the period. */
export function valueAt(waveform: Waveform, tS: number): number {
  const wrappedS = tS - Math.floor(tS / waveform.periodS) * waveform.periodS
  const segments = waveformSegments(waveform)
  const segment = segments.findLast(({ startS }) => startS <= wrappedS) ?? segments[0]!
  return segment.from + ((segment.to - segment.from) * (wrappedS - segment.startS)) / segment.durationS
}

import { requirePositive } from '../require'
import { createWaveform, waveformSegments } from './waveform'
import type { Waveform, WaveformPoint, WaveformSegment } from './waveform'

/** Every value multiplied by a factor. */
export const scaleWaveform = ({ periodS, points }: Waveform, factor: number): Waveform => ({
  periodS,
  points: points.map(([tS, value]) => [tS, value * factor] as const),
})

/** Every value raised by an offset. */
export const offsetWaveform = ({ periodS, points }: Waveform, offset: number): Waveform => ({
  periodS,
  points: points.map(([tS, value]) => [tS, value + offset] as const),
})

/** A value that stays, with the corners in time of another waveform. */
export const steadyLike = ({ periodS, points }: Waveform, value: number): Waveform => ({ periodS, points: points.map(([tS]) => [tS, value] as const) })

/**
 * Sum of waveforms of one period, exact: the sum has every corner of its parts.
 *
 * @throws RangeError when none is given or the periods differ
 */
export function sumWaveforms(waveforms: readonly Waveform[]): Waveform {
  const first = waveforms[0]
  if (!first) throw new RangeError('waveforms must hold at least one')
  const { periodS } = first
  for (const other of waveforms) {
    if (other.periodS !== periodS) throw new RangeError(`waveforms must have one period ${periodS}: ${other.periodS}`)
  }
  // All windings of one circuit change at the same times.
  if (waveforms.every(({ points }) => sameTimes(points, first.points))) {
    return { periodS, points: first.points.map(([tS], index) => [tS, waveforms.reduce((sum, { points }) => sum + points[index]![1], 0)] as const) }
  }
  const timesS = [...new Set(waveforms.flatMap(({ points }) => points.map(([tS]) => tS)))].sort((a, b) => a - b)
  const parts = waveforms.map(waveformSegments)
  const points = timesS.flatMap((tS): WaveformPoint[] => {
    const before = parts.reduce((sum, segments) => sum + valueBefore(segments, tS), 0)
    const after = parts.reduce((sum, segments) => sum + valueAfter(segments, tS), 0)
    if (tS === 0) return [[0, after]]
    if (tS === periodS || before === after) return [[tS, before]]
    return [[tS, before], [tS, after]]
  })
  return createWaveform(periodS, points)
}

const sameTimes = (one: readonly WaveformPoint[], other: readonly WaveformPoint[]) => one === other || (one.length === other.length && one.every(([tS], index) => tS === other[index]![0]))

const valueWithin = ({ startS, durationS, from, to }: WaveformSegment, tS: number) => from + ((to - from) * (tS - startS)) / durationS

function valueBefore(segments: readonly WaveformSegment[], tS: number): number {
  const segment = segments.findLast(({ startS }) => startS < tS)
  if (!segment) return 0
  return segment.endS === tS ? segment.to : valueWithin(segment, tS)
}

function valueAfter(segments: readonly WaveformSegment[], tS: number): number {
  const segment = segments.findLast(({ startS }) => startS <= tS)
  return segment ? valueWithin(segment, tS) : 0
}

/**
 * The waveform with each jump as a ramp that begins where the jump was and takes `edgeS`, but no longer than a quarter of the
 * period; waveforms that jump against each other, as in a commutation, keep their sum. The same waveform when it has no jump.
 *
 * Source: superposition.
 *
 * @throws RangeError unless the duration is positive
 */
export function withEdges(waveform: Waveform, edgeS: number): Waveform {
  requirePositive('edgeS', edgeS)
  const { periodS } = waveform
  const lengthS = Math.min(edgeS, periodS / 4)
  const jumps = jumpsOf(waveform)
  if (jumps.length === 0) return waveform
  return sumWaveforms([waveform, ...jumps.map(({ atS, by }) => decay(periodS, { atS, by, lengthS }))])
}

interface Jump {
  atS: number
  by: number
}

/** Steps of more than rounding, the one back to the start of the period at time 0. */
function jumpsOf({ periodS, points }: Waveform): Jump[] {
  const least = 1e-9 * Math.max(...points.map(([, value]) => Math.abs(value)))
  const steps = points.slice(1).map(([atS, value], index): Jump => ({ atS: atS === points[index]![0] && atS < periodS ? atS : -1, by: value - points[index]![1] }))
  const back: Jump = { atS: 0, by: points[0]![1] - points[points.length - 1]![1] }
  return [back, ...steps].filter(({ atS, by }) => atS >= 0 && Math.abs(by) > least)
}

/** What takes a jump back: −by at its time, falling to nothing over the length. */
function decay(periodS: number, { atS, by, lengthS }: Jump & { lengthS: number }): Waveform {
  const endS = atS + lengthS
  const before: WaveformPoint[] = atS > 0 ? [[0, 0], [atS, 0]] : []
  if (endS <= periodS) return { periodS, points: [...before, [atS, -by], [endS, 0], ...(endS < periodS ? [[periodS, 0] as const] : [])] }
  // Over the end of the period and on from its start.
  const left = (-by * (endS - periodS)) / lengthS
  return { periodS, points: [[0, left], [endS - periodS, 0], [atS, 0], [atS, -by], [periodS, left]] }
}

/** The first waveform less the second. */
export const differenceOfWaveforms = (first: Waveform, second: Waveform): Waveform => sumWaveforms([first, scaleWaveform(second, -1)])

/**
 * Running integral, starting at `initial`, in the quantity's unit times second. Exact where the quantity is constant
 * between its corners (a winding voltage); elsewhere exact at the corners, with a straight line between them.
 */
export function runningIntegral(waveform: Waveform, initial = 0): Waveform {
  const points: WaveformPoint[] = [[0, initial]]
  let sum = initial
  for (const { endS, durationS, from, to } of waveformSegments(waveform)) {
    sum += (durationS * (from + to)) / 2
    points.push([endS, sum])
  }
  return { periodS: waveform.periodS, points }
}

/**
 * Mean over the period of the product of two waveforms, in the product of their units. Exact: ramps from a to b and from c to d
 * have (2ac + ad + bc + 2bd)/6.
 *
 * @throws RangeError when the periods differ
 */
export function meanProduct(first: Waveform, second: Waveform): number {
  if (first.periodS !== second.periodS) throw new RangeError(`waveforms must have one period ${first.periodS}: ${second.periodS}`)
  const [one, other] = [waveformSegments(first), waveformSegments(second)]
  let sum = 0
  let startS = 0
  for (let i = 0, k = 0; i < one.length && k < other.length; ) {
    const [a, b] = [one[i]!, other[k]!]
    const endS = Math.min(a.endS, b.endS)
    const [a0, a1, b0, b1] = [valueWithin(a, startS), valueWithin(a, endS), valueWithin(b, startS), valueWithin(b, endS)]
    sum += ((endS - startS) * (2 * a0 * b0 + a0 * b1 + a1 * b0 + 2 * a1 * b1)) / 6
    startS = endS
    if (a.endS === endS) i += 1
    if (b.endS === endS) k += 1
  }
  return sum / first.periodS
}

import { meanSquare, peak } from './statistics'
import { constantWaveform, createWaveform, waveformSegments } from './waveform'
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

export interface WorkingVoltage {
  rmsV: number
  recurringPeakV: number
}

/**
 * Working voltage between two sides: the greatest rms and the greatest recurring peak of all pairs of node potentials,
 * each potential as a waveform in volt against one common reference.
 *
 * Source: IEC 60664-1:2020, 3.1 (working voltage, recurring peak voltage).
 *
 * @throws RangeError when a side has no node or the periods differ
 */
export function workingVoltage(sideV: readonly Waveform[], otherSideV: readonly Waveform[]): WorkingVoltage {
  if (sideV.length === 0 || otherSideV.length === 0) throw new RangeError('both sides must have at least one node')
  let worst: WorkingVoltage = { rmsV: 0, recurringPeakV: 0 }
  for (const node of sideV) {
    for (const other of otherSideV) {
      const between = differenceOfWaveforms(node, other)
      worst = { rmsV: Math.max(worst.rmsV, Math.sqrt(meanSquare(between))), recurringPeakV: Math.max(worst.recurringPeakV, peak(between)) }
    }
  }
  return worst
}

/** A node that holds one potential, for `workingVoltage`. */
export const steadyNode = (periodS: number, potentialV: number): Waveform => constantWaveform(periodS, potentialV)

import { createWaveform } from '../waveforms/waveform'
import type { Waveform, WaveformPoint } from '../waveforms/waveform'

/** The period cut at every switching instant; all waveforms of one state share its times. */
export interface Timeline {
  periodS: number
  /** Ascending from 0 to the period. */
  timesS: readonly number[]
}

/** Relative distance below which two instants are one. */
const SAME_INSTANT = 1e-11

/** A timeline of a period's switching instants, in any order; those outside the period or too near each other are left out. */
export function timeline(periodS: number, instantsS: readonly number[]): Timeline {
  const timesS = [0]
  for (const tS of [...instantsS].sort((a, b) => a - b)) {
    if (tS - timesS[timesS.length - 1]! > SAME_INSTANT * periodS && periodS - tS > SAME_INSTANT * periodS) timesS.push(tS)
  }
  return { periodS, timesS: [...timesS, periodS] }
}

/** A quantity that is straight between switching instants: its value at a time inside or at an end of a piece, whose middle is given. */
export type PieceValue = (tS: number, middleS: number) => number

/**
 * The waveform of a quantity that is straight between the instants and may jump at them. With a commutation time each jump
 * becomes a ramp of that length, or of half the piece that follows where that is shorter, so that sums of windings stay what they were.
 */
export function pieceWaveform({ periodS, timesS }: Timeline, value: PieceValue, commutationS = 0): Waveform {
  const points: WaveformPoint[] = []
  const last = timesS.length - 2
  let before = value(periodS, (timesS[last]! + periodS) / 2)
  for (let piece = 0; piece <= last; piece++) {
    const [fromS, toS] = [timesS[piece]!, timesS[piece + 1]!]
    const middleS = (fromS + toS) / 2
    const [from, to] = [value(fromS, middleS), value(toS, middleS)]
    if (commutationS > 0) {
      const edgeS = fromS + Math.min(commutationS, (toS - fromS) / 2)
      points.push([fromS, before], [edgeS, from + ((to - from) * (edgeS - fromS)) / (toS - fromS)], [toS, to])
    } else points.push([fromS, from], [toS, to])
    before = to
  }
  return createWaveform(periodS, points)
}

import { createWaveform } from '../waveforms/waveform'
import type { Waveform, WaveformPoint } from '../waveforms/waveform'
import { llcAfter } from './llc'
import type { LlcMode, LlcPoint, LlcState } from './llc'

/**
 * Angle of the tank's resonance that one straight piece stands for. A chord of angle h departs from its sine by at most h²/8 of the
 * amplitude, 0.05 %, and its rms is low by h²/12, 0.04 %.
 */
export const CHORD_RAD = 0.065

/** The state at an instant, with the mode around it; in the second half period everything is reversed. */
export interface LlcInstant extends LlcPoint {
  tS: number
  mode: LlcMode
  /** Voltage of the magnetising inductance. */
  magnetisingV: number
  /** +1 while the upper switch conducts, −1 while the lower one does. */
  half: 1 | -1
}

const clampedV = ({ tank, outputV }: LlcState, mode: LlcMode, { capacitorV }: LlcPoint): number => {
  if (mode !== 'O') return mode === 'P' ? outputV : -outputV
  return (tank.magnetisingInductanceH / (tank.resonantInductanceH + tank.magnetisingInductanceH)) * (tank.sourceV - capacitorV)
}

/** The whole period, two instants at each change of mode, fine enough for straight pieces between them. */
export function llcInstants(state: LlcState): LlcInstant[] {
  const { tank, segments, outputV, frequencyHz } = state
  const halfS = 1 / (2 * frequencyHz)
  const tankS = Math.sqrt(tank.resonantInductanceH * tank.resonantCapacitanceF)
  const half = segments.flatMap(({ mode, startS, durationS, from }): LlcInstant[] => {
    const pieces = Math.max(1, Math.ceil(durationS / (tankS * CHORD_RAD)))
    return Array.from({ length: pieces + 1 }, (_, index) => {
      const tS = index === pieces ? durationS : (durationS * index) / pieces
      const point = llcAfter(tank, outputV, { mode, from }, tS)
      return { ...point, mode, tS: Math.min(startS + tS, halfS), magnetisingV: clampedV(state, mode, point), half: 1 }
    })
  })
  const last = half[half.length - 1]!
  last.tS = halfS
  const mirrored = half.map((one): LlcInstant => ({
    tS: one.tS + halfS,
    mode: one.mode === 'O' ? 'O' : one.mode === 'P' ? 'N' : 'P',
    resonantA: -one.resonantA,
    capacitorV: -one.capacitorV,
    magnetisingA: -one.magnetisingA,
    magnetisingV: -one.magnetisingV,
    half: -1,
  }))
  return [...half, ...mirrored]
}

/** A quantity over the period, straight between the instants. */
export function llcWaveform({ frequencyHz }: LlcState, instants: readonly LlcInstant[], value: (instant: LlcInstant) => number): Waveform {
  const periodS = 1 / frequencyHz
  const points: WaveformPoint[] = instants.map((instant) => [instant.tS, value(instant)])
  points[0] = [0, points[0]![1]]
  points[points.length - 1] = [periodS, points[points.length - 1]![1]]
  return createWaveform(periodS, points)
}

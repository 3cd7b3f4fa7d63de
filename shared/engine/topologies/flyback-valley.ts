import { requirePositive } from '../require'
import { createWaveform, waveformSegments } from '../waveforms/waveform'
import type { Waveform, WaveformPoint } from '../waveforms/waveform'

export interface ValleyDuty {
  /** Across the primary while the switch conducts. */
  primaryVoltageV: number
  reflectedVoltageV: number
  transferredPowerW: number
  primaryInductanceH: number
  /** At the switched node, winding and switch together. */
  nodeCapacitanceF: number
  maximumFrequencyHz: number
}

export interface ValleyPoint {
  frequencyHz: number
  /** Which minimum of the ringing the switch closes in, from 1. */
  valley: number
  /** From the end of the secondaries' current to the switch closing. */
  deadS: number
}

/** Beyond this minimum the ringing has died away. Source: common practice. */
export const LAST_VALLEY = 12

/**
 * Frequency of a quasi-resonant flyback, which closes its switch in a minimum of the ringing: in the first one that keeps
 * below the greatest frequency.
 *
 *     T = L·Î·(1/V_p + 1/V_R) + t_d, t_d = (2n − 1)·π·√(L·C), ½·L·Î² = P·T
 *     Î = P·G + √(P²·G² + 2·P·t_d/L), G = 1/V_p + 1/V_R
 *
 * Source: energy balance and LC ringing; Fairchild AN-4146 and ON Semiconductor AND8145 (quasi-resonant flyback).
 *
 * @throws RangeError on a value that is not positive, or where even the last minimum is too fast
 */
export function valleyPoint(duty: ValleyDuty): ValleyPoint {
  for (const name of ['primaryVoltageV', 'reflectedVoltageV', 'transferredPowerW', 'primaryInductanceH', 'nodeCapacitanceF', 'maximumFrequencyHz'] as const) requirePositive(name, duty[name])
  for (let valley = 1; valley <= LAST_VALLEY; valley++) {
    const deadS = valleyDeadS(duty, valley)
    const frequencyHz = 1 / valleyPeriodS(duty, deadS)
    if (frequencyHz <= duty.maximumFrequencyHz) return { frequencyHz, valley, deadS }
  }
  throw new RangeError(`maximumFrequencyHz ${duty.maximumFrequencyHz} is passed even in minimum ${LAST_VALLEY} of the ringing`)
}

const valleyDeadS = ({ primaryInductanceH, nodeCapacitanceF }: ValleyDuty, valley: number) => (2 * valley - 1) * Math.PI * Math.sqrt(primaryInductanceH * nodeCapacitanceF)

function valleyPeriodS({ primaryVoltageV, reflectedVoltageV, transferredPowerW: powerW, primaryInductanceH }: ValleyDuty, deadS: number): number {
  const g = 1 / primaryVoltageV + 1 / reflectedVoltageV
  const peakA = powerW * g + Math.sqrt((powerW * g) ** 2 + (2 * powerW * deadS) / primaryInductanceH)
  return (primaryInductanceH * peakA ** 2) / (2 * powerW)
}

/** Straight pieces of one half swing. */
const PIECES = 6

interface RingInput {
  idleS: number
  valley: number
  reflectedVoltageV: number
  primaryInductanceH: number
  nodeCapacitanceF: number
}

/**
 * The last, idle span of a primary's waveforms as the ringing between magnetising inductance and node: v = −V_R·cos ωt,
 * i = −V_R·√(C/L)·sin ωt, drawn in straight pieces and without damping.
 *
 * Source: LC circuit.
 */
export function ringing(primary: { currentA: Waveform; voltageV: Waveform }, ring: RingInput): { currentA: Waveform; voltageV: Waveform } {
  const amplitudeA = ring.reflectedVoltageV * Math.sqrt(ring.nodeCapacitanceF / ring.primaryInductanceH)
  return {
    currentA: withEnd(primary.currentA, ring, (angle) => -amplitudeA * Math.sin(angle)),
    voltageV: withEnd(primary.voltageV, ring, (angle) => -ring.reflectedVoltageV * Math.cos(angle)),
  }
}

/** The same span of a winding that carries no current then: only its voltage rings, by its turns. */
export const ringingVoltage = (voltageV: Waveform, ring: RingInput): Waveform => withEnd(voltageV, ring, (angle) => -ring.reflectedVoltageV * Math.cos(angle))

/** A current that stays zero, on the same times. */
export const quietEnd = (currentA: Waveform, ring: RingInput): Waveform => withEnd(currentA, ring, () => 0)

function withEnd(waveform: Waveform, { idleS, valley }: RingInput, of: (angle: number) => number): Waveform {
  const { periodS } = waveform
  const startS = periodS - idleS
  const kept = waveformSegments(waveform).filter(({ endS }) => endS <= startS * (1 + 1e-9)).flatMap(({ startS: s, endS, from, to }): WaveformPoint[] => [[s, from], [endS, to]])
  const beginS = kept[kept.length - 1]?.[0] ?? 0
  const count = PIECES * (2 * valley - 1)
  const points = Array.from({ length: count + 1 }, (_, index): WaveformPoint => [index === count ? periodS : beginS + ((periodS - beginS) * index) / count, of((index / count) * (2 * valley - 1) * Math.PI)])
  return createWaveform(periodS, [...kept, ...points])
}

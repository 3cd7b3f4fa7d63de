import { requireNotNegative, requirePositive } from '../require'
import { scaleWaveform } from '../waveforms/combine'
import { constantWaveform, createWaveform } from '../waveforms/waveform'
import type { Waveform, WaveformPoint } from '../waveforms/waveform'
import type { WindingWaveforms } from './flyback'

export interface CommonModeChokeStageDuty {
  /** Of each winding. */
  turns: number
  /** Of one winding, the other open. */
  inductanceH: number
  /** Seen at one winding with the other shorted: what the line current sees. */
  differentialLeakageH: number
  lineRmsA: number
  /** Of the line current; above √2 times the rms for a rectifier with a capacitor. */
  linePeakA: number
  /** 0 for a direct current. */
  lineFrequencyHz: number
}

export interface CommonModeChokeState {
  /** There and back; equal and opposite, so that their ampere-turns cancel. */
  windings: readonly [WindingWaveforms, WindingWaveforms]
  /** Flux linkage of the line current in the leakage, L_dm·i, of one winding, in weber. */
  differentialFluxLinkageWb: Waveform
  /** Angle over half a period in which the line current flows, 0…1. */
  conductingShare: number
}

/** Straight pieces of a half sine. */
const PIECES = 16

/** Mean square of the chords over the square of the peak: (2 + cos h)/6 with h = π/pieces; ½ for the sine itself. */
const CHORD_SQUARE = (2 + Math.cos(Math.PI / PIECES)) / 6

/**
 * A common-mode choke at its line current. The line current flows there and back, and its ampere-turns cancel but for the
 * leakage; a rectifier's current is drawn as half sines of the stated peak that give the stated rms.
 *
 *     conducting share κ = 2·(I_rms/Î)²;  flux linkage L_dm·i
 *
 * Source: M. Nave, Power Line Filter Design for Switched-Mode Power Supplies (leakage flux of common-mode chokes); mean square of a half sine.
 *
 * @throws RangeError on a value out of its range, or a peak below the rms value
 */
export function commonModeChokeState(duty: CommonModeChokeStageDuty): CommonModeChokeState {
  requirePositive('turns', duty.turns)
  requirePositive('inductanceH', duty.inductanceH)
  requireNotNegative('differentialLeakageH', duty.differentialLeakageH)
  requirePositive('lineRmsA', duty.lineRmsA)
  requireNotNegative('lineFrequencyHz', duty.lineFrequencyHz)
  if (!(duty.linePeakA >= duty.lineRmsA * (1 - 1e-9))) throw new RangeError(`linePeakA must not be below the rms value ${duty.lineRmsA}: ${duty.linePeakA}`)
  const { currentA, conductingShare } = lineCurrent(duty)
  const voltageV = leakageVoltage(currentA, duty.differentialLeakageH / 2)
  return {
    windings: [{ currentA, voltageV }, { currentA: scaleWaveform(currentA, -1), voltageV: scaleWaveform(voltageV, -1) }],
    differentialFluxLinkageWb: scaleWaveform(currentA, duty.differentialLeakageH),
    conductingShare,
  }
}

function lineCurrent({ lineRmsA, linePeakA, lineFrequencyHz }: CommonModeChokeStageDuty): { currentA: Waveform; conductingShare: number } {
  if (lineFrequencyHz === 0) return { currentA: constantWaveform(1, lineRmsA), conductingShare: 1 }
  const share = Math.min(1, (lineRmsA / linePeakA) ** 2 / CHORD_SQUARE)
  // The rms value heats and is kept exactly; a sine's chords stand for it with a peak that is higher by 0.3 %.
  const amplitude = share === 1 ? lineRmsA / Math.sqrt(CHORD_SQUARE) : linePeakA
  const periodS = 1 / lineFrequencyHz
  const half = (sign: 1 | -1): WaveformPoint[] => {
    const startS = (sign > 0 ? 0 : periodS / 2) + ((1 - share) * periodS) / 4
    return Array.from({ length: PIECES + 1 }, (_, index) => [startS + (share * periodS * index) / (2 * PIECES), sign * amplitude * Math.sin((Math.PI * index) / PIECES)] as const)
  }
  return { currentA: createWaveform(periodS, [[0, 0], ...half(1), ...half(-1), [periodS, 0]].map(([tS, value]) => [Math.min(tS!, periodS), value!] as const)), conductingShare: share }
}

/** v = L·di/dt piece by piece. */
function leakageVoltage({ periodS, points }: Waveform, inductanceH: number): Waveform {
  const steps = points.slice(1).flatMap(([tS, value], index): WaveformPoint[] => {
    const [beforeS, before] = points[index]!
    if (tS <= beforeS) return []
    const volts = (inductanceH * (value - before)) / (tS - beforeS)
    return [[beforeS, volts], [tS, volts]]
  })
  return createWaveform(periodS, steps)
}

/**
 * Impedance of an inductance, 2π·f·L, in ohm: what a choke has of it below the frequency at which its material lets go.
 *
 * Source: definition.
 *
 * @throws RangeError on a value that is not positive
 */
export function inductiveImpedanceOhm(inductanceH: number, frequencyHz: number): number {
  requirePositive('inductanceH', inductanceH)
  requirePositive('frequencyHz', frequencyHz)
  return 2 * Math.PI * frequencyHz * inductanceH
}

/**
 * Peak flux density of the line current's leakage, L_dm·Î/(N·A_e), in tesla: the whole leakage taken in the core of one
 * winding, which is on the safe side.
 *
 * Source: M. Nave, Power Line Filter Design for Switched-Mode Power Supplies; Faraday’s law.
 *
 * @throws RangeError on a value out of its range
 */
export function differentialFluxDensityT(input: { differentialLeakageH: number; peakA: number; turns: number; areaMm2: number }): number {
  requireNotNegative('differentialLeakageH', input.differentialLeakageH)
  requireNotNegative('peakA', input.peakA)
  requirePositive('turns', input.turns)
  requirePositive('areaMm2', input.areaMm2)
  return (input.differentialLeakageH * input.peakA) / (input.turns * input.areaMm2 * 1e-6)
}

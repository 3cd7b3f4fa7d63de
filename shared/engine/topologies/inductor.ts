import { requireNotNegative, requirePositive } from '../require'
import { offsetWaveform, scaleWaveform } from '../waveforms/combine'
import { mean, rms, acRms } from '../waveforms/statistics'
import type { Waveform } from '../waveforms/waveform'
import { conductionMode, threeIntervals } from './flyback'
import type { ConductionMode, WindingWaveforms } from './flyback'

/** One winding that sees one voltage while the switch conducts and another while the rectifier does. */
export interface SingleInductorDuty {
  frequencyHz: number
  inductanceH: number
  /** Across the winding while the switch conducts, > 0. */
  onVoltageV: number
  /** Magnitude of the voltage that lets the current fall, > 0. */
  offVoltageV: number
  /** Mean of the winding's current over the period, > 0. */
  meanCurrentA: number
}

export interface InductorState extends WindingWaveforms {
  mode: ConductionMode
  dutyCycle: number
  /** Fraction of the period in which the rectifier conducts. */
  rectifierFraction: number
  rippleA: number
  peakCurrentA: number
  minimumCurrentA: number
  /** Flux linkage of the whole winding, L·i, in weber. */
  fluxLinkageWb: Waveform
  /** Voltage across the open switch; null where the duty does not say. */
  switchStressV: number | null
}

/**
 * Steady state of a single inductor; the mode is found, not assumed.
 *
 *     continuous: D = V_off/(V_on + V_off), ΔI = V_on·D/(L·f)
 *     discontinuous (mean below ΔI/2): D = √(2·I·L·f/(V_on·(1 + V_on/V_off))), D_2 = D·V_on/V_off
 *
 * Source: R. Erickson and D. Maksimović, Fundamentals of Power Electronics, ch. 2 and 5.
 *
 * @throws RangeError on a value that is not positive
 */
export function singleInductorState(duty: SingleInductorDuty): InductorState {
  const { frequencyHz, inductanceH, onVoltageV, offVoltageV, meanCurrentA } = duty
  for (const name of ['frequencyHz', 'inductanceH', 'onVoltageV', 'offVoltageV', 'meanCurrentA'] as const) requirePositive(name, duty[name])
  const continuousDuty = offVoltageV / (onVoltageV + offVoltageV)
  const continuousRippleA = (onVoltageV * continuousDuty) / (inductanceH * frequencyHz)
  const mode = conductionMode(continuousRippleA / (2 * meanCurrentA))
  const continuous = mode !== 'discontinuous'
  const dutyCycle = continuous ? continuousDuty : Math.sqrt((2 * meanCurrentA * inductanceH * frequencyHz) / (onVoltageV * (1 + onVoltageV / offVoltageV)))
  const rectifierFraction = continuous ? 1 - continuousDuty : (dutyCycle * onVoltageV) / offVoltageV
  const rippleA = (onVoltageV * dutyCycle) / (inductanceH * frequencyHz)
  const minimumCurrentA = mode === 'continuous' ? meanCurrentA - rippleA / 2 : 0
  const shape = threeIntervals(frequencyHz, { dutyCycle, secondaryFraction: rectifierFraction })
  const peakCurrentA = minimumCurrentA + rippleA
  const currentA = shape([minimumCurrentA, peakCurrentA], [peakCurrentA, minimumCurrentA])
  return {
    mode, dutyCycle, rectifierFraction, rippleA, peakCurrentA, minimumCurrentA, currentA,
    voltageV: shape([onVoltageV, onVoltageV], [-offVoltageV, -offVoltageV]),
    fluxLinkageWb: scaleWaveform(currentA, inductanceH),
    switchStressV: null,
  }
}

export interface ConverterInductorDuty {
  inputVoltageV: number
  /** Voltage across the closed switch. */
  switchDropV?: number
  outputVoltageV: number
  rectifierDropV: number
  outputCurrentA: number
  frequencyHz: number
  inductanceH: number
}

/**
 * Inductor of a buck converter: the whole output current flows through it in every mode.
 *
 * Source: R. Erickson and D. Maksimović, Fundamentals of Power Electronics, ch. 2 and 5; on and off voltage with the drops.
 *
 * @throws RangeError when the input does not exceed output and drops, or on a value out of its range
 */
export function buckInductorState(duty: ConverterInductorDuty): InductorState {
  const { inputVoltageV, outputVoltageV, switchDropV, rectifierDropV } = checked(duty)
  const onVoltageV = inputVoltageV - switchDropV - outputVoltageV
  requirePositive('inputVoltageV - switchDropV - outputVoltageV', onVoltageV)
  const state = singleInductorState({ ...duty, onVoltageV, offVoltageV: outputVoltageV + rectifierDropV, meanCurrentA: duty.outputCurrentA })
  return { ...state, switchStressV: inputVoltageV + rectifierDropV }
}

/**
 * Inductor of a boost converter: it carries the input current, I = I_o·(V_o + V_F − V_sw)/(V_in − V_sw) in continuous
 * conduction, from the mean over the rectifier's interval; in discontinuous conduction D_2·Î/2 = I_o.
 *
 * Source: R. Erickson and D. Maksimović, Fundamentals of Power Electronics, ch. 2, 3 and 5.
 *
 * @throws RangeError when output and drop do not exceed the input, or on a value out of its range
 */
export function boostInductorState(duty: ConverterInductorDuty): InductorState {
  const { inputVoltageV, outputVoltageV, switchDropV, rectifierDropV } = checked(duty)
  const onVoltageV = inputVoltageV - switchDropV
  requirePositive('inputVoltageV - switchDropV', onVoltageV)
  const offVoltageV = outputVoltageV + rectifierDropV - inputVoltageV
  requirePositive('outputVoltageV + rectifierDropV - inputVoltageV', offVoltageV)
  // The rectifier passes the share D_2/(D + D_2) of the mean current in both modes, which is V_on/(V_on + V_off).
  const meanCurrentA = (duty.outputCurrentA * (onVoltageV + offVoltageV)) / onVoltageV
  return { ...singleInductorState({ ...duty, onVoltageV, offVoltageV, meanCurrentA }), switchStressV: outputVoltageV + rectifierDropV }
}

function checked(duty: ConverterInductorDuty): Required<ConverterInductorDuty> {
  const switchDropV = duty.switchDropV ?? 0
  requirePositive('inputVoltageV', duty.inputVoltageV)
  requireNotNegative('switchDropV', switchDropV)
  requirePositive('outputVoltageV', duty.outputVoltageV)
  requireNotNegative('rectifierDropV', duty.rectifierDropV)
  requirePositive('outputCurrentA', duty.outputCurrentA)
  return { ...duty, switchDropV }
}

// ---------------------------------------------------------------------------------------------

export interface LineBoostDuty {
  /** Rms of the sinusoidal line. */
  lineVoltageV: number
  outputVoltageV: number
  rectifierDropV: number
  /** Drawn from the line at unity power factor. */
  inputPowerW: number
  frequencyHz: number
  inductanceH: number
}

export interface LineBoostState {
  /** At the crest of the line. */
  crest: InductorState
  /** Angle at which the ripple is greatest, rad. */
  greatestRippleAngle: number
  greatestRippleA: number
  greatestPeakA: number
  /** Over the half-wave, line and switching frequency together. */
  rmsA: number
  /** Switching-frequency part alone, over the half-wave. */
  rippleRmsA: number
  /** One switching period with the half-wave's mean square in its mean and its ripple. */
  equivalent: InductorState
  /** Part of the half-wave in which conduction is discontinuous. */
  discontinuousShare: number
}

/** Points of the half-wave at which the switching period is solved; the midpoint rule on them is exact to 10⁻⁴. */
const HALF_WAVE_POINTS = 60

/**
 * Boost inductor of a power-factor corrector with average-current control: line current i = √2·P/V·sin θ, duty
 * D = 1 − |v|/V_o, each switching period of a half-wave a steady state of its own.
 *
 *     I_rms² = ⟨i² + ΔI²/12⟩ over θ
 *
 * Source: R. Erickson and D. Maksimović, Fundamentals of Power Electronics, ch. 18 (rectifier with ideal line current).
 *
 * @throws RangeError when the output does not exceed the crest of the line, or on a value out of its range
 */
export function lineBoostState(duty: LineBoostDuty): LineBoostState {
  requirePositive('lineVoltageV', duty.lineVoltageV)
  requirePositive('inputPowerW', duty.inputPowerW)
  requireNotNegative('rectifierDropV', duty.rectifierDropV)
  requirePositive('outputVoltageV + rectifierDropV - √2·lineVoltageV', duty.outputVoltageV + duty.rectifierDropV - Math.SQRT2 * duty.lineVoltageV)
  const angles = Array.from({ length: HALF_WAVE_POINTS }, (_, index) => ((index + 0.5) / HALF_WAVE_POINTS) * (Math.PI / 2))
  const states = angles.map((angle) => lineBoostAt(duty, angle))
  const average = (of: (state: InductorState) => number) => states.reduce((sum, state) => sum + of(state), 0) / states.length
  const rmsA = Math.sqrt(average(({ currentA }) => rms(currentA) ** 2))
  const rippleRmsA = Math.sqrt(average(({ currentA }) => acRms(currentA) ** 2))
  const crest = lineBoostAt(duty, Math.PI / 2)
  const all = [...states, crest]
  const greatestRippleA = Math.max(...all.map(({ rippleA }) => rippleA))
  return {
    crest, greatestRippleA, rmsA, rippleRmsA,
    greatestRippleAngle: [...angles, Math.PI / 2][all.findIndex(({ rippleA }) => rippleA === greatestRippleA)]!,
    greatestPeakA: Math.max(...all.map(({ peakCurrentA }) => peakCurrentA)),
    equivalent: equivalentPeriod(duty, { rmsA, rippleRmsA }),
    discontinuousShare: average(({ mode }) => (mode === 'discontinuous' ? 1 : 0)),
  }
}

/** The switching period at one angle of the half-wave, 0 < θ < π. @throws RangeError as `lineBoostState` */
export function lineBoostAt(duty: LineBoostDuty, angle: number): InductorState {
  const lineV = Math.SQRT2 * duty.lineVoltageV * Math.sin(angle)
  const outputV = duty.outputVoltageV + duty.rectifierDropV
  const state = singleInductorState({
    frequencyHz: duty.frequencyHz, inductanceH: duty.inductanceH, onVoltageV: lineV, offVoltageV: outputV - lineV,
    meanCurrentA: Math.SQRT2 * (duty.inputPowerW / duty.lineVoltageV) * Math.sin(angle),
  })
  return { ...state, switchStressV: outputV }
}

/** A triangle with the ripple's mean square on a mean with the rest; its duty is that of the line's mean voltage. */
function equivalentPeriod(duty: LineBoostDuty, { rmsA, rippleRmsA }: { rmsA: number; rippleRmsA: number }): InductorState {
  const outputV = duty.outputVoltageV + duty.rectifierDropV
  const dutyCycle = 1 - ((2 / Math.PI) * Math.SQRT2 * duty.lineVoltageV) / outputV
  const rippleA = Math.sqrt(12) * rippleRmsA
  const shape = threeIntervals(duty.frequencyHz, { dutyCycle, secondaryFraction: 1 - dutyCycle })
  const triangle = shape([0, rippleA], [rippleA, 0])
  const currentA = offsetWaveform(triangle, Math.sqrt(rmsA ** 2 - rippleRmsA ** 2) - mean(triangle))
  const volts = duty.inductanceH * rippleA * duty.frequencyHz
  const low = currentA.points[0]![1]
  return {
    mode: low > 0 ? 'continuous' : 'discontinuous', dutyCycle, rectifierFraction: 1 - dutyCycle, rippleA, currentA,
    minimumCurrentA: low, peakCurrentA: low + rippleA,
    voltageV: shape([volts / dutyCycle, volts / dutyCycle], [-volts / (1 - dutyCycle), -volts / (1 - dutyCycle)]),
    fluxLinkageWb: scaleWaveform(currentA, duty.inductanceH),
    switchStressV: outputV,
  }
}

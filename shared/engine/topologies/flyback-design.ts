import { requireBetween, requireNotNegative, requirePositive } from '../require'

const requireDuty = (dutyCycle: number) => {
  if (!(dutyCycle > 0 && dutyCycle < 1)) throw new RangeError(`dutyCycle must lie between 0 and 1: ${dutyCycle}`)
}

/**
 * Turns ratio N_p/N_s that gives a duty cycle in continuous conduction, n = (V_in/V_s)·D/(1 − D); the secondary
 * voltage includes its drops.
 *
 * Source: L. Dixon, SLUP127, p. 5-13.
 *
 * @throws RangeError unless both voltages are positive and the duty cycle lies between 0 and 1
 */
export function flybackTurnsRatio(input: { inputVoltageV: number; secondaryVoltageV: number; dutyCycle: number }): number {
  const { inputVoltageV, secondaryVoltageV, dutyCycle } = input
  requirePositive('inputVoltageV', inputVoltageV)
  requirePositive('secondaryVoltageV', secondaryVoltageV)
  requireDuty(dutyCycle)
  return ((inputVoltageV / secondaryVoltageV) * dutyCycle) / (1 - dutyCycle)
}

/**
 * Duty cycle in continuous conduction, D = V_R/(V_in + V_R), with the reflected voltage V_R = n·(V_o + V_F).
 *
 * Source: volt-second balance; L. Dixon, SLUP127, p. 5-13.
 *
 * @throws RangeError unless both voltages are positive
 */
export function flybackContinuousDuty(input: { inputVoltageV: number; reflectedVoltageV: number }): number {
  requirePositive('inputVoltageV', input.inputVoltageV)
  requirePositive('reflectedVoltageV', input.reflectedVoltageV)
  return input.reflectedVoltageV / (input.inputVoltageV + input.reflectedVoltageV)
}

export interface FlybackInductanceInput {
  inputVoltageV: number
  dutyCycle: number
  /** Power through the core. */
  powerW: number
  frequencyHz: number
  /** ΔI over twice the mean on-time current; 1 is the boundary of conduction. */
  rippleRatio: number
}

/**
 * Primary inductance for a ripple ratio, L = (V_in·D)²/(2·P·f·K_RF), in henry. K_RF = 1 gives the boundary inductance.
 *
 * Source: Fairchild AN-4137; L. Dixon, SLUP127.
 *
 * @throws RangeError unless every value is positive, the duty cycle below 1 and the ripple ratio at most 1
 */
export function flybackInductanceH(input: FlybackInductanceInput): number {
  const { inputVoltageV, dutyCycle, powerW, frequencyHz, rippleRatio } = input
  requirePositive('inputVoltageV', inputVoltageV)
  requireDuty(dutyCycle)
  requirePositive('powerW', powerW)
  requirePositive('frequencyHz', frequencyHz)
  requireBetween('rippleRatio', rippleRatio, Number.MIN_VALUE, 1)
  return (inputVoltageV * dutyCycle) ** 2 / (2 * powerW * frequencyHz * rippleRatio)
}

/** Inductance at which conduction is just continuous, in henry: `flybackInductanceH` with a ripple ratio of 1. */
export const flybackBoundaryInductanceH = (input: Omit<FlybackInductanceInput, 'rippleRatio'>): number =>
  flybackInductanceH({ ...input, rippleRatio: 1 })

export interface CurrentLimitInput {
  thresholdA: number
  /** Tolerance of the threshold as a fraction, e.g. 0.1. */
  toleranceFraction: number
  /** From the threshold crossed to the switch open. */
  delayS: number
  /** The greatest input voltage: the current overshoots fastest there. */
  inputVoltageV: number
  /** The least inductance: as above. */
  inductanceH: number
}

/**
 * Greatest current the switch lets through, I = I_lim·(1 + tol) + V_in·t_d/L, in ampere.
 *
 * Source: Faraday's law over the delay of the current limit.
 *
 * @throws RangeError on a negative or missing value
 */
export function worstCaseCurrentLimitA(input: CurrentLimitInput): number {
  requirePositive('thresholdA', input.thresholdA)
  requireNotNegative('toleranceFraction', input.toleranceFraction)
  requireNotNegative('delayS', input.delayS)
  requirePositive('inputVoltageV', input.inputVoltageV)
  requirePositive('inductanceH', input.inductanceH)
  return input.thresholdA * (1 + input.toleranceFraction) + (input.inputVoltageV * input.delayS) / input.inductanceH
}

/**
 * Voltage across the open switch, V_in + V_R + spike, in volt.
 *
 * Source: flyback circuit equation; the spike is the designer's margin for leakage inductance.
 *
 * @throws RangeError on a negative or missing value
 */
export function switchStressV(input: { inputVoltageV: number; reflectedVoltageV: number; spikeVoltageV?: number }): number {
  requirePositive('inputVoltageV', input.inputVoltageV)
  requirePositive('reflectedVoltageV', input.reflectedVoltageV)
  requireNotNegative('spikeVoltageV', input.spikeVoltageV ?? 0)
  return input.inputVoltageV + input.reflectedVoltageV + (input.spikeVoltageV ?? 0)
}

/**
 * Reverse voltage of the rectifier, V_in/n + V_o, in volt, without spike.
 *
 * Source: flyback circuit equation; UC3842 data sheet, design procedure.
 *
 * @throws RangeError on a negative or missing value
 */
export function rectifierStressV(input: { inputVoltageV: number; turnsRatio: number; outputVoltageV: number }): number {
  requirePositive('inputVoltageV', input.inputVoltageV)
  requirePositive('turnsRatio', input.turnsRatio)
  return input.inputVoltageV / input.turnsRatio + Math.abs(input.outputVoltageV)
}

export interface ApplicationNoteSecondaryInput {
  primaryRmsA: number
  dutyCycle: number
  reflectedVoltageV: number
  /** This output's part of the output power. */
  powerShare: number
  outputVoltageV: number
  rectifierDropV: number
}

/**
 * Secondary rms current as the application note has it, in ampere:
 * I = I_p,rms·√((1 − D)/D)·V_RO·K_L/(V_o + V_F).
 *
 * Its primary current rests on P_out/η, so it exceeds the loss-less value by V_o/(η·(V_o + V_F)).
 * Source: Fairchild AN-4137.
 *
 * @throws RangeError on a value out of its range
 */
export function applicationNoteSecondaryRmsA(input: ApplicationNoteSecondaryInput): number {
  const { primaryRmsA, dutyCycle, reflectedVoltageV, powerShare, outputVoltageV, rectifierDropV } = input
  requirePositive('primaryRmsA', primaryRmsA)
  requireDuty(dutyCycle)
  requirePositive('reflectedVoltageV', reflectedVoltageV)
  requireBetween('powerShare', powerShare, 0, 1)
  requireNotNegative('rectifierDropV', rectifierDropV)
  requirePositive('|outputVoltageV| + rectifierDropV', Math.abs(outputVoltageV) + rectifierDropV)
  return (primaryRmsA * Math.sqrt((1 - dutyCycle) / dutyCycle) * reflectedVoltageV * powerShare) / (Math.abs(outputVoltageV) + rectifierDropV)
}

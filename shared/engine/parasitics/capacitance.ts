import { requireNotNegative, requirePositive } from '../require'

/**
 * Capacitive current of an a.c. electric-strength test, I = 2π·f·C·V, in ampere rms.
 *
 * Source: impedance of a capacitance.
 *
 * @throws RangeError unless the frequency is positive and the others are not negative
 */
export function capacitiveTestCurrentA(input: { capacitanceF: number; testVoltageV: number; frequencyHz: number }): number {
  requireNotNegative('capacitanceF', input.capacitanceF)
  requireNotNegative('testVoltageV', input.testVoltageV)
  requirePositive('frequencyHz', input.frequencyHz)
  return 2 * Math.PI * input.frequencyHz * input.capacitanceF * input.testVoltageV
}

/**
 * Apparent over true inductance below self-resonance, 1/(1 − (f/f_r)²).
 *
 * Source: parallel resonance without loss.
 *
 * @throws RangeError unless the frequency lies below the resonance
 */
export function apparentInductanceRatio(input: { frequencyHz: number; selfResonanceHz: number }): number {
  requirePositive('frequencyHz', input.frequencyHz)
  if (!(input.selfResonanceHz > input.frequencyHz)) throw new RangeError(`selfResonanceHz must exceed frequencyHz ${input.frequencyHz}: ${input.selfResonanceHz}`)
  return 1 / (1 - (input.frequencyHz / input.selfResonanceHz) ** 2)
}

/**
 * Self-resonant frequency of a winding, 1/(2π·√(L·C)), in Hz.
 *
 * Source: parallel resonance without loss.
 *
 * @throws RangeError unless both are positive
 */
export function selfResonanceHz(input: { inductanceH: number; capacitanceF: number }): number {
  requirePositive('inductanceH', input.inductanceH)
  requirePositive('capacitanceF', input.capacitanceF)
  return 1 / (2 * Math.PI * Math.sqrt(input.inductanceH * input.capacitanceF))
}

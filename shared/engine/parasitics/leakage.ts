import { MU_0_H_PER_M } from '../constants'
import { requireCount, requireNotNegative, requirePositive } from '../require'

export interface ConcentricLeakageInput {
  /** Turns of the winding to which the inductance is referred. */
  turns: number
  meanTurnLengthMm: number
  /** Breadth of the windings along the axis, margins left out. */
  breadthMm: number
  /** Builds of all windings and parts of windings. */
  windingHeightsMm: readonly number[]
  /** Insulation at each interface of primary and secondary. */
  interfaceGapsMm: readonly number[]
  /** Interfaces of primary and secondary: 1 simple, 2 for P–S–P. */
  interfaces: number
}

/**
 * Leakage inductance of concentric windings of one breadth, in henry:
 *
 *     L = µ0·N²·MLT/(b·p²)·(Σh/3 + Σx)
 *
 * Field parallel to the winding over its whole breadth; ±40 % where the windings do not fill the breadth.
 * Source: E. Snelling, Soft Ferrites, 2nd ed., ch. 11; L. Dixon, SLUP127.
 *
 * @throws RangeError on a value out of its range
 */
export function concentricLeakageH(input: ConcentricLeakageInput): number {
  const { turns, meanTurnLengthMm, breadthMm, windingHeightsMm, interfaceGapsMm, interfaces } = input
  requirePositive('turns', turns)
  requirePositive('meanTurnLengthMm', meanTurnLengthMm)
  requirePositive('breadthMm', breadthMm)
  requireCount('interfaces', interfaces)
  if (windingHeightsMm.length === 0) throw new RangeError('windingHeightsMm must hold at least one')
  windingHeightsMm.forEach((height, index) => requirePositive(`windingHeightsMm.${index}`, height))
  interfaceGapsMm.forEach((gap, index) => requireNotNegative(`interfaceGapsMm.${index}`, gap))
  const sum = (list: readonly number[]) => list.reduce((total, value) => total + value, 0)
  const heightMm = sum(windingHeightsMm) / 3 + sum(interfaceGapsMm)
  return (MU_0_H_PER_M * turns ** 2 * meanTurnLengthMm * 1e-3 * heightMm) / (breadthMm * interfaces ** 2)
}

/** Relative accuracy that can be claimed for `concentricLeakageH`. Source: comparison with the examples of L. Dixon, SLUP127. */
export const CONCENTRIC_LEAKAGE_ACCURACY_FRACTION = 0.4

/**
 * Loss in the clamp of a flyback, ½·L·I²·f·V_c/(V_c − V_R), in watt; the clamp voltage stands above the input voltage.
 *
 * Source: energy of the leakage inductance while it discharges against V_c − V_R; textbook.
 *
 * @throws RangeError unless the clamp voltage exceeds the reflected voltage
 */
export function clampLossW(input: {
  leakageInductanceH: number
  peakCurrentA: number
  frequencyHz: number
  clampVoltageV: number
  reflectedVoltageV: number
}): number {
  const { leakageInductanceH, peakCurrentA, frequencyHz, clampVoltageV, reflectedVoltageV } = input
  requireNotNegative('leakageInductanceH', leakageInductanceH)
  requireNotNegative('peakCurrentA', peakCurrentA)
  requirePositive('frequencyHz', frequencyHz)
  requirePositive('reflectedVoltageV', reflectedVoltageV)
  if (!(clampVoltageV > reflectedVoltageV)) throw new RangeError(`clampVoltageV must exceed reflectedVoltageV ${reflectedVoltageV}: ${clampVoltageV}`)
  return (0.5 * leakageInductanceH * peakCurrentA ** 2 * frequencyHz * clampVoltageV) / (clampVoltageV - reflectedVoltageV)
}

import { MU_0_H_PER_M } from '../constants'
import { requirePositive } from '../require'

/**
 * Inductance L = A_L·N², in henry, of an inductance factor in henry per turn squared.
 *
 * Source: definition, IEC 62044-2.
 *
 * @throws RangeError unless both are positive
 */
export function inductanceFromFactorH(input: { inductanceFactorH: number; turns: number }): number {
  requirePositive('inductanceFactorH', input.inductanceFactorH)
  requirePositive('turns', input.turns)
  return input.inductanceFactorH * input.turns ** 2
}

/** Inductance factor A_L = L/N², in henry per turn squared. Source: definition, IEC 62044-2. @throws RangeError unless both are positive */
export function inductanceFactorH(input: { inductanceH: number; turns: number }): number {
  requirePositive('inductanceH', input.inductanceH)
  requirePositive('turns', input.turns)
  return input.inductanceH / input.turns ** 2
}

export interface PathInput {
  areaMm2: number
  lengthMm: number
}

/**
 * Inductance factor A_L = µ0·µ_e·A_e/l_e, in henry per turn squared.
 *
 * Source: IEC 60205, IEC 62044-2.
 *
 * @throws RangeError unless all are positive
 */
export function inductanceFactorOfPathH({ areaMm2, lengthMm, permeability }: PathInput & { permeability: number }): number {
  requirePositive('areaMm2', areaMm2)
  requirePositive('lengthMm', lengthMm)
  requirePositive('permeability', permeability)
  return (MU_0_H_PER_M * permeability * areaMm2 * 1e-3) / lengthMm
}

/** Effective permeability µ_e = A_L·l_e/(µ0·A_e). Source: IEC 60205, IEC 62044-2. @throws RangeError unless all are positive */
export function effectivePermeability({ areaMm2, lengthMm, inductanceFactorH: factorH }: PathInput & { inductanceFactorH: number }): number {
  requirePositive('areaMm2', areaMm2)
  requirePositive('lengthMm', lengthMm)
  requirePositive('inductanceFactorH', factorH)
  return (factorH * lengthMm) / (MU_0_H_PER_M * areaMm2 * 1e-3)
}

/**
 * Turns for an inductance on a given factor, N = √(L/A_L), not rounded.
 *
 * Source: definition, IEC 62044-2.
 *
 * @throws RangeError unless both are positive
 */
export function turnsForInductance(input: { inductanceH: number; inductanceFactorH: number }): number {
  requirePositive('inductanceH', input.inductanceH)
  requirePositive('inductanceFactorH', input.inductanceFactorH)
  return Math.sqrt(input.inductanceH / input.inductanceFactorH)
}

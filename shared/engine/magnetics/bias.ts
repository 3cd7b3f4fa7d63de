import { interpolateTable } from '../interpolate'
import type { Answer } from '../answer'
import { notCheckable } from '../answer'
import { requireNotNegative, requirePositive } from '../require'

/** Share of the initial permeability that is left under a static field. */
export interface BiasPoint {
  fieldAPerM: number
  permeabilityShare: number
}

/**
 * Static field in the core, H = N·I/l_e, in A/m.
 *
 * Source: Ampère's law over the effective length, IEC 60205.
 *
 * @throws RangeError unless turns and length are positive and the current is not negative
 */
export function biasFieldAPerM({ turns, currentA, effectiveLengthMm }: { turns: number; currentA: number; effectiveLengthMm: number }): number {
  requirePositive('turns', turns)
  requirePositive('effectiveLengthMm', effectiveLengthMm)
  requireNotNegative('currentA', currentA)
  return (turns * currentA) / (effectiveLengthMm * 1e-3)
}

/**
 * Share of permeability (and of inductance, in a core without gap) left under a static field: straight lines between the
 * published points, full permeability below the first; beyond the last point not checkable.
 *
 * Source: the material's data sheet, named by the caller.
 *
 * @throws RangeError when the field is negative
 */
export function permeabilityShare(points: readonly BiasPoint[], fieldAPerM: number): Answer<number> {
  requireNotNegative('fieldAPerM', fieldAPerM)
  if (points.length === 0) return notCheckable('no-data')
  const rows = [...points].sort((one, other) => one.fieldAPerM - other.fieldAPerM).map(({ fieldAPerM: field, permeabilityShare: share }) => [field, share] as const)
  return interpolateTable(rows[0]![0] > 0 ? [[0, 1], ...rows] : rows, fieldAPerM)
}

/**
 * Points of a generic bias curve of a powder core, from its saturation alone: µ/µ_i = 1/(1 + (H/H_50)^c), with half of the
 * permeability left at H_50 = 0.6·B_sat/(µ0·µ_i) and c = 1.7.
 *
 * Source: form and both figures are common practice from memory for powders with a distributed gap; to be replaced by the
 * maker's curve before release.
 *
 * @throws RangeError unless both are positive
 */
export function genericPowderBias({ saturationT, permeability }: { saturationT: number; permeability: number }): BiasPoint[] {
  requirePositive('saturationT', saturationT)
  requirePositive('permeability', permeability)
  const halfFieldAPerM = (0.6 * saturationT) / (4e-7 * Math.PI * permeability)
  return [0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.8, 1, 1.25, 1.5, 2].map((ratio) => ({
    fieldAPerM: ratio * halfFieldAPerM,
    permeabilityShare: 1 / (1 + ratio ** 1.7),
  }))
}

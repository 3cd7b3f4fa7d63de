import { COPPER_RESISTIVITY_20C_OHM_MM2_PER_M } from '../constants'
import { requireNotNegative, requirePositive } from '../require'

/** What a foil stays off each flange or margin, so that its edges do not cut the tape beside it, mm. Source: common practice, 0.1 to 0.25 mm a side. */
export const FOIL_EDGE_MM = 0.2

/**
 * Widest foil for a layer, in mm: the width between the margins less the edges and what edge insulation wraps round both sides.
 *
 * Source: common practice of foil winding.
 *
 * @throws RangeError unless the width is positive and the others are not negative; 0 where nothing is left
 */
export function foilWidthMm(input: { availableMm: number; edgeMm?: number; edgeInsulationMm?: number }): number {
  const { availableMm, edgeMm = FOIL_EDGE_MM, edgeInsulationMm = 0 } = input
  requireNotNegative('availableMm', availableMm)
  requireNotNegative('edgeMm', edgeMm)
  requireNotNegative('edgeInsulationMm', edgeInsulationMm)
  return Math.max(0, availableMm - 2 * (edgeMm + edgeInsulationMm))
}

/** Resistance of a foil at 20 °C, 1/58 Ω·mm²/m over thickness times width, in Ω/m. Source: IEC 60028:1925. @throws RangeError unless both are positive */
export function foilResistanceOhmPerM({ thicknessMm, widthMm }: { thicknessMm: number; widthMm: number }): number {
  requirePositive('thicknessMm', thicknessMm)
  requirePositive('widthMm', widthMm)
  return COPPER_RESISTIVITY_20C_OHM_MM2_PER_M / (thicknessMm * widthMm)
}

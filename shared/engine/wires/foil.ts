import { COPPER_RESISTIVITY_20C_OHM_MM2_PER_M } from '../constants'
import { requireCount, requireNotNegative, requirePositive } from '../require'

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

/** Thickness over skin depth of least resistance by number of layers of a portion from no field to the full one. */
const OPTIMUM: readonly (readonly [layers: number, ratio: number])[] = [[1, Math.PI / 2], [2, 0.9613], [3, 0.7704], [4, 0.6631], [5, 0.5914], [6, 0.5391], [8, 0.4662], [10, 0.4167]]

/**
 * Foil thickness of least ac resistance for sine current, in mm: the minimum of Dowell's factor over the thickness, its
 * asymptote (15/(5m² − 1))^¼ above ten layers.
 *
 * Source: P. Dowell, Proc. IEE 113 (1966) 1387; W. Hurley et al., IEEE Trans. Power Electron. 15 (2000) 369.
 *
 * @throws RangeError unless the layers are a whole number and the skin depth is positive
 */
export function bestFoilMm({ layers, skinDepthMm }: { layers: number; skinDepthMm: number }): number {
  requireCount('layers', layers)
  requirePositive('skinDepthMm', skinDepthMm)
  const row = OPTIMUM.find(([count]) => count === layers)
  return skinDepthMm * (row ? row[1] : (15 / (5 * layers ** 2 - 1)) ** 0.25)
}

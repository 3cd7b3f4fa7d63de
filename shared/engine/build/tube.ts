import type { CoreRow, FormerRow } from '../library'
import { requireNotNegative } from '../require'

/**
 * Length in mm of one turn whose centre lies `heightMm` above the winding tube.
 *
 * Round tube: π·(D + 2y). Rectangular tube with corner radius r: the four straight parts stay, the four
 * corners become quarter circles of radius r + y: 2·(w − 2r) + 2·(d − 2r) + 2π·(r + y).
 *
 * Source: geometry.
 *
 * @throws RangeError when the height is negative
 */
export function turnLengthMm(tube: FormerRow['tube'], heightMm: number): number {
  requireNotNegative('heightMm', heightMm)
  if (tube.shape === 'round') return Math.PI * (tube.diameterMm + 2 * heightMm)

  const radiusMm = Math.min(tube.cornerRadiusMm, tube.widthMm / 2, tube.depthMm / 2)
  return 2 * (tube.widthMm - 2 * radiusMm) + 2 * (tube.depthMm - 2 * radiusMm) + 2 * Math.PI * (radiusMm + heightMm)
}

/**
 * By how much a layer-wound coil is thicker than the sum of its diameters on a round tube: wires ride up
 * at the layer ends and over lead-outs. Source: common practice of winding shops, 5 to 10 %, upper end.
 */
export const BULGE_ROUND_TUBE = 1.1

/**
 * The same on a rectangular tube, where the flat sides bow. Source: W. T. McLyman, Transformer and
 * Inductor Design Handbook, 3rd ed., ch. 4: the usable build is 15 to 20 % less; 15 % taken, 1/0.85.
 */
export const BULGE_RECTANGULAR_TUBE = 1 / 0.85

export const bulgeFactor = (tube: FormerRow['tube']): number => (tube.shape === 'round' ? BULGE_ROUND_TUBE : BULGE_RECTANGULAR_TUBE)

/** Distance of the former's tube from the centre leg, mm; none where the library's figures leave none. */
export function tubeClearanceMm({ tube, tubeWallMm }: FormerRow, leg: NonNullable<CoreRow['centreLeg']>): number {
  const insideMm = (tube.shape === 'round' ? tube.diameterMm : tube.widthMm) - 2 * tubeWallMm
  return Math.max(0, (insideMm - (leg.shape === 'round' ? leg.diameterMm : leg.widthMm)) / 2)
}

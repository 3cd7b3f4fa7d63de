import { known } from '../answer'
import type { Answer } from '../answer'
import { requireCount, requirePositive } from '../require'
import { LITZ_LENGTH_FACTOR, litzDiameterMm, litzResistanceOhmPerM } from './insulated-diameter'
import { roundAreaMm2 } from './resistance'

export interface LitzConstruct {
  /** Bundles of each stage, from the strands outward: [7, 5] is five bundles of seven strands. */
  stages: readonly number[]
  strandConductorMm: number
  strandOverallMm: number
  /** Thickness of the serving on the radius: 0.03 to 0.06 mm for one layer of silk or polyester; 0 without. */
  servingMm: number
  /** Length in which the outer bundles go round once; null takes the usual 2 % of lengthening. */
  layLengthMm: number | null
}

export interface LitzFigures {
  strands: number
  overallMm: number
  copperAreaMm2: number
  /** Length of a strand over that of the bundle. */
  lengthFactor: number
  resistanceOhmPerM: number
  /** Copper over the circle of the overall diameter. */
  copperFill: number
}

/** Diameter over √n · strand overall diameter of ropes of more strands than IEC 60317-11 lists. Source: winding handbooks, upper end, from memory. */
export const ROPE_PACKING = 1.35

/**
 * Figures of a litz of `stages` from its strands: overall diameter p·√n·d with the serving, area of all strands, resistance
 * with the lengthening of the lay.
 *
 * Source: IEC 60317-11 (packing factors from memory) up to 400 strands, `ROPE_PACKING` above; geometry of the lay.
 *
 * @throws RangeError unless every stage is a whole number and strands have a positive diameter
 */
export function litzFigures(construct: LitzConstruct): LitzFigures {
  const { stages, strandConductorMm, strandOverallMm, servingMm, layLengthMm } = construct
  if (stages.length === 0) throw new RangeError('stages must hold at least one')
  stages.forEach((count, index) => requireCount(`stages.${index}`, count))
  const strands = stages.reduce((product, count) => product * count, 1)
  const answer: Answer<number> = strands > 400 ? known(ROPE_PACKING * Math.sqrt(strands) * strandOverallMm + 2 * servingMm) : litzDiameterMm({ strandCount: strands, strandOuterDiameterMm: strandOverallMm, servingThicknessMm: servingMm })
  if (answer.state !== 'known') throw new RangeError(`stages must make at least 3 strands: ${strands}`)
  const overallMm = answer.value
  const lengthFactor = layLengthMm === null ? LITZ_LENGTH_FACTOR : layLengthFactor({ bundleMm: overallMm - 2 * servingMm, layLengthMm })
  const copperAreaMm2 = strands * roundAreaMm2(strandConductorMm)
  return {
    strands,
    overallMm,
    copperAreaMm2,
    lengthFactor,
    resistanceOhmPerM: litzResistanceOhmPerM({ strandCount: strands, strandDiameterMm: strandConductorMm, lengthFactor }),
    copperFill: copperAreaMm2 / roundAreaMm2(overallMm),
  }
}

/**
 * Mean length of the strands of a twisted bundle over the bundle's own: strands lie evenly over the section, each on a
 * helix of its radius, (2/3)·((1 + u²)^1.5 − 1)/u² with u = π·D/lay.
 *
 * Source: geometry of helices.
 *
 * @throws RangeError unless diameter and lay are positive
 */
export function layLengthFactor({ bundleMm, layLengthMm }: { bundleMm: number; layLengthMm: number }): number {
  requirePositive('bundleMm', bundleMm)
  requirePositive('layLengthMm', layLengthMm)
  const square = ((Math.PI * bundleMm) / layLengthMm) ** 2
  return square < 1e-6 ? 1 + square / 4 : ((2 / 3) * ((1 + square) ** 1.5 - 1)) / square
}

/** Strands thinner than this share of the skin depth gain little more. Source: C. Sullivan, IEEE Trans. Power Electron. 14 (1999) 283. */
export const STRAND_SKIN_DEPTHS = 1 / 3

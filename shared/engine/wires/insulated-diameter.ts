import { known, notCheckable } from '../answer'
import type { Answer } from '../answer'
import { ENAMELLED_WIRE_CONDUCTIVITY } from '../constants'
import { requireCount, requireNotNegative, requirePositive } from '../require'
import { roundAreaMm2 } from './resistance'

/** Layer thickness of the common extruded triple-insulated wire, 0.002 in. Source: McLyman, Handbook, 3rd ed. 2004, Table 4-16. */
export const TRIPLE_INSULATED_LAYER_MM = 0.0508

/**
 * Overall diameter of a wire with extruded layers, d + 2·n·t, in mm; by default three layers of 0.002 in.
 *
 * Source: geometry; layer thickness of McLyman, Handbook, 3rd ed. 2004, Table 4-16. A maker's figure goes before it.
 *
 * @throws RangeError unless diameter, layers and thickness are positive
 */
export function layeredWireDiameterMm(input: { conductorDiameterMm: number; layers?: number; layerThicknessMm?: number }): number {
  const { conductorDiameterMm, layers = 3, layerThicknessMm = TRIPLE_INSULATED_LAYER_MM } = input
  requirePositive('conductorDiameterMm', conductorDiameterMm)
  requireCount('layers', layers)
  requirePositive('layerThicknessMm', layerThicknessMm)
  return conductorDiameterMm + 2 * layers * layerThicknessMm
}

/** Packing factor p of the bundle diameter p·√n·d by number of strands, from memory. Source: IEC 60317-11. */
const LITZ_PACKING: readonly (readonly [strandsUpTo: number, factor: number])[] = [[12, 1.25], [16, 1.26], [20, 1.27], [400, 1.28]]

export interface LitzDiameterInput {
  strandCount: number
  /** Overall diameter of one enamelled strand. */
  strandOuterDiameterMm: number
  /** Thickness of the serving (silk, film) on the radius; 0 for bare bundles. */
  servingThicknessMm?: number
}

/**
 * Overall diameter of a bunched litz wire, p·√n·d and the serving, in mm.
 *
 * Source: IEC 60317-11, packing factors from memory; 3 to 400 strands, beyond that not checkable.
 *
 * @throws RangeError unless the strands are a whole number and the diameter is positive
 */
export function litzDiameterMm({ strandCount, strandOuterDiameterMm, servingThicknessMm = 0 }: LitzDiameterInput): Answer<number> {
  requireCount('strandCount', strandCount)
  requirePositive('strandOuterDiameterMm', strandOuterDiameterMm)
  requireNotNegative('servingThicknessMm', servingThicknessMm)
  if (strandCount < 3) return notCheckable('before-first-row', { strandCount, firstRow: 3 })
  const row = LITZ_PACKING.find(([upTo]) => strandCount <= upTo)
  if (!row) return notCheckable('past-last-row', { strandCount, lastRow: 400 })
  return known(row[1] * Math.sqrt(strandCount) * strandOuterDiameterMm + 2 * servingThicknessMm)
}

/** By how much a strand is longer than its bundle. Source: maker's table of 10 × 0.020 mm, 5.5500 Ω/m. */
export const LITZ_LENGTH_FACTOR = 1.02

/**
 * Nominal resistance of a litz wire at 20 °C, in Ω/m: strands in parallel by IEC 60317-0-1, each longer by the lay.
 *
 * Source: IEC 60317-11; lay of 2 %.
 *
 * @throws RangeError unless the strands are a whole number and the diameter is positive
 */
export function litzResistanceOhmPerM(input: { strandCount: number; strandDiameterMm: number; lengthFactor?: number }): number {
  requireCount('strandCount', input.strandCount)
  const { lengthFactor = LITZ_LENGTH_FACTOR } = input
  requirePositive('lengthFactor', lengthFactor)
  return lengthFactor / (ENAMELLED_WIRE_CONDUCTIVITY.nominal * input.strandCount * roundAreaMm2(input.strandDiameterMm))
}

import { requireCount, requireNotNegative, requirePositive } from '../require'
import { resistivityOhmMm2PerM } from '../wires/resistance'
import { skinDepthMm } from '../wires/skin-depth'
import { foilProximityLossPerMetre, foilSkinFactor } from './layer-loss'
import { roundWireResponse, rowGradientFactor, rowReaction } from './round-wire'
import type { RoundWireResponse } from './round-wire'

/** One conductor of a winding; litz by its strands and the diameter of the bundle that holds them. */
export type Conductor =
  | { kind: 'round'; diameterMm: number }
  | { kind: 'litz'; strandDiameterMm: number; strands: number; bundleDiameterMm: number }
  | { kind: 'foil'; thicknessMm: number; breadthMm: number }

/** Frequency and temperature at which a conductor loses. */
export interface LossPoint {
  frequencyHz: number
  temperatureC: number
}

/** What one conductor does at one frequency and temperature, before its neighbours count. */
export interface ConductorResponse {
  conductor: Conductor
  /** Ratio of ac to dc resistance by the conductor's own current. */
  skinFactor: number
  /** W/m per (A/m)² rms of a uniform field. */
  proximityWPerM: number
  /** Null for a foil, which does not react with its layer. */
  strand: { diameterInSkinDepths: number; wire: RoundWireResponse } | null
  /** W/m per (A/m)² over Ω/m, 1/m²: what a mean square of field at the strands of a bundle adds to the factor. */
  perBundleFieldM2: number
}

/**
 * Response of one conductor. Round wire and each strand of litz: exact cylinder functions. Foil: the field along it only; what
 * crowds into its ends is outside the model. Litz: currents that close through the ends of the strands, by imperfect
 * transposition, are outside the model.
 *
 * Source: as `round-wire.ts` and `layer-loss.ts`; litz: C. Sullivan, IEEE Trans. Power Electron. 14 (1999) 283.
 *
 * @throws RangeError on a value out of its range
 */
export function conductorResponse(conductor: Conductor, point: LossPoint): ConductorResponse {
  const depthMm = skinDepthMm(point)
  const resistivityOhmM = resistivityOhmMm2PerM(point.temperatureC) * 1e-6
  if (conductor.kind === 'foil') {
    const { thicknessMm, breadthMm } = conductor
    const proximityWPerM = foilProximityLossPerMetre({ heightMm: thicknessMm, skinDepthMm: depthMm, breadthMm, resistivityOhmM })
    return { conductor, skinFactor: foilSkinFactor(thicknessMm, depthMm), proximityWPerM, strand: null, perBundleFieldM2: 0 }
  }
  const { diameterMm, strands } = roundParts(conductor)
  const diameterInSkinDepths = diameterMm / depthMm
  const wire = roundWireResponse(diameterInSkinDepths)
  const proximityWPerM = strands * Math.PI * resistivityOhmM * diameterInSkinDepths ** 2 * -wire.dipole.im
  return { conductor, skinFactor: wire.skinFactor, proximityWPerM, strand: { diameterInSkinDepths, wire }, perBundleFieldM2: proximityWPerM / resistancePerM(diameterMm, strands, resistivityOhmM) }
}

function roundParts(conductor: Exclude<Conductor, { kind: 'foil' }>): { diameterMm: number; strands: number } {
  const parts = conductor.kind === 'round' ? { diameterMm: conductor.diameterMm, strands: 1 } : { diameterMm: conductor.strandDiameterMm, strands: conductor.strands }
  requirePositive('diameterMm', parts.diameterMm)
  requireCount('strands', parts.strands)
  return parts
}

/** The factors of one conductor in its layer at one frequency and temperature. */
export interface ConductorLoss {
  /** Ratio of ac to dc resistance by the conductor's own current and the currents of its neighbours in the layer. */
  ownFactor: number
  /** W/m per (A/m)² rms of the field along the layer. */
  alongWPerM: number
  /** The same for the field across the layer. */
  acrossWPerM: number
}

/**
 * Loss of a conductor in its layer by its own current and by the field around it, as two terms that add (they are orthogonal).
 *
 * `inverseSquaresPerMm2` is Σ 1/x² over the other conductors of the layer, mean of the layer: round wires react as a row; strands
 * of litz stand for the wire in it, and the field inside the bundle is added to its own factor (`bundleFieldPerM2`).
 *
 * Source: as `conductorResponse`; orthogonality: J. Ferreira, IEEE Trans. Power Electron. 9 (1994) 127.
 *
 * @throws RangeError on a value out of its range
 */
export function inLayer({ conductor, skinFactor, proximityWPerM, strand, perBundleFieldM2 }: ConductorResponse, inverseSquaresPerMm2: number): ConductorLoss {
  if (conductor.kind === 'foil' || !strand) return { ownFactor: skinFactor, alongWPerM: proximityWPerM, acrossWPerM: 0 }
  const { diameterMm, strands } = roundParts(conductor)
  const packing = strands * (diameterMm / 2) ** 2 * inverseSquaresPerMm2
  const { along, across } = rowReaction(strand.wire.dipole, packing)
  const inside = conductor.kind === 'round'
    ? rowGradientFactor({ diameterInSkinDepths: strand.diameterInSkinDepths, quadrupole: strand.wire.quadrupole, packing })
    : perBundleFieldM2 * bundleFieldPerM2(conductor, inverseSquaresPerMm2)
  return { ownFactor: skinFactor + inside, alongWPerM: proximityWPerM * along, acrossWPerM: proximityWPerM * across }
}

const resistancePerM = (diameterMm: number, strands: number, resistivityOhmM: number) => resistivityOhmM / (strands * (Math.PI / 4) * (diameterMm * 1e-3) ** 2)

/**
 * Mean square of the field at the strands of a bundle by its own current, spread evenly over it, and by those of its neighbours in
 * the row, in (A/m)² per A²: ½/(π·D)²·(1 + s²), s = (D/2)²·Σ 1/x².
 *
 * Source: Ampère's law; C. Sullivan (1999); gradient of the row as in `rowGradientFactor`.
 *
 * @throws RangeError unless the bundle has a diameter
 */
export function bundleFieldPerM2({ bundleDiameterMm }: { bundleDiameterMm: number }, inverseSquaresPerMm2: number): number {
  requirePositive('bundleDiameterMm', bundleDiameterMm)
  const packing = (bundleDiameterMm / 2) ** 2 * inverseSquaresPerMm2
  return (0.5 * (1 + packing ** 2)) / (Math.PI * bundleDiameterMm * 1e-3) ** 2
}

/**
 * Σ 1/x² to all other conductors of a row, mean over the row, in 1/mm², by the places of their centres; 0 for one alone.
 *
 * Source: definition; rows beyond 200 as an endless one of their mean pitch p, π²/(3·p²).
 *
 * @throws RangeError when two conductors lie in one place
 */
export function rowInverseSquares(centresMm: readonly number[]): number {
  const count = centresMm.length
  if (count < 2) return 0
  if (count > 200) {
    const pitchMm = (Math.max(...centresMm) - Math.min(...centresMm)) / (count - 1)
    requirePositive('pitch', pitchMm)
    return Math.PI ** 2 / (3 * pitchMm ** 2)
  }
  let sum = 0
  for (let i = 0; i < count; i++) {
    for (let k = i + 1; k < count; k++) sum += 2 / (centresMm[i]! - centresMm[k]!) ** 2
  }
  requireNotNegative('sum of inverse squares', sum)
  return sum / count
}

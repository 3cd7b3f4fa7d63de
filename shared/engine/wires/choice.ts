import { requireCount, requirePositive } from '../require'
import { roundAreaMm2 } from './resistance'
import { skinDepthMm } from './skin-depth'

export interface StockWire {
  designation: string
  conductorDiameterMm: number
  outerDiameterMm: number
}

export interface WireChoiceInput {
  rmsCurrentA: number
  /** Greatest current density allowed. */
  currentDensityLimitAPerMm2: number
  frequencyHz: number
  temperatureC: number
  /** Greatest conductor diameter in skin depths; 2 for a single layer. */
  diameterLimitSkinDepths?: number
  /** Most wires wound in parallel. */
  parallelLimit?: number
  stock: readonly StockWire[]
}

export type WireRejection = 'thicker-than-skin-depth-limit' | 'needs-too-many-in-parallel'

export interface WireCandidate {
  wire: StockWire
  parallelCount: number
  copperAreaMm2: number
  currentDensityAPerMm2: number
  diameterInSkinDepths: number
  /** Area the wires take in a square grid, (n·D²). */
  windowAreaPerTurnMm2: number
  /** Why it is not proposed; empty for a proposal. */
  rejections: readonly WireRejection[]
}

/**
 * Every wire of the stock with the least number in parallel that keeps the current density, proposals first (fewest in
 * parallel, then least copper), then the rejected ones with their reasons.
 *
 * Source: current density J = I/A; diameter ≤ 2δ for one layer is the usual rule (Snelling, Soft Ferrites, ch. 11).
 *
 * @throws RangeError unless every limit is positive and the stock holds a wire
 */
export function wireCandidates(input: WireChoiceInput): WireCandidate[] {
  const { rmsCurrentA, currentDensityLimitAPerMm2, diameterLimitSkinDepths = 2, parallelLimit = 4, stock } = input
  requirePositive('rmsCurrentA', rmsCurrentA)
  requirePositive('currentDensityLimitAPerMm2', currentDensityLimitAPerMm2)
  requirePositive('diameterLimitSkinDepths', diameterLimitSkinDepths)
  requireCount('parallelLimit', parallelLimit)
  if (stock.length === 0) throw new RangeError('stock must hold at least one wire')
  const depthMm = skinDepthMm(input)
  const neededMm2 = rmsCurrentA / currentDensityLimitAPerMm2
  const candidate = (wire: StockWire): WireCandidate => {
    const areaMm2 = roundAreaMm2(wire.conductorDiameterMm)
    const parallelCount = Math.max(1, Math.ceil(neededMm2 / areaMm2 - 1e-12))
    const diameterInSkinDepths = wire.conductorDiameterMm / depthMm
    const rejections: WireRejection[] = []
    if (diameterInSkinDepths > diameterLimitSkinDepths) rejections.push('thicker-than-skin-depth-limit')
    if (parallelCount > parallelLimit) rejections.push('needs-too-many-in-parallel')
    return {
      wire,
      parallelCount,
      copperAreaMm2: parallelCount * areaMm2,
      currentDensityAPerMm2: rmsCurrentA / (parallelCount * areaMm2),
      diameterInSkinDepths,
      windowAreaPerTurnMm2: parallelCount * wire.outerDiameterMm ** 2,
      rejections,
    }
  }
  return stock.map(candidate).sort(byPreference)
}

const byPreference = (a: WireCandidate, b: WireCandidate) =>
  Number(a.rejections.length > 0) - Number(b.rejections.length > 0) || a.parallelCount - b.parallelCount || a.copperAreaMm2 - b.copperAreaMm2

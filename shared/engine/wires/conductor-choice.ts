import { requireCount, requirePositive } from '../require'
import { bestFoilMm } from './foil'
import { STRAND_SKIN_DEPTHS } from './litz'
import { skinDepthMm } from './skin-depth'

/** One row of the stock, of any form. */
export interface StockConductor {
  designation: string
  form: 'round' | 'litz' | 'foil'
  /** Diameter of the wire or of one strand; thickness of a foil. */
  conductorMm: number
  /** Over the insulation; thickness of a foil. */
  overallMm: number
  /** Foil only. */
  widthMm: number | null
  strands: number
  copperAreaMm2: number
}

export interface ConductorNeed {
  rmsCurrentA: number
  /** Alternating share of the rms current, 0…1: nearly direct current needs no thin wire. */
  acShare: number
  currentDensityLimitAPerMm2: number
  frequencyHz: number
  temperatureC: number
  turns: number
  /** Width between the margins, and the layers that the winding may take. */
  availableMm: number
  layers: number
  /** Diameter of the pin that the winding ends at; null for flying leads. */
  pinMm: number | null
  parallelLimit?: number
  stock: readonly StockConductor[]
}

export type ConductorRejection =
  | 'thicker-than-skin-depth-limit'
  | 'strand-thicker-than-third-of-skin-depth'
  | 'foil-thicker-than-best'
  | 'needs-too-many-in-parallel'
  | 'does-not-fit-layers'
  | 'too-wide-for-window'
  | 'too-thick-for-pin'

export interface ConductorCandidate {
  conductor: StockConductor
  parallel: number
  copperAreaMm2: number
  currentDensityAPerMm2: number
  layersNeeded: number
  /** Why it is not proposed; empty for a proposal. */
  rejections: readonly ConductorRejection[]
}

/** Below this alternating share the loss is nearly that of direct current. */
const SMALL_AC_SHARE = 0.3

/** A bundle wraps round a pin up to this multiple of its diameter. Source: common practice. */
const PIN_MULTIPLE = 1.5

const ROUND_SKIN_DEPTHS = 2
const MOST_FOIL_OVER_BEST = 1.2

/**
 * Every conductor of the stock for one winding, with the least number in parallel that keeps the current density and the
 * reasons against it: skin depth (a round wire two depths, a strand a third, a foil the best thickness for its layers and
 * a fifth more), the layers and width of the window, the pin. Proposals first: fewest layers, fewest in parallel, least copper.
 *
 * Source: J = I/A; 2δ for round wire: E. Snelling, Soft Ferrites, 2nd ed., ch. 11; strands: C. Sullivan, IEEE Trans. Power
 * Electron. 14 (1999) 283; foil: P. Dowell, Proc. IEE 113 (1966) 1387; helix and pin: geometry and common practice.
 *
 * @throws RangeError unless current, limit, frequency, turns, width and layers are positive and the stock holds a row
 */
export function conductorCandidates(need: ConductorNeed): ConductorCandidate[] {
  for (const name of ['rmsCurrentA', 'currentDensityLimitAPerMm2', 'frequencyHz', 'turns', 'availableMm'] as const) requirePositive(name, need[name])
  requireCount('layers', need.layers)
  if (need.stock.length === 0) throw new RangeError('stock must hold at least one conductor')
  const depthMm = skinDepthMm(need)
  return need.stock.map((conductor) => candidate(need, conductor, depthMm)).sort(byPreference)
}

function candidate(need: ConductorNeed, conductor: StockConductor, depthMm: number): ConductorCandidate {
  const areaMm2 = need.rmsCurrentA / need.currentDensityLimitAPerMm2
  const parallel = Math.max(1, Math.ceil(areaMm2 / conductor.copperAreaMm2 - 1e-9))
  const layersNeeded = layersOf(need, conductor, parallel)
  return {
    conductor,
    parallel,
    copperAreaMm2: parallel * conductor.copperAreaMm2,
    currentDensityAPerMm2: need.rmsCurrentA / (parallel * conductor.copperAreaMm2),
    layersNeeded,
    rejections: [
      ...depthRejections(need, conductor, depthMm),
      ...(parallel > (need.parallelLimit ?? 4) ? ['needs-too-many-in-parallel' as const] : []),
      ...(layersNeeded > need.layers ? [layersNeeded === Infinity ? ('too-wide-for-window' as const) : ('does-not-fit-layers' as const)] : []),
      ...(need.pinMm !== null && conductor.form !== 'foil' && conductor.overallMm > PIN_MULTIPLE * need.pinMm ? ['too-thick-for-pin' as const] : []),
    ],
  }
}

/** Foil takes a layer for each turn; the helix of wire takes one bundle more than its turns. Infinite where not one turn fits. */
function layersOf({ turns, availableMm }: ConductorNeed, { form, overallMm, widthMm }: StockConductor, parallel: number): number {
  if (form === 'foil') return (widthMm ?? availableMm) > availableMm ? Infinity : Math.ceil(turns)
  const most = Math.floor(availableMm / (overallMm * parallel) - 1 + 1e-9)
  return most < 1 ? Infinity : Math.ceil(turns / most)
}

function depthRejections({ acShare, layers }: ConductorNeed, { form, conductorMm }: StockConductor, depthMm: number): ConductorRejection[] {
  if (acShare < SMALL_AC_SHARE) return []
  if (form === 'litz') return conductorMm > depthMm * STRAND_SKIN_DEPTHS * (1 + 1e-9) ? ['strand-thicker-than-third-of-skin-depth'] : []
  if (form === 'foil') return conductorMm > MOST_FOIL_OVER_BEST * bestFoilMm({ layers, skinDepthMm: depthMm }) ? ['foil-thicker-than-best'] : []
  return conductorMm > ROUND_SKIN_DEPTHS * depthMm ? ['thicker-than-skin-depth-limit'] : []
}

const byPreference = (a: ConductorCandidate, b: ConductorCandidate) =>
  Number(a.rejections.length > 0) - Number(b.rejections.length > 0) || a.layersNeeded - b.layersNeeded || a.parallel - b.parallel || a.copperAreaMm2 - b.copperAreaMm2 || (a.conductor.designation < b.conductor.designation ? -1 : 1)

import { MU_0_H_PER_M } from '../constants'
import { requireNotNegative, requirePositive } from '../require'

/**
 * How the gap's fringing field is taken in.
 *
 * - `none`: field lines straight across the gap.
 * - `mclyman-gap`: F = 1 + l_g/√A·ln(2G/l_g) on the gap's reluctance only.
 * - `mclyman-path`: the same F on the whole path, L = F·µ0·N²·A_e/(l_g + l_e/µ_r).
 * - `dixon-round-leg`: the gap's area is that of a leg whose diameter is greater by l_g.
 * - `conformal`: each direction of the leg by the Schwarz–Christoffel map of its edges, F = F(a)·F(b); both are the diameter
 *   of a round leg.
 *
 * Sources: C. McLyman, Transformer and Inductor Design Handbook, 3rd ed. 2004; L. Dixon, SLUP127; J. Mühlethaler, J. Kolar,
 * A. Ecklebe, A Novel Approach for 3D Air Gap Reluctance Calculations, ECCE Asia 2011.
 */
export type FringingModel = 'none' | 'mclyman-gap' | 'mclyman-path' | 'dixon-round-leg' | 'conformal'

export interface GappedCore {
  effectiveAreaMm2: number
  effectiveLengthMm: number
  /** Relative permeability of the core without gap. */
  permeability: number
  /** Area of the gapped leg; the effective area where it is not known. */
  gapAreaMm2?: number
  /** Length of the winding on the gapped leg, G; needed by the models of McLyman. */
  windingLengthMm?: number
  /** Diameter of the gapped leg; needed by the model of Dixon. */
  legDiameterMm?: number
  /** Both sides of the gapped leg's section, its diameter twice where it is round; needed by the conformal model. */
  legSidesMm?: readonly [number, number]
  fringing: FringingModel
}

function checkCore(core: GappedCore): void {
  requirePositive('effectiveAreaMm2', core.effectiveAreaMm2)
  requirePositive('effectiveLengthMm', core.effectiveLengthMm)
  requirePositive('permeability', core.permeability)
  if (core.gapAreaMm2 !== undefined) requirePositive('gapAreaMm2', core.gapAreaMm2)
  if (core.fringing !== 'none' && core.fringing !== 'dixon-round-leg') requirePositive('windingLengthMm', core.windingLengthMm ?? Number.NaN)
  if (core.fringing === 'conformal') for (const side of core.legSidesMm ?? [Number.NaN]) requirePositive('legSidesMm', side)
  if (core.fringing === 'dixon-round-leg') requirePositive('legDiameterMm', core.legDiameterMm ?? Number.NaN)
}

/**
 * Fringing factor F ≥ 1 of a gap in the named model. The models of McLyman hold while the gap is short against the
 * winding; from l_g = 2G on they give 1.
 *
 * Source: see `FringingModel`.
 *
 * @throws RangeError when the model's dimension is missing or a value is out of its range
 */
export function fringingFactor(core: GappedCore, gapMm: number): number {
  checkCore(core)
  requireNotNegative('gapMm', gapMm)
  if (core.fringing === 'none' || gapMm === 0) return 1
  if (core.fringing === 'dixon-round-leg') return (1 + gapMm / core.legDiameterMm!) ** 2
  if (core.fringing === 'conformal') return core.legSidesMm!.reduce((factor, sideMm) => factor * edgeFactor(gapMm, sideMm, core.windingLengthMm!), 1)
  const areaMm2 = core.gapAreaMm2 ?? core.effectiveAreaMm2
  return 1 + (gapMm / Math.sqrt(areaMm2)) * Math.max(0, Math.log((2 * core.windingLengthMm!) / gapMm))
}

/**
 * Fringing in the plane across one side of a leg in the middle of its winding length G:
 * F = 1 + l_g/a·(2/π)·(1 + ln(π·h/(2·l_g))), h = (G − l_g)/2 the leg on either side of the gap; 1 where the leg is too short for it.
 *
 * Source: A. Balakrishnan, W. Joines, T. Wilson, IEEE Trans. Power Electron. 12 (1997) 654; J. Mühlethaler (2011).
 */
function edgeFactor(gapMm: number, sideMm: number, windingLengthMm: number): number {
  const legMm = (windingLengthMm - gapMm) / 2
  if (!(legMm > 0)) return 1
  return 1 + (gapMm / sideMm) * (2 / Math.PI) * Math.max(0, 1 + Math.log((Math.PI * legMm) / (2 * gapMm)))
}

/**
 * Inductance factor of a gapped core, in henry per turn squared. The gap is the sum of all gaps along the path.
 *
 *     A_L = µ0/(l_e/(µ_r·A_e) + l_g/(F·A_g))          (`mclyman-path`: F·µ0/(l_e/(µ_r·A_e) + l_g/A_g))
 *
 * Source: reluctances in series; see `FringingModel`.
 *
 * @throws RangeError as `fringingFactor`
 */
export function gappedInductanceFactorH(core: GappedCore, gapMm: number): number {
  const factor = fringingFactor(core, gapMm)
  const gapAreaMm2 = core.gapAreaMm2 ?? core.effectiveAreaMm2
  const corePerMm = core.effectiveLengthMm / (core.permeability * core.effectiveAreaMm2)
  const gapPerMm = gapMm / gapAreaMm2
  if (core.fringing === 'mclyman-path') return (factor * MU_0_H_PER_M * 1e-3) / (corePerMm + gapPerMm)
  return (MU_0_H_PER_M * 1e-3) / (corePerMm + gapPerMm / factor)
}

/** Inductance of a gapped core with turns, in henry. Source: as `gappedInductanceFactorH`. @throws RangeError as `fringingFactor` */
export function gappedInductanceH(core: GappedCore, gapMm: number, turns: number): number {
  requirePositive('turns', turns)
  return gappedInductanceFactorH(core, gapMm) * turns ** 2
}

export type GapSolution =
  | { state: 'found'; gapMm: number; fringingFactor: number; model: FringingModel }
  /** The core without gap has less inductance than asked for. */
  | { state: 'ungapped-too-low'; ungappedInductanceH: number; model: FringingModel }
  /** No gap shorter than the winding (or than the path, where its length is not given) brings the inductance down that far. */
  | { state: 'gap-too-long'; longestGapMm: number; inductanceH: number; model: FringingModel }

/**
 * Gap that gives an inductance, in mm, by bisection of `gappedInductanceH`.
 *
 * Source: as `gappedInductanceFactorH`.
 *
 * @throws RangeError as `fringingFactor`, or unless inductance and turns are positive
 */
export function gapForInductance(core: GappedCore, inductanceH: number, turns: number): GapSolution {
  requirePositive('inductanceH', inductanceH)
  const model = core.fringing
  const ungappedInductanceH = gappedInductanceH(core, 0, turns)
  if (ungappedInductanceH < inductanceH) return { state: 'ungapped-too-low', ungappedInductanceH, model }
  const longestGapMm = core.windingLengthMm ?? core.effectiveLengthMm
  const leastInductanceH = gappedInductanceH(core, longestGapMm, turns)
  if (leastInductanceH > inductanceH) return { state: 'gap-too-long', longestGapMm, inductanceH: leastInductanceH, model }

  let lowMm = 0
  let highMm = longestGapMm
  for (let step = 0; step < 60; step++) {
    const middleMm = (lowMm + highMm) / 2
    if (gappedInductanceH(core, middleMm, turns) > inductanceH) lowMm = middleMm
    else highMm = middleMm
  }
  const gapMm = (lowMm + highMm) / 2
  return { state: 'found', gapMm, fringingFactor: fringingFactor(core, gapMm), model }
}

export interface InductanceSpread {
  lowestH: number
  nominalH: number
  highestH: number
  lowestFraction: number
  highestFraction: number
}

export interface GapTolerance {
  gapMm: number
  gapToleranceMm: number
  /** Tolerance of the core's permeability as a fraction; 0 looks at the gap alone. */
  permeabilityToleranceFraction?: number
}

/**
 * Spread of inductance that the tolerances of gap and permeability leave, worst case, in henry and as fractions of nominal.
 *
 * Source: as `gappedInductanceFactorH`, at the limits of both.
 *
 * @throws RangeError as `fringingFactor`, or on a tolerance that leaves no permeability
 */
export function inductanceSpread(core: GappedCore, turns: number, tolerance: GapTolerance): InductanceSpread {
  const { gapMm, gapToleranceMm, permeabilityToleranceFraction = 0 } = tolerance
  requireNotNegative('gapToleranceMm', gapToleranceMm)
  requireNotNegative('permeabilityToleranceFraction', permeabilityToleranceFraction)
  const at = (mm: number, share: number) => gappedInductanceH({ ...core, permeability: core.permeability * share }, mm, turns)
  const nominalH = at(gapMm, 1)
  const lowestH = at(gapMm + gapToleranceMm, 1 - permeabilityToleranceFraction)
  const highestH = at(Math.max(0, gapMm - gapToleranceMm), 1 + permeabilityToleranceFraction)
  return { lowestH, nominalH, highestH, lowestFraction: lowestH / nominalH - 1, highestFraction: highestH / nominalH - 1 }
}

import { gapForInductance, gappedInductanceFactorH, inductanceSpread } from '../magnetics/gap'
import type { GappedCore } from '../magnetics/gap'
import { topologyOf } from '../topologies'
import { attempt, explain, positive, report } from './context'
import type { Context } from './context'

/** The inductance that every later stage works with, and the figures of the document it rests on. */
export interface InductanceBasis {
  nominalH: number
  minimumH: number
  maximumH: number
  alH: number
  turns: number
  from: 'stated' | 'al' | 'gap' | 'ungapped'
}

/** Relative spread of an ungapped ferrite core where nothing better is stated. Source: IEC 62358 practice, ±25 %. */
const UNGAPPED_SPREAD = 0.25

/** Inductance at the primary: as stated, else from A_L, else from the gap; a transformer's core without any of them has no gap. */
export function inductanceBasis(context: Context): InductanceBasis | null {
  const { specification, primary } = context
  const stated = specification.electrical.inductance.value
  const turns = primary?.turns
  if (!positive(turns)) return null
  const alH = specification.core.gap.alH.value
  const gapMm = specification.core.gap.lengthMm.value ?? (isTransformer(context) ? 0 : null)
  const fromGap = alFromGap(context, gapMm)
  const { nominalH, from } = positive(stated?.nominalH)
    ? { nominalH: stated.nominalH, from: 'stated' as const }
    : positive(alH)
      ? { nominalH: alH * turns ** 2, from: 'al' as const }
      : { nominalH: (fromGap ?? 0) * turns ** 2, from: gapMm === 0 ? ('ungapped' as const) : ('gap' as const) }
  if (!positive(nominalH)) {
    report(context, 'inductance-not-stated', 'warning', 'electrical.inductance')
    return null
  }
  const spread = spreadOf(context, from === 'ungapped' ? 0 : gapMm)
  const basis: InductanceBasis = {
    nominalH,
    minimumH: nominalH * Math.max(0.01, 1 + (stated?.lowerTolerance ?? -spread.below)),
    maximumH: nominalH * (1 + (stated?.upperTolerance ?? spread.above)),
    alH: positive(alH) ? alH : nominalH / turns ** 2,
    turns,
    from,
  }
  explain(context, 'magnetics.inductanceH', () => ({
    symbol: 'L', value: nominalH, unit: 'H', formula: from === 'stated' ? 'as specified' : from === 'ungapped' ? 'µ0·µ_i·A_e/l_e·N²' : 'A_L·N²', source: 'IEC 62044-2, definition of A_L',
    inputs: [from === 'stated' ? { name: 'L', value: nominalH, unit: 'H', origin: 'electrical.inductance' } : { name: 'A_L', value: basis.alH, unit: 'H', origin: AL_ORIGINS[from] }, { name: 'N', value: turns, unit: '', origin: 'windings.turns' }],
  }))
  return basis
}

const AL_ORIGINS = { al: 'core.gap.alH', gap: 'calculated from core.gap.lengthMm', ungapped: 'calculated from the core without gap' } as const

interface Spread {
  below: number
  above: number
}

/**
 * Relative spread of the inductance where the document states none: that of A_L; else what the tolerances of gap length and
 * permeability leave; else the material's own.
 */
function spreadOf(context: Context, gapMm: number | null): Spread {
  const { gap } = context.specification.core
  const both = (share: number): Spread => ({ below: share, above: share })
  if (gap.alTolerance.value !== null) return both(gap.alTolerance.value)
  const core = gappedCore(context)
  const permeabilityToleranceFraction = context.material?.permeabilityTolerance ?? UNGAPPED_SPREAD
  const gapToleranceMm = gap.lengthToleranceMm.value
  if (!core || !positive(gapMm) || gapToleranceMm === null) return both(positive(gapMm) ? UNGAPPED_SPREAD : permeabilityToleranceFraction)
  const paths = gapsInPath(context)
  const limits = attempt(context, 'core.gap.lengthToleranceMm', () => inductanceSpread(core, 1, { gapMm: gapMm * paths, gapToleranceMm: gapToleranceMm * paths, permeabilityToleranceFraction: Math.min(0.95, permeabilityToleranceFraction) }))
  return limits ? { below: -limits.lowestFraction, above: limits.highestFraction } : both(UNGAPPED_SPREAD)
}

/** Parts whose flux follows the volt-seconds: a gap only lowers their inductance. */
const isTransformer = ({ requirement }: Context) => requirement !== null && topologyOf(requirement.duty).core !== 'stores-energy'

/** The core with its gap as the magnetics stage takes it; null without core or material. */
export function gappedCore(context: Context): GappedCore | null {
  const { core, material, former, sets } = context
  if (!core || !material) return null
  const leg = core.centreLeg
  const legAreaMm2 = leg ? (leg.shape === 'round' ? (Math.PI / 4) * leg.diameterMm ** 2 : leg.widthMm * leg.depthMm) : core.effectiveAreaMm2
  // The window of a half with a plate is as long as one half's, that of two halves twice that.
  const windowMm = core.dimensionsMm.d !== null ? (core.shape === 'EI' ? 1 : 2) * core.dimensionsMm.d : (former?.windingWidthMm ?? null)
  return {
    effectiveAreaMm2: core.effectiveAreaMm2 * sets,
    effectiveLengthMm: core.effectiveLengthMm,
    permeability: material.initialPermeability,
    gapAreaMm2: legAreaMm2 * sets,
    ...(windowMm !== null ? { windingLengthMm: windowMm } : {}),
    fringing: windowMm !== null ? 'mclyman-gap' : 'none',
  }
}

const gapsInPath = ({ specification }: Context) => (specification.core.gap.position.value === 'all-legs-spacer' ? 2 : 1)

/** A_L that the stated gap length gives, H. */
export function alFromGap(context: Context, lengthMm = context.specification.core.gap.lengthMm.value): number | null {
  const core = gappedCore(context)
  if (!core || lengthMm === null || !(lengthMm >= 0)) return null
  return attempt(context, 'core.gap.lengthMm', () => gappedInductanceFactorH(core, lengthMm * gapsInPath(context)))
}

export interface GapResult {
  gapMm: number | null
  fringingFactor: number | null
  model: string
}

/** The gap that gives the inductance: of the centre leg, or the sheet's thickness where a spacer lies in all legs. */
export function gapOf(context: Context, basis: InductanceBasis | null): GapResult {
  const core = gappedCore(context)
  const model = core?.fringing === 'mclyman-gap' ? 'McLyman, fringing on the gap term, area of the centre leg' : 'without fringing'
  const none = { gapMm: null, fringingFactor: null, model }
  if (!core || !basis) return none
  if (basis.from === 'ungapped') return { gapMm: 0, fringingFactor: null, model: 'no gap' }
  const solution = attempt(context, 'core.gap', () => gapForInductance(core, basis.nominalH, basis.turns))
  if (solution?.state !== 'found') return none
  const gapMm = solution.gapMm / gapsInPath(context)
  explain(context, 'magnetics.gapMm', () => ({
    symbol: 'l_g', value: gapMm, unit: 'mm', formula: 'L = µ0·N²/(l_e/(µ_r·A_e) + l_g/(F·A_g)), F = 1 + l_g/√A_g·ln(2G/l_g)',
    source: 'C. McLyman, Transformer and Inductor Design Handbook, 3rd ed. 2004',
    inputs: [
      { name: 'L', value: basis.nominalH, unit: 'H', origin: 'magnetics.inductanceH' }, { name: 'N', value: basis.turns, unit: '', origin: 'windings.turns' },
      { name: 'A_e', value: core.effectiveAreaMm2, unit: 'mm²', origin: originOf(context, 'core') }, { name: 'l_e', value: core.effectiveLengthMm, unit: 'mm', origin: originOf(context, 'core') },
      { name: 'A_g', value: core.gapAreaMm2 ?? core.effectiveAreaMm2, unit: 'mm²', origin: originOf(context, 'core') }, { name: 'µ_r', value: core.permeability, unit: '', origin: originOf(context, 'material') },
      { name: 'F', value: solution.fringingFactor, unit: '', origin: 'calculated' },
    ],
  }))
  return { gapMm, fringingFactor: solution.fringingFactor, model }
}

/** Where a library figure comes from, for the working. */
export function originOf(context: Context, kind: 'core' | 'material' | 'former'): string {
  const row = context[kind]
  return row ? `${row.name}, version ${row.version}: ${row.source}${row.edition ? `, ${row.edition}` : ''} (${row.confidence})` : 'not in the library'
}

import { inductanceSpread } from '../magnetics/gap'
import { gappedCore } from '../evaluate/inductance'
import { createContext } from '../evaluate/context'
import type { Library } from '../library'
import type { SpecificationDocument, TestRow } from '../specification'

/** One cause of spread: the relative half width within which practically every part lies. */
export interface SpreadShare {
  cause: 'core-factor' | 'gap-length' | 'permeability' | 'wire-resistance' | 'turn-length' | 'winding-geometry' | 'instrument'
  halfWidth: number
  source: string
}

/** Half width over which a normal distribution is taken as three deviations. Source: common practice of statistical tolerancing. */
export const DEVIATIONS_PER_HALF_WIDTH = 3

/** Length of a turn by winding tension and pitch. Source: common practice, 2 to 4 %. */
const TURN_LENGTH: SpreadShare = { cause: 'turn-length', halfWidth: 0.03, source: 'common practice, 2 to 4 %' }
/** Leakage repeats by how the turns lie. Source: common practice, 10 to 15 % by hand, 5 to 10 % by machine. */
const GEOMETRY: SpreadShare = { cause: 'winding-geometry', halfWidth: 0.12, source: 'common practice, 10 to 15 % wound by hand' }

const instrument = (halfWidth: number): SpreadShare => ({ cause: 'instrument', halfWidth, source: 'accuracy class asked of the instrument' })

/** What spreads the inductance: the factor that the core is ground to, else the gap's length, else the material. */
function coreShares(document: SpecificationDocument, library: Library): SpreadShare[] {
  const { gap } = document.specification.core
  const context = createContext(document, library, false)
  if (gap.control.value !== 'length' && gap.alTolerance.value !== null) return [{ cause: 'core-factor', halfWidth: Math.abs(gap.alTolerance.value), source: 'core.gap.alTolerance' }]
  const core = gappedCore(context)
  const lengthMm = gap.lengthMm.value
  if (gap.control.value === 'length' && core && lengthMm !== null && gap.lengthToleranceMm.value !== null) {
    const spread = inductanceSpread(core, 1, { gapMm: lengthMm, gapToleranceMm: gap.lengthToleranceMm.value, permeabilityToleranceFraction: context.material?.permeabilityTolerance ?? 0 })
    return [{ cause: 'gap-length', halfWidth: Math.max(-spread.lowestFraction, spread.highestFraction), source: 'core.gap.lengthToleranceMm and the material’s permeability' }]
  }
  return context.material ? [{ cause: 'permeability', halfWidth: context.material.permeabilityTolerance, source: `${context.material.name}: ${context.material.source}` }] : []
}

function wireShare(document: SpecificationDocument, library: Library, row: TestRow): SpreadShare[] {
  const winding = document.specification.windings.find(({ id }) => id === row.windingId)
  const wire = winding && createContext(document, library, false).index.find('wire', winding.wire.wire)
  if (!wire) return []
  const { nominalOhmPerM, minimumOhmPerM, maximumOhmPerM } = wire.resistance20
  if (minimumOhmPerM === null || maximumOhmPerM === null) return [{ cause: 'wire-resistance', halfWidth: 0.05, source: 'common practice: the library holds no limits for this wire' }]
  return [{ cause: 'wire-resistance', halfWidth: Math.max(1 - minimumOhmPerM / nominalOhmPerM, maximumOhmPerM / nominalOhmPerM - 1), source: `${wire.name}: ${wire.source}` }]
}

/** Causes of spread of one row's readings in production; empty where none is known. */
export function rowSpread(document: SpecificationDocument, library: Library, row: TestRow): SpreadShare[] {
  switch (row.characteristic) {
    case 'inductance':
    case 'inductance-at-bias':
      return [...coreShares(document, library), instrument(row.characteristic === 'inductance' ? 0.005 : 0.03)]
    case 'leakage':
      return [GEOMETRY, instrument(0.01)]
    case 'dc-resistance':
      return [...wireShare(document, library, row), TURN_LENGTH, instrument(0.005)]
    case 'turns-ratio':
      return [instrument(0.001)]
    case 'interwinding-capacitance':
      return [GEOMETRY, instrument(0.01)]
    case 'self-resonance':
      // The frequency goes by the root of inductance and capacitance.
      return [...coreShares(document, library), GEOMETRY].map((share) => ({ ...share, halfWidth: share.halfWidth / 2 })).concat(instrument(0.01))
    default:
      return []
  }
}

/** Relative standard deviation of independent causes; null where there is none. Source: sum of variances. */
export function relativeDeviation(shares: readonly SpreadShare[]): number | null {
  if (shares.length === 0) return null
  return Math.hypot(...shares.map(({ halfWidth }) => halfWidth / DEVIATIONS_PER_HALF_WIDTH))
}

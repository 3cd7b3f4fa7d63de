import type { CoreShape } from '../library'
import type { OvervoltageCategory, PollutionDegree, ProductStandard, WireInsulation } from '../specification'

/** What the engineer prefers where the requirement sheet leaves a choice. */
export interface ProposalPreferences {
  /** In the order of liking; other shapes are not proposed. */
  shapes: readonly CoreShape[]
  /** A core, material or former that must be taken. */
  coreId: string | null
  materialId: string | null
  wireSystem: 'IEC' | 'AWG'
  enamel: WireInsulation
  /** Output power from which the primary is cut into two halves around the secondaries, W. */
  interleaveFromW: number
  /** Relative, both sides. */
  inductanceTolerance: number
  alTolerance: number
  /** Radial build over window height that a proposal may use, bulge included. */
  buildLimit: number
  productStandard: ProductStandard
  standardEdition: string
  /** What the person knows about the part's surroundings; null takes the defaults of the document. */
  surroundings: { overvoltageCategory: OvervoltageCategory; pollutionDegree: PollutionDegree; altitudeM: number } | null
}

export const DEFAULT_PREFERENCES: ProposalPreferences = {
  shapes: ['ETD', 'E', 'EFD', 'ER', 'PQ', 'RM'],
  coreId: null,
  materialId: null,
  wireSystem: 'IEC',
  enamel: 'enamel-grade-1',
  interleaveFromW: 30,
  inductanceTolerance: 0.1,
  alTolerance: 0.05,
  buildLimit: 0.85,
  productStandard: 'IEC 62368-1',
  standardEdition: '2018',
  surroundings: null,
}

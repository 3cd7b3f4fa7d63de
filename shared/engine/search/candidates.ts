import type { Evaluation } from '../evaluation'
import type { CoreRow, FormerRow, MaterialRow } from '../library'
import type { Candidate } from '../propose/candidate'
import { judgedBy } from '../propose/judge'
import type { Rejection } from '../propose/reasons'
import type { InsulationMethod, SpecificationDocument } from '../specification'

/** What candidates are compared by; null where the engine cannot tell. */
export interface CandidateFigures {
  lossW: number | null
  copperLossW: number | null
  coreLossW: number | null
  /** Of the box around the part. */
  volumeMm3: number
  heightMm: number
  copperG: number | null
  /** At the primary with all secondaries shorted. */
  leakageH: number | null
  riseK: number | null
  fluxUtilisation: number | null
  buildRatio: number
}

export interface SearchCandidate {
  /** Says what was chosen, and breaks ties. */
  id: string
  core: string
  former: string
  material: string
  method: InsulationMethod
  primaryTurns: number
  /** Wires by winding, e.g. `P: 2 × grade-1 0.355 mm`. */
  wires: { winding: string; wire: string; parallel: number; turns: number }[]
  figures: CandidateFigures
  /** No other candidate is at least as good in loss, volume, copper, height and leakage. */
  onFront: boolean
  /** Questions that it leaves open although it is no failure. */
  compromises: number
  isPreferred: boolean
  isStocked: boolean
  document: SpecificationDocument
}

/** A core that fell out, with the release check that its best design breaks, or that most of its variants break by closed forms. */
export interface RejectedCore {
  core: string
  former: string
  shape: CoreRow['shape']
  /** Code of the check. */
  check: string
}

/** The check that a reason comes to, where nothing was evaluated or the layout itself says it. */
const CHECK_OF: Readonly<Record<Rejection, string>> = {
  'window': 'W03',
  'build': 'W03',
  'layer-width': 'W01',
  'pins': 'P01',
  'flux': 'E01',
  'temperature': 'T11',
  'resistance': 'T03',
  'wire': 'T02',
  'height': 'W25',
  'insulation': 'I04',
}

/** The check by which a design was rejected: the one that its evaluation breaks, else that of the reason. */
export const rejectingCheck = (rejection: Rejection, evaluation: Evaluation | null): string => (evaluation && judgedBy(evaluation, rejection)) ?? CHECK_OF[rejection]

interface Made {
  candidate: Candidate
  former: FormerRow
  material: MaterialRow
  id: string
}

/** A candidate as the person sees it. */
export function shownCandidate({ candidate: { document, evaluation, design, compromises }, former, material, id }: Made, { preferred, stocked }: { preferred: ReadonlySet<string>; stocked: ReadonlySet<string> }): SearchCandidate {
  const { length, width, height } = former.envelopeMm
  const { losses, mass, thermal, magnetics, layout, leakages } = evaluation
  const together = leakages.reduce<(typeof leakages)[number] | null>((most, one) => (most && most.shortedWindingIds.length >= one.shortedWindingIds.length ? most : one), null)
  const keys = [`core/${design.core.id}`, `former/${former.id}`, `material/${material.id}`]
  return {
    id,
    core: design.core.name,
    former: former.name,
    material: material.name,
    method: design.method,
    primaryTurns: design.windings[0]!.turns,
    wires: design.windings.map(({ name, wire, turns }) => ({ winding: name, wire: wire.wire.id, parallel: wire.parallel, turns })),
    figures: {
      lossW: losses.totalW,
      copperLossW: losses.copperW,
      coreLossW: losses.coreW,
      volumeMm3: length * width * height,
      heightMm: height,
      copperG: mass.copperG,
      leakageH: together?.inductanceH ?? null,
      riseK: thermal.riseK,
      fluxUtilisation: magnetics.fluxUtilisation,
      buildRatio: layout.buildRatio,
    },
    onFront: false,
    compromises,
    isPreferred: keys.some((key) => preferred.has(key)),
    isStocked: [`core/${design.core.id}`, `former/${former.id}`].every((key) => stocked.has(key)),
    document,
  }
}

import type { Coil, StepPlacement } from '../build'
import type { FormerRow } from '../library'
import type { BoundaryEnd, InsulationBoundary, SequenceStep, Winding, WindingSpecification } from '../specification'

/** What the build puts between the two ends of a boundary; null where it cannot be told. */
export interface ProvidedInsulation {
  clearanceMm: number | null
  creepageMm: number | null
  distanceThroughInsulationMm: number | null
  layers: number | null
  /** Every pair is parted by the insulation of a triple- or fully insulated wire. */
  byInsulatedWire: boolean
  /** A boundary with no laid winding on one side is not judged. */
  known: boolean
  how: string
}

export const isInsulatedWire = ({ wire }: Winding): boolean => wire.insulation === 'triple-insulated' || wire.insulation === 'fully-insulated'

/**
 * Whether the wire's own covering is the insulation inside the coil: that of triple- and fully insulated wire always,
 * enamel only where the boundary protects nobody. Source: IEC 62368-1, Annex J; enamel counts as no protective insulation.
 */
const insulates = (winding: Winding, functional: boolean) => isInsulatedWire(winding) || (functional && winding.wire.insulation !== 'bare')

/** Windings that lie at one end of a boundary; none for the core. */
export function windingsAt(specification: WindingSpecification, end: BoundaryEnd): Winding[] {
  switch (end.kind) {
    case 'side':
      return specification.windings.filter(({ side }) => side === end.side)
    case 'winding':
      return specification.windings.filter(({ id }) => id === end.windingId)
    case 'core':
      return []
  }
}

/** Margin that tape holds free beside a winding step: that of the margin steps directly before it, none without one. */
function tapedMargins(sequence: readonly SequenceStep[], index: number): { leftMm: number; rightMm: number } {
  const before: { leftMm: number; rightMm: number }[] = []
  for (let position = index - 1; position >= 0; position -= 1) {
    const step = sequence[position]!
    if (step.kind !== 'margin') break
    before.push(step)
  }
  const least = (side: 'leftMm' | 'rightMm') => (before.length > 0 ? Math.min(...before.map((step) => step[side])) : 0)
  return { leftMm: least('leftMm'), rightMm: least('rightMm') }
}

/** The coil with the margins that tape holds: wire without margin tape beside it falls to the flange. */
export const withTapedMargins = (coil: Coil, sequence: readonly SequenceStep[]): Coil => ({
  ...coil,
  placements: coil.placements.map((placement) => {
    const { leftMm, rightMm } = tapedMargins(sequence, placement.index)
    return { ...placement, marginLeftMm: Math.min(placement.marginLeftMm, leftMm), marginRightMm: Math.min(placement.marginRightMm, rightMm) }
  }),
})

interface Path {
  lengthMm: number
  layers: number
  thicknessMm: number
  how: string
}

export interface PathInput {
  specification: WindingSpecification
  former: FormerRow
  coil: Coil
  boundary: InsulationBoundary
}

/** The weakest path of the build across a boundary: along the coil, and from pin to pin. */
export function providedInsulation({ specification, former, coil: laidOut, boundary }: PathInput): ProvidedInsulation {
  const coil = boundary.insulation === 'functional' ? laidOut : withTapedMargins(laidOut, specification.sequence)
  const [first, second] = boundary.between
  const one = windingsAt(specification, first)
  const other = windingsAt(specification, second)
  const functional = boundary.insulation === 'functional'
  if (first.kind === 'core' || second.kind === 'core') return toCore({ former, coil }, first.kind === 'core' ? other : one, functional)

  const pairs = one.flatMap((a) => other.filter(({ id }) => id !== a.id).map((b) => [a, b] as const))
  const laid = pairs.filter(([a, b]) => coil.windings.has(a.id) && coil.windings.has(b.id))
  if (laid.length === 0) return NOT_KNOWN
  const bare = laid.filter(([a, b]) => !insulates(a, functional) && !insulates(b, functional))
  const paths = bare.flatMap(([a, b]) => coilPaths(coil, former, a, b))
  const pins = pinDistance(specification, former, one, other)
  const distances = [...paths, ...(pins ? [pins] : [])]
  const nearest = distances.reduce<Path | null>((least, path) => (least && least.lengthMm <= path.lengthMm ? least : path), null)
  const byInsulatedWire = bare.length === 0
  return {
    clearanceMm: nearest?.lengthMm ?? null,
    creepageMm: nearest?.lengthMm ?? null,
    distanceThroughInsulationMm: paths.length > 0 ? Math.min(...paths.map(({ thicknessMm }) => thicknessMm)) : null,
    layers: paths.length > 0 ? Math.min(...paths.map(({ layers }) => layers)) : null,
    byInsulatedWire,
    known: byInsulatedWire || paths.length > 0,
    how: [byInsulatedWire ? wireText(functional) : null, nearest?.how ?? null].filter((part) => part !== null).join('; '),
  }
}

const NOT_KNOWN: ProvidedInsulation = { clearanceMm: null, creepageMm: null, distanceThroughInsulationMm: null, layers: null, byInsulatedWire: false, known: false, how: 'not laid in the coil' }

const wireText = (functional: boolean) => (functional ? 'enamelled or insulated winding wire' : 'insulated winding wire')

/** Paths between the neighbouring parts of two windings. */
function coilPaths(coil: Coil, former: FormerRow, a: Winding, b: Winding): Path[] {
  const of = (id: string) => coil.placements.filter(({ windingId }) => windingId === id)
  return of(a.id).flatMap((one) => of(b.id).map((other) => (one.section === other.section ? acrossTape(coil, former, one, other) : overFlange(former, one, other))))
}

/** Round the end of the tapes between: along one margin to the flange, and back along the other. */
function acrossTape(coil: Coil, former: FormerRow, one: StepPlacement, other: StepPlacement): Path {
  const [inner, outer] = one.index < other.index ? [one, other] : [other, one]
  const tapes = coil.tapes.filter(({ section, index }) => section === inner.section && index > inner.index && index < outer.index)
  const covering = tapes.filter(({ fullWidth }) => fullWidth)
  const thicknessMm = covering.reduce((sum, { topMm, bottomMm }) => sum + topMm - bottomMm, 0)
  const layers = covering.reduce((sum, tape) => sum + tape.layers, 0)
  if (layers > 0) {
    const leftMm = inner.marginLeftMm + outer.marginLeftMm
    const rightMm = inner.marginRightMm + outer.marginRightMm
    return { lengthMm: Math.min(leftMm, rightMm) + thicknessMm, layers, thicknessMm, how: 'along the margins round the end of the tape' }
  }
  const narrow = tapes[0]
  if (!narrow) return { lengthMm: 0, layers: 0, thicknessMm: 0, how: 'no tape between' }
  const edges = [
    { edgeMm: narrow.leftMm, margins: [inner.marginLeftMm, outer.marginLeftMm] },
    { edgeMm: former.windingWidthMm - narrow.rightMm, margins: [inner.marginRightMm, outer.marginRightMm] },
  ]
  const tapeMm = narrow.topMm - narrow.bottomMm
  const along = edges.map(({ edgeMm, margins }) => margins.reduce((sum, marginMm) => sum + Math.max(0, marginMm - edgeMm), 0) + tapeMm)
  return { lengthMm: Math.min(...along), layers: narrow.layers, thicknessMm: tapeMm, how: 'round the end of a tape narrower than the former' }
}

function overFlange({ windingHeightMm, flangeThicknessMm }: FormerRow, one: StepPlacement, other: StepPlacement): Path {
  const climbMm = (placement: StepPlacement) => Math.max(0, windingHeightMm - placement.topMm)
  return { lengthMm: climbMm(one) + climbMm(other) + flangeThicknessMm, layers: 1, thicknessMm: flangeThicknessMm, how: 'over the flange between the sections' }
}

/**
 * To the core: along the margin to the flange and up it, where the outer leg begins; through the tube's wall, or
 * through the tapes over the outermost part.
 */
function toCore({ former, coil }: Pick<PathInput, 'former' | 'coil'>, windings: readonly Winding[], functional: boolean): ProvidedInsulation {
  const laid = windings.filter(({ id }) => coil.windings.has(id))
  if (laid.length === 0) return NOT_KNOWN
  const bare = laid.filter((winding) => !insulates(winding, functional)).map(({ id }) => id)
  if (bare.length === 0) return { ...NOT_KNOWN, known: true, byInsulatedWire: true, how: `${wireText(functional)}; how far stripped ends and pins lie from the core is not held` }
  const paths = coil.placements.filter(({ windingId }) => bare.includes(windingId)).map((placement) => corePath(coil, former, placement, isOutermost(coil, placement)))
  const nearest = paths.reduce((least, path) => (least.lengthMm <= path.lengthMm ? least : path))
  return {
    clearanceMm: nearest.lengthMm,
    creepageMm: nearest.lengthMm,
    distanceThroughInsulationMm: Math.min(...paths.map(({ thicknessMm }) => thicknessMm)),
    layers: Math.min(...paths.map(({ layers }) => layers)),
    byInsulatedWire: false,
    known: true,
    how: nearest.how,
  }
}

const isOutermost = (coil: Coil, placement: StepPlacement) =>
  !coil.placements.some(({ section, index }) => section === placement.section && index > placement.index)

function corePath(coil: Coil, { windingHeightMm, tubeWallMm, flangeThicknessMm }: FormerRow, placement: StepPlacement, outermost: boolean): Path {
  const lengthMm = Math.min(placement.marginLeftMm, placement.marginRightMm) + Math.max(0, windingHeightMm - placement.topMm)
  const how = 'along the margin and up the flange to the outer leg'
  const wall = { layers: 1, thicknessMm: Math.min(tubeWallMm, flangeThicknessMm) }
  if (!outermost) return { lengthMm, how, ...wall }
  const over = coil.tapes.filter(({ section, index, fullWidth }) => section === placement.section && index > placement.index && fullWidth)
  const layers = over.reduce((sum, tape) => sum + tape.layers, 0)
  const thicknessMm = over.reduce((sum, { topMm, bottomMm }) => sum + topMm - bottomMm, 0)
  // Outward there is only the tape, inward and sideways the plastic of the former.
  return { lengthMm, how, layers, thicknessMm: Math.min(thicknessMm, wall.thicknessMm) }
}

// ---------------------------------------------------------------------------------------------

/** Every terminal that windings come to: starts, finishes, and where their steps begin and end. */
export function terminalNames({ sequence }: Pick<WindingSpecification, 'sequence'>, windings: readonly Winding[]): Set<string> {
  const ids = new Set(windings.map(({ id }) => id))
  const steps = sequence.flatMap((step) => (step.kind === 'winding' && ids.has(step.windingId) ? [step.startTerminal, step.finishTerminal] : step.kind === 'shield' && ids.has(step.windingId) ? [step.connectedTerminal] : []))
  return new Set([...windings.flatMap(({ startTerminal, finishTerminal }) => [startTerminal, finishTerminal]), ...steps].filter((name) => name !== ''))
}

/** Least distance between the pins of two groups of windings, pin section taken off; null without positions. */
export function pinDistance(specification: WindingSpecification, former: FormerRow, one: readonly Winding[], other: readonly Winding[]): Path | null {
  const specified = specification.former
  const pins = specified.pins.length > 0 ? specified.pins : former.pins
  const sizeMm = specified.pinSection.value?.sizeMm ?? former.pinSection.sizeMm
  const at = (windings: readonly Winding[]) => {
    const terminals = terminalNames(specification, windings)
    return pins.filter(({ number }) => terminals.has(number))
  }
  const distances = at(one).flatMap((a) => at(other).filter(({ number }) => number !== a.number).map((b) => Math.hypot(a.xMm - b.xMm, a.yMm - b.yMm) - sizeMm))
  return distances.length > 0 ? { lengthMm: Math.max(0, Math.min(...distances)), layers: 0, thicknessMm: 0, how: 'from pin to pin' } : null
}

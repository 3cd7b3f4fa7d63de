import type { Coil } from '../build'
import type { InsulationPath, RingLayout } from '../evaluation'
import type { FormerRow } from '../library'
import type { BoundaryEnd, InsulationBoundary, SequenceStep, Winding, WindingSpecification } from '../specification'
import { acrossTape, overFlange, shieldParts, shorter, toOuterLeg, viaConductor } from './path-geometry'
import type { CoilPart, Path } from './path-geometry'
import { alongHole } from './ring-paths'

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
  /** The weakest ways, for a drawing. */
  paths: readonly InsulationPath[]
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

export interface PathInput {
  specification: WindingSpecification
  former: FormerRow
  coil: Coil
  boundary: InsulationBoundary
}

/** What the laid coil provides across a boundary, on a former or on a ring core; null where nothing is laid. */
export function insulationOf({ specification, former, coil }: { specification: WindingSpecification; former: FormerRow | null; coil: Coil | null }, boundary: InsulationBoundary): ProvidedInsulation | null {
  if (coil?.layout.ring) return onRing(specification, coil.layout.ring, boundary)
  return coil && former ? providedInsulation({ specification, former, coil, boundary }) : null
}

/** On a ring windings in sectors of their own are parted along the hole; enamel is no insulation to the core, nor within a sector but functionally. */
function onRing(specification: WindingSpecification, ring: RingLayout, { between, insulation }: InsulationBoundary): ProvidedInsulation {
  if (between.some(({ kind }) => kind === 'core')) return { ...NOT_KNOWN, how: 'coating of the ring core' }
  const functional = insulation === 'functional'
  const [one, other] = between.map((end) => windingsAt(specification, end))
  const pairs = one!.flatMap((a) => other!.filter(({ id }) => id !== a.id).map((b) => ({ covered: insulates(a, functional) || insulates(b, functional), path: alongHole(ring, a, b) })))
  const bare = pairs.filter(({ covered }) => !covered)
  if (pairs.length === 0 || bare.some(({ path }) => path === null)) return NOT_KNOWN
  // Where the wire's own covering insulates, it may touch the next winding's; ends and terminals of a ring the document does not place.
  const nearest = nearestOf(bare.flatMap(({ path }) => path ?? []))
  const how = [bare.length === 0 ? wireText(functional) : null, nearest?.how ?? null].filter((part) => part !== null).join('; ')
  return { ...lengths(nearest, []), byInsulatedWire: bare.length === 0, known: true, how }
}

/** The weakest path of the build across a boundary: along the coil, by way of core or shield, and from pin to pin. */
export function providedInsulation({ specification, former, coil: laidOut, boundary }: PathInput): ProvidedInsulation {
  const functional = boundary.insulation === 'functional'
  const coil = functional ? laidOut : withTapedMargins(laidOut, specification.sequence)
  const shields = shieldParts(coil, former)
  const laid: LaidCoil = { coil, former, shields, placements: [...coil.placements, ...shields], functional }
  const [first, second] = boundary.between
  const one = windingsAt(specification, first)
  const other = windingsAt(specification, second)
  if (first.kind === 'core' || second.kind === 'core') return toCore(laid, first.kind === 'core' ? other : one)
  return betweenWindings(laid, { one, other, pins: pinDistance(specification, former, one, other) })
}

const NOT_KNOWN: ProvidedInsulation = { clearanceMm: null, creepageMm: null, distanceThroughInsulationMm: null, layers: null, byInsulatedWire: false, known: false, how: 'not laid in the coil', paths: [] }

const wireText = (functional: boolean) => (functional ? 'enamelled or insulated winding wire' : 'insulated winding wire')

/** The coil with everything in it that conducts. */
interface LaidCoil {
  coil: Coil
  former: FormerRow
  shields: readonly CoilPart[]
  /** Windings and shields. */
  placements: readonly CoilPart[]
  functional: boolean
}

const placementsOf = ({ placements }: LaidCoil, id: string) => placements.filter(({ windingId }) => windingId === id)
const isLaid = (laid: LaidCoil, { id }: Winding) => placementsOf(laid, id).length > 0

/** Wire in the coil that only its own covering would part from what lies beside it. */
const isBare = (laid: LaidCoil, winding: Winding) => winding.role === 'shield' || !insulates(winding, laid.functional)

function betweenWindings(laid: LaidCoil, { one, other, pins }: { one: readonly Winding[]; other: readonly Winding[]; pins: Path | null }): ProvidedInsulation {
  const pairs = one.flatMap((a) => other.filter((b) => b.id !== a.id && isLaid(laid, a) && isLaid(laid, b)).map((b) => [a, b] as const))
  if (pairs.length === 0) return NOT_KNOWN
  const bare = pairs.filter(([a, b]) => isBare(laid, a) && isBare(laid, b))
  const direct = bare.flatMap(([a, b]) => coilPaths(laid, a, b))
  const around = bare.flatMap(([a, b]) => conductorPaths(laid, a, b))
  const nearest = nearestOf([...direct, ...around, ...(pins ? [pins] : [])])
  return {
    ...lengths(nearest, direct),
    byInsulatedWire: bare.length === 0,
    known: bare.length === 0 || direct.length > 0,
    how: [bare.length === 0 ? wireText(laid.functional) : null, nearest?.how ?? null].filter((part) => part !== null).join('; '),
  }
}

const nearestOf = (paths: readonly Path[]): Path | null => paths.reduce<Path | null>((least, path) => (least ? shorter(least, path) : path), null)

/** Distances of the nearest path, and the least solid insulation of those that cross it. */
function lengths(nearest: Path | null, crossing: readonly Path[]): Pick<ProvidedInsulation, 'clearanceMm' | 'creepageMm' | 'distanceThroughInsulationMm' | 'layers' | 'paths'> {
  const thinnest = crossing.reduce<Path | null>((least, path) => (least && least.thicknessMm <= path.thicknessMm ? least : path), null)
  return {
    clearanceMm: nearest?.lengthMm ?? null,
    creepageMm: nearest?.lengthMm ?? null,
    distanceThroughInsulationMm: thinnest?.thicknessMm ?? null,
    layers: crossing.length > 0 ? Math.min(...crossing.map(({ layers }) => layers)) : null,
    paths: [
      // Tape and former leave no air beside the surface, so that clearance and creepage run the same way.
      ...(nearest ? (['creepage', 'clearance'] as const).map((kind) => ({ kind, plane: nearest.plane, lengthMm: nearest.lengthMm, how: nearest.how, points: nearest.points })) : []),
      ...(thinnest && thinnest.through.length > 0 ? [{ kind: 'through-insulation' as const, plane: thinnest.plane, lengthMm: thinnest.thicknessMm, how: 'through the insulation', points: thinnest.through }] : []),
    ],
  }
}

/** Paths between the neighbouring parts of two windings. */
const coilPaths = (laid: LaidCoil, a: Winding, b: Winding): Path[] =>
  placementsOf(laid, a.id).flatMap((one) => placementsOf(laid, b.id).map((other) => along(laid, one, other)))

const along = ({ coil, former }: LaidCoil, one: CoilPart, other: CoilPart): Path =>
  one.section === other.section ? acrossTape(coil, former, one, other) : overFlange(former, one, other)

/** By way of the core, and of any shield that is neither of the two. */
function conductorPaths(laid: LaidCoil, a: Winding, b: Winding): Path[] {
  const { coil, former, shields } = laid
  return placementsOf(laid, a.id).flatMap((one) =>
    placementsOf(laid, b.id).flatMap((other) => [
      viaConductor(toOuterLeg(coil, former, one), toOuterLeg(coil, former, other), 'along the margins and by way of the core'),
      ...shields.filter(({ windingId }) => windingId !== a.id && windingId !== b.id).map((shield) => viaConductor(along(laid, one, shield), along(laid, other, shield), 'round the ends of the tapes by way of a shield')),
    ]),
  )
}

/**
 * To the core: along the margin to the flange and up it, where the outer leg begins; through the tube's wall, or
 * through the tapes over the outermost part.
 */
function toCore(laid: LaidCoil, windings: readonly Winding[]): ProvidedInsulation {
  const { coil, former } = laid
  const wound = windings.filter((winding) => isLaid(laid, winding))
  if (wound.length === 0) return NOT_KNOWN
  const bare = wound.filter((winding) => isBare(laid, winding))
  if (bare.length === 0) return { ...NOT_KNOWN, known: true, byInsulatedWire: true, how: `${wireText(laid.functional)}; how far stripped ends and pins lie from the core is not held` }
  const paths = bare.flatMap(({ id }) => placementsOf(laid, id)).map((placement) => toOuterLeg(coil, former, placement))
  const nearest = nearestOf(paths)!
  return { ...lengths(nearest, paths), byInsulatedWire: false, known: true, how: nearest.how }
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
  const ways = at(one).flatMap((a) => at(other).filter(({ number }) => number !== a.number).map((b) => betweenPins(a, b, sizeMm)))
  return ways.reduce<Path | null>((least, way) => (least ? shorter(least, way) : way), null)
}

const betweenPins = (a: Position, b: Position, sizeMm: number): Path => ({
  lengthMm: Math.max(0, Math.hypot(a.xMm - b.xMm, a.yMm - b.yMm) - sizeMm), layers: 0, thicknessMm: 0, how: 'from pin to pin', plane: 'pins', points: [[a.xMm, a.yMm], [b.xMm, b.yMm]], through: [],
})

interface Position {
  xMm: number
  yMm: number
}

import type { Coil, StepPlacement } from '../build'
import type { PathPoint } from '../evaluation'
import type { FormerRow, LibraryRow } from '../library'

/** One way along surfaces or through air from one conductor to another, in mm. */
export interface Path {
  lengthMm: number
  /** Solid insulation between the two conductors. */
  layers: number
  thicknessMm: number
  how: string
  /** Where it runs: in the winding window, among the pins or on a ring core. */
  plane: 'window' | 'pins' | 'ring'
  points: readonly PathPoint[]
  /** Straight through the solid insulation; none where the path lies in one plane with no insulation to cross. */
  through: readonly PathPoint[]
}

/** What of a winding step or a shield a path begins or ends at. */
export type CoilPart = Pick<StepPlacement, 'index' | 'windingId' | 'section' | 'bottomMm' | 'topMm' | 'marginLeftMm' | 'marginRightMm'>

export type FormerShape = Pick<FormerRow, Exclude<keyof FormerRow, keyof LibraryRow>>

/** Inside of the left flange of a section, in window coordinates. */
const sectionLeftMm = ({ windingWidthMm, flangeThicknessMm }: FormerShape, section: number) => (section - 1) * (windingWidthMm + flangeThicknessMm)

/** The shorter of two ways; the first where they are equal. */
export const shorter = (one: Path, other: Path): Path => (other.lengthMm < one.lengthMm ? other : one)

const between = (one: CoilPart, other: CoilPart) => (one.index < other.index ? ([one, other] as const) : ([other, one] as const))

/** Round the end of the tapes between two parts of one section: along one margin to the flange, and back along the other. */
export function acrossTape(coil: Coil, former: FormerShape, one: CoilPart, other: CoilPart): Path {
  const [inner, outer] = between(one, other)
  const tapes = coil.tapes.filter(({ section, index }) => section === inner.section && index > inner.index && index < outer.index)
  const covering = tapes.filter(({ fullWidth }) => fullWidth)
  const narrow = tapes[0]
  if (covering.length > 0) {
    const thicknessMm = covering.reduce((sum, { topMm, bottomMm }) => sum + topMm - bottomMm, 0)
    const layers = covering.reduce((sum, tape) => sum + tape.layers, 0)
    return { ...roundEnds(former, inner, outer, { leftMm: 0, rightMm: 0, thicknessMm }), layers, thicknessMm, how: 'along the margins round the end of the tape' }
  }
  if (!narrow) return { ...roundEnds(former, inner, outer, { leftMm: Infinity, rightMm: Infinity, thicknessMm: 0 }), layers: 0, thicknessMm: 0, how: 'no tape between' }
  const thicknessMm = narrow.topMm - narrow.bottomMm
  const ends = roundEnds(former, inner, outer, { leftMm: narrow.leftMm, rightMm: former.windingWidthMm - narrow.rightMm, thicknessMm })
  return { ...ends, layers: narrow.layers, thicknessMm, how: 'round the end of a tape narrower than the former' }
}

interface TapeEnds {
  /** From the flange to the end of the tape; endless without a tape. */
  leftMm: number
  rightMm: number
  thicknessMm: number
}

function roundEnds(former: FormerShape, inner: CoilPart, outer: CoilPart, { leftMm, rightMm, thicknessMm }: TapeEnds): Pick<Path, 'lengthMm' | 'plane' | 'points' | 'through'> {
  const left = sectionLeftMm(former, inner.section)
  const right = left + former.windingWidthMm
  const ways = [
    { edgeMm: leftMm, margins: [inner.marginLeftMm, outer.marginLeftMm] as const, at: (inMm: number) => left + inMm },
    { edgeMm: rightMm, margins: [inner.marginRightMm, outer.marginRightMm] as const, at: (inMm: number) => right - inMm },
  ].map(({ edgeMm, margins: [ofInner, ofOuter], at }) => {
    const lengthMm = Math.max(0, ofInner - edgeMm) + Math.max(0, ofOuter - edgeMm) + thicknessMm
    const cornerMm = (marginMm: number) => at(Math.min(edgeMm, marginMm))
    const points: PathPoint[] = [[at(ofInner), inner.topMm], [cornerMm(ofInner), inner.topMm], [cornerMm(ofOuter), outer.bottomMm], [at(ofOuter), outer.bottomMm]]
    return { lengthMm, points }
  })
  const [first, second] = ways as [(typeof ways)[0], (typeof ways)[0]]
  const { lengthMm, points } = second.lengthMm < first.lengthMm ? second : first
  const middleMm = left + former.windingWidthMm / 2
  return { lengthMm, points: withoutRepeats(points), plane: 'window', through: [[middleMm, inner.topMm], [middleMm, outer.bottomMm]] }
}

const withoutRepeats = (points: readonly PathPoint[]) => points.filter(([x, y], index) => index === 0 || x !== points[index - 1]![0] || y !== points[index - 1]![1])

/** Up the flange between two sections, over its edge, and down to the other section's wire. */
export function overFlange(former: FormerShape, one: CoilPart, other: CoilPart): Path {
  const { windingHeightMm, flangeThicknessMm } = former
  const climbMm = (placement: CoilPart) => Math.max(0, windingHeightMm - placement.topMm)
  const [left, right] = one.section < other.section ? [one, other] : [other, one]
  const faceMm = sectionLeftMm(former, left.section) + former.windingWidthMm
  const farFaceMm = sectionLeftMm(former, right.section)
  return {
    lengthMm: climbMm(one) + climbMm(other) + flangeThicknessMm,
    layers: 1,
    thicknessMm: flangeThicknessMm,
    how: 'over the flange between the sections',
    plane: 'window',
    points: [[faceMm, left.topMm], [faceMm, windingHeightMm], [farFaceMm, windingHeightMm], [farFaceMm, right.topMm]],
    through: [[faceMm, Math.min(left.topMm, right.topMm)], [farFaceMm, Math.min(left.topMm, right.topMm)]],
  }
}

const isOutermost = (coil: Coil, placement: CoilPart) => !coil.placements.some(({ section, index }) => section === placement.section && index > placement.index)

/** Along the margin to the flange and up it, where the outer leg begins. */
export function toOuterLeg(coil: Coil, former: FormerShape, placement: CoilPart): Path {
  const { windingHeightMm, tubeWallMm, flangeThicknessMm, windingWidthMm } = former
  const left = sectionLeftMm(former, placement.section)
  const isLeft = placement.marginLeftMm <= placement.marginRightMm
  const marginMm = Math.min(placement.marginLeftMm, placement.marginRightMm)
  const flangeMm = isLeft ? left : left + windingWidthMm
  const wireMm = isLeft ? flangeMm + marginMm : flangeMm - marginMm
  const wallMm = Math.min(tubeWallMm, flangeThicknessMm)
  const way = {
    lengthMm: marginMm + Math.max(0, windingHeightMm - placement.topMm),
    how: 'along the margin and up the flange to the outer leg',
    plane: 'window' as const,
    points: withoutRepeats([[wireMm, placement.topMm], [flangeMm, placement.topMm], [flangeMm, windingHeightMm]]),
  }
  const middleMm = left + windingWidthMm / 2
  if (!isOutermost(coil, placement)) return { ...way, layers: 1, thicknessMm: wallMm, through: [[middleMm, placement.bottomMm], [middleMm, -tubeWallMm]] }
  const over = coil.tapes.filter(({ section, index, fullWidth }) => section === placement.section && index > placement.index && fullWidth)
  const overMm = over.reduce((sum, { topMm, bottomMm }) => sum + topMm - bottomMm, 0)
  // Outward there is only the tape, inward and sideways the plastic of the former.
  return { ...way, layers: over.reduce((sum, tape) => sum + tape.layers, 0), thicknessMm: Math.min(overMm, wallMm), through: [[middleMm, placement.topMm], [middleMm, placement.topMm + overMm]] }
}

/**
 * From one conductor to a conductive part of no fixed potential and on from it to another conductor: the part itself
 * counts as no distance. Source: IEC 60664-1:2020, floating conductive parts.
 */
export function viaConductor(one: Path, other: Path, how: string): Path {
  return { lengthMm: one.lengthMm + other.lengthMm, layers: one.layers + other.layers, thicknessMm: one.thicknessMm + other.thicknessMm, how, plane: one.plane, points: [...one.points, ...[...other.points].reverse()], through: [] }
}

/** Shields as they lie in the window; their margins are those that their own width leaves. */
export const shieldParts = ({ shields }: Pick<Coil, 'shields'>, { windingWidthMm }: FormerShape): CoilPart[] =>
  shields.map(({ index, windingId, section, bottomMm, topMm, leftMm, rightMm }) => ({ index, windingId, section, bottomMm, topMm, marginLeftMm: Math.max(0, leftMm), marginRightMm: Math.max(0, windingWidthMm - rightMm) }))

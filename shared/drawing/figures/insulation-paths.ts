import type { Evaluation, InsulationPath, PathPoint } from '../../engine/evaluation'
import type { Library } from '../../engine/library'
import type { WindingSpecification } from '../../engine/specification'
import { clearedLabel } from '../dimensions'
import type { Layer, Picture, PointMm, Shape } from '../model'
import { circle, label, LETTERING, line, moved, polyline } from '../shapes'
import { coilSection, type CoilPicture } from './coil-section'
import { standardScale } from './scales'

/** A path with its mark on the drawing: number of the boundary and a letter for the kind of distance. */
export interface MarkedPath extends InsulationPath {
  mark: string
  boundaryId: string
}

const LETTERS: Record<InsulationPath['kind'], string> = { clearance: 'a', creepage: 'b', 'through-insulation': 'c' }

/** Clearance, creepage and what leads through the insulation stay apart in grey. */
const LAYERS: Record<InsulationPath['kind'], Layer> = { clearance: 'hidden', creepage: 'frame', 'through-insulation': 'outline' }

export const PATHS_LEGEND = 'a clearance (dashed), b creepage distance (thick), c through the insulation (medium). A part that conducts counts as no distance.'

/** The weakest ways of all boundaries, in the order of the specification. */
export function markedPaths(specification: WindingSpecification, evaluation: Evaluation): MarkedPath[] {
  return specification.insulation.boundaries.flatMap((boundary, index) => {
    const paths = evaluation.boundaries.find(({ boundaryId }) => boundaryId === boundary.id)?.provided.paths ?? []
    const ordered = [...paths].sort((one, other) => LETTERS[one.kind].localeCompare(LETTERS[other.kind]))
    return ordered.filter(({ points }) => points.length > 1).map((path) => ({ ...path, mark: `${index + 1}${LETTERS[path.kind]}`, boundaryId: boundary.id }))
  })
}

export interface PathsInput {
  specification: WindingSpecification
  evaluation: Evaluation
  library: Library
  paths: readonly MarkedPath[]
  maximumWidthMm: number
  maximumHeightMm: number
}

/** The coil section to scale with the ways that lie in it. Null when none does. */
export function pathSection({ specification, evaluation, library, paths, ...room }: PathsInput): CoilPicture | null {
  const inWindow = paths.filter(({ plane }) => plane === 'window')
  const { layout } = evaluation
  if (inWindow.length === 0 || layout.items.length === 0) return null
  const highest = Math.max(...inWindow.flatMap(({ points }) => points.map(([, y]) => y)))
  const above = Math.max(0, highest - Math.max(layout.windowHeightMm, layout.buildMm))
  return coilSection({
    specification,
    library,
    layout,
    gapMm: null,
    extent: 'window',
    balloons: false,
    ...room,
    overlay: {
      aboveMm: Math.min(above, layout.windowHeightMm),
      draw: (place) => inWindow.flatMap(({ points, kind, boundaryId }) => pathShapes(points.map(place), kind, `boundary:${boundaryId}`)),
      balloons: gathered(inWindow).map(({ mark, points, boundaryId }) => ({ text: mark, tag: `boundary:${boundaryId}`, at: middleOf(points) })),
    },
  })
}

function pathShapes(points: readonly PointMm[], kind: InsulationPath['kind'], tag: string): Shape[] {
  const layer = LAYERS[kind]
  return [
    polyline(points, { layer, tag }),
    ...[points[0]!, points.at(-1)!].map((end) => circle(end, 0.5, { layer: 'thin', fill: 'ink', tag })),
  ]
}

const samePoints = (one: readonly PathPoint[], other: readonly PathPoint[]) =>
  one.length === other.length && one.every(([x, y], index) => Math.abs(x - other[index]![0]) < 1e-6 && Math.abs(y - other[index]![1]) < 1e-6)

/** Ways that run along each other share one mark, e.g. `1ab`. */
function gathered(paths: readonly MarkedPath[]): MarkedPath[] {
  const found: MarkedPath[] = []
  for (const path of paths) {
    const same = found.find(({ boundaryId, points }) => boundaryId === path.boundaryId && samePoints(points, path.points))
    if (same) same.mark = `${/^\d+/.exec(same.mark)![0]}${[...same.mark.replace(/^\d+/, ''), LETTERS[path.kind]].sort().join('')}`
    else found.push({ ...path })
  }
  return found
}

/** The middle of the longest straight piece. */
function middleOf(points: readonly PathPoint[]): PointMm {
  const pieces = points.slice(1).map((point, index) => ({ from: points[index]!, to: point, length: Math.hypot(point[0] - points[index]![0], point[1] - points[index]![1]) }))
  const longest = pieces.reduce((best, piece) => (piece.length > best.length ? piece : best))
  return [(longest.from[0] + longest.to[0]) / 2, (longest.from[1] + longest.to[1]) / 2]
}

/** The pins seen from above with the ways that lie between them. Null when none does. */
export function pathPins(specification: WindingSpecification, paths: readonly MarkedPath[], widthMm: number, heightMm: number): (Picture & { scale: number }) | null {
  const among = gathered(paths.filter(({ plane }) => plane === 'pins'))
  const { pins } = specification.former
  if (among.length === 0 || pins.length === 0) return null
  const points = [...pins.map(({ xMm, yMm }): PathPoint => [xMm, yMm]), ...among.flatMap((path) => path.points)]
  const reach = (index: 0 | 1) => 2 * Math.max(...points.map((point) => Math.abs(point[index])))
  const size = { width: reach(0) + 2, height: reach(1) + 2 }
  const scale = standardScale(size, { width: widthMm - 16, height: heightMm - 8 })
  const place = ([x, y]: PathPoint): PointMm => [x * scale, y * scale]
  const section = ((specification.former.pinSection.value?.sizeMm ?? 0.6) * scale) / 2
  const shapes: Shape[] = [
    ...among.flatMap(({ points: way, kind, boundaryId }) => [polyline(way.map(place), { layer: LAYERS[kind], tag: `boundary:${boundaryId}` })]),
    ...pins.filter(({ state }) => state !== 'missing').flatMap((pin) => pinMark(place([pin.xMm, pin.yMm]), Math.max(section, 0.4), pin.number, pin.xMm < 0 ? -1 : 1)),
    ...spreadMarks(among.map(({ mark, points: way, boundaryId }) => ({ mark, at: place(middleOf(way)), upright: runsUp(way), tag: `boundary:${boundaryId}` }))),
  ]
  return { widthMm, heightMm: size.height * scale + 8, scale, shapes: moved(shapes, widthMm / 2, (size.height * scale) / 2 + 4) }
}

const runsUp = (points: readonly PathPoint[]) => points.every(([x]) => Math.abs(x - points[0]![0]) < 1e-6)

function pinMark(at: PointMm, radius: number, number: string, hand: 1 | -1): Shape[] {
  return [
    circle(at, radius, { layer: 'thin', fill: 'dark-tint', tag: `pin:${number}` }),
    ...clearedLabel(label([at[0] + hand * (radius + 0.8), at[1] - LETTERING.small / 2], number, { align: hand > 0 ? 'start' : 'end', heightMm: LETTERING.small, tag: `pin:${number}` })),
  ]
}

/** Marks on their lines, or beside them where they run up; one that would lie on another moves up. */
function spreadMarks(marks: readonly { mark: string; at: PointMm; upright: boolean; tag: string }[]): Shape[] {
  const taken: PointMm[] = []
  return marks.flatMap(({ mark, at: [x, middle], upright, tag }) => {
    const at: PointMm = [upright ? x + (x < 0 ? 4 : -4) : x, middle]
    let y = at[1]
    while (taken.some(([x, other]) => Math.abs(x - at[0]) < 8 && Math.abs(other - y) < 4.2)) y += 1
    taken.push([at[0], y])
    const shift = y === at[1] ? [] : [line(at, [at[0], y], 'dimension', tag)]
    return [...shift, ...clearedLabel(label([at[0], y - LETTERING.small / 2], mark, { align: 'middle', heightMm: LETTERING.small, font: 'sans-bold', tag }))]
  })
}

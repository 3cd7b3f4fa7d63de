import type { Layout, LayoutItem, LayoutOutline } from '../../engine/evaluation'
import type { CoreRow, FormerRow, Library } from '../../engine/library'
import type { WindingSpecification } from '../../engine/specification'
import type { BoxMm, Picture, PointMm, Shape } from '../model'
import { box, circle, hatchRectangle, label, LETTERING, line, moved, rectangle } from '../shapes'
import { findRow } from '../sheets/input'
import { balloons, type Balloon } from './balloons'
import { ringSection } from './ring-section'
import { scaleText, standardScale } from './scales'
import { scaleBar, scaleBarWidthMm } from './scale-bar'
import { turnMark } from './turn-marks'

export interface CoilSectionInput {
  specification: WindingSpecification
  library: Library
  layout: Layout
  /** Total gap, mm; null draws none. */
  gapMm: number | null
  maximumWidthMm: number
  maximumHeightMm: number
  /** `window`: the winding window alone; `whole`: with the core around it. */
  extent: 'window' | 'whole'
  /** Numbered balloons that name the steps of the winding sequence. */
  balloons: boolean
  /** Any scale that fills the room, and no scale bar, for a screen. */
  anyScale?: boolean
  /** Drawn over the section, with balloons of its own. Room above the window, mm of the part, is kept for it. */
  overlay?: SectionOverlay
}

export interface SectionOverlay {
  aboveMm: number
  draw(place: (point: PointMm) => PointMm, scale: number): Shape[]
  /** In the coordinates of the layout. */
  balloons: readonly { text: string; tag: string; at: PointMm }[]
}

export interface CoilPicture extends Picture {
  scale: number
  /** False when the core's dimensions are not published and only the former is drawn. */
  coreDrawn: boolean
}

/** What lies around the winding window, in mm of the part; y from the axis of the centre leg. */
interface Surroundings {
  /** Outside of the winding tube over the axis. */
  tubeMm: number
  tubeWallMm: number
  flangeMm: number
  core: { legMm: number; windowMm: number; outerMm: number; halfLengthMm: number; halfWindowMm: number } | null
}

const SIDE_MM = 24
const FOOT_MM = 9

/**
 * Section through one side of the coil, to scale: turns by winding, tapes, margins, the former's tube and flanges, the
 * core with its gap. The axis of the centre leg lies at the lower edge, the pin-1 end at the left. A ring core is drawn along its axis.
 */
export function coilSection(input: CoilSectionInput): CoilPicture {
  const { layout, specification, library } = input
  if (layout.ring) return ringSection({ ...input, ring: layout.ring })
  const core = findRow(library, 'core', specification.core.core.value)
  const former = findRow(library, 'former', specification.former.former.value)
  const around = surroundings(input.extent === 'whole' ? core : null, former, layout)
  const extent = extentOf(around, layout, { aboveMm: input.overlay?.aboveMm ?? 0, outlines: outlinesIn(input) })
  const frame = { side: input.balloons || input.overlay ? SIDE_MM : 5, foot: input.anyScale ? 1 : FOOT_MM }
  const room = { width: input.maximumWidthMm - 2 * frame.side, height: input.maximumHeightMm - frame.foot - 2 }
  const size = { width: extent.rightMm - extent.leftMm, height: extent.topMm - extent.bottomMm }
  const scale = input.anyScale ? Math.min(room.width / size.width, room.height / size.height) : standardScale(size, room)
  const pen: Pen = { input, around, extent, scale, place: ([x, y]) => [(x - extent.leftMm) * scale, (y - extent.bottomMm) * scale] }
  const marks = input.balloons ? sectionBalloons(pen) : overlayBalloons(pen)
  const bodyMm = Math.max(size.height * scale, ...marks.map(({ at }) => at[1] + 4))
  const section = [...surroundingShapes(pen), ...layout.items.flatMap((item) => itemShapes(pen, item)), ...outlinesIn(input).flatMap((outline) => outlineShapes(pen, outline)), ...overlayShapes(pen), ...marks.flatMap(({ shapes }) => shapes)]
  const low = Math.min(0, ...marks.map(({ at }) => at[1] - 4))
  return {
    widthMm: size.width * scale + 2 * frame.side,
    heightMm: bodyMm - low + frame.foot + 2,
    shapes: [...moved(section, frame.side, frame.foot + 1 - low), ...(input.anyScale ? [] : scaleBarShapes(scale, frame.side))],
    scale,
    coreDrawn: around.core !== null,
  }
}

function scaleBarShapes(scale: number, leftMm: number): Shape[] {
  return [
    ...scaleBar([leftMm, 1], scale),
    label([leftMm + scaleBarWidthMm(scale) + 3, 1], `Scale ${scaleText(scale)}`, { heightMm: LETTERING.small }),
  ]
}

interface Pen {
  input: CoilSectionInput
  around: Surroundings
  extent: BoxMm
  scale: number
  /** From the window's coordinates, with y from the axis, to the picture. */
  place(point: PointMm): PointMm
}

function surroundings(core: CoreRow | null, former: FormerRow | null, layout: Layout): Surroundings {
  const tube = former?.tube
  const tubeMm = !tube ? layout.windowHeightMm / 2 : tube.shape === 'round' ? tube.diameterMm / 2 : tube.widthMm / 2
  return { tubeMm, tubeWallMm: former?.tubeWallMm ?? 0.5, flangeMm: former?.flangeThicknessMm ?? 0.5, core: coreSection(core, tubeMm) }
}

function coreSection(core: CoreRow | null, tubeMm: number): Surroundings['core'] {
  const leg = core?.centreLeg
  const { a, b, d, e } = core?.dimensionsMm ?? { a: null, b: null, d: null, e: null }
  if (!leg || a === null || b === null || d === null || e === null) return null
  const legMm = (leg.shape === 'round' ? leg.diameterMm : leg.widthMm) / 2
  return legMm < tubeMm ? { legMm, windowMm: e / 2, outerMm: a / 2, halfLengthMm: b, halfWindowMm: d } : null
}

function extentOf({ core, flangeMm, tubeMm, tubeWallMm }: Surroundings, layout: Layout, { aboveMm, outlines }: { aboveMm: number; outlines: readonly LayoutOutline[] }): BoxMm {
  const middle = layout.windowWidthMm / 2
  const halfLength = Math.max(core?.halfLengthMm ?? 0, middle + flangeMm)
  const build = Math.max(layout.windowHeightMm, layout.buildMm)
  const highest = Math.max(build + aboveMm, ...outlines.map(({ yMm, heightMm }) => yMm + heightMm))
  return {
    leftMm: middle - halfLength,
    rightMm: middle + halfLength,
    bottomMm: core ? 0 : tubeMm - tubeWallMm,
    topMm: Math.max(core?.outerMm ?? 0, tubeMm + highest),
  }
}

function area({ place }: Pen, leftMm: number, bottomMm: number, rightMm: number, topMm: number): BoxMm {
  const [left, bottom] = place([leftMm, bottomMm])
  const [right, top] = place([rightMm, topMm])
  return { leftMm: left, bottomMm: bottom, rightMm: right, topMm: top }
}

function surroundingShapes(pen: Pen): Shape[] {
  const { around, input } = pen
  const { windowWidthMm: width, windowHeightMm: height } = input.layout
  const wall = area(pen, -around.flangeMm, around.tubeMm - around.tubeWallMm, width + around.flangeMm, around.tubeMm)
  const flange = (x: number) => area(pen, x, around.tubeMm, x + around.flangeMm, around.tubeMm + height)
  const formerParts = [wall, flange(-around.flangeMm), flange(width)]
  return [
    ...coreShapes(pen),
    ...formerParts.flatMap((part) => [rectangle(part, { layer: 'thin', fill: 'paper', tag: 'former' }), ...hatchRectangle(part, 1.6, -1)]),
  ]
}

function coreShapes(pen: Pen): Shape[] {
  const { core } = pen.around
  if (!core) return []
  const middle = pen.input.layout.windowWidthMm / 2
  const half = Math.min((pen.input.gapMm ?? 0) / 2, core.halfWindowMm)
  const backs = [-1, 1].map((hand) => {
    const xs = [middle + hand * core.halfWindowMm, middle + hand * core.halfLengthMm].sort((a, b) => a - b)
    return area(pen, xs[0]!, 0, xs[1]!, core.outerMm)
  })
  const legs =
    half > 0
      ? [area(pen, middle - core.halfWindowMm, 0, middle - half, core.legMm), area(pen, middle + half, 0, middle + core.halfWindowMm, core.legMm)]
      : [area(pen, middle - core.halfWindowMm, 0, middle + core.halfWindowMm, core.legMm)]
  const outer = area(pen, middle - core.halfWindowMm, core.windowMm, middle + core.halfWindowMm, core.outerMm)
  const parts = [...backs, ...legs, outer]
  return [...parts.flatMap((part) => hatchRectangle(part, 3.2)), ...coreEdges(pen, core, middle, half), ...axis(pen)]
}

/** One outline around back, leg and outer leg of each half; the halves meet in the outer leg. */
function coreEdges(pen: Pen, core: NonNullable<Surroundings['core']>, middle: number, halfGapMm: number): Shape[] {
  const edge = (from: PointMm, to: PointMm) => line(pen.place(from), pen.place(to), 'outline', 'core')
  const half = (hand: number): Shape[] => {
    const x = (offset: number): number => middle + hand * offset
    return [
      edge([x(core.halfLengthMm), 0], [x(core.halfLengthMm), core.outerMm]),
      edge([x(core.halfLengthMm), core.outerMm], [x(0), core.outerMm]),
      edge([x(0), core.windowMm], [x(core.halfWindowMm), core.windowMm]),
      edge([x(core.halfWindowMm), core.windowMm], [x(core.halfWindowMm), core.legMm]),
      edge([x(core.halfWindowMm), core.legMm], [x(halfGapMm), core.legMm]),
      edge([x(halfGapMm), core.legMm], [x(halfGapMm), 0]),
    ]
  }
  return [...half(-1), ...half(1), edge([middle, core.windowMm], [middle, core.outerMm])]
}

const axis = (pen: Pen): Shape[] => {
  const [left] = pen.place([pen.extent.leftMm, 0])
  const [right, y] = pen.place([pen.extent.rightMm, 0])
  return [line([left - 3, y], [right + 3, y], 'centre')]
}

/** Beside insulation paths the leads would be taken for more of them. */
const outlinesIn = ({ layout, overlay }: CoilSectionInput): LayoutOutline[] => (layout.outlines ?? []).filter(({ kind }) => !overlay || kind === 'section-wall')

/** Walls of the former as its flanges; what crosses the coil elsewhere round the turn as hidden lines. */
function outlineShapes(pen: Pen, { kind, stepId, xMm, yMm, widthMm, heightMm }: LayoutOutline): Shape[] {
  const { scale, around } = pen
  const [x, y] = pen.place([xMm, yMm + around.tubeMm])
  const part = box(x, y, widthMm * scale, heightMm * scale)
  if (kind === 'section-wall') return [rectangle(part, { layer: 'thin', fill: 'paper', tag: 'former' }), ...hatchRectangle(part, 1.6, -1)]
  return [rectangle(part, { layer: kind === 'lead-sleeve' ? 'fine' : 'hidden', fill: 'none', ...(stepId === null ? {} : { tag: `step:${stepId}` }) })]
}

function itemShapes(pen: Pen, item: LayoutItem): Shape[] {
  const { scale, around, input } = pen
  const at = (x: number, y: number) => pen.place([x, y + around.tubeMm])
  switch (item.kind) {
    case 'turn': {
      const index = input.specification.windings.findIndex(({ id }) => id === item.windingId)
      if (input.overlay) return [circle(at(item.xMm, item.yMm), (item.overallMm / 2) * scale, { layer: 'fine', fill: 'paper', tag: `winding:${item.windingId} step:${item.stepId}` })]
      return turnMark(index, at(item.xMm, item.yMm), (item.overallMm / 2) * scale, (item.conductorMm / 2) * scale, `winding:${item.windingId} step:${item.stepId}`)
    }
    case 'foil': {
      const [x, y] = at(item.xMm, item.yMm)
      return [rectangle(box(x, y, item.widthMm * scale, item.thicknessMm * scale), { layer: 'fine', fill: 'ink', tag: `winding:${item.windingId} step:${item.stepId}` })]
    }
    case 'tape': {
      const [x, y] = at(item.xMm, item.yMm)
      return [rectangle(box(x, y, item.widthMm * scale, item.thicknessMm * scale), { layer: 'fine', fill: input.overlay ? 'tint' : 'dark-tint', tag: `step:${item.stepId}` })]
    }
    case 'margin': {
      const [x, y] = at(item.xMm, item.yMm)
      const part = box(x, y, item.widthMm * scale, item.heightMm * scale)
      return [
        rectangle(part, { layer: 'fine', fill: input.overlay ? 'tint' : 'paper', tag: `step:${item.stepId}` }),
        ...(input.overlay ? [] : [...hatchRectangle(part, 1.2, 1, 'fine'), ...hatchRectangle(part, 1.2, -1, 'fine')]),
      ]
    }
  }
}

/** Middle of the items of a step along the radius, and how far they reach to either side. */
function sectionBalloons(pen: Pen): Balloon[] {
  const { specification, layout } = pen.input
  const left = pen.place([pen.extent.leftMm, 0])[0] - 5
  const right = pen.place([pen.extent.rightMm, 0])[0] + 5
  const targets = specification.sequence.flatMap((step, index) => {
    const items = layout.items.filter((item) => item.stepId === step.id)
    if (items.length === 0) return []
    const boxes = items.map((item) => itemBox(item))
    const y = (Math.min(...boxes.map((each) => each.bottomMm)) + Math.max(...boxes.map((each) => each.topMm))) / 2
    const place = (x: number) => pen.place([x, y + pen.around.tubeMm])
    return [{ text: String(index + 1), tag: `step:${step.id}`, leftEnd: place(Math.min(...boxes.map((each) => each.leftMm))), rightEnd: place(Math.max(...boxes.map((each) => each.rightMm))) }]
  })
  return balloons(targets, left, right)
}

const onSection = ({ place, around }: Pen) => ([x, y]: PointMm): PointMm => place([x, y + around.tubeMm])

const overlayShapes = (pen: Pen): Shape[] => pen.input.overlay?.draw(onSection(pen), pen.scale) ?? []

function overlayBalloons(pen: Pen): Balloon[] {
  const left = pen.place([pen.extent.leftMm, 0])[0] - 5
  const right = pen.place([pen.extent.rightMm, 0])[0] + 5
  const targets = (pen.input.overlay?.balloons ?? []).map(({ text, tag, at }) => ({ text, tag, leftEnd: onSection(pen)(at), rightEnd: onSection(pen)(at) }))
  return balloons(targets, left, right)
}

function itemBox(item: LayoutItem): BoxMm {
  switch (item.kind) {
    case 'turn':
      return box(item.xMm - item.overallMm / 2, item.yMm - item.overallMm / 2, item.overallMm, item.overallMm)
    case 'margin':
      return box(item.xMm, item.yMm, item.widthMm, item.heightMm)
    case 'foil':
    case 'tape':
      return box(item.xMm, item.yMm, item.widthMm, item.thicknessMm)
  }
}


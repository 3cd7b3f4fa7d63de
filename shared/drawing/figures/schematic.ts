import type { Winding, WindingSpecification } from '../../engine/specification'
import type { Library } from '../../engine/library'
import type { PathStep, Picture, PointMm, Shape } from '../model'
import { circle, label, LETTERING, line, moved, path } from '../shapes'
import { rowName } from '../sheets/input'
import { tapsOf } from '../sheets/terminals'
import { SIDE_WORDS } from '../sheets/words'
import { shortenedText, textWidthMm } from '../text-metrics'

export interface SchematicInput {
  specification: WindingSpecification
  library: Library
  widthMm: number
  maximumHeightMm: number
}

const TERMINAL_RADIUS_MM = 0.8
const SLOT_MM = 30
const SCREEN_SLOT_MM = 9
const CAPTION_MM = 8
const FOOT_MM = 10
const ARCS = 4
/** From the middle of the core to the leads of the coils. */
const COIL_MM = 7

type Hand = -1 | 1

interface Column {
  hand: Hand
  coils: Winding[]
  screens: Winding[]
}

/**
 * Circuit of the part with the symbols of IEC 60617: windings as half circles, a filled dot at the start of each,
 * the core as two lines (interrupted by a gap), screens as dashed lines, terminals with their names.
 */
export function schematic(input: SchematicInput): Picture {
  const columns = sortWindings(input.specification)
  const need = Math.max(...columns.map(columnHeightMm))
  const slotMm = Math.min(SLOT_MM, (SLOT_MM * (input.maximumHeightMm - CAPTION_MM - FOOT_MM)) / Math.max(need, 1))
  const shrink = slotMm / SLOT_MM
  const bodyMm = need * shrink
  const pen: Pen = { ...input, shrink, top: bodyMm + FOOT_MM, bottom: FOOT_MM, reach: input.widthMm / 2 - 9 }
  const shapes = [...coreShapes(pen), ...columns.flatMap((column) => columnShapes(pen, column))]
  return { widthMm: input.widthMm, heightMm: bodyMm + CAPTION_MM + FOOT_MM, shapes: moved(shapes, input.widthMm / 2, 0) }
}

interface Pen extends SchematicInput {
  /** Applied to heights where many windings share a column. */
  shrink: number
  top: number
  bottom: number
  /** From the middle of the core to the terminals. */
  reach: number
}

const columnHeightMm = ({ coils, screens }: Column) => coils.length * SLOT_MM + screens.length * SCREEN_SLOT_MM

/** Primary side at the left; where everything lies on one side, the first winding stands opposite the others. */
function sortWindings({ windings }: WindingSpecification): Column[] {
  const isLeft = ({ side }: Winding) => side === 'primary'
  const oneSided = windings.every(isLeft) || !windings.some(isLeft)
  const left = oneSided ? windings.slice(0, 1) : windings.filter(isLeft)
  const right = windings.filter((winding) => !left.includes(winding))
  const column = (hand: Hand, all: Winding[]): Column => ({
    hand,
    coils: all.filter(({ role }) => role !== 'shield'),
    screens: all.filter(({ role }) => role === 'shield'),
  })
  return [column(-1, left), column(1, right)]
}

function coreShapes(pen: Pen): Shape[] {
  const { specification, top, bottom } = pen
  const gapped = specification.core.gap.control.value !== null && specification.core.gap.control.value !== 'none'
  const middle = (top + bottom) / 2
  const bars = [-1, 1].flatMap((x) =>
    gapped
      ? [line([x, bottom + 1], [x, middle - 0.9], 'outline', 'core'), line([x, middle + 0.9], [x, top - 1], 'outline', 'core')]
      : [line([x, bottom + 1], [x, top - 1], 'outline', 'core')],
  )
  return [...bars, ...coreConnection(pen)]
}

function coreConnection({ specification, bottom, reach }: Pen): Shape[] {
  const potential = specification.core.potential.value
  const small = { heightMm: LETTERING.small, align: 'middle' } as const
  if (potential === null) return [label([0, 2], 'core: potential not stated', small)]
  if (potential.connection === 'floating' || potential.pin === null) {
    return [label([0, 2], `core floating, ${SIDE_WORDS[potential.side]} side`, small)]
  }
  const hand: Hand = potential.side === 'primary' ? -1 : 1
  const y = bottom - 4
  return [
    line([0, bottom + 1], [0, y], 'symbol', 'core'),
    line([-1, bottom + 1], [1, bottom + 1], 'symbol', 'core'),
    line([0, y], [hand * (reach - TERMINAL_RADIUS_MM), y], 'symbol', 'core'),
    ...terminal([hand * reach, y], potential.pin, hand),
    label([hand * 12, y - 3], 'core', small),
  ]
}

function columnShapes(pen: Pen, column: Column): Shape[] {
  const sides = [...new Set([...column.coils, ...column.screens].map(({ side }) => SIDE_WORDS[side]))]
  const caption = label([column.hand * (pen.reach + 1), pen.top + 4], sides.join(' / '), { align: column.hand < 0 ? 'start' : 'end', heightMm: LETTERING.small })
  const shapes: Shape[] = sides.length === 0 ? [] : [caption]
  let y = pen.top - Math.max(0, (pen.top - pen.bottom - columnHeightMm(column) * pen.shrink) / 2)
  for (const winding of column.coils) {
    shapes.push(...coil(pen, winding, column.hand, y))
    y -= SLOT_MM * pen.shrink
  }
  column.screens.forEach((winding, index) => {
    shapes.push(...screen(pen, winding, column.hand, y - (SCREEN_SLOT_MM * pen.shrink) / 2, index))
    y -= SCREEN_SLOT_MM * pen.shrink
  })
  return shapes
}

function terminal([x, y]: PointMm, name: string, hand: Hand): Shape[] {
  return [
    circle([x, y], TERMINAL_RADIUS_MM, { layer: 'symbol', fill: 'paper', tag: `pin:${name}` }),
    label([x + hand * 1.8, y - LETTERING.body / 2], name, { align: hand < 0 ? 'end' : 'start', font: 'sans-bold', tag: `pin:${name}` }),
  ]
}

function coil(pen: Pen, winding: Winding, hand: Hand, slotTop: number): Shape[] {
  const tag = `winding:${winding.id}`
  const taps = tapsOf(pen.specification, winding)
  const arcs = Math.max(ARCS, (taps.length + 1) * 2)
  const height = SLOT_MM * pen.shrink * 0.66
  const top = slotTop - (SLOT_MM * pen.shrink - height) / 2
  const radius = height / arcs / 2
  const x = hand * COIL_MM
  const tapY = (index: number) => top - Math.round(((index + 1) * arcs) / (taps.length + 1)) * 2 * radius
  return [
    halfCircles(x, top, radius, arcs, hand, tag),
    ...lead(pen, x, top, winding.startTerminal, hand, tag),
    ...taps.flatMap((tap, index) => lead(pen, x, tapY(index), tap.terminal, hand, tag)),
    ...lead(pen, x, top - height, winding.finishTerminal, hand, tag),
    circle([x + hand * 1.9, top - 1.9], 0.75, { layer: 'symbol', fill: 'ink', tag }),
    ...coilText(pen, winding, hand, top - height / 2, tag, taps.length > 0),
  ]
}

/** The bulges face the core. */
function halfCircles(x: number, top: number, radiusMm: number, arcs: number, hand: Hand, tag: string): Shape {
  const steps: PathStep[] = Array.from({ length: arcs }, (_, index) => ({
    to: [x, top - (index + 1) * 2 * radiusMm],
    radiusMm,
    turn: hand < 0 ? 'right' : 'left',
  }))
  return path([x, top], steps, { layer: 'symbol', tag })
}

function lead({ reach }: Pen, x: number, y: number, name: string, hand: Hand, tag: string): Shape[] {
  return [line([x, y], [hand * (reach - TERMINAL_RADIUS_MM), y], 'symbol', tag), ...terminal([hand * reach, y], name, hand)]
}

function coilText(pen: Pen, winding: Winding, hand: Hand, y: number, tag: string, tapped: boolean): Shape[] {
  const middle = hand * ((COIL_MM + pen.reach) / 2 + 1.5)
  const room = pen.reach - COIL_MM - 8
  const turns = `   ${turnsText(pen.specification, winding)}`
  const nameRoom = room - textWidthMm(turns, 'sans-bold', LETTERING.body)
  const name = `${shortenedText(winding.name, 'sans-bold', LETTERING.body, nameRoom)}${turns}`
  const wire = wireText(pen, winding)
  const small = { align: 'middle', heightMm: LETTERING.small, tag } as const
  const roomy = pen.shrink > 0.45 && !tapped && textWidthMm(wire, 'sans', LETTERING.small) < room
  const nameLabel = label([middle, y + (roomy ? 0.7 : tapped ? 1 : -1.2)], name, { align: 'middle', font: 'sans-bold', tag })
  return roomy ? [nameLabel, label([middle, y - 3], wire, small)] : [nameLabel]
}

/** `46 turns`; `23 + 23 turns` where the winding is tapped. */
function turnsText(specification: WindingSpecification, winding: Winding): string {
  const marks = [0, ...tapsOf(specification, winding).map((tap) => tap.turns), winding.turns]
  const parts = marks.slice(1).map((mark, index) => mark - marks[index]!)
  return `${parts.join(' + ')} ${winding.turns === 1 ? 'turn' : 'turns'}`
}

function wireText({ library }: Pen, { wire }: Winding): string {
  const name = rowName(library, wire.wire)
  return wire.parallel > 1 ? `${wire.parallel} × ${name}` : name
}

function screen(pen: Pen, winding: Winding, hand: Hand, y: number, index: number): Shape[] {
  const tag = `winding:${winding.id}`
  const x = hand * (2.6 + index * 1.2)
  const shield = pen.specification.sequence.find((step) => step.kind === 'shield' && step.windingId === winding.id)
  const name = shield?.kind === 'shield' ? shield.connectedTerminal : winding.startTerminal
  return [
    line([x, pen.top - 1], [x, y], 'screen', tag),
    ...lead(pen, x, y, name, hand, tag),
    label([hand * ((COIL_MM + pen.reach) / 2 + 1.5), y + 1], `${winding.name}   screen`, { align: 'middle', font: 'sans-bold', tag }),
  ]
}

/** The circuit in words, for readers who do not see it. */
export function schematicInWords({ windings }: WindingSpecification): string {
  return windings
    .map(({ name, startTerminal, finishTerminal, turns }) => `${name}: start ${startTerminal}, finish ${finishTerminal}, ${turns} turns`)
    .join('; ')
}

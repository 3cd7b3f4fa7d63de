import type { BoundaryEnd, InsulationBoundary, InsulationType, Side, WindingSpecification } from '../../engine/specification'
import type { Layer, Picture, PointMm, Shape } from '../model'
import { box, circle, label, LETTERING, line, rectangle } from '../shapes'
import { terminalsOf } from '../sheets/terminals'
import { INSULATION_WORDS, SIDE_WORDS } from '../sheets/words'
import { shortenedText } from '../text-metrics'

const BOX_MM = 46
const ROW_MM = 5
const TRACK_MM = 8
const RADIUS_MM = 2.7
const GAP_MM = 4
const CORE_MM = 7

/** Line of a boundary by what its insulation is. */
const LAYERS: Record<InsulationType, Layer> = { functional: 'hidden', basic: 'thin', supplementary: 'thin', double: 'outline', reinforced: 'outline' }

/** A conducting part that boundaries end at. */
interface Node {
  key: string
  title: string
  /** Windings of a side with their terminals; boundaries may end at one of them. */
  rows: { key: string; text: string }[]
  hand: 'left' | 'right'
}

/**
 * Which conducting parts lie on which side, with a numbered line for each insulation boundary: sides and their windings
 * left and right, the core below. Numbers are those of the table of boundaries.
 */
export function insulationMap(specification: WindingSpecification): Picture {
  const { boundaries } = specification.insulation
  const nodes = nodesOf(specification)
  const ends = endCounts(boundaries)
  const channel = Math.max(2, boundaries.length + 1) * TRACK_MM
  const columns = { left: columnOf(nodes, 'left', ends), right: columnOf(nodes, 'right', ends) }
  const bodyMm = Math.max(columns.left.heightMm, columns.right.heightMm, boundaries.length * (2 * RADIUS_MM + 1))
  const bottom = CORE_MM + 6
  const top = bottom + bodyMm
  const rightX = BOX_MM + channel
  const ports = new Map([...drawnColumn(columns.left, 0, top), ...drawnColumn(columns.right, rightX, top)].map((port) => [port.key, port]))
  const core = ends.has('core') || specification.core.core.value !== null
  const used = new Map<string, number>()
  const tracks = boundaries.map((boundary, index) => trackShapes({ boundary, index, ports, used, trackX: BOX_MM + (index + 1) * TRACK_MM, coreY: CORE_MM }))
  return {
    widthMm: rightX + BOX_MM,
    heightMm: top,
    shapes: [
      ...tracks.flatMap(({ lines }) => lines),
      ...columnShapes(columns.left, 0, top),
      ...columnShapes(columns.right, rightX, top),
      ...(core ? coreShapes(specification, BOX_MM, channel) : []),
      ...tracks.flatMap(({ balloon }) => balloon),
    ],
  }
}

const keyOf = (end: BoundaryEnd): string => (end.kind === 'core' ? 'core' : end.kind === 'side' ? `side:${end.side}` : `winding:${end.windingId}`)

function nodesOf({ windings, ...specification }: WindingSpecification): Node[] {
  const sides = [...new Set(windings.map(({ side }) => side))]
  const left = sides.includes('primary') ? 'primary' : sides[0]
  return sides.map((side: Side) => ({
    key: `side:${side}`,
    title: SIDE_WORDS[side],
    hand: side === left ? 'left' : 'right',
    rows: windings
      .filter((winding) => winding.side === side)
      .map((winding) => ({ key: `winding:${winding.id}`, text: `${winding.name}: ${terminalsOf({ windings, ...specification }, winding).map(([name]) => name).join(', ')}` })),
  }))
}

/** How many boundaries end at each part. */
function endCounts(boundaries: readonly InsulationBoundary[]): Map<string, number> {
  const counts = new Map<string, number>()
  for (const end of boundaries.flatMap(({ between }) => between)) counts.set(keyOf(end), (counts.get(keyOf(end)) ?? 0) + 1)
  return counts
}

interface ColumnRow {
  key: string
  text: string
  heading: boolean
  heightMm: number
}

interface Column {
  nodes: { rows: ColumnRow[]; heightMm: number }[]
  heightMm: number
  hand: 'left' | 'right'
}

function columnOf(nodes: readonly Node[], hand: 'left' | 'right', ends: ReadonlyMap<string, number>): Column {
  const rowsOf = ({ key, title, rows }: Node): ColumnRow[] =>
    [{ key, text: title, heading: true }, ...rows.map((row) => ({ ...row, heading: false }))].map((row) => ({ ...row, heightMm: Math.max(1, ends.get(row.key) ?? 0) * ROW_MM }))
  const mine = nodes.filter((node) => node.hand === hand).map((node) => {
    const rows = rowsOf(node)
    return { rows, heightMm: rows.reduce((sum, { heightMm }) => sum + heightMm, 0) }
  })
  return { nodes: mine, hand, heightMm: mine.reduce((sum, { heightMm }) => sum + heightMm + GAP_MM, -GAP_MM) }
}

interface Port {
  key: string
  x: number
  topMm: number
}

/** Upper edge of each row at the edge that faces the middle. */
function drawnColumn({ nodes, hand }: Column, leftMm: number, topMm: number): Port[] {
  let y = topMm
  return nodes.flatMap(({ rows }) => {
    const ports = rows.map((row) => {
      const port = { key: row.key, x: hand === 'left' ? leftMm + BOX_MM : leftMm, topMm: y }
      y -= row.heightMm
      return port
    })
    y -= GAP_MM
    return ports
  })
}

function columnShapes({ nodes }: Column, leftMm: number, topMm: number): Shape[] {
  let y = topMm
  return nodes.flatMap(({ rows, heightMm }) => {
    const frame = rectangle(box(leftMm, y - heightMm, BOX_MM, heightMm), { layer: 'outline', fill: 'paper' })
    const texts = rows.map((row): Shape => {
      const font = row.heading ? 'sans-bold' : 'sans'
      const text = shortenedText(row.text, font, LETTERING.small, BOX_MM - 4)
      const shape = label([leftMm + 2, y - row.heightMm / 2 - LETTERING.small / 2], text, { font, heightMm: LETTERING.small, tag: row.key.startsWith('winding:') ? row.key : undefined })
      y -= row.heightMm
      return shape
    })
    y -= GAP_MM
    return [frame, ...texts]
  })
}

function coreShapes({ core }: WindingSpecification, leftMm: number, widthMm: number): Shape[] {
  const potential = core.potential.value
  const text = potential === null ? 'core: potential not stated' : potential.connection === 'pin' ? `core, pin ${potential.pin ?? '?'}, ${SIDE_WORDS[potential.side]}` : `core, floating, ${SIDE_WORDS[potential.side]}`
  const fitted = shortenedText(text, 'sans', LETTERING.small, widthMm - 3)
  return [
    rectangle(box(leftMm, 0, widthMm, CORE_MM), { layer: 'outline', fill: 'tint', tag: 'core' }),
    label([leftMm + widthMm / 2, (CORE_MM - LETTERING.small) / 2], fitted, { align: 'middle', heightMm: LETTERING.small }),
  ]
}

interface Track {
  boundary: InsulationBoundary
  index: number
  ports: ReadonlyMap<string, Port>
  /** Ends drawn so far, so that each finds a height of its own. */
  used: Map<string, number>
  trackX: number
  coreY: number
}

/** From one end level to the track of the boundary, along it, and level to the other end. */
function trackShapes({ boundary, index, ports, used, trackX, coreY }: Track): { lines: Shape[]; balloon: Shape[] } {
  const tag = `boundary:${boundary.id}`
  const layer = LAYERS[boundary.insulation]
  const stops = boundary.between.map((end): PointMm | null => {
    const key = keyOf(end)
    if (key === 'core') return [trackX, coreY]
    const port = ports.get(key)
    if (!port) return null
    const order = used.get(key) ?? 0
    used.set(key, order + 1)
    return [port.x, port.topMm - (order + 0.5) * ROW_MM]
  })
  const known = stops.filter((stop): stop is PointMm => stop !== null)
  const heights = known.map(([, y]) => y)
  const middle = heights.length === 0 ? coreY + 6 : (Math.max(...heights) + Math.min(...heights)) / 2
  return {
    lines: [
      ...known.filter(([x]) => x !== trackX).map((stop) => line(stop, [trackX, stop[1]], layer, tag)),
      ...(known.length === 2 ? [line([trackX, heights[0]!], [trackX, heights[1]!], layer, tag)] : []),
    ],
    balloon: [
      circle([trackX, middle], RADIUS_MM, { layer: 'thin', fill: 'paper', tag }),
      label([trackX, middle - LETTERING.body / 2], String(index + 1), { align: 'middle', tag }),
    ],
  }
}

/** How the lines of the map are read. */
export const MAP_LEGEND = 'Thick line: double or reinforced insulation; thin: basic or supplementary; dashed: functional. Numbers as in the table of boundaries.'

/** The map in words, for readers who do not see it. */
export const mapInWords = ({ insulation }: WindingSpecification): string =>
  insulation.boundaries.map((boundary, index) => `${index + 1}: ${boundary.name}, ${INSULATION_WORDS[boundary.insulation]}`).join('; ')

/** Plain data in millimetres, origin bottom-left, y upwards. No DOM, no PDF, no pixels. */
export type PointMm = readonly [xMm: number, yMm: number]

/** Line widths of ISO 128-2 (0.13, 0.18, 0.25, 0.35, 0.5, 0.7 mm); dash lengths in mm, empty for a continuous line. */
export const LINES = {
  frame: { widthMm: 0.7, dashMm: [] },
  zone: { widthMm: 0.35, dashMm: [] },
  outline: { widthMm: 0.5, dashMm: [] },
  symbol: { widthMm: 0.35, dashMm: [] },
  screen: { widthMm: 0.35, dashMm: [2, 1] },
  thin: { widthMm: 0.25, dashMm: [] },
  phantom: { widthMm: 0.18, dashMm: [6, 0.75, 0.5, 0.75, 0.5, 0.75] },
  hidden: { widthMm: 0.25, dashMm: [3, 0.75] },
  centre: { widthMm: 0.25, dashMm: [6, 0.75, 0.5, 0.75] },
  dimension: { widthMm: 0.18, dashMm: [] },
  fine: { widthMm: 0.13, dashMm: [] },
  hatch: { widthMm: 0.18, dashMm: [] },
  rule: { widthMm: 0.18, dashMm: [] },
  'heavy-rule': { widthMm: 0.35, dashMm: [] },
} as const satisfies Record<string, { widthMm: number; dashMm: readonly number[] }>

export type Layer = keyof typeof LINES

/** `paper` hides what lies below it. Tints stay apart in grey. */
export type Fill = 'none' | 'paper' | 'tint' | 'dark-tint' | 'ink'

export const FILL_COLOURS: Record<Exclude<Fill, 'none'>, string> = {
  paper: '#ffffff',
  tint: '#ececec',
  'dark-tint': '#c4c4c4',
  ink: '#000000',
}

export type FontRole = 'sans' | 'sans-bold' | 'mono'
export type Align = 'start' | 'middle' | 'end'
export type Ink = 'ink' | 'faint'

/** `faint` is for marks that lie below the drawing. Solid, since it must print without transparency. */
export const INK_COLOURS: Record<Ink, string> = { ink: '#000000', faint: '#e2e2e2' }

/** A straight step, or an arc of at most half a turn; `turn` is seen from above, y upwards. */
export type PathStep = { to: PointMm } | { to: PointMm; radiusMm: number; turn: 'left' | 'right' }

interface ShapeBase {
  /** What the shape belongs to, e.g. `winding:w1`, `step:s3`, `pin:4`. */
  tag?: string
}

export interface PathShape extends ShapeBase {
  kind: 'path'
  layer: Layer
  from: PointMm
  steps: readonly PathStep[]
  closed: boolean
  fill: Fill
  /** False for areas without an edge. */
  stroked: boolean
}

export interface CircleShape extends ShapeBase {
  kind: 'circle'
  layer: Layer
  center: PointMm
  radiusMm: number
  fill: Fill
}

export interface LabelShape extends ShapeBase {
  kind: 'label'
  /** On the baseline. */
  anchor: PointMm
  align: Align
  /** Height of capitals: the nominal size of ISO 3098-1. */
  heightMm: number
  font: FontRole
  text: string
  ink: Ink
  /** Counter-clockwise about the anchor. */
  rotationDeg: number
}

/** A matrix of square modules, e.g. a two-dimensional code. */
export interface ModulesShape extends ShapeBase {
  kind: 'modules'
  /** Lower left corner of the matrix, without quiet zone. */
  corner: PointMm
  moduleMm: number
  /** From the top, one character per module: `1` is dark. */
  rows: readonly string[]
}

export type Shape = PathShape | CircleShape | LabelShape | ModulesShape

/** Something drawn that can stand alone: in a sheet, or by itself on a screen. */
export interface Picture {
  widthMm: number
  heightMm: number
  shapes: readonly Shape[]
}

export interface BoxMm {
  leftMm: number
  bottomMm: number
  rightMm: number
  topMm: number
}

/** What a sheet holds, in the order in which it is read. */
export type Block =
  /** Frame, rules and marks that say nothing. */
  | { kind: 'artifact'; shapes: readonly Shape[] }
  | { kind: 'heading'; level: 1 | 2; text: string; box: BoxMm; shapes: readonly Shape[] }
  | { kind: 'text'; box: BoxMm; shapes: readonly Shape[] }
  | { kind: 'figure'; title: string; alternative: string; box: BoxMm; shapes: readonly Shape[] }
  | TableBlock

export interface TableBlock {
  kind: 'table'
  title: string
  box: BoxMm
  /** Title line, empty where the table has none. */
  caption: readonly LabelShape[]
  rows: readonly TableRow[]
  rules: readonly Shape[]
}

export interface TableRow {
  header: boolean
  tag?: string
  cells: readonly TableCell[]
}

export interface TableCell {
  header: boolean
  columns: number
  labels: readonly LabelShape[]
}

export interface Sheet {
  number: number
  count: number
  title: string
  widthMm: number
  heightMm: number
  blocks: readonly Block[]
}

/** All shapes of a block in painting order. */
export function blockShapes(block: Block): readonly Shape[] {
  if (block.kind !== 'table') return block.shapes
  return [...block.rules, ...block.caption, ...block.rows.flatMap((row) => row.cells.flatMap((cell) => cell.labels))]
}

/** All shapes of a sheet in painting order. */
export const sheetShapes = (sheet: Sheet): readonly Shape[] => sheet.blocks.flatMap(blockShapes)

/** A sheet as one picture. */
export const sheetPicture = (sheet: Sheet): Picture => ({
  widthMm: sheet.widthMm,
  heightMm: sheet.heightMm,
  shapes: sheetShapes(sheet),
})

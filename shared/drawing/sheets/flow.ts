import type { Block, Picture } from '../model'
import { box, label, labelLines, LETTERING, linesHeightMm, moved } from '../shapes'
import { drawTablePart, layoutTable, suitingHeightMm, tableHeightMm, type TableContent, type TableLayout } from '../table'
import { wrapText } from '../text-metrics'
import { SPACE } from './frame'
import { TITLE_BLOCK } from './title-block'

/** A sheet being filled. */
export interface Page {
  content: string
  scale: string
  blocks: Block[]
}

/** Where the next thing on the current sheet goes; sheets are added as things need them. */
export interface Flow {
  pages: Page[]
  topMm: number
}

export const BODY_BOTTOM_MM = TITLE_BLOCK.topMm + 3.5
export const BODY_WIDTH_MM = SPACE.rightMm - SPACE.leftMm
const GAP_MM = 4.5
const HEADING_MM = 7

export const newFlow = (): Flow => ({ pages: [], topMm: BODY_BOTTOM_MM })

const currentPage = (flow: Flow): Page => flow.pages.at(-1)!

/** Begins a sheet whose heading is `content`. */
export function newPage(flow: Flow, content: string): void {
  flow.pages.push({ content, scale: '', blocks: [] })
  const top = SPACE.topMm
  const shape = label([SPACE.leftMm, top - LETTERING.heading], content, { heightMm: LETTERING.heading, font: 'sans-bold' })
  const area = box(SPACE.leftMm, top - HEADING_MM, BODY_WIDTH_MM, HEADING_MM)
  currentPage(flow).blocks.push({ kind: 'heading', level: 1, text: content, box: area, shapes: [shape] })
  flow.topMm = top - HEADING_MM
}

/** Goes on to a further sheet of the same group. */
export function continuePage(flow: Flow): void {
  newPage(flow, currentPage(flow).content.replace(/( \(continued\))?$/, ' (continued)'))
}

/** Room below the last thing on the sheet, mm. */
export const roomMm = (flow: Flow): number => flow.topMm - BODY_BOTTOM_MM

/** Takes `heightMm` of the sheet, a further one where this has no room; answers its upper edge. */
export function take(flow: Flow, heightMm: number): number {
  if (roomMm(flow) < heightMm) continuePage(flow)
  const top = flow.topMm
  flow.topMm = top - heightMm - GAP_MM
  return top
}

export const add = (flow: Flow, ...blocks: Block[]): void => void currentPage(flow).blocks.push(...blocks)

export function setScale(flow: Flow, scale: string): void {
  currentPage(flow).scale = scale
}

/** A picture with its title above, its upper edge at `topMm`. */
export function placeFigure(flow: Flow, title: string, alternative: string, picture: Picture, leftMm: number, topMm: number, widthMm: number): void {
  const area = box(leftMm, topMm - FIGURE_TITLE_MM - picture.heightMm, widthMm, picture.heightMm + FIGURE_TITLE_MM)
  const heading = labelLines(leftMm, topMm - 0.9, wrapText(title, 'sans-bold', LETTERING.body, widthMm), { font: 'sans-bold' })
  add(flow, { kind: 'figure', title, alternative, box: area, shapes: [...heading, ...moved(picture.shapes, area.leftMm, area.bottomMm)] })
}

export interface Figure {
  title: string
  words: string
  picture: Picture
}

const FIGURE_GAP_MM = 6

/** Figures beside each other as long as they have room, in rows below each other. */
export function addFigures(flow: Flow, figures: readonly Figure[]): void {
  const rows: Figure[][] = []
  let left = Infinity
  for (const figure of figures) {
    if (left + figure.picture.widthMm > BODY_WIDTH_MM) {
      rows.push([])
      left = 0
    }
    rows.at(-1)!.push(figure)
    left += figure.picture.widthMm + FIGURE_GAP_MM
  }
  for (const row of rows) addRow(flow, row)
}

function addRow(flow: Flow, row: readonly Figure[]): void {
  const top = take(flow, FIGURE_TITLE_MM + Math.max(...row.map(({ picture }) => picture.heightMm)))
  let left: number = SPACE.leftMm
  for (const { title, words, picture } of row) {
    placeFigure(flow, title, words, picture, left, top, picture.widthMm)
    left += picture.widthMm + FIGURE_GAP_MM
  }
}

/** Height of a figure's title, mm. */
export const FIGURE_TITLE_MM = 6

/** A table over the width of the sheet, going on to further sheets with its header. */
export function addTable(flow: Flow, content: TableContent): void {
  if (content.rows.length === 0) return
  const layout = layoutFor(content, roomMm(flow))
  if (readsBetterWhole(flow, layout)) continuePage(flow)
  let row = 0
  while (row < layout.rows.length) row = placePart(flow, layout, row)
}

/** In the small lettering where only that keeps the table on the sheet. */
function layoutFor(content: TableContent, heightMm: number): TableLayout {
  const layout = layoutTable(content, BODY_WIDTH_MM)
  if (tableHeightMm(layout) <= heightMm || content.heightMm !== undefined) return layout
  const small = layoutTable({ ...content, heightMm: LETTERING.small }, BODY_WIDTH_MM)
  return tableHeightMm(small) <= heightMm ? small : layout
}

/** A short table that would be cut near its head goes to the next sheet in one piece. */
function readsBetterWhole(flow: Flow, layout: TableLayout): boolean {
  const heightMm = tableHeightMm(layout)
  if (heightMm <= roomMm(flow)) return false
  const sheetMm = SPACE.topMm - HEADING_MM - BODY_BOTTOM_MM
  const firstRowsMm = layout.headMm + layout.rows.slice(0, LEAST_ROWS).reduce((sum, row) => sum + row.heightMm, 0)
  return firstRowsMm > roomMm(flow) || (heightMm < sheetMm / 2 && roomMm(flow) < heightMm / 2)
}

/** Fewer rows than these under a header are not begun at the foot of a sheet. */
const LEAST_ROWS = 3

function placePart(flow: Flow, layout: TableLayout, firstRow: number): number {
  const part = drawTablePart(layout, firstRow, SPACE.leftMm, flow.topMm, BODY_BOTTOM_MM)
  if (!part) {
    continuePage(flow)
    return firstRow
  }
  add(flow, part.block)
  flow.topMm = part.bottomMm - GAP_MM
  return part.nextRow
}

/** Columns lower than this are not begun unless all fits into them. */
const LEAST_COLUMN_MM = 40

interface Pending {
  layout: TableLayout
  nextRow: number
}

/** Tables beside each other in columns of equal width, filled evenly, going on to further sheets. */
export function addColumns(flow: Flow, contents: readonly TableContent[], count: number, leftMm: number = SPACE.leftMm, widthMm = BODY_WIDTH_MM): void {
  const columnMm = (widthMm - (count - 1) * GAP_MM) / count
  const filled = contents.filter(({ rows }) => rows.length > 0)
  const queue = pendingTables(filled, columnMm, count * roomMm(flow))
  if (roomMm(flow) < LEAST_COLUMN_MM && remainingMm(queue) > count * roomMm(flow)) continuePage(flow)
  while (queue.length > 0) {
    if (!fillColumns(flow, queue, count, columnMm, leftMm)) continuePage(flow)
    else if (queue.length > 0) continuePage(flow)
  }
}

/** Tables beside each other share one lettering, the small one where only that keeps them on the sheet. */
function pendingTables(contents: readonly TableContent[], columnMm: number, heightMm: number): Pending[] {
  const inLettering = (lettering: number): Pending[] => contents.map((content) => ({ layout: layoutTable({ heightMm: lettering, ...content }, columnMm), nextRow: 0 }))
  const suiting = inLettering(Math.min(...contents.map((content) => suitingHeightMm(content, columnMm))))
  if (remainingMm(suiting) <= heightMm) return suiting
  const small = inLettering(LETTERING.small)
  return remainingMm(small) <= heightMm ? small : suiting
}

function fillColumns(flow: Flow, queue: Pending[], count: number, columnMm: number, leftMm: number): boolean {
  const top = flow.topMm
  const target = top - Math.min(top - BODY_BOTTOM_MM, remainingMm(queue) / count + 8)
  let lowest = top
  for (let index = 0; index < count && queue.length > 0; index++) {
    const last = index === count - 1
    const bottom = fillColumn(flow, queue, leftMm + index * (columnMm + GAP_MM), top, last ? BODY_BOTTOM_MM : target)
    lowest = Math.min(lowest, bottom)
  }
  flow.topMm = lowest
  return lowest < top
}

function fillColumn(flow: Flow, queue: Pending[], leftMm: number, topMm: number, bottomMm: number): number {
  let y = topMm
  while (queue.length > 0) {
    const pending = queue[0]!
    const part = drawTablePart(pending.layout, pending.nextRow, leftMm, y, bottomMm)
    if (!part || (y < topMm && isSliver(part.nextRow - pending.nextRow, pending))) break
    add(flow, part.block)
    y = part.bottomMm - GAP_MM
    pending.nextRow = part.nextRow
    if (pending.nextRow < pending.layout.rows.length) break
    queue.shift()
  }
  return y
}

/** A few rows of a longer table at the foot of a column read better at the head of the next. */
const isSliver = (drawn: number, { layout, nextRow }: Pending) => drawn < 3 && nextRow + drawn < layout.rows.length

const remainingMm = (queue: readonly Pending[]): number =>
  queue.reduce((total, { layout, nextRow }) => {
    const done = layout.rows.slice(0, nextRow).reduce((sum, row) => sum + row.heightMm, 0)
    return total + tableHeightMm(layout) - done + GAP_MM
  }, 0)

/** Numbered or plain paragraphs over the width of the sheet under a heading. */
export function addParagraphs(flow: Flow, title: string, paragraphs: readonly string[], heightMm: number = LETTERING.body): void {
  if (paragraphs.length === 0) return
  const wrapped = paragraphs.map((text) => wrapText(text, 'sans', heightMm, BODY_WIDTH_MM))
  const first = linesHeightMm(wrapped[0]!.length, heightMm)
  const top = take(flow, FIGURE_TITLE_MM + first - GAP_MM)
  const area = box(SPACE.leftMm, top - FIGURE_TITLE_MM, BODY_WIDTH_MM, FIGURE_TITLE_MM)
  add(flow, { kind: 'heading', level: 2, text: title, box: area, shapes: [label([SPACE.leftMm, top - 3.4], title, { font: 'sans-bold' })] })
  flow.topMm = top - FIGURE_TITLE_MM
  for (const lines of wrapped) addParagraph(flow, lines, heightMm)
  flow.topMm -= GAP_MM - 1
}

function addParagraph(flow: Flow, lines: readonly string[], heightMm: number): void {
  const height = linesHeightMm(lines.length, heightMm)
  const top = take(flow, height)
  flow.topMm = top - height - 1
  const area = box(SPACE.leftMm, top - height, BODY_WIDTH_MM, height)
  add(flow, { kind: 'text', box: area, shapes: labelLines(SPACE.leftMm, top, lines, { heightMm }) })
}

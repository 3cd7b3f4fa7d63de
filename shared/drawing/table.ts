import { CELL_PADDING_MM, columnWidthsMm, filledColumns, fractionOf, leastWidthMm, type Column, type Row } from './columns'
import type { LabelShape, Shape, TableBlock, TableCell, TableRow } from './model'
import { label, labelLines, LETTERING, line, linesHeightMm } from './shapes'
import { LINE_PITCH, textWidthMm, wrapText } from './text-metrics'

export type { Column, Row } from './columns'

export interface TableContent {
  title: string
  columns: readonly Column[]
  rows: readonly Row[]
  /** Lettering of the cells; the largest that reads well when nothing is said. */
  heightMm?: number
  /** Key–value tables have none. */
  headerless?: boolean
}

/** A table whose widths and line breaks are settled, ready to be cut into parts. */
export interface TableLayout {
  content: TableContent
  columns: readonly Column[]
  widthsMm: readonly number[]
  rows: readonly RowLayout[]
  heightMm: number
  /** Caption and header, repeated on each part. */
  headMm: number
}

interface RowLayout {
  tag?: string
  /** Lines by column. */
  lines: readonly (readonly string[])[]
  heightMm: number
}

const CAPTION_MM = 5.2
const ROW_PADDING_MM = 0.7
/** Rows with more lines than this are cut, so that any row fits a sheet. */
const MOST_LINES = 36

const rowHeightMm = (lineCount: number, heightMm: number) => linesHeightMm(Math.max(lineCount, 1), heightMm) + 2 * ROW_PADDING_MM - heightMm * 0.1

/** A table in the larger lettering may become this much taller; beyond that, its columns are too narrow for it. */
const MOST_GROWTH = 1.75

/**
 * The lettering of ISO 3098 that suits a table in its width: 2.5 mm, which stays legible on an A4 copy, or 1.8 mm
 * where the larger one would break words or most lines.
 */
export function suitingHeightMm(content: TableContent, widthMm: number): number {
  const [small, large] = [LETTERING.small, LETTERING.body].map((heightMm) => ({ ...content, heightMm }))
  const columns = filledColumns(content.columns, content.rows)
  if (leastWidthMm(columns, content.rows, LETTERING.body) > widthMm) return LETTERING.small
  const growth = tableHeightMm(layoutTable(large!, widthMm)) / tableHeightMm(layoutTable(small!, widthMm))
  return growth <= MOST_GROWTH ? LETTERING.body : LETTERING.small
}

/** Settles widths and line breaks of a table that is `widthMm` wide. Columns without a value are left out. */
export function layoutTable(content: TableContent, widthMm: number): TableLayout {
  const heightMm = content.heightMm ?? suitingHeightMm(content, widthMm)
  const columns = filledColumns(content.columns, content.rows)
  const widthsMm = columnWidthsMm(columns, content.rows, heightMm, widthMm)
  const rows = content.rows.flatMap((row) => layoutRow(row, columns, widthsMm, heightMm))
  const draft = { content, columns, widthsMm, rows, heightMm }
  return { ...draft, headMm: CAPTION_MM + headerHeightMm(draft) }
}

function layoutRow(row: Row, columns: readonly Column[], widthsMm: readonly number[], heightMm: number): RowLayout[] {
  const lines = columns.map((column, index) =>
    wrapText(row.cells[column.key] ?? '', column.font ?? 'sans', heightMm, widthsMm[index]! - 2 * CELL_PADDING_MM),
  )
  const most = Math.max(1, ...lines.map((cell) => cell.length))
  const parts = Array.from({ length: Math.ceil(most / MOST_LINES) }, (_, part) =>
    lines.map((cell) => cell.slice(part * MOST_LINES, (part + 1) * MOST_LINES)),
  )
  return parts.map((part) => ({
    lines: part,
    heightMm: rowHeightMm(Math.max(...part.map((cell) => cell.length)), heightMm),
    ...(row.tag !== undefined && { tag: row.tag }),
  }))
}

type Draft = Omit<TableLayout, 'headMm'>

const hasGroups = ({ columns }: Draft) => columns.some((column) => column.group !== undefined)

function headerLines({ columns, widthsMm, heightMm }: Draft): string[][] {
  return columns.map(({ header }, index) => wrapText(header, 'sans-bold', heightMm, widthsMm[index]! - 2 * CELL_PADDING_MM))
}

function headerHeightMm(draft: Draft): number {
  if (draft.content.headerless) return 0
  const own = rowHeightMm(Math.max(1, ...headerLines(draft).map((cell) => cell.length)), draft.heightMm)
  return own + (hasGroups(draft) ? rowHeightMm(1, draft.heightMm) : 0)
}

/** Height of a whole table in one part, mm. */
export const tableHeightMm = (layout: TableLayout): number =>
  layout.headMm + layout.rows.reduce((total, row) => total + row.heightMm, 0)

export interface TablePart {
  block: TableBlock
  /** First row that found no room; the number of rows when all did. */
  nextRow: number
  bottomMm: number
}

/** Draws rows from `firstRow` on down to `bottomMm`. Null when not even one row has room. */
export function drawTablePart(layout: TableLayout, firstRow: number, leftMm: number, topMm: number, bottomMm: number): TablePart | null {
  let y = topMm - layout.headMm
  let nextRow = firstRow
  while (nextRow < layout.rows.length && y - layout.rows[nextRow]!.heightMm >= bottomMm - 1e-6) y -= layout.rows[nextRow++]!.heightMm
  if (nextRow === firstRow) return null
  const pen: Pen = { layout, leftMm, edges: columnEdges(layout, leftMm) }
  const title = firstRow === 0 ? layout.content.title : `${layout.content.title} (continued)`
  const rows = [...headerRows(pen, topMm - CAPTION_MM), ...bodyRows(pen, firstRow, nextRow, topMm - layout.headMm)]
  return {
    block: {
      kind: 'table',
      title,
      box: { leftMm, rightMm: pen.edges.at(-1)!, bottomMm: y, topMm },
      caption: [label([leftMm, topMm - 3.4], title, { font: 'sans-bold' })],
      rows,
      rules: rules(pen, firstRow, nextRow, topMm - CAPTION_MM),
    },
    nextRow,
    bottomMm: y,
  }
}

interface Pen {
  layout: TableLayout
  leftMm: number
  edges: readonly number[]
}

function columnEdges({ widthsMm }: TableLayout, leftMm: number): number[] {
  const edges = [leftMm]
  for (const width of widthsMm) edges.push(edges.at(-1)! + width)
  return edges
}

interface Group {
  text: string
  first: number
  last: number
}

function groups({ columns }: TableLayout): Group[] {
  const found: Group[] = []
  columns.forEach(({ group = '' }, index) => {
    const previous = found.at(-1)
    if (previous && previous.text === group && group !== '') previous.last = index
    else found.push({ text: group, first: index, last: index })
  })
  return found
}

function headerRows({ layout, edges }: Pen, topMm: number): TableRow[] {
  if (layout.content.headerless) return []
  const style = { font: 'sans-bold', heightMm: layout.heightMm } as const
  const grouped = hasGroups(layout)
  const groupMm = grouped ? rowHeightMm(1, layout.heightMm) : 0
  const upper: TableCell[] = groups(layout).map(({ text, first, last }) => {
    const middle = (edges[first]! + edges[last + 1]!) / 2
    const labels = text === '' ? [] : labelLines(middle, topMm - ROW_PADDING_MM, [text], { ...style, align: 'middle' })
    return { header: true, columns: last - first + 1, labels }
  })
  const lower: TableCell[] = headerLines(layout).map((lines, index) => ({
    header: true,
    columns: 1,
    labels: labelLines(edges[index]! + CELL_PADDING_MM, topMm - groupMm - ROW_PADDING_MM, lines, style),
  }))
  return [...(grouped ? [{ header: true, cells: upper }] : []), { header: true, cells: lower }]
}

function bodyRows(pen: Pen, firstRow: number, nextRow: number, topMm: number): TableRow[] {
  let y = topMm
  return pen.layout.rows.slice(firstRow, nextRow).map((row) => {
    const cells = row.lines.map((lines, index) => ({
      header: index === 0,
      columns: 1,
      labels: cellLabels(pen, index, lines, y - ROW_PADDING_MM, row.tag),
    }))
    y -= row.heightMm
    return { header: false, cells, ...(row.tag !== undefined && { tag: row.tag }) }
  })
}

function cellLabels(pen: Pen, index: number, lines: readonly string[], topMm: number, tag?: string): LabelShape[] {
  const { layout, edges } = pen
  const column = layout.columns[index]!
  const style = { font: column.font ?? 'sans', heightMm: layout.heightMm, ...(tag !== undefined && { tag }) } as const
  const filled = lines.some((text) => text !== '')
  if (!filled) return []
  const [left, right] = [edges[index]! + CELL_PADDING_MM, edges[index + 1]! - CELL_PADDING_MM]
  switch (column.align ?? 'start') {
    case 'start':
      return labelLines(left, topMm, lines, style)
    case 'end':
      return labelLines(right, topMm, lines, { ...style, align: 'end' })
    case 'middle':
      return labelLines((left + right) / 2, topMm, lines, { ...style, align: 'middle' })
    case 'decimal':
      return lines.map((text, row) =>
        label([decimalStart(layout, index, text, right), topMm - layout.heightMm - row * layout.heightMm * LINE_PITCH], text, style),
      )
  }
}

/** Where a figure starts so that decimal signs of its column meet, the longest fraction ending at the right edge. */
function decimalStart(layout: TableLayout, index: number, text: string, rightMm: number): number {
  const width = (part: string) => textWidthMm(part, layout.columns[index]!.font ?? 'sans', layout.heightMm)
  const fractions = layout.rows.flatMap((row) => row.lines[index]!.map((each) => width(fractionOf(each))))
  return rightMm - Math.max(...fractions) - width(text.slice(0, text.length - fractionOf(text).length))
}

function rules({ layout, edges, leftMm }: Pen, firstRow: number, nextRow: number, topMm: number): Shape[] {
  const right = edges.at(-1)!
  const rows = layout.rows.slice(firstRow, nextRow)
  const header = layout.headMm - CAPTION_MM
  const levels = [topMm - header]
  for (const row of rows) levels.push(levels.at(-1)! - row.heightMm)
  const bottom = levels.at(-1)!
  const groupMm = header > 0 && hasGroups(layout) ? rowHeightMm(1, layout.heightMm) : 0
  const level = (y: number, heavy: boolean) => line([leftMm, y], [right, y], heavy ? 'heavy-rule' : 'rule')
  return [
    level(topMm, true),
    ...levels.map((y, index) => level(y, y === bottom || (index === 0 && header > 0))),
    ...edges.map((x, index) => {
      const outer = index === 0 || index === edges.length - 1
      const inGroup = groupMm > 0 && !outer && sameGroup(layout, index)
      return line([x, inGroup ? topMm - groupMm : topMm], [x, bottom], outer ? 'heavy-rule' : 'rule')
    }),
    ...groupRules(layout, edges, topMm - groupMm, groupMm),
  ]
}

const sameGroup = ({ columns }: TableLayout, index: number) =>
  columns[index - 1]!.group !== undefined && columns[index - 1]!.group === columns[index]!.group

const groupRules = (layout: TableLayout, edges: readonly number[], y: number, groupMm: number): Shape[] =>
  groupMm === 0 ? [] : groups(layout).filter(({ text }) => text !== '').map(({ first, last }) => line([edges[first]!, y], [edges[last + 1]!, y], 'rule'))


import type { Block, LabelShape, Shape, Sheet } from '#shared/drawing/model'
import { box, label, labelLines, line, linesHeightMm } from '#shared/drawing/shapes'
import { drawTablePart, layoutTable, type TableContent } from '#shared/drawing/table'
import { wrapText } from '#shared/drawing/text-metrics'

/** What a letter-like document is made of, in reading order. */
export type Part =
  | { kind: 'heading'; text: string }
  | { kind: 'paragraph'; text: string }
  /** Labels with their values; those without a value are left out. */
  | { kind: 'fields'; title: string; fields: readonly (readonly [label: string, value: string])[] }
  | { kind: 'table'; content: TableContent }

export interface LetterDocument {
  title: string
  /** At the right of the title, e.g. number and revision. */
  reference: string
  /** Above the title. */
  sender: string
  /** At the foot of each page, before the page number. */
  footer: string
  parts: readonly Part[]
}

const A4 = { widthMm: 210, heightMm: 297 } as const
const LEFT_MM = 20
const WIDTH_MM = 170
const TOP_MM = 279
const BOTTOM_MM = 22
const TEXT_MM = 2.2
const SMALL_MM = 1.8
const GAP_MM = 4
const HEADING_MM = 6.5

interface Writer {
  letter: LetterDocument
  pages: Block[][]
  y: number
}

/** Lays a document out on A4 pages: paragraphs and tables break where the page ends, headers repeat. */
export function layOutDocument(letter: LetterDocument): Sheet[] {
  const writer: Writer = { letter, pages: [], y: 0 }
  newPage(writer)
  for (const part of letter.parts) write(writer, part)
  return writer.pages.map((blocks, index) => ({
    number: index + 1,
    count: writer.pages.length,
    title: letter.title,
    ...A4,
    blocks: [...blocks, footer(letter, index + 1, writer.pages.length)],
  }))
}

function newPage(writer: Writer): void {
  const { sender, title, reference } = writer.letter
  const first = writer.pages.length === 0
  const right = LEFT_MM + WIDTH_MM
  const shapes: Shape[] = [
    label([LEFT_MM, TOP_MM - 2.5], sender, { heightMm: 2.5, font: 'sans-bold' }),
    label([LEFT_MM, TOP_MM - 12], title, { heightMm: first ? 5 : 3.5, font: 'sans-bold' }),
    label([right, TOP_MM - 12], reference, { heightMm: first ? 3.5 : 2.5, font: 'mono', align: 'end' }),
  ]
  const rule = line([LEFT_MM, TOP_MM - 15], [right, TOP_MM - 15], 'outline')
  writer.pages.push([
    { kind: 'artifact', shapes: [rule] },
    { kind: 'heading', level: 1, text: title, box: box(LEFT_MM, TOP_MM - 15, WIDTH_MM, 15), shapes },
  ])
  writer.y = TOP_MM - 15 - GAP_MM
}

function footer({ footer: text }: LetterDocument, number: number, count: number): Block {
  const y = 12
  const labels: LabelShape[] = [
    ...labelLines(LEFT_MM, y + SMALL_MM, wrapText(text, 'sans', SMALL_MM, WIDTH_MM - 25), { heightMm: SMALL_MM }),
    label([LEFT_MM + WIDTH_MM, y], `Page ${number} of ${count}`, { heightMm: SMALL_MM, align: 'end' }),
  ]
  return { kind: 'text', box: box(LEFT_MM, y, WIDTH_MM, 6), shapes: labels }
}

const add = (writer: Writer, block: Block): void => void writer.pages.at(-1)!.push(block)

/** Takes a height, on the next page where this has no room; answers the upper edge. */
function take(writer: Writer, heightMm: number): number {
  if (writer.y - heightMm < BOTTOM_MM) newPage(writer)
  const top = writer.y
  writer.y = top - heightMm
  return top
}

function write(writer: Writer, part: Part): void {
  switch (part.kind) {
    case 'heading': {
      // A heading does not stay alone at the foot of a page.
      if (writer.y - HEADING_MM - 15 < BOTTOM_MM) newPage(writer)
      const top = take(writer, HEADING_MM)
      const shapes = [label([LEFT_MM, top - 4], part.text, { heightMm: 2.5, font: 'sans-bold' })]
      return add(writer, { kind: 'heading', level: 2, text: part.text, box: box(LEFT_MM, top - HEADING_MM, WIDTH_MM, HEADING_MM), shapes })
    }
    case 'paragraph':
      return writeParagraph(writer, part.text)
    case 'fields':
      return writeTable(writer, fieldsTable(part.title, part.fields))
    case 'table':
      return writeTable(writer, part.content)
  }
}

const LINES_AT_ONCE = 12

function writeParagraph(writer: Writer, text: string): void {
  const lines = wrapText(text, 'sans', TEXT_MM, WIDTH_MM)
  for (let from = 0; from < lines.length; from += LINES_AT_ONCE) {
    const some = lines.slice(from, from + LINES_AT_ONCE)
    const heightMm = linesHeightMm(some.length, TEXT_MM) + 1
    const top = take(writer, heightMm)
    add(writer, { kind: 'text', box: box(LEFT_MM, top - heightMm, WIDTH_MM, heightMm), shapes: labelLines(LEFT_MM, top, some, { heightMm: TEXT_MM }) })
  }
  writer.y -= GAP_MM - 1
}

function fieldsTable(title: string, fields: readonly (readonly [string, string])[]): TableContent {
  const rows = fields.filter(([, value]) => value !== '').map(([name, value]) => ({ cells: { name, value } }))
  return { title, headerless: true, heightMm: TEXT_MM, columns: [{ key: 'name', header: 'Field', always: true }, { key: 'value', header: 'Value', always: true }], rows }
}

function writeTable(writer: Writer, content: TableContent): void {
  if (content.rows.length === 0) return
  const layout = layoutTable({ heightMm: TEXT_MM, ...content }, WIDTH_MM)
  let row = 0
  while (row < layout.rows.length) {
    const part = drawTablePart(layout, row, LEFT_MM, writer.y, BOTTOM_MM)
    if (part) {
      add(writer, part.block)
      row = part.nextRow
      writer.y = part.bottomMm - GAP_MM
    }
    if (row < layout.rows.length) newPage(writer)
  }
}

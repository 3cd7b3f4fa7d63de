import type { OrderContent } from '#shared/contracts/orders'
import type { FontRole } from '#shared/drawing/model'
import { label } from '#shared/drawing/shapes'
import { textWidthMm, wrapText } from '#shared/drawing/text-metrics'
import { formatMoney, groupDigits } from '#shared/number-format'
import { documentBytes, openDocument } from './open-document'
import { POINTS_PER_MM, renderShapes } from './render-shapes'

/** ISO 216 A4, with the margins of a letter. */
const PAGE = { widthMm: 210, heightMm: 297, leftMm: 20, rightMm: 15, topMm: 18, bottomMm: 20 } as const
const LINE_MM = 5
const TEXT_MM = 2.2

type Element = PDFKit.PDFStructureElement

/** Writes from top to bottom and begins a new page where the old one is full. */
class Letter {
  readonly #doc: PDFKit.PDFDocument
  readonly #root: Element
  readonly #running: string
  #y: number = PAGE.heightMm - PAGE.topMm
  #page = 0

  constructor(doc: PDFKit.PDFDocument, root: Element, running: string) {
    this.#doc = doc
    this.#root = root
    this.#running = running
    this.#newPage()
  }

  #newPage(): void {
    this.#page += 1
    this.#doc.addPage({ size: [PAGE.widthMm * POINTS_PER_MM, PAGE.heightMm * POINTS_PER_MM], margin: 0 })
    this.#doc.scale(POINTS_PER_MM)
    this.#y = PAGE.heightMm - PAGE.topMm
    const foot = label([PAGE.leftMm, PAGE.bottomMm - 8], `${this.#running} · page ${this.#page}`, { align: 'start', heightMm: 1.8, font: 'sans' })
    this.#doc.markContent('Artifact', { type: 'Pagination' })
    renderShapes(this.#doc, [foot], PAGE.heightMm)
    this.#doc.endMarkedContent()
  }

  room(heightMm: number): void {
    if (this.#y - heightMm < PAGE.bottomMm) this.#newPage()
  }

  gap(heightMm: number): void {
    this.#y -= heightMm
  }

  /** One line of cells at their places, as one element of the structure. */
  line(parent: Element | null, type: string, cells: readonly Cell[], heightMm = LINE_MM): void {
    this.room(heightMm)
    this.#y -= heightMm
    const shapes = cells.map(({ x, text, align = 'start', bold = false, mono = false, sizeMm = TEXT_MM }) => label([x, this.#y], text, { align, heightMm: sizeMm, font: fontOf(bold, mono) }))
    const element = this.#doc.struct(type, {}, [() => renderShapes(this.#doc, shapes, PAGE.heightMm)])
    ;(parent ?? this.#root).add(element)
    element.end()
  }

  /** A table row whose cells are elements of their own. */
  row(table: Element, header: boolean, cells: readonly Cell[]): void {
    this.room(LINE_MM)
    this.#y -= LINE_MM
    const row = this.#doc.struct('TR')
    table.add(row)
    for (const { x, text, align = 'start', mono = false } of cells) {
      const shape = label([x, this.#y], text, { align, heightMm: TEXT_MM, font: fontOf(header, mono) })
      const cell = this.#doc.struct(header ? 'TH' : 'TD', {}, [() => renderShapes(this.#doc, [shape], PAGE.heightMm)])
      row.add(cell)
      cell.end()
    }
    row.end()
  }

  table(title: string, write: (table: Element) => void): void {
    const table = this.#doc.struct('Table', { title })
    this.#root.add(table)
    write(table)
    table.end()
  }
}

interface Cell {
  x: number
  text: string
  align?: 'start' | 'middle' | 'end'
  bold?: boolean
  mono?: boolean
  sizeMm?: number
}

const fontOf = (bold: boolean, mono: boolean): FontRole => (mono ? 'mono' : bold ? 'sans-bold' : 'sans')
const RIGHT = PAGE.widthMm - PAGE.rightMm
const WIDTH = RIGHT - PAGE.leftMm

/**
 * The purchase order as PDF/A-3b. Equal content gives equal bytes; every figure is the record's own text.
 *
 * @param sha256 of the canonical JSON of the content, printed so that the paper names its record
 */
export async function renderPurchaseOrderPdf(content: OrderContent, sha256: string): Promise<Buffer> {
  const doc = openDocument({
    title: `Purchase order ${content.number}`,
    subject: `Order of ${content.date}`,
    author: content.buyer.legalEntity,
    language: 'en',
    date: new Date(`${content.date}T00:00:00Z`),
  })
  const root = doc.struct('Document')
  doc.addStructure(root)
  const letter = new Letter(doc, root, `Purchase order ${content.number}, revision ${content.revision} · record ${sha256}`)
  writeHead(letter, content)
  writeLines(letter, content)
  writeTerms(letter, content)
  root.end()
  return documentBytes(doc)
}

function writeHead(letter: Letter, content: OrderContent): void {
  letter.line(null, 'H1', [{ x: PAGE.leftMm, text: `Purchase order ${content.number}`, bold: true, sizeMm: 4.5 }], 9)
  facts(letter, [
    ['Date', content.date],
    ['Revision', String(content.revision)],
    ['Request for quotation', content.rfqNumber],
    ['Your quotation', `${content.quotation.reference}, revision ${content.quotation.revision}, valid until ${content.quotation.validUntil}`],
  ])
  letter.gap(3)
  block(letter, 'Buyer', [content.buyer.legalEntity, ...(content.buyer.vatNumber ? [`VAT no. ${content.buyer.vatNumber}`] : []), `${content.buyer.contactName}, ${content.buyer.contactEmail}`])
  block(letter, 'Vendor', [content.vendor.name, ...(content.vendor.number ? [`Vendor no. ${content.vendor.number}`] : []), ...content.vendor.address.split('\n')])
  block(letter, 'Invoice to', content.buyer.billTo.split('\n'))
  block(letter, 'Deliver to', content.buyer.shipTo.split('\n'))
}

function facts(letter: Letter, pairs: readonly (readonly [string, string])[]): void {
  for (const [name, value] of pairs) {
    if (value === '') continue
    const lines = wrapped(value, WIDTH - 45)
    lines.forEach((text, index) => letter.line(null, 'P', [...(index === 0 ? [{ x: PAGE.leftMm, text: name, bold: true }] : []), { x: PAGE.leftMm + 45, text }]))
  }
}

function block(letter: Letter, name: string, lines: readonly string[]): void {
  facts(letter, [[name, lines.filter((line) => line.trim() !== '').join('\n')]])
}

const wrapped = (text: string, widthMm: number): string[] => text.split('\n').flatMap((line) => wrapText(line, 'sans', TEXT_MM, widthMm))

/** Right edges of the numbers, left edges of the words. */
const COLUMNS = { position: PAGE.leftMm, part: PAGE.leftMm + 10, quantity: 118, price: 152, total: RIGHT } as const

function writeLines(letter: Letter, content: OrderContent): void {
  const money = (amount: string) => formatMoney(amount, content.currency)
  letter.gap(4)
  letter.room(4 * LINE_MM)
  letter.line(null, 'H2', [{ x: PAGE.leftMm, text: 'Parts', bold: true, sizeMm: 3 }], 7)
  letter.table('Parts', (table) => {
    letter.row(table, true, [
      { x: COLUMNS.position, text: 'Pos.' },
      { x: COLUMNS.part, text: 'Part, drawing revision' },
      { x: COLUMNS.quantity, text: 'Quantity', align: 'end' },
      { x: COLUMNS.price, text: 'Price', align: 'end' },
      { x: COLUMNS.total, text: 'Amount', align: 'end' },
    ])
    for (const line of content.lines) {
      letter.row(table, false, [
        { x: COLUMNS.position, text: String(line.position) },
        { x: COLUMNS.part, text: `${line.partNumber}, revision ${line.drawingRevision}` },
        { x: COLUMNS.quantity, text: `${groupDigits(String(line.quantity))} ${line.unit}`, align: 'end', mono: true },
        { x: COLUMNS.price, text: `${money(line.price)}${line.priceUnit === 1 ? '' : ` / ${line.priceUnit}`}`, align: 'end', mono: true },
        { x: COLUMNS.total, text: money(line.lineTotal), align: 'end', mono: true },
      ])
    }
    for (const cost of content.oneTimeCosts) {
      letter.row(table, false, [
        { x: COLUMNS.position, text: String(cost.position) },
        { x: COLUMNS.part, text: shortened(`One-time: ${cost.text}`, COLUMNS.total - COLUMNS.part - 45) },
        { x: COLUMNS.total, text: money(cost.amount), align: 'end', mono: true },
      ])
    }
    letter.row(table, true, [
      { x: COLUMNS.part, text: 'Total' },
      { x: COLUMNS.total, text: money(content.total), align: 'end', mono: true },
    ])
  })
  for (const line of content.lines) {
    facts(letter, [
      [`Position ${line.position}`, `${line.description}\nSpecification SHA-256 ${line.specificationSha256}${line.countryOfOrigin ? `\nOrigin ${line.countryOfOrigin}` : ''}`],
    ])
  }
}

function shortened(text: string, widthMm: number): string {
  let kept = text
  while (kept.length > 1 && textWidthMm(`${kept}…`, 'sans', TEXT_MM) > widthMm) kept = kept.slice(0, -1)
  return kept === text ? text : `${kept}…`
}

function writeTerms(letter: Letter, content: OrderContent): void {
  letter.gap(3)
  letter.room(3 * LINE_MM)
  letter.line(null, 'H2', [{ x: PAGE.leftMm, text: 'Terms', bold: true, sizeMm: 3 }], 7)
  facts(letter, [
    ['Delivery', `${content.deliveryRule} ${content.deliveryPlace} (Incoterms® 2020)`],
    ['Delivery date', content.deliveryOn],
    ['Carrier', content.carrier],
    ['Over/under delivery', content.overUnderPercent === 0 ? 'none' : `±${content.overUnderPercent} %`],
    ['Payment', content.paymentTerms],
    ['Packing and labels', content.packing],
    ['Documents', content.documents],
    ['Quality', content.quality],
    ['Tooling', content.tooling],
    ['Terms', content.termsVersion],
    ['Remarks', content.remarks],
    ['Acknowledge by', `${content.acknowledgeBy}: accept, accept with changes, or refuse`],
  ])
}

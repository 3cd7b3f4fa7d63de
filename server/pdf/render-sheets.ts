import { blockShapes, type Block, type LabelShape, type Shape, type Sheet, type TableBlock } from '#shared/drawing/model'
import { label } from '#shared/drawing/shapes'
import { documentBytes, openDocument, type DocumentInfo } from './open-document'
import { POINTS_PER_MM, renderShapes } from './render-shapes'

export interface Attachment {
  /** File name in the PDF. */
  name: string
  bytes: Uint8Array
  description: string
}

export interface Watermark {
  /** Whose copy it is: vendor number and name. */
  recipient: string
}

export interface SpecificationPdf {
  sheets: readonly Sheet[]
  info: DocumentInfo
  /** The very bytes whose SHA-256 stands in the title block. */
  attachment: Attachment
  watermark?: Watermark
}

/**
 * The sheets of one revision as PDF/A-3b, one page each, tagged, with bookmarks and the specification attached.
 * Equal input gives equal bytes. A copy with a watermark is another file that carries the same specification.
 */
export async function renderSpecificationPdf({ sheets, info, attachment, watermark }: SpecificationPdf): Promise<Buffer> {
  return renderPages({ pages: sheets, info, attachment, ...(watermark && { watermark }) })
}

export interface Pages {
  pages: readonly Sheet[]
  info: DocumentInfo
  attachment?: Attachment
  watermark?: Watermark
}

/** Any sheets as PDF/A-3b, one page each in its own size, tagged and with bookmarks. */
export async function renderPages({ pages, info, attachment, watermark }: Pages): Promise<Buffer> {
  const doc = openDocument(info)
  if (attachment) attach(doc, attachment, info.date)
  const root = doc.struct('Document')
  doc.addStructure(root)
  for (const page of pages) renderSheet(doc, root, page, watermark)
  root.end()
  return documentBytes(doc)
}

function attach(doc: PDFKit.PDFDocument, { name, bytes, description }: Attachment, date: Date): void {
  const options = { name, description, type: 'application/json', relationship: 'Source', creationDate: date, modifiedDate: date }
  doc.file(Buffer.from(bytes), options as PDFKit.Mixins.PDFAttachmentOptions)
}

type Element = PDFKit.PDFStructureElement

function renderSheet(doc: PDFKit.PDFDocument, root: Element, sheet: Sheet, watermark?: Watermark): void {
  doc.addPage({ size: [sheet.widthMm * POINTS_PER_MM, sheet.heightMm * POINTS_PER_MM], margin: 0 })
  doc.outline.addItem(`${sheet.number}  ${sheet.title}`)
  doc.scale(POINTS_PER_MM)
  const section = doc.struct('Sect', { title: `Sheet ${sheet.number} of ${sheet.count}: ${sheet.title}` })
  root.add(section)
  const pen: Pen = { doc, heightMm: sheet.heightMm }
  if (watermark) renderArtifact(pen, watermarkShapes(sheet, watermark))
  for (const block of sheet.blocks) renderBlock(pen, section, block)
  section.end()
}

interface Pen {
  doc: PDFKit.PDFDocument
  heightMm: number
}

function renderArtifact({ doc, heightMm }: Pen, shapes: readonly Shape[]): void {
  if (shapes.length === 0) return
  doc.markContent('Artifact', { type: 'Layout' })
  renderShapes(doc, shapes, heightMm)
  doc.endMarkedContent()
}

/** Adds an element around what is drawn now. */
function renderElement({ doc, heightMm }: Pen, parent: Element, type: string, shapes: readonly Shape[], options: PDFKit.Mixins.StructureElementOptions = {}): void {
  if (shapes.length === 0) return
  const element = doc.struct(type, options, [() => renderShapes(doc, shapes, heightMm)])
  parent.add(element)
  element.end()
}

function renderBlock(pen: Pen, parent: Element, block: Block): void {
  switch (block.kind) {
    case 'artifact':
      return renderArtifact(pen, block.shapes)
    case 'heading':
      return renderElement(pen, parent, block.level === 1 ? 'H1' : 'H2', block.shapes)
    case 'figure':
      return renderElement(pen, parent, 'Figure', blockShapes(block), { title: block.title, alt: `${block.title}: ${block.alternative}` })
    case 'text': {
      // Lines under text are marks; one paragraph holds the text.
      renderArtifact(pen, block.shapes.filter(({ kind }) => kind !== 'label'))
      return renderElement(pen, parent, 'P', block.shapes.filter(({ kind }) => kind === 'label'))
    }
    case 'table':
      return renderTable(pen, parent, block)
  }
}

function renderTable(pen: Pen, parent: Element, table: TableBlock): void {
  renderArtifact(pen, table.rules)
  const element = pen.doc.struct('Table', { title: table.title })
  parent.add(element)
  renderElement(pen, element, 'Caption', table.caption)
  for (const row of table.rows) {
    const line = pen.doc.struct('TR')
    element.add(line)
    for (const cell of row.cells) renderCell(pen, line, cell.header ? 'TH' : 'TD', cell.labels)
    line.end()
  }
  element.end()
}

function renderCell({ doc, heightMm }: Pen, row: Element, type: 'TH' | 'TD', labels: readonly LabelShape[]): void {
  const cell = labels.length === 0 ? doc.struct(type) : doc.struct(type, {}, [() => renderShapes(doc, labels, heightMm)])
  row.add(cell)
  cell.end()
}

/** Below the drawing, in solid grey: transparency would not keep. */
function watermarkShapes(sheet: Sheet, { recipient }: Watermark): Shape[] {
  const text = `Copy for ${recipient}`
  const style = { align: 'middle', heightMm: 7, ink: 'faint', rotationDeg: 30, font: 'sans-bold' } as const
  const rows = [0.2, 0.5, 0.8]
  return rows.flatMap((y) => [0.25, 0.7].map((x) => label([sheet.widthMm * x, sheet.heightMm * y], text, style)))
}

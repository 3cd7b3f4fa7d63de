import { fontSizeMm, alignmentShiftMm, textRuns } from '#shared/drawing/text-metrics'
import { FILL_COLOURS, INK_COLOURS, LINES, type CircleShape, type LabelShape, type PathShape, type Shape } from '#shared/drawing/model'
import { modulesPathData, pathData } from '#shared/drawing/path-data'

export const POINTS_PER_MM = 72 / 25.4

/** Draws shapes into a document that is scaled to millimetres; `heightMm` turns their y upwards. */
export function renderShapes(doc: PDFKit.PDFDocument, shapes: readonly Shape[], heightMm: number): void {
  doc.lineJoin('round').lineCap('butt')
  for (const shape of shapes) renderShape(doc, shape, heightMm)
}

function renderShape(doc: PDFKit.PDFDocument, shape: Shape, heightMm: number): void {
  switch (shape.kind) {
    case 'path':
      doc.path(pathData(shape, heightMm))
      return paint(doc, shape, shape.stroked)
    case 'circle':
      doc.circle(shape.center[0], heightMm - shape.center[1], shape.radiusMm)
      return paint(doc, shape, true)
    case 'label':
      return renderLabel(doc, shape, heightMm)
    case 'modules':
      doc.path(modulesPathData(shape, heightMm)).fill(INK_COLOURS.ink)
      return
  }
}

function paint(doc: PDFKit.PDFDocument, shape: PathShape | CircleShape, stroked: boolean): void {
  const { widthMm, dashMm } = LINES[shape.layer]
  doc.lineWidth(widthMm)
  // pdfkit's dash() knows one dash and one gap only.
  doc.addContent(`[${dashMm.join(' ')}] 0 d`)
  if (shape.fill === 'none') doc.stroke('#000000')
  else if (stroked) doc.fillAndStroke(FILL_COLOURS[shape.fill], '#000000')
  else doc.fill(FILL_COLOURS[shape.fill])
}

function renderLabel(doc: PDFKit.PDFDocument, shape: LabelShape, heightMm: number): void {
  const [x, y] = [shape.anchor[0], heightMm - shape.anchor[1]]
  const rotated = shape.rotationDeg !== 0
  if (rotated) doc.save().rotate(-shape.rotationDeg, { origin: [x, y] })
  doc.fillColor(INK_COLOURS[shape.ink]).fontSize(fontSizeMm(shape.heightMm))
  let start = x + alignmentShiftMm(shape)
  for (const run of textRuns(shape.text, shape.font, shape.heightMm)) {
    doc.font(run.font).text(run.text, start, y, { lineBreak: false, baseline: 'alphabetic' })
    start += run.widthMm
  }
  if (rotated) doc.restore()
}

import type { MeasurementReading, Note } from './model'

export interface ReportIdentity {
  drawingNumber: string
  revision: string
}

const DRAWING = /^(drawing|drg|dwg|part|item|article|zeichnung|teil)\b(?!.*\brev)/i
const REVISION = /\b(rev|revision|issue|index|änderungsstand)\b/i

const plain = (text: string) => text.normalize('NFKC').toUpperCase().replace(/[\s._-]/g, '')
const bareRevision = (text: string) => plain(text.replace(/^\s*(rev(ision)?|issue|index)\.?\s*/i, ''))

/**
 * Compares what stands above a table with the drawing revision that the report was asked for. A difference is a
 * note, not a refusal: the limits of the revision asked for count either way.
 */
export function compareTitleBlock(titleBlock: MeasurementReading['titleBlock'], { drawingNumber, revision }: ReportIdentity): Note[] {
  return titleBlock.flatMap(({ address, label, value }): Note[] => {
    if (value.trim() === '') return []
    if (REVISION.test(label)) return bareRevision(value) === plain(revision) ? [] : [{ code: 'other-revision', address, values: { file: value, asked: revision } }]
    if (!DRAWING.test(label)) return []
    return plain(value).includes(plain(drawingNumber)) ? [] : [{ code: 'other-drawing', address, values: { file: value, asked: drawingNumber } }]
  })
}

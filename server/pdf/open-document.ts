import PDFDocument from 'pdfkit'
import type { FontRole } from '#shared/drawing/model'
import { fontBytes } from './fonts'
import { setPlainLetters } from './plain-letters'

const ROLES: readonly FontRole[] = ['sans-bold', 'mono', 'sans']

export interface DocumentInfo {
  title: string
  subject: string
  /** Company that the document comes from. */
  author: string
  /** BCP 47, e.g. `en`. */
  language: string
  /** Stands in the file instead of the time of making, so that equal input gives equal bytes. */
  date: Date
}

/** An empty PDF/A-3b with the shipped fonts under their roles and no trace of machine or time. */
export function openDocument(info: DocumentInfo): PDFKit.PDFDocument {
  const doc = new PDFDocument({
    subset: 'PDF/A-3b',
    pdfVersion: '1.7',
    tagged: true,
    lang: info.language,
    displayTitle: true,
    autoFirstPage: false,
    margin: 0,
    // No font by default: pdfkit would open the same font again, under its role, at each change of font.
    font: null as unknown as string,
    info: { Title: info.title, Subject: info.subject, Author: info.author, Creator: 'Dotside', Producer: 'Dotside', CreationDate: info.date },
  } as PDFKit.PDFDocumentOptions)
  for (const role of ROLES) setPlainLetters(doc.registerFont(role, fontBytes(role)).font(role))
  return doc
}

/** Ends the document and answers its bytes. */
export function documentBytes(doc: PDFKit.PDFDocument): Promise<Buffer> {
  return new Promise((resolve, reject) => {
    const chunks: Buffer[] = []
    doc.on('data', (chunk: Buffer) => chunks.push(chunk))
    doc.on('end', () => resolve(Buffer.concat(chunks)))
    doc.on('error', reject)
    doc.end()
  })
}

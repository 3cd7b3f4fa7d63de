import type { DocumentInfo } from '#server/pdf/open-document'
import type { Attachment } from '#server/pdf/render-sheets'

interface Named {
  partNumber: string
  revision: string
  title: string
  company: string
  issuedOn: string
}

/** What the PDF says of itself. The date is the revision's, so that equal input gives equal bytes. */
export const pdfInfo = ({ partNumber, revision, title, company, issuedOn }: Named): DocumentInfo => ({
  title: `${partNumber} ${revision}`,
  subject: title,
  author: company,
  language: 'en',
  date: new Date(`${issuedOn}T00:00:00Z`),
})

/** The structured specification inside the PDF, for a system that reads what a person sees. */
export const pdfAttachment = (bytes: Uint8Array): Attachment => ({
  name: 'winding-specification.json',
  bytes,
  description: 'The winding specification as canonical JSON (RFC 8785)',
})

export const sheetsFileName = (partNumber: string, revision: string, extension = 'pdf'): string =>
  `${partNumber.replace(/[^\p{L}\p{N}._-]+/gu, '-') || 'part'}-${revision}.${extension}`

import type { Context } from '#server/context'
import type { files } from '#server/db/schema/index'
import type { FileKind } from '#shared/contracts/endpoint'
import type { Readable } from 'node:stream'

export const MEDIA_TYPES: Record<FileKind, string> = {
  pdf: 'application/pdf',
  docx: 'application/vnd.openxmlformats-officedocument.wordprocessingml.document',
  xlsx: 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet',
  pptx: 'application/vnd.openxmlformats-officedocument.presentationml.presentation',
  odt: 'application/vnd.oasis.opendocument.text',
  ods: 'application/vnd.oasis.opendocument.spreadsheet',
  'doc-xls-ppt': 'application/octet-stream',
  csv: 'text/csv; charset=utf-8',
  txt: 'text/plain; charset=utf-8',
  png: 'image/png',
  jpeg: 'image/jpeg',
  step: 'model/step',
  zip: 'application/zip',
}

/** What an endpoint with `download` answers. The bytes are opened after the transaction has ended. */
export interface FileDownload {
  name: string
  mediaType: string
  sizeBytes: number
  open: () => Promise<Readable>
}

/** A stored file on its way out. Only hand it a row that the actor was just allowed to read. */
export function downloadOf(ctx: Context, file: Pick<typeof files.$inferSelect, 'name' | 'kind' | 'sizeBytes' | 'sha256'>): FileDownload {
  return { name: file.name, mediaType: MEDIA_TYPES[file.kind], sizeBytes: file.sizeBytes, open: () => ctx.files.open(file.sha256) }
}

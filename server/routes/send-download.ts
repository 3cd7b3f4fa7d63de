import type { FileDownload } from '#server/services/files/download'
import type { Response } from 'express'
import { pipeline } from 'node:stream/promises'

/** Always an attachment: a file that somebody uploaded is never shown as a page of ours. */
export async function sendDownload(res: Response, file: FileDownload): Promise<void> {
  const content = await file.open()
  res.set({
    'content-type': file.mediaType,
    'content-length': String(file.sizeBytes),
    'content-disposition': attachment(file.name),
    'cache-control': 'private, no-store',
  })
  await pipeline(content, res).catch((error: unknown) => {
    // A reader who leaves early is no failure.
    if (!res.destroyed && !res.headersSent) throw error
    res.destroy()
  })
}

/** File name for old and for new readers (RFC 6266, RFC 8187). */
function attachment(name: string): string {
  const plain = name.normalize('NFKD').replace(/[^\x20-\x7e]/g, '').replace(/["\\%]/g, '_') || 'file'
  const encoded = encodeURIComponent(name).replace(/['()*]/g, (c) => `%${c.charCodeAt(0).toString(16).toUpperCase()}`)
  return `attachment; filename="${plain}"; filename*=UTF-8''${encoded}`
}

import type { Context } from '#server/context'
import { asActor, type Actor } from '#server/db/as-actor'
import { files } from '#server/db/schema/index'
import { notFound } from '#server/errors'
import { downloadOf, type FileDownload } from '#server/services/files/download'
import { reportTemplate } from '#shared/measurement/report-template'
import { eq } from 'drizzle-orm'
import { Readable } from 'node:stream'
import { expectedRows } from './expected-rows'
import { findRequest, releaseBytes } from './find-samples'
import { loadSet } from './view-set'

/** A file of a report; the right is asked for again at each download. */
export async function downloadSampleFile(ctx: Context, actor: Actor, setId: string, fileId: string): Promise<FileDownload> {
  const file = await asActor(ctx, actor, async (tx) => {
    const { file, evidence } = await loadSet(tx, actor, setId)
    if (![file, ...evidence].some(({ id }) => id === fileId)) throw notFound('file')
    const [row] = await tx.select().from(files).where(eq(files.id, fileId))
    if (!row) throw notFound('file')
    return row
  })
  return downloadOf(ctx, file)
}

/** An empty report for exactly the release that was asked for, with a line for each part. */
export async function downloadTemplate(ctx: Context, actor: Actor, requestId: string): Promise<FileDownload> {
  const { found, specification } = await asActor(ctx, actor, async (tx) => {
    const found = await findRequest(tx, actor, requestId)
    return { found, specification: await releaseBytes(tx, found.request.releaseId) }
  })
  const serials = Array.from({ length: found.request.quantity }, (_, index) => String(index + 1))
  const bytes = Buffer.from(`\ufeff${reportTemplate(expectedRows(specification), serials)}`, 'utf8')
  const name = `${found.request.number}-${found.partNumber.replace(/[^\p{L}\p{N}._-]+/gu, '-')}-${found.revision}.csv`
  return { name, mediaType: 'text/csv; charset=utf-8', sizeBytes: bytes.length, open: async () => Readable.from([bytes]) }
}

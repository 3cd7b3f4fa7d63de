import type { Context } from '#server/context'
import type { Actor, Transaction } from '#server/db/as-actor'
import { files } from '#server/db/schema/index'
import type { FileKind } from '#shared/contracts/endpoint'
import { createHash, randomUUID } from 'node:crypto'
import type { StagedFile } from './staged-file'

export interface StoredFile {
  id: string
  name: string
  kind: FileKind
  sizeBytes: number
  sha256: string
}

/**
 * Keeps the bytes under their hash. Call it before the transaction that refers to them: bytes that nothing
 * refers to are harmless, a row without its bytes is not.
 */
export async function keepFile(ctx: Context, staged: StagedFile): Promise<void> {
  await ctx.files.keep(staged.path, staged.sha256)
}

/** Keeps bytes that were made here (a drawing, an order) and describes them like an upload. */
export async function keepMadeFile(ctx: Context, bytes: Uint8Array, name: string, kind: FileKind): Promise<Omit<StoredFile, 'id'>> {
  const sha256 = createHash('sha256').update(bytes).digest('hex')
  await ctx.files.keepBytes(bytes, sha256)
  return { name, kind, sizeBytes: bytes.length, sha256 }
}

/** Refers to kept bytes, as a file of the actor's company. */
export async function referToFile(tx: Transaction, actor: Actor, file: Omit<StoredFile, 'id'>): Promise<StoredFile> {
  const { name, kind, sizeBytes, sha256 } = file
  const row = { id: randomUUID(), name, kind, sizeBytes, sha256 }
  await tx.insert(files).values({ ...row, companyId: actor.companyId, uploadedBy: actor.personId })
  return row
}

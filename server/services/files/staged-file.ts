import type { FileKind } from '#shared/contracts/endpoint'
import { rm } from 'node:fs/promises'

/** A file that has come in whole, was recognised by its content, and is not referenced by anything yet. */
export interface StagedFile {
  path: string
  name: string
  kind: FileKind
  sizeBytes: number
  /** SHA-256 over the bytes, lower-case hex. */
  sha256: string
}

/** Removes what was not kept; a kept file no longer lies there. */
export async function discardStaged(file: StagedFile | null): Promise<void> {
  if (file) await rm(file.path, { force: true })
}

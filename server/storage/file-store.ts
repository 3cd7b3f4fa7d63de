import type { Readable } from 'node:stream'

/** Keeps files under the SHA-256 of their bytes (lower-case hex). Equal bytes are kept once; nothing is overwritten. */
export interface FileStore {
  /** Folder for files on their way in. */
  readonly stagingFolder: string
  /** Takes a staged file over; afterwards it no longer lies in the staging folder. */
  keep(stagedPath: string, sha256: string): Promise<void>
  /** Keeps bytes that were made here, such as a rendered document. */
  keepBytes(bytes: Uint8Array, sha256: string): Promise<void>
  has(sha256: string): Promise<boolean>
  open(sha256: string): Promise<Readable>
  /** Throws when nothing can be written. */
  check(): Promise<void>
}

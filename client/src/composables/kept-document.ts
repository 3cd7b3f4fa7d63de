import type { SpecificationDocument } from '#shared/engine/specification'
import { specificationDocumentSchema } from '#shared/contracts/specification-document'

/** What is typed and not stored yet, so that it survives a reload and an ended session. */
export interface KeptDocument {
  /** The stored version that it was made from. */
  version: number
  /** What was stored in that version: with it, what others store meanwhile can be brought together with this. */
  base: SpecificationDocument
  document: SpecificationDocument
}

const keyOf = (personId: string, revisionId: string) => `draft:${personId}:specification:${revisionId}`

export function readKept(personId: string, revisionId: string): KeptDocument | null {
  try {
    const kept = JSON.parse(sessionStorage.getItem(keyOf(personId, revisionId)) ?? 'null') as KeptDocument | null
    if (kept === null || typeof kept.version !== 'number' || !kept.base) return null
    // A shape of an earlier program cannot be worked on; one that merely does not fit the limits can.
    const parsed = specificationDocumentSchema.safeParse(kept.document)
    const foreign = !parsed.success && parsed.error.issues.some(({ code }) => code === 'unrecognized_keys' || code === 'invalid_type')
    return foreign ? null : kept
  } catch {
    return null
  }
}

export function keepLocally(personId: string, revisionId: string, kept: KeptDocument): void {
  try {
    sessionStorage.setItem(keyOf(personId, revisionId), JSON.stringify(kept))
  } catch {
    // Storage is full or switched off: the page itself still holds everything.
  }
}

export function forgetKept(personId: string, revisionId: string): void {
  sessionStorage.removeItem(keyOf(personId, revisionId))
}

import { inject, provide, type InjectionKey, type Ref } from 'vue'
import type { Library } from '#shared/engine/library'
import type { SpecificationDocument } from '#shared/engine/specification'

/** What the entries of a form know about the document that they are a part of. */
export interface DocumentEntry {
  read: (path: string) => unknown
  /** Several places at once, so that they are one step for undo. */
  write: (changes: Readonly<Record<string, unknown>>) => void
  document: Readonly<Ref<Pick<SpecificationDocument, 'requirement'> & Partial<SpecificationDocument>>>
  library: Readonly<Ref<Library>>
  readonly: Readonly<Ref<boolean>>
  /** Place → sentences of what does not fit the schema or stops release, to stand at the entry. */
  problems: Readonly<Ref<ReadonlyMap<string, string>>>
  /** Place → codes of checks that are not met there. */
  flags: Readonly<Ref<ReadonlyMap<string, readonly string[]>>>
  /** The place that a check or finding leads to, with a count that rises each time. */
  target: Readonly<Ref<{ path: string; turn: number } | null>>
  /** The row under the pointer or the focus, such as `step:s3`, to be marked in the coil. */
  marked: Ref<string | null>
  /** Writes the revision block from a comparison with the release in force. */
  writeBlock?: () => Promise<void>
  /** Place → number of open comments there. */
  comments?: Readonly<Ref<ReadonlyMap<string, number>>>
}

const DOCUMENT_ENTRY: InjectionKey<DocumentEntry> = Symbol('document entry')

export const provideDocumentEntry = (entry: DocumentEntry) => provide(DOCUMENT_ENTRY, entry)

export function useDocumentEntry(): DocumentEntry {
  const entry = inject(DOCUMENT_ENTRY)
  if (!entry) throw new Error('An entry stands outside of any document.')
  return entry
}

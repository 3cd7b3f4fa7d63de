import { ref, type Ref } from 'vue'
import type { Library } from '#shared/engine/library'
import type { SpecificationDocument } from '#shared/engine/specification'
import { nextReleaseLetter } from '#shared/workflow/revision-letters'
import { withEntry } from '@/components/specifications/compare/revision-entry'
import { loadRevision, loadSpecification, type RevisionKey } from '@/queries/specifications'

interface Sources {
  key: RevisionKey
  document: Readonly<Ref<SpecificationDocument>>
  library: Library
  /** Who writes it, by name. */
  by: string
  write: (changes: Readonly<Record<string, unknown>>) => void
}

/** Writes the revision block of a draft from its comparison with the release in force; does nothing before the first release. */
export function useRevisionBlock({ key, document, library, by, write }: Sources) {
  const failure = ref<string | null>(null)

  async function writeBlock(): Promise<void> {
    failure.value = null
    const part = await loadSpecification(key.specificationId)
    const last = part.revisions.find(({ id, release }) => release !== null && id !== key.revisionId)
    if (!last?.release) return void (failure.value = 'Nothing of this part has been released yet: its first release has no predecessor.')
    const { document: before } = await loadRevision({ ...key, revisionId: last.id })
    const { revisions } = document.value.specification
    const entries = withEntry(revisions, nextReleaseLetter(last.release.revision), before, document.value, library).map((entry, index, all) => (index === all.length - 1 && entry.by === '' ? { ...entry, by } : entry))
    if (JSON.stringify(entries) !== JSON.stringify(revisions)) write({ revisions: entries })
  }

  return { writeBlock, failure }
}

import { computed, ref, type Ref } from 'vue'
import { useRouter } from 'vue-router'
import type { SpecificationDocument } from '#shared/engine/specification'
import { named } from '@/components/specifications/duty/new-document'
import { useCreateSpecification } from '@/queries/specifications'
import { useSessionStore } from '@/stores/session'
import { useFieldErrors } from './useFieldErrors'

interface PartName {
  partNumber: string
  title: string
}

/** Starts a part with a document that is there already: a copy, or one from a file. */
export function useStartPart(name: Readonly<Ref<PartName>>) {
  const router = useRouter()
  const session = useSessionStore()
  const { mutateAsync, error, isLoading } = useCreateSpecification()
  const { fieldErrors } = useFieldErrors(error)
  const missing = ref<Record<string, string>>({})
  const errors = computed(() => ({ ...fieldErrors.value, ...missing.value }))

  async function start(document: SpecificationDocument) {
    const [partNumber, title] = [name.value.partNumber.trim(), name.value.title.trim()]
    missing.value = { ...(partNumber === '' && { partNumber: 'Give the part number.' }), ...(title === '' && { title: 'Give the title.' }) }
    if (Object.keys(missing.value).length > 0) return
    const created = await mutateAsync({ partNumber, title, document: named(document, { partNumber, title }, session.person?.company.name ?? '') })
    await router.push({ name: 'workbench', params: { specificationId: created.specificationId, revisionId: created.id } })
  }

  return { start, errors, error, isLoading }
}

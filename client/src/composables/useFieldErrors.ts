import { computed, toValue, type MaybeRefOrGetter } from 'vue'
import { ApiError } from '@/api/api-error'

/** The sentences of a refused call by input path, to stand at their entries: `fieldErrors.email`. */
export function useFieldErrors(error: MaybeRefOrGetter<Error | null>) {
  const fieldErrors = computed<Readonly<Record<string, string>>>(() => {
    const failure = toValue(error)
    return failure instanceof ApiError ? failure.fields : {}
  })
  return { fieldErrors }
}

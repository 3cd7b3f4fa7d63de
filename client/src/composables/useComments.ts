import { useQuery } from '@pinia/colada'
import { computed } from 'vue'
import { commentsQuery, useCommentActions, type RevisionKey } from '@/queries/specifications'
import { useSessionStore } from '@/stores/session'

/** The comments on one revision, and what the person may do with them. */
export function useComments(key: RevisionKey) {
  const session = useSessionStore()
  const { state } = useQuery(() => commentsQuery(key))
  const actions = useCommentActions(key)
  const rows = computed(() => state.value.data ?? [])

  return {
    rows,
    open: computed(() => rows.value.filter(({ settled }) => settled === null).length),
    mayWrite: computed(() => session.hasRole('engineer', 'checker', 'quality')),
    busy: computed(() => actions.write.isLoading.value || actions.settle.isLoading.value),
    error: computed(() => actions.write.error.value ?? actions.settle.error.value ?? state.value.error),
    write: (comment: { place: string; text: string }, done: () => void) => actions.write.mutateAsync(comment).then(done, () => undefined),
    settle: (commentId: string, settled: boolean) => void actions.settle.mutateAsync({ commentId, settled }).catch(() => undefined),
  }
}

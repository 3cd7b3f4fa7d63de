import { useRouter } from 'vue-router'
import { useSessionStore } from '@/stores/session'

/**
 * Leads on after signing in. When somebody else was signed in before, by a fresh page: nothing of that person stays
 * in memory.
 */
export function useEnter() {
  const router = useRouter()
  const before = useSessionStore().person
  return async (path: string) => {
    if (before) location.assign(path)
    else await router.replace(path)
  }
}

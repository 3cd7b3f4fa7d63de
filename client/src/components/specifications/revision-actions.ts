import type { Role } from '#shared/contracts/endpoint'
import type { RevisionSummary } from '#shared/contracts/specifications'

export type RevisionAction = 'work' | 'submit' | 'send-back' | 'let-pass' | 'release' | 'next-draft' | 'withdraw'

interface Person {
  id: string
  roles: readonly Role[]
}

interface About {
  state: RevisionSummary['state']
  editors: readonly { id: string }[]
  /** Whether another revision of the part is a draft or in check. */
  openElsewhere: boolean
}

export interface OfferedActions {
  actions: readonly RevisionAction[]
  /** Why something that is due is not offered to this person; null when nothing is missing. */
  explanation: string | null
}

const engineers: Partial<Record<RevisionSummary['state'], readonly RevisionAction[]>> = { draft: ['work', 'submit', 'withdraw'], released: ['next-draft'] }
const checkers: Partial<Record<RevisionSummary['state'], readonly RevisionAction[]>> = { 'in-check': ['release', 'send-back', 'let-pass'], released: ['withdraw'] }

/** What a person may do with a revision. The server decides again. */
export function offeredActions({ id, roles }: Person, { state, editors, openElsewhere }: About): OfferedActions {
  const worked = editors.some((editor) => editor.id === id)
  const mayCheck = roles.includes('checker')
  const asEngineer = roles.includes('engineer') ? (engineers[state] ?? []).filter((action) => action !== 'next-draft' || !openElsewhere) : []
  const asChecker = mayCheck && !(state === 'in-check' && worked) ? (checkers[state] ?? []) : []
  const asQuality = roles.includes('quality') && !worked && state === 'in-check' ? (['let-pass'] as const) : []
  return { actions: [...new Set([...asEngineer, ...asChecker, ...asQuality])], explanation: explain({ state, worked, mayCheck, isEngineer: roles.includes('engineer'), openElsewhere }) }
}

function explain({ state, worked, mayCheck, isEngineer, openElsewhere }: { state: RevisionSummary['state']; worked: boolean; mayCheck: boolean; isEngineer: boolean; openElsewhere: boolean }): string | null {
  if (state === 'in-check' && mayCheck && worked) return 'You worked on this draft, so somebody else has to check and release it.'
  if (state === 'in-check' && isEngineer && !mayCheck) return 'This revision is in check; a checker who did not work on it releases it or sends it back.'
  if (state === 'released' && isEngineer && openElsewhere) return 'A draft of this part is open already; go on with that one.'
  return null
}

import type { Role } from '#shared/contracts/endpoint'
import type { Rfq } from '#shared/contracts/rfqs'

export const SECOND_OPENERS: readonly Role[] = ['approver', 'quality', 'engineer']

interface Looker {
  id: string
  roles: readonly Role[]
}

type Sealed = Pick<Rfq, 'state' | 'openedAt' | 'openingAskedAt' | 'openingAskedBy'>

export const isSealed = ({ state }: Pick<Rfq, 'state'>): boolean => state === 'issued' || state === 'closed'

/** Whether this person asks for the opening, opens, or neither, as the server would decide it now. */
export function openingAct(rfq: Sealed, { id, roles }: Looker, isDue: boolean): 'ask' | 'open' | null {
  if (!isSealed(rfq) || !isDue) return null
  if (rfq.openingAskedAt === null) return roles.includes('buyer') ? 'ask' : null
  return rfq.openingAskedBy?.id !== id && roles.some((role) => SECOND_OPENERS.includes(role)) ? 'open' : null
}

/** Who has to do what before anybody reads a quotation, said to this person; empty when there is nothing to say. */
export function openingNote(rfq: Sealed, { id, roles }: Looker, isDue: boolean): string {
  if (!isSealed(rfq)) return ''
  if (!isDue) return 'After the due time a buyer asks for the opening; then somebody else, who is approver, quality or engineer, opens.'
  if (rfq.openingAskedAt === null) {
    return roles.includes('buyer') ? 'The due time has passed. Ask for the opening; somebody else opens.' : 'The due time has passed. A buyer has to ask for the opening first.'
  }
  const asker = rfq.openingAskedBy
  if (asker?.id === id) return 'You asked for the opening. Somebody else, who is approver, quality or engineer, opens; they were told by mail.'
  const asked = `${asker?.name ?? 'A buyer'} asked for the opening.`
  return roles.some((role) => SECOND_OPENERS.includes(role)) ? `${asked} You are the second person: open the quotations when you are ready.` : `${asked} Somebody who is approver, quality or engineer opens.`
}

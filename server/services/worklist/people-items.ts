import type { Actor, Transaction } from '#server/db/as-actor'
import { listChanges } from '#server/services/people/change-requests'
import { listCustomers } from '#server/services/people/customers'
import type { ChangeRequest, PersonChange } from '#shared/contracts/people'
import type { WorklistItem } from '#shared/contracts/worklist'
import type { WorklistProvider } from './provider'

const WHAT: Record<PersonChange['kind'], string> = { roles: 'new roles', email: 'a new mail address', removal: 'the removal' }
const link = { route: 'people', params: {} }

function changeItem(change: ChangeRequest): Omit<WorklistItem, 'state' | 'since' | 'detail'> {
  return { id: `person-change-${change.id}`, kind: 'person-change', title: `Confirm ${WHAT[change.change.kind]} for ${change.personName}`, dueAt: null, link }
}

/** Waiting for whoever may be the second person; decided for whoever asked. */
async function changeItems(tx: Transaction, actor: Actor, doneSince: Date): Promise<WorklistItem[]> {
  const changes = await listChanges(tx, actor)
  const waiting = changes.filter(({ mayConfirm }) => mayConfirm)
  const decided = changes.filter(({ requestedBy, decidedAt }) => requestedBy === actor.personId && decidedAt !== null && new Date(decidedAt) >= doneSince)
  return [
    ...waiting.map((change): WorklistItem => ({ ...changeItem(change), state: 'open', since: change.requestedAt, detail: `Asked for by ${change.requestedByName}` })),
    ...decided.map((change): WorklistItem => ({
      ...changeItem(change),
      title: `You asked for ${WHAT[change.change.kind]} for ${change.personName}`,
      state: 'done',
      since: change.decidedAt!,
      detail: change.state === 'refused' ? 'Refused' : 'Confirmed',
    })),
  ]
}

async function customerItems(tx: Transaction, actor: Actor): Promise<WorklistItem[]> {
  if (!actor.roles.includes('vendor')) return []
  const customers = await listCustomers(tx, actor)
  return customers
    .filter(({ state }) => state === 'invited')
    .map(({ id, name, invitedAt }) => ({
      id: `customer-${id}`,
      kind: 'customer-invitation',
      title: `Accept the invitation of ${name}`,
      detail: 'Requests for quotation reach you after that.',
      state: 'open',
      since: invitedAt,
      dueAt: null,
      link: { route: 'customers', params: {} },
    }))
}

export const peopleItems: WorklistProvider = async (tx, actor, { doneSince }) => [
  ...(await changeItems(tx, actor, doneSince)),
  ...(await customerItems(tx, actor)),
]

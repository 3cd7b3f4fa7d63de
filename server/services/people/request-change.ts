import { savepoint, type Actor, type Transaction } from '#server/db/as-actor'
import { changeRequests } from '#server/db/schema/index'
import { AppError, violates } from '#server/errors'
import { queueMail } from '#server/mail/queue-mail'
import { secondPersons } from '#server/policies/people'
import { recordAudit } from '#server/services/audit/record-audit'
import type { Person, PersonChange } from '#shared/contracts/people'
import { sql } from 'drizzle-orm'
import { randomUUID } from 'node:crypto'
import { activeMembers } from './change-requests'
import { refuseForeignRoles } from './invite-person'

/** Nothing changes yet; those who may be the second person are told. */
export async function requestChange(tx: Transaction, actor: Actor, person: Person, change: PersonChange): Promise<{ id: string }> {
  if (person.state === 'left') throw new AppError('conflict', `${person.name} has left; there is nothing to change.`)
  if (change.kind === 'roles') refuseForeignRoles(actor.companyKind, change.roles)

  const id = randomUUID()
  const request = { id, companyId: actor.companyId, personId: person.id, change, requestedBy: actor.personId, requestedAt: sql`app_now()` }
  await onlyOneWaiting(person, () => savepoint(tx, () => tx.insert(changeRequests).values(request)))
  const roles = change.kind === 'roles' ? change.roles : undefined
  await recordAudit(tx, actor, { type: 'person-change-requested', personId: person.id, changeId: id, change: change.kind, roles })

  const able = secondPersons(actor.companyKind, { requestedBy: actor.personId, personId: person.id }, await activeMembers(tx, [actor.companyId]))
  for (const personId of able) {
    await queueMail(tx, actor, { template: 'change-requested', props: { personName: person.name, kind: change.kind }, to: { personId } })
  }
  return { id }
}

async function onlyOneWaiting(person: Person, work: () => Promise<unknown>): Promise<void> {
  try {
    await work()
  } catch (error) {
    if (!violates(error, 'change_requests_one_open_key')) throw error
    throw new AppError('conflict', `Such a change of ${person.name} already waits for a second person; take it back first.`)
  }
}

import { appNow, type Actor, type Transaction } from '#server/db/as-actor'
import { changeRequests, companies, memberships, people } from '#server/db/schema/index'
import { AppError, notFound } from '#server/errors'
import { queueMail } from '#server/mail/queue-mail'
import { mayConfirmChange, mayRefuseChange, type Member } from '#server/policies/people'
import { recordAudit } from '#server/services/audit/record-audit'
import type { CompanyKind } from '#shared/contracts/endpoint'
import type { PersonChange } from '#shared/contracts/people'
import { eq } from 'drizzle-orm'
import { activeMembers, type ChangeRow } from './change-requests'

interface Waiting {
  request: ChangeRow
  kind: CompanyKind
  members: Member[]
}

/** Locked, so that two people deciding at the same moment yield one decision and one refusal. */
async function lockWaiting(tx: Transaction, actor: Actor, changeId: string): Promise<Waiting> {
  const [request] = await tx.select().from(changeRequests).where(eq(changeRequests.id, changeId))
  if (!request || (request.companyId !== actor.companyId && actor.companyKind !== 'operator')) throw notFound('change')
  if (request.state !== 'requested') throw decidedBefore()
  const [company] = await tx.select({ kind: companies.kind }).from(companies).where(eq(companies.id, request.companyId))
  return { request, kind: company!.kind, members: await activeMembers(tx, [request.companyId]) }
}

const decidedBefore = () => new AppError('already-decided', 'This change was decided before; reload the list.')

/** Sets the decision if nobody has decided meanwhile. */
async function decide(tx: Transaction, actor: Actor, request: ChangeRow, state: 'confirmed' | 'refused'): Promise<Date> {
  const decidedAt = await appNow(tx)
  const [locked] = await tx.select({ state: changeRequests.state }).from(changeRequests).where(eq(changeRequests.id, request.id)).for('update')
  if (locked?.state !== 'requested') throw decidedBefore()
  await tx.update(changeRequests).set({ state, decidedBy: actor.personId, decidedAt }).where(eq(changeRequests.id, request.id))
  return decidedAt
}

export async function confirmChange(tx: Transaction, actor: Actor, changeId: string): Promise<void> {
  const { request, kind, members } = await lockWaiting(tx, actor, changeId)
  if (!mayConfirmChange(actor, kind, request, members)) {
    throw new AppError('second-person-needed', 'Somebody else has to confirm this: not who asked for it, not whom it concerns, and with the role for it.')
  }
  refuseLastManager(request, kind, members)
  const { personId, change } = request
  const at = await decide(tx, actor, request, 'confirmed')
  await recordAudit(tx, actor, { type: 'person-change-confirmed', personId, changeId, change: change.kind, roles: change.kind === 'roles' ? change.roles : undefined }, { companyId: request.companyId })
  await apply(tx, actor, request, at)
}

async function apply(tx: Transaction, actor: Actor, { id, personId, change }: ChangeRow, at: Date): Promise<void> {
  if (change.kind === 'email') {
    // It counts when the new address is proved; until then the old one signs in.
    await queueMail(tx, actor, { template: 'address-proof', props: { changeId: id }, to: { personId, address: change.email } })
    return
  }
  if (change.kind === 'roles') {
    const { roles, approvalLimit, approvalCurrency } = change
    await tx.update(memberships).set({ roles, approvalLimit, approvalCurrency }).where(eq(memberships.personId, personId))
  }
  await tx.update(people).set({ sessionsValidAfter: at, ...(change.kind === 'removal' && { leftAt: at }) }).where(eq(people.id, personId))
  await tx.update(changeRequests).set({ state: 'done' }).where(eq(changeRequests.id, id))
  await queueMail(tx, actor, { template: 'change-done', props: { kind: change.kind, at: at.toISOString() }, to: { personId } })
}

/** A company nobody manages could never be managed again. */
function refuseLastManager({ personId, change }: ChangeRow, kind: CompanyKind, members: readonly Member[]): void {
  const role = kind === 'buying' ? 'admin' : kind
  const managers = members.filter(({ roles }) => roles.includes(role))
  const isLast = managers.length === 1 && managers[0]!.personId === personId
  if (isLast && losesRole(change, role)) throw new AppError('conflict', 'This person is the last who manages the company’s people; appoint another first.')
}

function losesRole(change: PersonChange, role: 'admin' | 'vendor' | 'operator'): boolean {
  return change.kind === 'removal' || (change.kind === 'roles' && !change.roles.includes(role))
}

export async function refuseChange(tx: Transaction, actor: Actor, changeId: string): Promise<void> {
  const { request, kind, members } = await lockWaiting(tx, actor, changeId)
  if (!mayRefuseChange(actor, kind, request, members)) throw new AppError('second-person-needed', 'Only who asked for it takes it back, and only who may confirm it refuses it.')
  await decide(tx, actor, request, 'refused')
  await recordAudit(tx, actor, { type: 'person-change-refused', personId: request.personId, changeId }, { companyId: request.companyId })
}

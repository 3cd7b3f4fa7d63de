import type { Actor, Transaction } from '#server/db/as-actor'
import { companies, memberships, people } from '#server/db/schema/index'
import { AppError } from '#server/errors'
import { queueMail } from '#server/mail/queue-mail'
import { rolesOfKind } from '#server/policies/people'
import { recordAudit } from '#server/services/audit/record-audit'
import type { CompanyKind, Role } from '#shared/contracts/endpoint'
import type { InvitePerson, Person } from '#shared/contracts/people'
import { and, eq, isNull, sql } from 'drizzle-orm'
import { randomUUID } from 'node:crypto'
import { findPerson } from './list-people'

/** Invites to the actor's own company. Whether the address is known elsewhere shows nowhere. */
export async function invitePerson(tx: Transaction, actor: Actor, { name, email, roles, approvalLimit, approvalCurrency }: InvitePerson): Promise<Person> {
  refuseForeignRoles(actor.companyKind, roles)
  await refuseSecondInvitation(tx, actor.companyId, email)

  const personId = randomUUID()
  await tx.insert(people).values({ id: personId, name, email, invitedBy: actor.personId })
  await tx.insert(memberships).values({ personId, companyId: actor.companyId, companyKind: actor.companyKind, roles, approvalLimit, approvalCurrency })
  await recordAudit(tx, actor, { type: 'person-invited', personId, roles })
  await mailInvitation(tx, actor, personId)
  return (await findPerson(tx, actor, personId))!
}

export function refuseForeignRoles(kind: CompanyKind, roles: readonly Role[]): void {
  const known = rolesOfKind(kind)
  const foreign = roles.filter((role) => !known.includes(role))
  if (foreign.length === 0) return
  const message = `A person of this company cannot be ${foreign.join(', ')}. Possible: ${known.join(', ')}.`
  throw new AppError('invalid-input', message, { roles: message })
}

/** Serialized by the lock, so that a double click invites once. */
async function refuseSecondInvitation(tx: Transaction, companyId: string, email: string): Promise<void> {
  await tx.execute(sql`select pg_advisory_xact_lock(hashtextextended(${`${companyId} ${email}`}, 1))`)
  const [known] = await tx
    .select({ id: people.id })
    .from(people)
    .innerJoin(memberships, eq(memberships.personId, people.id))
    .where(and(eq(memberships.companyId, companyId), eq(people.email, email), isNull(people.leftAt)))
  if (known) throw new AppError('already-invited', 'This address is already among the people of your company.', { email: 'Already among your people.' })
}

export async function mailInvitation(tx: Transaction, actor: Actor, personId: string): Promise<void> {
  const [company] = await tx.select({ name: companies.name }).from(companies).where(eq(companies.id, actor.companyId))
  await queueMail(tx, actor, { template: 'invitation', props: { companyName: company!.name }, to: { personId } })
}

export async function resendInvitation(tx: Transaction, actor: Actor, person: Person): Promise<void> {
  if (person.state !== 'invited') throw new AppError('already-accepted', `${person.name} has already accepted.`)
  await recordAudit(tx, actor, { type: 'invitation-repeated', personId: person.id })
  await mailInvitation(tx, actor, person.id)
}

import type { Actor, Transaction } from '#server/db/as-actor'
import { memberships, people } from '#server/db/schema/index'
import { readablePeople } from '#server/policies/people'
import type { Person } from '#shared/contracts/people'
import { and, eq } from 'drizzle-orm'

type PersonRow = typeof people.$inferSelect
type MembershipRow = typeof memberships.$inferSelect

export function presentPerson(person: PersonRow, { companyId, roles, approvalLimit, approvalCurrency }: MembershipRow): Person {
  const state = person.leftAt ? 'left' : person.acceptedAt ? 'active' : 'invited'
  return { id: person.id, name: person.name, email: person.email, companyId, roles, approvalLimit, approvalCurrency, state, createdAt: person.createdAt.toISOString() }
}

/** The own company's people, those who left included: records name them. */
export async function listPeople(tx: Transaction, actor: Actor): Promise<Person[]> {
  const rows = await tx
    .select({ person: people, membership: memberships })
    .from(memberships)
    .innerJoin(people, eq(people.id, memberships.personId))
    .where(and(readablePeople(actor), eq(memberships.companyId, actor.companyId)))
    .orderBy(people.name, people.id)
  return rows.map(({ person, membership }) => presentPerson(person, membership))
}

export async function findPerson(tx: Transaction, actor: Actor, personId: string): Promise<Person | null> {
  const [row] = await tx
    .select({ person: people, membership: memberships })
    .from(memberships)
    .innerJoin(people, eq(people.id, memberships.personId))
    .where(and(readablePeople(actor), eq(memberships.personId, personId)))
  return row ? presentPerson(row.person, row.membership) : null
}

import type { Actor, Transaction } from '#server/db/as-actor'
import { changeRequests, companies, memberships, people } from '#server/db/schema/index'
import { mayConfirmChange, type Member } from '#server/policies/people'
import type { CompanyKind } from '#shared/contracts/endpoint'
import type { ChangeRequest } from '#shared/contracts/people'
import { and, desc, eq, inArray, isNotNull, isNull } from 'drizzle-orm'
import { alias } from 'drizzle-orm/pg-core'

export type ChangeRow = typeof changeRequests.$inferSelect

/** Those of a company who can act: they have accepted and not left. */
export async function activeMembers(tx: Transaction, companyIds: readonly string[]): Promise<(Member & { companyId: string })[]> {
  if (companyIds.length === 0) return []
  return tx
    .select({ personId: memberships.personId, roles: memberships.roles, companyId: memberships.companyId })
    .from(memberships)
    .innerJoin(people, eq(people.id, memberships.personId))
    .where(and(inArray(memberships.companyId, [...companyIds]), isNotNull(people.acceptedAt), isNull(people.leftAt)))
}

/** The changes of the own company, newest first; for an operator those of every company that wait. */
export async function listChanges(tx: Transaction, actor: Actor): Promise<ChangeRequest[]> {
  const [concerned, asking] = [alias(people, 'concerned'), alias(people, 'asking')]
  const scope = actor.companyKind === 'operator' ? eq(changeRequests.state, 'requested') : eq(changeRequests.companyId, actor.companyId)
  const rows = await tx
    .select({ request: changeRequests, kind: companies.kind, personName: concerned.name, requestedByName: asking.name })
    .from(changeRequests)
    .innerJoin(companies, eq(companies.id, changeRequests.companyId))
    .innerJoin(concerned, eq(concerned.id, changeRequests.personId))
    .innerJoin(asking, eq(asking.id, changeRequests.requestedBy))
    .where(scope)
    .orderBy(desc(changeRequests.requestedAt))
    .limit(200)
  const members = await activeMembers(tx, [...new Set(rows.map(({ request }) => request.companyId))])
  return rows.map(({ request, kind, ...names }) => ({ ...present(request), ...names, mayConfirm: mayDecide(actor, kind, request, members) }))
}

function mayDecide(actor: Actor, kind: CompanyKind, request: ChangeRow, members: readonly (Member & { companyId: string })[]): boolean {
  const own = members.filter(({ companyId }) => companyId === request.companyId)
  return request.state === 'requested' && mayConfirmChange(actor, kind, request, own)
}

function present({ id, personId, change, requestedBy, state, requestedAt, decidedAt }: ChangeRow) {
  return { id, personId, change, requestedBy, state, requestedAt: requestedAt.toISOString(), decidedAt: decidedAt?.toISOString() ?? null }
}

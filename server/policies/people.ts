import type { Actor } from '#server/db/as-actor'
import { memberships, vendorLinks, vendorRelations } from '#server/db/schema/index'
import { BUYING_ROLES, type CompanyKind, type Role } from '#shared/contracts/endpoint'
import { and, eq, isNotNull, or, sql, type SQL } from 'drizzle-orm'

/** Roles a person of such a company may hold. */
export function rolesOfKind(kind: CompanyKind): readonly Role[] {
  switch (kind) {
    case 'buying':
      return BUYING_ROLES
    case 'vendor':
      return ['vendor']
    case 'operator':
      return ['operator']
  }
}

const MANAGES_PEOPLE: Record<CompanyKind, Role> = { buying: 'admin', vendor: 'vendor', operator: 'operator' }

/** Only a company's own people add people to it, so that nobody outside puts a reader of offers into it. */
export function canManagePeople(actor: Actor, company: { companyId: string }): boolean {
  return actor.companyId === company.companyId && actor.roles.includes(MANAGES_PEOPLE[actor.companyKind])
}

/** A vendor's people are seen by the buying companies whose invitation it accepted, and by nobody else outside. */
export function canReadPerson(actor: Actor, person: { companyId: string }, acceptedVendorIds: readonly string[]): boolean {
  switch (actor.companyKind) {
    case 'operator':
      return true
    case 'buying':
      return person.companyId === actor.companyId || acceptedVendorIds.includes(person.companyId)
    case 'vendor':
      return person.companyId === actor.companyId
  }
}

/** The same rule for lists that select from `memberships`. */
export function readablePeople(actor: Actor): SQL {
  switch (actor.companyKind) {
    case 'operator':
      return sql`true`
    case 'buying': {
      const accepted = sql`exists (select from ${vendorLinks} where ${and(
        eq(vendorLinks.buyingCompanyId, actor.companyId),
        eq(vendorLinks.vendorCompanyId, memberships.companyId),
        isNotNull(vendorLinks.acceptedAt),
      )})`
      return or(eq(memberships.companyId, actor.companyId), accepted)!
    }
    case 'vendor':
      return eq(memberships.companyId, actor.companyId)
  }
}

export interface Member {
  personId: string
  roles: readonly Role[]
}

/**
 * Who may be the second person of a change: not who asked, not whom it concerns. In a buying company another
 * administrator; where there is none, quality or an approver. In a vendor company any colleague.
 * An empty list leaves it to the operator.
 */
export function secondPersons(kind: CompanyKind, request: { requestedBy: string; personId: string }, members: readonly Member[]): string[] {
  const others = members.filter(({ personId }) => personId !== request.requestedBy && personId !== request.personId)
  const holding = (...roles: Role[]) => others.filter((member) => member.roles.some((role) => roles.includes(role))).map(({ personId }) => personId)
  const managers = holding(MANAGES_PEOPLE[kind])
  return kind === 'buying' && managers.length === 0 ? holding('quality', 'approver') : managers
}

export function mayConfirmChange(actor: Actor, kind: CompanyKind, request: { requestedBy: string; personId: string }, members: readonly Member[]): boolean {
  if (actor.personId === request.requestedBy || actor.personId === request.personId) return false
  const able = secondPersons(kind, request, members)
  return able.length > 0 ? able.includes(actor.personId) : actor.companyKind === 'operator'
}

/** Whoever asked may take it back; whoever may confirm may refuse. */
export function mayRefuseChange(actor: Actor, kind: CompanyKind, request: { requestedBy: string; personId: string }, members: readonly Member[]): boolean {
  return actor.personId === request.requestedBy || mayConfirmChange(actor, kind, request, members)
}

/** What a buying company keeps about a vendor is its own: no other company's, and not the vendor's. */
export function canReadVendorRelation(actor: Actor, relation: { buyingCompanyId: string }): boolean {
  return actor.companyKind === 'buying' && actor.companyId === relation.buyingCompanyId
}

export function readableVendorRelations(actor: Actor): SQL {
  return actor.companyKind === 'buying' ? eq(vendorRelations.buyingCompanyId, actor.companyId) : sql`false`
}

export function canUpdateVendorRelation(actor: Actor, relation: { buyingCompanyId: string }): boolean {
  return canReadVendorRelation(actor, relation) && (actor.roles.includes('buyer') || actor.roles.includes('quality'))
}

export function canReadAgreement(actor: Actor, relation: { buyingCompanyId: string }): boolean {
  return canReadVendorRelation(actor, relation) && actor.roles.some((role) => role === 'buyer' || role === 'quality' || role === 'approver')
}

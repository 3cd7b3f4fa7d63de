import type { Actor } from '#server/db/as-actor'
import { specificationRevisions, specifications } from '#server/db/schema/specifications'
import { eq, sql, type SQL } from 'drizzle-orm'

interface OwnedRow {
  companyId: string
}

interface RevisionRow extends OwnedRow {
  state: string
  editorIds: readonly string[]
}

const READERS = ['engineer', 'checker', 'quality', 'buyer', 'approver'] as const

const holds = (actor: Actor, ...roles: Actor['roles'][number][]) => roles.some((role) => actor.roles.includes(role))

/** Everybody of the buying company who works with drawings; not who only manages its accounts. */
export function canReadSpecification(actor: Actor, row: OwnedRow): boolean {
  return actor.companyKind === 'buying' && actor.companyId === row.companyId && holds(actor, ...READERS)
}

/** The same rule as a restriction, for lists of specifications. */
export function readableSpecifications(actor: Actor): SQL {
  return actor.companyKind === 'buying' && holds(actor, ...READERS) ? eq(specifications.companyId, actor.companyId) : sql`false`
}

/** The same rule for lists of revisions. */
export function readableRevisions(actor: Actor): SQL {
  return actor.companyKind === 'buying' && holds(actor, ...READERS) ? eq(specificationRevisions.companyId, actor.companyId) : sql`false`
}

export function canEditDraft(actor: Actor, row: RevisionRow): boolean {
  return canReadSpecification(actor, row) && holds(actor, 'engineer') && row.state === 'draft'
}

/** The technical side says what is to be changed; purchasing reads it. */
export function canComment(actor: Actor, row: OwnedRow): boolean {
  return canReadSpecification(actor, row) && holds(actor, 'engineer', 'checker', 'quality')
}

/** Nobody checks what they worked on, whatever roles they hold. */
export function isSecondPerson(actor: Actor, row: RevisionRow): boolean {
  return canReadSpecification(actor, row) && !row.editorIds.includes(actor.personId)
}

import type { Actor } from '#server/db/as-actor'
import { awards } from '#server/db/schema/awards'
import { and, eq, inArray, sql, type SQL } from 'drizzle-orm'

interface AwardRow {
  companyId: string
  state: string
}

const READERS = ['engineer', 'checker', 'quality', 'buyer', 'approver'] as const
const PRICE_READERS = ['buyer', 'approver'] as const
const DECIDED = ['approved', 'ordered'] as const

const holds = (actor: Actor, roles: readonly Actor['roles'][number][]) => roles.some((role) => actor.roles.includes(role))
const isOwn = (actor: Actor, companyId: string) => actor.companyKind === 'buying' && actor.companyId === companyId

/** Purchasing reads proposals; who works with the drawing reads what was decided. No vendor reads any. */
export function canReadAward(actor: Actor, row: AwardRow): boolean {
  if (!isOwn(actor, row.companyId)) return false
  return holds(actor, PRICE_READERS) || (holds(actor, READERS) && (DECIDED as readonly string[]).includes(row.state))
}

/** The same rule as a restriction. */
export function readableAwards(actor: Actor): SQL {
  if (actor.companyKind !== 'buying') return sql`false`
  if (holds(actor, PRICE_READERS)) return eq(awards.companyId, actor.companyId)
  return holds(actor, READERS) ? and(eq(awards.companyId, actor.companyId), inArray(awards.state, [...DECIDED]))! : sql`false`
}

export const canProposeAward = (actor: Actor, row: { companyId: string }): boolean => isOwn(actor, row.companyId) && holds(actor, ['buyer'])

export const isApprover = (actor: Actor, row: { companyId: string }): boolean => isOwn(actor, row.companyId) && holds(actor, ['approver'])

/** Nobody decides what they proposed themselves. */
export const canDecideAward = (actor: Actor, row: { companyId: string; proposedBy: string }): boolean => isApprover(actor, row) && actor.personId !== row.proposedBy

import type { Actor } from '#server/db/as-actor'
import { rfqInvitations, rfqs } from '#server/db/schema/rfqs'
import { and, eq, isNotNull, sql, type SQL } from 'drizzle-orm'

interface RfqRow {
  companyId: string
  openedAt: Date | null
  openingAskedBy: string | null
}

interface InvitationRow {
  vendorCompanyId: string
  issuedAt: Date | null
}

const READERS = ['engineer', 'checker', 'quality', 'buyer', 'approver'] as const
const PRICE_READERS = ['buyer', 'approver'] as const
const SECOND_OPENERS = ['approver', 'quality', 'engineer'] as const

const holds = (actor: Actor, roles: readonly Actor['roles'][number][]) => roles.some((role) => actor.roles.includes(role))
const isOwn = (actor: Actor, companyId: string) => actor.companyKind === 'buying' && actor.companyId === companyId

/** The buying side of an enquiry: everybody who works on the part or buys it. */
export const canReadRfq = (actor: Actor, row: Pick<RfqRow, 'companyId'>): boolean => isOwn(actor, row.companyId) && holds(actor, READERS)

/** The same rule as a restriction. */
export const readableRfqs = (actor: Actor): SQL =>
  actor.companyKind === 'buying' && holds(actor, READERS) ? eq(rfqs.companyId, actor.companyId) : sql`false`

export const canWriteRfq = (actor: Actor, row: Pick<RfqRow, 'companyId'>): boolean => isOwn(actor, row.companyId) && holds(actor, ['buyer'])

/** Prices are read by purchasing alone, and by nobody before the opening. */
export const canReadQuotes = (actor: Actor, row: Pick<RfqRow, 'companyId' | 'openedAt'>): boolean =>
  isOwn(actor, row.companyId) && holds(actor, PRICE_READERS) && row.openedAt !== null

/** The same rule as a restriction, for queries that join the enquiry. */
export const readableQuotes = (actor: Actor): SQL =>
  actor.companyKind === 'buying' && holds(actor, PRICE_READERS) ? and(eq(rfqs.companyId, actor.companyId), isNotNull(rfqs.openedAt))! : sql`false`

/** The second of the two persons who open: another one than asked, with another role than buyer. */
export const canOpen = (actor: Actor, row: RfqRow): boolean =>
  isOwn(actor, row.companyId) && holds(actor, SECOND_OPENERS) && row.openingAskedBy !== null && row.openingAskedBy !== actor.personId

/** A vendor answers its own invitation, once that is issued. */
export const canAnswerInvitation = (actor: Actor, row: InvitationRow): boolean =>
  actor.companyKind === 'vendor' && actor.roles.includes('vendor') && actor.companyId === row.vendorCompanyId && row.issuedAt !== null

/** The same rule as a restriction. */
export const answerableInvitations = (actor: Actor): SQL =>
  actor.companyKind === 'vendor' && actor.roles.includes('vendor')
    ? and(eq(rfqInvitations.vendorCompanyId, actor.companyId), isNotNull(rfqInvitations.issuedAt))!
    : sql`false`

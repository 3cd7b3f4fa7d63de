import type { Actor } from '#server/db/as-actor'
import { rfqs } from '#server/db/schema/index'
import { readableRfqs } from '#server/policies/rfqs'
import type { WorklistItem } from '#shared/contracts/worklist'
import { and, gte, inArray, or } from 'drizzle-orm'
import type { WorklistMoment, WorklistProvider } from './provider'

type RfqRow = typeof rfqs.$inferSelect

/** For the buying side: enquiries to be issued, asked for and opened, and what was opened lately. */
export const rfqItems: WorklistProvider = async (tx, actor, moment) => {
  if (actor.companyKind !== 'buying') return []
  const waiting = inArray(rfqs.state, ['preparing', 'issued', 'closed'])
  const rows = await tx
    .select()
    .from(rfqs)
    .where(and(readableRfqs(actor), or(waiting, gte(rfqs.openedAt, moment.doneSince))))
  const unopened = rows.filter((row) => row.openedAt === null)
  const open = [...(actor.roles.includes('buyer') ? unopened.flatMap((row) => buyerItems(row, moment)) : []), ...openerItems(unopened, actor, moment)]
  return [...open, ...openedItems(rows, actor)]
}

const itemOf = (row: RfqRow, kind: string): Pick<WorklistItem, 'id' | 'kind' | 'link' | 'detail' | 'state'> => ({
  id: `${kind}-${row.id}`,
  kind,
  detail: row.title,
  state: 'open',
  link: { route: 'rfq', params: { rfqId: row.id } },
})

function buyerItems(row: RfqRow, { now }: WorklistMoment): WorklistItem[] {
  if (row.state === 'preparing') {
    return [{ ...itemOf(row, 'rfq-preparing'), title: `Issue the enquiry ${row.number}`, since: row.createdAt.toISOString(), dueAt: null }]
  }
  if (now < row.dueAt || row.openingAskedAt) return []
  return [{ ...itemOf(row, 'rfq-opening'), title: `Ask for the opening of ${row.number}`, since: row.dueAt.toISOString(), dueAt: null }]
}

/** The asker cannot be the second person, whatever roles that person holds. */
function openerItems(rows: readonly RfqRow[], actor: Actor, { now }: WorklistMoment): WorklistItem[] {
  if (!actor.roles.some((role) => role === 'approver' || role === 'quality' || role === 'engineer')) return []
  return rows
    .filter((row) => row.openingAskedAt && row.openingAskedBy !== actor.personId && now >= row.dueAt)
    .map((row) => ({ ...itemOf(row, 'rfq-second-opener'), title: `Open ${row.number} as the second person`, since: row.openingAskedAt!.toISOString(), dueAt: null }))
}

/** Told to the two who opened. */
function openedItems(rows: readonly RfqRow[], actor: Actor): WorklistItem[] {
  return rows
    .filter((row) => row.openedAt && (row.openedBy === actor.personId || row.openingAskedBy === actor.personId))
    .map((row) => ({ ...itemOf(row, 'rfq-opened'), title: `${row.number} was opened`, state: 'done' as const, since: row.openedAt!.toISOString(), dueAt: null }))
}

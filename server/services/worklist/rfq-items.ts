import type { Actor, Transaction } from '#server/db/as-actor'
import { rfqs } from '#server/db/schema/index'
import { readableRfqs } from '#server/policies/rfqs'
import { listVendorRfqs } from '#server/services/rfqs/vendor-rfq'
import type { WorklistItem } from '#shared/contracts/worklist'
import { and, inArray } from 'drizzle-orm'
import type { WorklistMoment, WorklistProvider } from './provider'

type RfqRow = typeof rfqs.$inferSelect

export const rfqItems: WorklistProvider = async (tx, actor, moment) => {
  if (actor.companyKind === 'vendor') return vendorItems(tx, actor)
  if (actor.companyKind !== 'buying') return []
  const rows = await tx
    .select()
    .from(rfqs)
    .where(and(readableRfqs(actor), inArray(rfqs.state, ['preparing', 'issued', 'closed'])))
  return [...(actor.roles.includes('buyer') ? rows.flatMap((row) => buyerItems(row, moment)) : []), ...openerItems(rows, actor, moment)]
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

const VENDOR_STEPS: Partial<Record<Awaited<ReturnType<typeof listVendorRfqs>>[number]['invitationState'], string>> = {
  invited: 'New enquiry',
  seen: 'Accept confidentiality or decline',
  'terms-accepted': 'Quote or decline',
}

async function vendorItems(tx: Transaction, actor: Actor): Promise<WorklistItem[]> {
  const rows = await listVendorRfqs(tx, actor)
  return rows.flatMap((row): WorklistItem[] => {
    const step = VENDOR_STEPS[row.invitationState]
    if (row.state !== 'open' || !step) return []
    const link = { route: 'enquiry', params: { rfqId: row.id } }
    return [{ id: `enquiry-${row.id}`, kind: 'enquiry', title: `${step}: ${row.number}`, detail: `${row.customerName} · ${row.title}`, state: 'open', since: row.issuedAt, dueAt: row.dueAt, link }]
  })
}

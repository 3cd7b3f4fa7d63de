import type { Actor, Transaction } from '#server/db/as-actor'
import { listAwards } from '#server/services/awards/read-awards'
import { listOrders } from '#server/services/orders/read-orders'
import { listRfqs } from '#server/services/rfqs/read-rfq'
import type { AwardSummary } from '#shared/contracts/awards'
import type { WorklistItem } from '#shared/contracts/worklist'
import type { WorklistProvider } from './provider'

const awardLink = (id: string) => ({ route: 'award', params: { awardId: id } })

export const awardItems: WorklistProvider = async (tx, actor, { doneSince }) => {
  if (actor.roles.includes('vendor')) return vendorItems(tx, actor)
  const isBuyer = actor.roles.includes('buyer')
  const isApprover = actor.roles.includes('approver')
  if (!isBuyer && !isApprover) return []
  const awards = await listAwards(tx, actor)
  return [
    ...(isApprover ? awards.filter(({ state }) => state === 'proposed').map(approvalItem) : []),
    ...(isBuyer ? [...(await comparisonItems(tx, actor, awards)), ...awards.filter(({ state }) => state === 'approved').map(orderItem), ...(await answerItems(tx, actor, doneSince))] : []),
  ]
}

const approvalItem = ({ id, rfqNumber, rfqTitle, proposedBy, proposedAt }: AwardSummary): WorklistItem => ({
  id: `award-approval-${id}`,
  kind: 'award-approval',
  title: `Approve the award for ${rfqNumber}`,
  detail: `${rfqTitle}, proposed by ${proposedBy}`,
  state: 'open',
  since: proposedAt,
  dueAt: null,
  link: awardLink(id),
})

const orderItem = ({ id, rfqNumber, vendorName, decidedAt, proposedAt }: AwardSummary): WorklistItem => ({
  id: `award-order-${id}`,
  kind: 'award-order',
  title: `Place the order for ${rfqNumber}`,
  detail: `Approved for ${vendorName}`,
  state: 'open',
  since: decidedAt ?? proposedAt,
  dueAt: null,
  link: awardLink(id),
})

/** Opened enquiries for which nothing is proposed. */
async function comparisonItems(tx: Transaction, actor: Actor, awards: AwardSummary[]): Promise<WorklistItem[]> {
  const busy = new Set(awards.filter(({ state }) => state === 'proposed' || state === 'approved').map(({ rfqId }) => rfqId))
  const opened = (await listRfqs(tx, actor, 'opened')).filter(({ id }) => !busy.has(id))
  return opened.map(({ id, number, title, dueAt }) => ({
    id: `award-comparison-${id}`,
    kind: 'award-comparison',
    title: `Compare the quotations for ${number}`,
    detail: title,
    state: 'open',
    since: dueAt,
    dueAt: null,
    link: { route: 'comparison', params: { rfqId: id } },
  }))
}

/** What vendors answered lately. */
async function answerItems(tx: Transaction, actor: Actor, doneSince: Date): Promise<WorklistItem[]> {
  const answered = (await listOrders(tx, actor)).filter(({ answer, placedAt }) => answer !== null && new Date(placedAt) >= doneSince)
  return answered.map(({ id, number, counterpart, answer, placedAt }) => ({
    id: `order-answer-${id}`,
    kind: 'order-answer',
    title: `${counterpart} answered the order ${number}`,
    detail: ANSWERS[answer!],
    state: answer === 'accepted' ? 'done' : 'open',
    since: placedAt,
    dueAt: null,
    link: { route: 'order', params: { orderId: id } },
  }))
}

const ANSWERS = { accepted: 'Accepted', 'accepted-with-changes': 'Accepted with changes', refused: 'Refused' } as const

async function vendorItems(tx: Transaction, actor: Actor): Promise<WorklistItem[]> {
  const waiting = (await listOrders(tx, actor)).filter(({ answer }) => answer === null)
  return waiting.map(({ id, number, counterpart, placedAt, acknowledgeBy }) => ({
    id: `order-acknowledgement-${id}`,
    kind: 'order-acknowledgement',
    title: `Acknowledge the purchase order ${number}`,
    detail: `From ${counterpart}`,
    state: 'open',
    since: placedAt,
    dueAt: `${acknowledgeBy}T23:59:59.999Z`,
    link: { route: 'vendor-order', params: { orderId: id } },
  }))
}

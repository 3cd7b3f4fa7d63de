import type { Context } from '#server/context'
import { appNow, asActor, type Actor, type Transaction } from '#server/db/as-actor'
import { companies, files, orderAcknowledgements, purchaseOrders } from '#server/db/schema/index'
import { AppError, notFound, violates } from '#server/errors'
import { queueMail } from '#server/mail/queue-mail'
import { canAcknowledgeOrder, canReadOrder, readableOrders } from '#server/policies/orders'
import { recordAudit } from '#server/services/audit/record-audit'
import { downloadOf, type FileDownload } from '#server/services/files/download'
import { namesOf, personOf } from '#server/services/specifications/read-revision'
import type { Order, OrderContent, OrderSummary } from '#shared/contracts/orders'
import { desc, eq } from 'drizzle-orm'

type OrderRow = typeof purchaseOrders.$inferSelect
type AcknowledgementRow = typeof orderAcknowledgements.$inferSelect

interface FoundOrder {
  order: OrderRow
  acknowledgement: AcknowledgementRow | null
}

const contentOf = (order: OrderRow) => JSON.parse(order.content.toString('utf8')) as OrderContent

export async function listOrders(tx: Transaction, actor: Actor): Promise<OrderSummary[]> {
  const rows = await tx
    .select({ order: purchaseOrders, acknowledgement: orderAcknowledgements, customerName: companies.name })
    .from(purchaseOrders)
    .leftJoin(orderAcknowledgements, eq(orderAcknowledgements.orderId, purchaseOrders.id))
    .leftJoin(companies, eq(companies.id, purchaseOrders.companyId))
    .where(readableOrders(actor))
    .orderBy(desc(purchaseOrders.placedAt))
    .limit(500)
  return rows.map((row) => summaryOf(row, actor, row.customerName))
}

function summaryOf({ order, acknowledgement }: FoundOrder, actor: Actor, customerName: string | null): OrderSummary {
  const content = contentOf(order)
  return {
    id: order.id,
    number: order.number,
    rfqNumber: content.rfqNumber,
    counterpart: actor.companyKind === 'vendor' ? (customerName ?? content.buyer.legalEntity) : content.vendor.name,
    total: { amount: content.total, currency: content.currency },
    deliveryOn: content.deliveryOn,
    acknowledgeBy: order.acknowledgeBy,
    placedAt: order.placedAt.toISOString(),
    answer: acknowledgement?.answer ?? null,
  }
}

async function findOrder(tx: Transaction, actor: Actor, orderId: string): Promise<FoundOrder & { customerName: string | null }> {
  const [found] = await tx
    .select({ order: purchaseOrders, acknowledgement: orderAcknowledgements, customerName: companies.name })
    .from(purchaseOrders)
    .leftJoin(orderAcknowledgements, eq(orderAcknowledgements.orderId, purchaseOrders.id))
    .leftJoin(companies, eq(companies.id, purchaseOrders.companyId))
    .where(eq(purchaseOrders.id, orderId))
  if (!found || !canReadOrder(actor, found.order)) throw notFound('purchase order')
  return found
}

export async function readOrder(tx: Transaction, actor: Actor, orderId: string): Promise<Order> {
  const found = await findOrder(tx, actor, orderId)
  const { order, acknowledgement } = found
  const content = contentOf(order)
  const names = await namesOf(tx, [order.placedBy, acknowledgement?.answeredBy ?? null])
  return {
    ...summaryOf(found, actor, found.customerName),
    content,
    sha256: order.sha256,
    pdfSha256: order.pdfSha256,
    placedBy: content.buyer.contactName,
    acknowledgement: acknowledgement && {
      answer: acknowledgement.answer,
      text: acknowledgement.text,
      answeredBy: personOf(names, acknowledgement.answeredBy).name,
      answeredAt: acknowledgement.answeredAt.toISOString(),
    },
  }
}

export async function downloadOrder(ctx: Context, actor: Actor, orderId: string): Promise<FileDownload> {
  const file = await asActor(ctx, actor, async (tx) => {
    const { order } = await findOrder(tx, actor, orderId)
    const [row] = await tx.select().from(files).where(eq(files.id, order.pdfFileId))
    if (!row) throw notFound('purchase order')
    return row
  })
  return downloadOf(ctx, file)
}

/** The vendor's one answer; it differs from the order only as a counter-offer in words. */
export async function acknowledgeOrder(tx: Transaction, actor: Actor, orderId: string, answer: AcknowledgementRow['answer'], text: string): Promise<Order> {
  const { order, acknowledgement } = await findOrder(tx, actor, orderId)
  if (!canAcknowledgeOrder(actor, order)) throw new AppError('not-allowed', 'An order is acknowledged by its vendor.')
  if (acknowledgement) throw alreadyAcknowledged()
  try {
    await tx.insert(orderAcknowledgements).values({ orderId, companyId: order.companyId, vendorCompanyId: order.vendorCompanyId, answeredBy: actor.personId, answer, text, answeredAt: await appNow(tx) })
  } catch (error) {
    if (violates(error, 'order_acknowledgements_order_key')) throw alreadyAcknowledged()
    throw error
  }
  await recordAudit(tx, actor, { type: 'order-acknowledged', orderId, answer }, { companyId: order.companyId })
  const [vendor] = await tx.select({ name: companies.name }).from(companies).where(eq(companies.id, actor.companyId))
  await queueMail(tx, actor, { template: 'order-answered', props: { orderId, number: order.number, vendorName: vendor!.name }, to: { companyId: order.companyId, roles: ['buyer'] } })
  return readOrder(tx, actor, orderId)
}

const alreadyAcknowledged = () => new AppError('already-acknowledged', 'This order was answered already; talk to the buyer about changes.')

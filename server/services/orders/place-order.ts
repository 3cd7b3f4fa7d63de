import type { Context } from '#server/context'
import { appNow, asActor, type Actor, type Transaction } from '#server/db/as-actor'
import { awards, companies, purchaseOrders, quotes, quoteStates, rfqLines, rfqs, specificationReleases } from '#server/db/schema/index'
import { AppError } from '#server/errors'
import { queueMail } from '#server/mail/queue-mail'
import { renderPurchaseOrderPdf } from '#server/pdf/render-purchase-order'
import { canPlaceOrder } from '#server/policies/orders'
import { recordAudit } from '#server/services/audit/record-audit'
import { findAward, isOfferValid, lockAward, readAwardLines, requireEnquiryOpen, type AwardRow } from '#server/services/awards/read-awards'
import { drawNumber } from '#server/services/draw-number'
import { keepMadeFile, referToFile } from '#server/services/files/store-file'
import { listQuotes } from '#server/services/quotes/read-quotes'
import { lockRfq } from '#server/services/rfqs/lock-rfq'
import { companyToday } from '#server/services/samples/request-samples'
import { canonicalJson } from '#shared/canonical-json'
import type { Order, OrderContent, OrderInput } from '#shared/contracts/orders'
import { unprintable } from '#shared/drawing/text-metrics'
import { and, eq, notExists, sql } from 'drizzle-orm'
import { createHash } from 'node:crypto'
import { orderContent } from './order-content'
import { readOrder } from './read-orders'

/** Makes the order of an approved award: its content and PDF are made outside any transaction and then written together. */
export async function placeOrder(ctx: Context, actor: Actor, awardId: string, input: OrderInput): Promise<Order> {
  const content = await asActor(ctx, actor, (tx) => prepare(tx, actor, awardId, input))
  refuseUnprintable(content)
  const pdf = await renderPurchaseOrderPdf({ content, ...contentBytes(content) })
  const kept = await keepMadeFile(ctx, pdf, `${content.number}.pdf`, 'pdf')
  return asActor(ctx, actor, async (tx) => {
    const award = await lockAward(tx, actor, awardId)
    await requireOrderable(tx, actor, award)
    const file = await referToFile(tx, actor, kept)
    const orderId = await writeOrder(tx, actor, award, content, file)
    await closeRfq(tx, actor, award.rfqId)
    return readOrder(tx, actor, orderId)
  })
}

async function prepare(tx: Transaction, actor: Actor, awardId: string, input: OrderInput): Promise<OrderContent> {
  const award = await findAward(tx, actor, awardId)
  await requireOrderable(tx, actor, award)
  const today = await companyToday(tx, actor.companyId)
  requireFuture(input, today)
  const lines = await readAwardLines(tx, awardId)
  const releases = await tx
    .select({ lineId: rfqLines.id, title: specificationReleases.title, specificationSha256: specificationReleases.specificationSha256 })
    .from(rfqLines)
    .innerJoin(specificationReleases, eq(specificationReleases.id, rfqLines.releaseId))
    .where(eq(rfqLines.rfqId, award.rfqId))
  const quote = (await listQuotes(tx, actor, award.rfqId)).find(({ id }) => id === award.quoteId)!
  const number = drawNumber('PO', await appNow(tx))
  return orderContent(tx, { award, lines, titles: new Map(releases.map((row) => [row.lineId, row])), quote, input, number, today, buyerId: actor.personId })
}

async function requireOrderable(tx: Transaction, actor: Actor, award: AwardRow): Promise<void> {
  if (!canPlaceOrder(actor, award)) throw new AppError('not-allowed', 'A buyer places orders.')
  if (award.state === 'ordered') throw new AppError('already-ordered', 'The order of this award was placed already.')
  if (award.state !== 'approved') throw new AppError('not-approved', `This award is ${award.state}; an order needs an approved one.`)
  await requireEnquiryOpen(tx, award)
  if (!(await isOfferValid(tx, award))) throw new AppError('offer-expired', 'The quotation has expired since it was approved; it cannot be ordered without an extension.')
}

function requireFuture({ deliveryOn, acknowledgeBy }: OrderInput, today: string): void {
  const fields: Record<string, string> = {}
  if (deliveryOn < today) fields.deliveryOn = 'The date of delivery has passed.'
  if (acknowledgeBy < today) fields.acknowledgeBy = 'The date of acknowledgement has passed.'
  if (acknowledgeBy > deliveryOn) fields.acknowledgeBy ??= 'An order is acknowledged before it is delivered.'
  const [first] = Object.values(fields)
  if (first) throw new AppError('invalid-input', first, fields)
}

/** A glyph that no shipped font has is said before a PDF is made. */
function refuseUnprintable(content: OrderContent): void {
  const found = unprintable(content)
  if (found.length === 0) return
  const fields = Object.fromEntries(found.map(({ path, glyphs }) => [path, `No shipped font has ${glyphs.join(', ')}.`]))
  const [first] = Object.entries(fields)
  throw new AppError('unprintable-text', `The order cannot be printed; please correct “${first![0]}”: ${first![1]}`, fields)
}

function contentBytes(content: OrderContent): { bytes: Buffer; sha256: string } {
  const bytes = Buffer.from(canonicalJson(content), 'utf8')
  return { bytes, sha256: createHash('sha256').update(bytes).digest('hex') }
}

async function writeOrder(tx: Transaction, actor: Actor, award: AwardRow, content: OrderContent, file: { id: string; sha256: string }): Promise<string> {
  const { bytes, sha256 } = contentBytes(content)
  const { id: awardId, rfqId, companyId, vendorCompanyId } = award
  const [row] = await tx
    .insert(purchaseOrders)
    .values({ awardId, rfqId, companyId, vendorCompanyId, pdfFileId: file.id, placedBy: actor.personId, number: content.number, acknowledgeBy: content.acknowledgeBy, content: bytes, sha256, pdfSha256: file.sha256, placedAt: await appNow(tx) })
    .returning({ id: purchaseOrders.id })
  const orderId = row!.id
  await tx.update(awards).set({ state: 'ordered' }).where(eq(awards.id, awardId))
  await recordAudit(tx, actor, { type: 'order-placed', rfqId, awardId, orderId, sha256, pdfSha256: file.sha256 })
  const customerName = await customerNameOf(tx, companyId)
  await queueMail(tx, actor, { template: 'order-placed', props: { orderId, number: content.number, customerName, acknowledgeBy: content.acknowledgeBy }, to: { companyId: vendorCompanyId } })
  return orderId
}

async function customerNameOf(tx: Transaction, companyId: string): Promise<string> {
  const [company] = await tx.select({ name: companies.name }).from(companies).where(eq(companies.id, companyId))
  return company!.name
}

/** Once every part is ordered the enquiry is awarded, and who quoted and got nothing is told so. */
async function closeRfq(tx: Transaction, actor: Actor, rfqId: string): Promise<void> {
  const { row: rfq } = await lockRfq(tx, actor, rfqId)
  const open = await tx
    .select({ id: rfqLines.id })
    .from(rfqLines)
    .where(and(eq(rfqLines.rfqId, rfqId), notExists(tx.select({ one: sql`1` }).from(sql`award_lines l join awards a on a.id = l.award_id`).where(sql`l.line_id = ${rfqLines.id} and a.state = 'ordered'`))))
  if (open.length > 0) return

  await tx
    .update(rfqs)
    .set({ state: 'awarded', version: rfq.version + 1 })
    .where(eq(rfqs.id, rfqId))
  const losers = await tx
    .selectDistinct({ vendorCompanyId: quotes.vendorCompanyId })
    .from(quotes)
    .innerJoin(quoteStates, and(eq(quoteStates.quoteId, quotes.id), eq(quoteStates.state, 'submitted')))
    .where(and(eq(quotes.rfqId, rfqId), notExists(tx.select({ one: sql`1` }).from(sql`awards a`).where(sql`a.rfq_id = ${quotes.rfqId} and a.vendor_company_id = ${quotes.vendorCompanyId} and a.state = 'ordered'`))))
  const customerName = await customerNameOf(tx, rfq.companyId)
  for (const { vendorCompanyId } of losers) {
    await queueMail(tx, actor, { template: 'rfq-decided', props: { rfqId, rfqNumber: rfq.number, customerName }, to: { companyId: vendorCompanyId } })
  }
}

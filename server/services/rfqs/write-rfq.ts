import { appNow, type Actor, type Transaction } from '#server/db/as-actor'
import { people, rfqInvitations, rfqLines, rfqs, specificationReleases, specificationRevisions, vendorRelations } from '#server/db/schema/index'
import { AppError, violates } from '#server/errors'
import { savepoint } from '#server/db/as-actor'
import { canWriteRfq } from '#server/policies/rfqs'
import { recordAudit } from '#server/services/audit/record-audit'
import type { Rfq, RfqInput } from '#shared/contracts/rfqs'
import { isCurrency } from '#shared/money'
import { and, eq, inArray } from 'drizzle-orm'
import { randomInt } from 'node:crypto'
import { lockRfq } from './lock-rfq'
import { presentRfq } from './read-rfq'

/** Letters and figures that cannot be taken for one another. */
const NUMBER_LETTERS = '23456789ABCDEFGHJKLMNPRTUVWXY'

/** Random, so that no vendor can count another's enquiries by it. */
function newNumber(now: Date): string {
  const tail = Array.from({ length: 5 }, () => NUMBER_LETTERS[randomInt(NUMBER_LETTERS.length)]).join('')
  return `RFQ-${String(now.getUTCFullYear()).slice(2)}-${tail}`
}

export async function createRfq(tx: Transaction, actor: Actor, input: RfqInput): Promise<Rfq> {
  const now = await appNow(tx)
  await requireSoundInput(tx, actor, input, now)
  const [buyer] = await tx.select({ name: people.name, email: people.email }).from(people).where(eq(people.id, actor.personId))
  const values = { ...columnsOf(input), companyId: actor.companyId, buyerId: actor.personId, contactName: buyer!.name, contactEmail: buyer!.email }
  const row = await insertWithNumber(tx, values, now)
  await writeParts(tx, actor, row.id, input)
  await recordAudit(tx, actor, { type: 'rfq-created', rfqId: row.id })
  return presentRfq(tx, actor, row)
}

async function insertWithNumber(tx: Transaction, values: Omit<typeof rfqs.$inferInsert, 'number'>, now: Date) {
  for (let attempt = 1; ; attempt++) {
    try {
      const [row] = await savepoint(tx, () => tx.insert(rfqs).values({ ...values, number: newNumber(now) }).returning())
      return row!
    } catch (error) {
      if (attempt >= 5 || !violates(error, 'rfqs_company_number_key')) throw error
    }
  }
}

/** Rewrites an enquiry that is still prepared. */
export async function updateRfq(tx: Transaction, actor: Actor, rfqId: string, version: number, input: RfqInput): Promise<Rfq> {
  const { row, now } = await lockRfq(tx, actor, rfqId)
  requirePreparing(actor, row, version)
  await requireSoundInput(tx, actor, input, now)
  await tx.delete(rfqLines).where(eq(rfqLines.rfqId, rfqId))
  await tx.delete(rfqInvitations).where(eq(rfqInvitations.rfqId, rfqId))
  await writeParts(tx, actor, rfqId, input)
  const [saved] = await tx
    .update(rfqs)
    .set({ ...columnsOf(input), version: row.version + 1 })
    .where(eq(rfqs.id, rfqId))
    .returning()
  return presentRfq(tx, actor, saved!)
}

export function requirePreparing(actor: Actor, row: typeof rfqs.$inferSelect, version: number): void {
  if (!canWriteRfq(actor, row)) throw new AppError('not-allowed', 'A buyer prepares enquiries.')
  if (row.state !== 'preparing') throw new AppError('rfq-issued', 'The enquiry was issued and does not change any more.')
  if (row.version !== version) throw new AppError('stale-version', 'Somebody changed the enquiry meanwhile; load it again and enter yours.')
}

const columnsOf = ({ title, dueAt, dueZone, currency, deliveryRule, deliveryPlace, terms }: RfqInput) => ({
  title,
  dueAt: new Date(dueAt),
  dueZone,
  currency,
  deliveryRule,
  deliveryPlace,
  terms,
})

async function writeParts(tx: Transaction, actor: Actor, rfqId: string, input: RfqInput): Promise<void> {
  await tx.insert(rfqLines).values(input.lines.map((line, index) => ({ ...line, rfqId, companyId: actor.companyId, position: index + 1 })))
  if (input.vendorCompanyIds.length === 0) return
  await tx.insert(rfqInvitations).values(input.vendorCompanyIds.map((vendorCompanyId) => ({ vendorCompanyId, rfqId, companyId: actor.companyId })))
}

/** What the shape alone cannot say: time, zone, currency, releases in force, vendors that may be asked. */
async function requireSoundInput(tx: Transaction, actor: Actor, input: RfqInput, now: Date): Promise<void> {
  const fields: Record<string, string> = {
    ...dueFields(input, now),
    ...lineFields(input),
    ...(await releaseFields(tx, actor, input)),
    ...(await vendorFields(tx, actor, input)),
  }
  if (!isCurrency(input.currency)) fields.currency = `${input.currency} is no currency of ISO 4217 that is in use.`
  const [first] = Object.values(fields)
  if (first) throw new AppError('invalid-input', first, fields)
}

function dueFields(input: RfqInput, now: Date): Record<string, string> {
  const fields: Record<string, string> = {}
  if (new Date(input.dueAt) <= now) fields.dueAt = 'The due time lies in the past; choose a later one.'
  if (!isTimeZone(input.dueZone)) fields.dueZone = `${input.dueZone} is no time zone that is known here; write it like Europe/Berlin.`
  const { samplesNeededOn, questionsUntil } = input.terms
  if (samplesNeededOn && samplesNeededOn < now.toISOString().slice(0, 10)) fields['terms.samplesNeededOn'] = 'This date lies in the past.'
  if (questionsUntil && new Date(questionsUntil) > new Date(input.dueAt)) fields['terms.questionsUntil'] = 'Questions end before the due time.'
  return fields
}

function isTimeZone(zone: string): boolean {
  try {
    return Boolean(new Intl.DateTimeFormat('en', { timeZone: zone }))
  } catch {
    return false
  }
}

function lineFields(input: RfqInput): Record<string, string> {
  const fields: Record<string, string> = {}
  input.lines.forEach((line, index) => {
    if (line.orderQuantity < line.quantities[0]!) {
      fields[`lines.${index}.orderQuantity`] = `Offers are compared at this quantity, so it cannot lie below the smallest break (${line.quantities[0]}).`
    }
    if (input.lines.findIndex((other) => other.releaseId === line.releaseId) < index) fields[`lines.${index}.releaseId`] = 'This part stands in the enquiry already.'
  })
  if (new Set(input.vendorCompanyIds).size < input.vendorCompanyIds.length) fields.vendorCompanyIds = 'A vendor is named twice.'
  return fields
}

async function releaseFields(tx: Transaction, actor: Actor, input: RfqInput): Promise<Record<string, string>> {
  const ids = input.lines.map((line) => line.releaseId)
  const rows = await tx
    .select({ id: specificationReleases.id, state: specificationRevisions.state })
    .from(specificationReleases)
    .innerJoin(specificationRevisions, eq(specificationRevisions.id, specificationReleases.revisionId))
    .where(and(inArray(specificationReleases.id, ids), eq(specificationReleases.companyId, actor.companyId)))
  const states = new Map(rows.map((row) => [row.id, row.state]))
  const fields: Record<string, string> = {}
  ids.forEach((id, index) => {
    const state = states.get(id)
    if (state === undefined) fields[`lines.${index}.releaseId`] = 'There is no such released revision.'
    else if (state !== 'released') fields[`lines.${index}.releaseId`] = `This revision is ${state}; choose the one in force.`
  })
  return fields
}

async function vendorFields(tx: Transaction, actor: Actor, input: RfqInput): Promise<Record<string, string>> {
  if (input.vendorCompanyIds.length === 0) return {}
  const rows = await tx
    .select({ id: vendorRelations.vendorCompanyId, approval: vendorRelations.approval, name: vendorRelations.name })
    .from(vendorRelations)
    .where(and(eq(vendorRelations.buyingCompanyId, actor.companyId), inArray(vendorRelations.vendorCompanyId, input.vendorCompanyIds)))
  const fields: Record<string, string> = {}
  input.vendorCompanyIds.forEach((id, index) => {
    const relation = rows.find((row) => row.id === id)
    if (!relation) fields[`vendorCompanyIds.${index}`] = 'There is no such vendor.'
    else if (relation.approval === 'blocked') fields[`vendorCompanyIds.${index}`] = `${relation.name} is blocked; quality or a buyer has to clear it first.`
  })
  return fields
}

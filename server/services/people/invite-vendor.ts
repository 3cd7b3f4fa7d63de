import type { Context } from '#server/context'
import { asActor, asAuth, type Actor, type Transaction } from '#server/db/as-actor'
import { companies, memberships, people, vendorLinks, vendorRelations } from '#server/db/schema/index'
import { AppError } from '#server/errors'
import { queueMail } from '#server/mail/queue-mail'
import { recordAudit } from '#server/services/audit/record-audit'
import type { InviteVendor, Vendor } from '#shared/contracts/people'
import { and, desc, eq, isNull, sql } from 'drizzle-orm'
import { randomUUID } from 'node:crypto'
import { findVendor } from './vendors'

interface Contact {
  companyId: string
  personId: string
}

/**
 * A vendor that is known here keeps its one sign-in and gets one more customer; an unknown one is set up with
 * its first contact. The inviting company sees the same in both cases: what it typed, until the vendor accepts.
 */
export function inviteVendor(ctx: Context, actor: Actor, input: InviteVendor): Promise<Vendor> {
  return asActor(ctx, actor, async (tx) => {
    // Two companies inviting one new vendor at the same moment must not make it two.
    await tx.execute(sql`select pg_advisory_xact_lock(hashtextextended(${input.contactEmail}, 2))`)
    await refuseSecondInvitation(tx, actor, input.contactEmail)
    const known = await findKnownContact(ctx, input.contactEmail)
    const contact = known && !(await isLinked(tx, actor, known.companyId)) ? known : await createVendor(tx, actor, input)
    await link(tx, actor, contact.companyId, input)
    await recordAudit(tx, actor, { type: 'vendor-invited', vendorCompanyId: contact.companyId })
    await mailVendor(tx, actor, contact.personId)
    return (await findVendor(tx, actor, contact.companyId))!
  })
}

async function refuseSecondInvitation(tx: Transaction, actor: Actor, email: string): Promise<void> {
  const own = eq(vendorRelations.buyingCompanyId, actor.companyId)
  const [invited] = await tx.select({ name: vendorRelations.name }).from(vendorRelations).where(and(own, eq(vendorRelations.contactEmail, email)))
  // People of a vendor that accepted are visible to the actor; others are not found here.
  const [seen] = await tx
    .select({ id: people.id })
    .from(people)
    .innerJoin(memberships, eq(memberships.personId, people.id))
    .where(and(eq(people.email, email), eq(memberships.companyKind, 'vendor'), isNull(people.leftAt)))
  if (invited || seen) throw new AppError('already-invited', 'This contact is already among your vendors.', { contactEmail: 'Already among your vendors.' })
}

/** With the rights of signing in, since the actor may not know; the answer leaves this file in no form. */
async function findKnownContact(ctx: Context, email: string): Promise<Contact | null> {
  const [row] = await asAuth(ctx, (tx) =>
    tx
      .select({ companyId: memberships.companyId, personId: people.id })
      .from(people)
      .innerJoin(memberships, eq(memberships.personId, people.id))
      .where(and(eq(people.email, email), eq(memberships.companyKind, 'vendor'), isNull(people.leftAt)))
      .orderBy(desc(sql`${people.acceptedAt} is not null`), people.createdAt)
      .limit(1),
  )
  return row ?? null
}

async function isLinked(tx: Transaction, actor: Actor, vendorCompanyId: string): Promise<boolean> {
  const own = and(eq(vendorLinks.buyingCompanyId, actor.companyId), eq(vendorLinks.vendorCompanyId, vendorCompanyId))
  return (await tx.$count(vendorLinks, own)) > 0
}

async function createVendor(tx: Transaction, actor: Actor, input: InviteVendor): Promise<Contact> {
  const [companyId, personId] = [randomUUID(), randomUUID()]
  await tx.insert(companies).values({ id: companyId, kind: 'vendor', name: input.name, country: input.country })
  await tx.insert(people).values({ id: personId, name: input.contactName, email: input.contactEmail, invitedBy: actor.personId })
  await tx.insert(memberships).values({ personId, companyId, companyKind: 'vendor', roles: ['vendor'], isFirstContact: true })
  return { companyId, personId }
}

async function link(tx: Transaction, actor: Actor, vendorCompanyId: string, { name, contactName, contactEmail }: InviteVendor): Promise<void> {
  const pair = { buyingCompanyId: actor.companyId, vendorCompanyId }
  await tx.insert(vendorLinks).values({ ...pair, invitedAt: sql`app_now()` })
  await tx.insert(vendorRelations).values({ ...pair, name, contactName, contactEmail })
}

async function mailVendor(tx: Transaction, actor: Actor, personId: string): Promise<void> {
  const [company] = await tx.select({ name: companies.name }).from(companies).where(eq(companies.id, actor.companyId))
  await queueMail(tx, actor, { template: 'vendor-invitation', props: { buyingCompanyName: company!.name }, to: { personId } })
}

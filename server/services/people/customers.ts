import type { Actor, Transaction } from '#server/db/as-actor'
import { companies, vendorLinks } from '#server/db/schema/index'
import { AppError, notFound } from '#server/errors'
import { recordAudit } from '#server/services/audit/record-audit'
import type { Customer } from '#shared/contracts/people'
import { and, eq, isNull, sql, type SQL } from 'drizzle-orm'

/** The buying companies that invited the actor's vendor company. */
export async function listCustomers(tx: Transaction, actor: Actor, which?: SQL): Promise<Customer[]> {
  const rows = await tx
    .select({ company: companies, link: vendorLinks })
    .from(vendorLinks)
    .innerJoin(companies, eq(companies.id, vendorLinks.buyingCompanyId))
    .where(and(eq(vendorLinks.vendorCompanyId, actor.companyId), which))
    .orderBy(companies.name)
  return rows.map(({ company: { id, name, country }, link }) => ({ id, name, country, state: link.acceptedAt ? 'accepted' : 'invited', invitedAt: link.invitedAt.toISOString() }))
}

export async function acceptCustomer(tx: Transaction, actor: Actor, customerId: string): Promise<Customer> {
  const pair = and(eq(vendorLinks.vendorCompanyId, actor.companyId), eq(vendorLinks.buyingCompanyId, customerId))
  const [customer] = await listCustomers(tx, actor, pair)
  if (!customer) throw notFound('customer')
  const accepted = await tx.update(vendorLinks).set({ acceptedAt: sql`app_now()` }).where(and(pair, isNull(vendorLinks.acceptedAt)))
  if (accepted.rowCount === 0) throw new AppError('already-accepted', `${customer.name} is already among your customers.`)
  await recordAudit(tx, actor, { type: 'customer-accepted', buyingCompanyId: customerId }, { companyId: customerId })
  return { ...customer, state: 'accepted' }
}

import type { Actor } from '#server/db/as-actor'
import { purchaseOrders } from '#server/db/schema/orders'
import { eq, sql, type SQL } from 'drizzle-orm'

interface Parties {
  companyId: string
  vendorCompanyId: string
}

const READERS = ['engineer', 'checker', 'quality', 'buyer', 'approver'] as const
const holds = (actor: Actor, roles: readonly Actor['roles'][number][]) => roles.some((role) => actor.roles.includes(role))

/** An order is read by the company that placed it and by the vendor it was placed with. */
export function canReadOrder(actor: Actor, row: Parties): boolean {
  switch (actor.companyKind) {
    case 'buying':
      return actor.companyId === row.companyId && holds(actor, READERS)
    case 'vendor':
      return actor.companyId === row.vendorCompanyId && holds(actor, ['vendor'])
    case 'operator':
      return false
  }
}

/** The same rule as a restriction. */
export function readableOrders(actor: Actor): SQL {
  if (actor.companyKind === 'buying' && holds(actor, READERS)) return eq(purchaseOrders.companyId, actor.companyId)
  if (actor.companyKind === 'vendor' && holds(actor, ['vendor'])) return eq(purchaseOrders.vendorCompanyId, actor.companyId)
  return sql`false`
}

export const canPlaceOrder = (actor: Actor, row: Pick<Parties, 'companyId'>): boolean => actor.companyKind === 'buying' && actor.companyId === row.companyId && holds(actor, ['buyer'])

export const canAcknowledgeOrder = (actor: Actor, row: Pick<Parties, 'vendorCompanyId'>): boolean =>
  actor.companyKind === 'vendor' && actor.companyId === row.vendorCompanyId && holds(actor, ['vendor'])

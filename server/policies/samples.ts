import type { Actor } from '#server/db/as-actor'
import { sampleRequests, sampleSets } from '#server/db/schema/samples'
import { and, eq, isNotNull, sql, type SQL } from 'drizzle-orm'

interface Parties {
  companyId: string
  vendorCompanyId: string
}

const READERS = ['engineer', 'checker', 'quality', 'buyer', 'approver'] as const
const REQUESTERS = ['buyer', 'engineer', 'quality'] as const
const DISPOSERS = ['quality', 'engineer'] as const

const holds = (actor: Actor, roles: readonly Actor['roles'][number][]) => roles.some((role) => actor.roles.includes(role))
const isBuyingSide = (actor: Actor, row: Pick<Parties, 'companyId'>) => actor.companyKind === 'buying' && actor.companyId === row.companyId && holds(actor, READERS)
const isVendorSide = (actor: Actor, row: Pick<Parties, 'vendorCompanyId'>) => actor.companyKind === 'vendor' && actor.companyId === row.vendorCompanyId && actor.roles.includes('vendor')

/** Both parties see a request; no other vendor, and not who only manages accounts. */
export const canReadSampleRequest = (actor: Actor, row: Parties): boolean => isBuyingSide(actor, row) || isVendorSide(actor, row)

/** The same rule as a restriction. */
export function readableSampleRequests(actor: Actor): SQL {
  if (actor.companyKind === 'buying' && holds(actor, READERS)) return eq(sampleRequests.companyId, actor.companyId)
  if (actor.companyKind === 'vendor' && actor.roles.includes('vendor')) return eq(sampleRequests.vendorCompanyId, actor.companyId)
  return sql`false`
}

/** A report is the vendor's alone until it is confirmed. */
export const canReadSampleSet = (actor: Actor, row: Parties & { confirmedAt: Date | null }): boolean =>
  isVendorSide(actor, row) || (isBuyingSide(actor, row) && row.confirmedAt !== null)

/** The same rule as a restriction. */
export function readableSampleSets(actor: Actor): SQL {
  if (actor.companyKind === 'buying' && holds(actor, READERS)) return and(eq(sampleSets.companyId, actor.companyId), isNotNull(sampleSets.confirmedAt))!
  if (actor.companyKind === 'vendor' && actor.roles.includes('vendor')) return eq(sampleSets.vendorCompanyId, actor.companyId)
  return sql`false`
}

export const canRequestSamples = (actor: Actor, row: Pick<Parties, 'companyId'>): boolean => isBuyingSide(actor, row) && holds(actor, REQUESTERS)

export const canReportSamples = (actor: Actor, row: Pick<Parties, 'vendorCompanyId'>): boolean => isVendorSide(actor, row)

export const canDisposeSamples = (actor: Actor, row: Pick<Parties, 'companyId'>): boolean => isBuyingSide(actor, row) && holds(actor, DISPOSERS)

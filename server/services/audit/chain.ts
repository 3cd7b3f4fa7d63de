import type { Transaction } from '#server/db/as-actor'
import { auditChain, auditChainHead, auditEntries } from '#server/db/schema/index'
import { canonicalJson } from '#shared/canonical-json'
import { asc, eq, gt, isNull, sql, and } from 'drizzle-orm'
import { createHash } from 'node:crypto'

/** Where every chain begins; the migration writes the same. */
export const CHAIN_START = createHash('sha256').update('dotside').digest()

/** An entry as it is chained; the moment to the microsecond, as PostgreSQL keeps it. */
const ENTRY = {
  id: auditEntries.id,
  companyId: auditEntries.companyId,
  actorPersonId: auditEntries.actorPersonId,
  actorCompanyId: auditEntries.actorCompanyId,
  sealedBy: auditEntries.sealedBy,
  at: sql<string>`to_char(${auditEntries.at} at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.US"Z"')`,
  area: auditEntries.area,
  event: auditEntries.event,
}

export const nextHash = (previous: Buffer, entry: unknown): Buffer => createHash('sha256').update(previous).update(canonicalJson(entry)).digest()

const BATCH = 500

/**
 * Links committed entries to the chain, oldest first, and returns how many. Writers do not wait for it; only one
 * chains at a time, behind the lock on the head. `everything` looks at all entries, otherwise at those of the
 * last day: no transaction stays open as long.
 */
export async function chainEntries(tx: Transaction, everything: boolean): Promise<number> {
  const [head] = await tx.select().from(auditChainHead).for('update')
  const recent = everything ? undefined : sql`${auditEntries.at} > app_now() - interval '1 day'`
  const entries = await tx
    .select(ENTRY)
    .from(auditEntries)
    .leftJoin(auditChain, eq(auditChain.entryId, auditEntries.id))
    .where(and(isNull(auditChain.entryId), recent))
    .orderBy(asc(auditEntries.at), asc(auditEntries.id))
    .limit(BATCH)
  if (entries.length === 0) return 0

  let { position } = head!
  let hash: Buffer = head!.hash
  const links = entries.map((entry) => {
    position += 1
    hash = nextHash(hash, entry)
    return { position, entryId: entry.id, hash, chainedAt: sql`app_now()` }
  })
  await tx.insert(auditChain).values(links)
  await tx.update(auditChainHead).set({ position, hash })
  return entries.length
}

export interface ChainVerdict {
  linked: number
  /** Position at which the chain does not hold, and why. */
  broken: { position: number; reason: string } | null
  head: string
}

/** Computes the whole chain again from the entries as they are now. */
export async function verifyChain(tx: Transaction): Promise<ChainVerdict> {
  const [head] = await tx.select().from(auditChainHead)
  let position = 0
  let hash: Buffer = CHAIN_START
  const verdict = (reason: string | null, at = position): ChainVerdict => ({ linked: position, broken: reason ? { position: at, reason } : null, head: head!.hash.toString('hex') })
  for (;;) {
    const links = await tx
      .select({ position: auditChain.position, stored: auditChain.hash, entry: ENTRY })
      .from(auditChain)
      .leftJoin(auditEntries, eq(auditEntries.id, auditChain.entryId))
      .where(gt(auditChain.position, position))
      .orderBy(asc(auditChain.position))
      .limit(BATCH)
    if (links.length === 0) break
    for (const link of links) {
      if (link.position !== position + 1) return verdict('a link is missing', position + 1)
      if (!link.entry) return verdict('its entry is missing', link.position)
      hash = nextHash(hash, link.entry)
      if (!hash.equals(link.stored)) return verdict('the entry is not what was chained', link.position)
      position = link.position
    }
  }
  if (position !== head!.position || !hash.equals(head!.hash)) return verdict('links are missing at the end', position + 1)
  return verdict(null)
}

/** Hash of the last link in hex, for records of decision. */
export async function auditChainHeadHash(tx: Transaction): Promise<string> {
  const [head] = await tx.select({ hash: auditChainHead.hash }).from(auditChainHead)
  return head?.hash.toString('hex') ?? ''
}

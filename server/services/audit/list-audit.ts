import type { Actor, Transaction } from '#server/db/as-actor'
import { auditChain, auditEntries, people } from '#server/db/schema/index'
import { readableAuditEntries } from '#server/policies/audit'
import type { QueryOf } from '#shared/contracts/endpoint'
import type { AuditEntry, listAudit as contract } from '#shared/contracts/audit'
import { and, desc, eq, sql, type SQL } from 'drizzle-orm'

/** Newest first; `before` names the last entry of the page before. */
export async function listAudit(tx: Transaction, actor: Actor, { before, type, limit }: QueryOf<typeof contract>): Promise<AuditEntry[]> {
  const rows = await tx
    .select({ entry: auditEntries, actorName: people.name, hash: auditChain.hash })
    .from(auditEntries)
    .leftJoin(people, eq(people.id, auditEntries.actorPersonId))
    .leftJoin(auditChain, eq(auditChain.entryId, auditEntries.id))
    .where(and(readableAuditEntries(actor), type ? sql`${auditEntries.event} ->> 'type' = ${type}` : undefined, before ? olderThan(before) : undefined))
    .orderBy(desc(auditEntries.at), desc(auditEntries.id))
    .limit(limit)
  return rows.map(({ entry, actorName, hash }) => ({
    id: entry.id,
    at: entry.at.toISOString(),
    actorId: entry.actorPersonId,
    actorName,
    area: entry.area,
    event: entry.event,
    chainHash: hash?.toString('hex') ?? null,
  }))
}

const olderThan = (id: string): SQL => sql`(${auditEntries.at}, ${auditEntries.id}) < (select e.at, e.id from ${auditEntries} e where e.id = ${id})`

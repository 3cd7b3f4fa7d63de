import { appNow, type Actor, type Transaction } from '#server/db/as-actor'
import { specificationComments } from '#server/db/schema/index'
import { notFound } from '#server/errors'
import { canComment } from '#server/policies/specifications'
import { recordAudit } from '#server/services/audit/record-audit'
import type { SpecificationComment } from '#shared/contracts/specifications'
import { and, asc, eq } from 'drizzle-orm'
import { findRevision, namesOf, personOf } from './read-revision'
import type { DraftKey } from './write-draft'

/** Oldest first, settled ones with who settled them. */
export async function listComments(tx: Transaction, actor: Actor, key: DraftKey): Promise<SpecificationComment[]> {
  const revision = await findRevision(tx, actor, key.specificationId, key.revisionId)
  const rows = await tx.select().from(specificationComments).where(eq(specificationComments.revisionId, revision.id)).orderBy(asc(specificationComments.at), asc(specificationComments.id))
  const names = await namesOf(tx, rows.flatMap(({ byId, settledBy }) => [byId, settledBy]))
  return rows.map(({ id, place, text, at, byId, settledBy, settledAt }) => ({
    id,
    place,
    text,
    at: at.toISOString(),
    by: personOf(names, byId),
    settled: settledBy === null ? null : { by: personOf(names, settledBy), at: settledAt!.toISOString() },
  }))
}

export async function writeComment(tx: Transaction, actor: Actor, key: DraftKey, input: { place: string; text: string }): Promise<SpecificationComment[]> {
  const revision = await findRevision(tx, actor, key.specificationId, key.revisionId)
  if (!canComment(actor, revision)) throw notFound('revision')
  const [row] = await tx
    .insert(specificationComments)
    .values({ ...input, revisionId: revision.id, companyId: revision.companyId, byId: actor.personId, at: await appNow(tx) })
    .returning({ id: specificationComments.id })
  await recordAudit(tx, actor, { type: 'comment-written', specificationId: revision.specificationId, revisionId: revision.id, commentId: row!.id })
  return listComments(tx, actor, key)
}

/** Settles a comment, or opens it again. Who is second to settle it changes nothing. */
export async function settleComment(tx: Transaction, actor: Actor, key: DraftKey & { commentId: string }, settled: boolean): Promise<SpecificationComment[]> {
  const revision = await findRevision(tx, actor, key.specificationId, key.revisionId)
  if (!canComment(actor, revision)) throw notFound('revision')
  const [row] = await tx
    .select()
    .from(specificationComments)
    .where(and(eq(specificationComments.id, key.commentId), eq(specificationComments.revisionId, revision.id)))
    .for('update')
  if (!row) throw notFound('comment')
  if ((row.settledBy !== null) !== settled) {
    const change = settled ? { settledBy: actor.personId, settledAt: await appNow(tx) } : { settledBy: null, settledAt: null }
    await tx.update(specificationComments).set(change).where(eq(specificationComments.id, row.id))
    await recordAudit(tx, actor, { type: 'comment-settled', specificationId: revision.specificationId, revisionId: revision.id, commentId: row.id, settled })
  }
  return listComments(tx, actor, key)
}

import type { Actor, Transaction } from '#server/db/as-actor'
import { people, specificationOverrides, specificationReleases, specificationRevisions } from '#server/db/schema/index'
import { notFound } from '#server/errors'
import { canReadSpecification } from '#server/policies/specifications'
import { specificationDocumentSchema } from '#shared/contracts/specification-document'
import type { ReleaseSummary, Revision, RevisionSummary } from '#shared/contracts/specifications'
import type { SpecificationDocument } from '#shared/engine/specification'
import { and, eq, inArray } from 'drizzle-orm'

export type RevisionRow = typeof specificationRevisions.$inferSelect
export type ReleaseRow = Omit<typeof specificationReleases.$inferSelect, 'specification' | 'sheets'>

/** The columns of a release that lists show: not its documents, which are large. */
export const RELEASE_COLUMNS = {
  id: specificationReleases.id,
  revisionId: specificationReleases.revisionId,
  companyId: specificationReleases.companyId,
  specificationId: specificationReleases.specificationId,
  pdfFileId: specificationReleases.pdfFileId,
  revision: specificationReleases.revision,
  partNumber: specificationReleases.partNumber,
  title: specificationReleases.title,
  issuedOn: specificationReleases.issuedOn,
  createdByName: specificationReleases.createdByName,
  checkedByName: specificationReleases.checkedByName,
  approvedByName: specificationReleases.approvedByName,
  engine: specificationReleases.engine,
  specificationSha256: specificationReleases.specificationSha256,
  pdfSha256: specificationReleases.pdfSha256,
  createdAt: specificationReleases.createdAt,
}

/** Stored bytes were validated when they were written; what no longer fits the schema is our failure. */
export function readDocument(bytes: Buffer): SpecificationDocument {
  return specificationDocumentSchema.parse(JSON.parse(bytes.toString('utf8')))
}

export async function findRevision(tx: Transaction, actor: Actor, specificationId: string, revisionId: string): Promise<RevisionRow> {
  const [row] = await tx
    .select()
    .from(specificationRevisions)
    .where(and(eq(specificationRevisions.id, revisionId), eq(specificationRevisions.specificationId, specificationId)))
  if (!row || !canReadSpecification(actor, row)) throw notFound('revision')
  return row
}

/** The row locked until the transaction ends, for a change that depends on its state. */
export async function lockRevision(tx: Transaction, actor: Actor, specificationId: string, revisionId: string): Promise<RevisionRow> {
  const [row] = await tx
    .select()
    .from(specificationRevisions)
    .where(and(eq(specificationRevisions.id, revisionId), eq(specificationRevisions.specificationId, specificationId)))
    .for('update')
  if (!row || !canReadSpecification(actor, row)) throw notFound('revision')
  return row
}

export async function readRevision(tx: Transaction, actor: Actor, specificationId: string, revisionId: string): Promise<Revision> {
  return presentRevision(tx, await findRevision(tx, actor, specificationId, revisionId))
}

export async function presentRevision(tx: Transaction, row: RevisionRow): Promise<Revision> {
  const overrides = await overridesInForce(tx, row)
  const names = await namesOf(tx, [row.createdBy, row.checkedBy, ...row.editorIds, ...overrides.map((override) => override.byId)])
  const [release] = await tx.select(RELEASE_COLUMNS).from(specificationReleases).where(eq(specificationReleases.revisionId, row.id))
  return {
    ...summaryOf(row, release ?? null, names),
    specificationId: row.specificationId,
    version: row.version,
    document: readDocument(row.document),
    overrides: overrides.map(({ code, path, reason, byId, at }) => ({ code, path, reason, by: personOf(names, byId), at: at.toISOString() })),
    returnedReason: row.returnedReason,
    withdrawnReason: row.withdrawnReason,
    editors: row.editorIds.map((id) => personOf(names, id)),
  }
}

/** What was let pass in an earlier check does not count in this one: the document changed in between. */
export async function overridesInForce(tx: Transaction, row: Pick<RevisionRow, 'id' | 'submittedAt'>) {
  const rows = await tx.select().from(specificationOverrides).where(eq(specificationOverrides.revisionId, row.id))
  return rows.filter(({ at }) => row.submittedAt !== null && at >= row.submittedAt)
}

export function summaryOf(row: RevisionRow, release: ReleaseRow | null, names: Names): RevisionSummary {
  return {
    id: row.id,
    label: release?.revision ?? `P${row.draftNumber}`,
    state: row.state,
    createdBy: personOf(names, row.createdBy),
    checkedBy: row.checkedBy === null ? null : personOf(names, row.checkedBy),
    updatedAt: row.updatedAt.toISOString(),
    release: release && releaseSummary(release),
  }
}

export function releaseSummary(row: ReleaseRow): ReleaseSummary {
  const { id, revision, issuedOn, specificationSha256, pdfSha256, partNumber, title, engine } = row
  return { id, revision, issuedOn, specificationSha256, pdfSha256, partNumber, title, engine }
}

export type Names = ReadonlyMap<string, string>

export async function namesOf(tx: Transaction, ids: readonly (string | null)[]): Promise<Names> {
  const wanted = [...new Set(ids.filter((id): id is string => id !== null))]
  if (wanted.length === 0) return new Map()
  const rows = await tx.select({ id: people.id, name: people.name }).from(people).where(inArray(people.id, wanted))
  return new Map(rows.map(({ id, name }) => [id, name]))
}

export const personOf = (names: Names, id: string) => ({ id, name: names.get(id) ?? '—' })

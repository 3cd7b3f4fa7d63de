import type { Actor, Transaction } from '#server/db/as-actor'
import { specificationReleases, specificationRevisions, specifications } from '#server/db/schema/index'
import { notFound } from '#server/errors'
import { readableSpecifications } from '#server/policies/specifications'
import type { Specification } from '#shared/contracts/specifications'
import { and, desc, eq, inArray, sql } from 'drizzle-orm'
import { namesOf, personOf, RELEASE_COLUMNS, releaseSummary, summaryOf, type ReleaseRow } from './read-revision'

/** What a list needs of a revision; the documents stay where they are. */
const REVISION_COLUMNS = {
  id: specificationRevisions.id,
  specificationId: specificationRevisions.specificationId,
  companyId: specificationRevisions.companyId,
  basedOnId: specificationRevisions.basedOnId,
  createdBy: specificationRevisions.createdBy,
  checkedBy: specificationRevisions.checkedBy,
  editorIds: specificationRevisions.editorIds,
  draftNumber: specificationRevisions.draftNumber,
  state: specificationRevisions.state,
  version: specificationRevisions.version,
  topology: specificationRevisions.topology,
  figures: specificationRevisions.figures,
  searchText: sql<string>`''`,
  returnedReason: specificationRevisions.returnedReason,
  withdrawnReason: specificationRevisions.withdrawnReason,
  submittedAt: specificationRevisions.submittedAt,
  updatedAt: specificationRevisions.updatedAt,
  createdAt: specificationRevisions.createdAt,
  document: sql<Buffer>`''::bytea`,
  evaluation: sql<Buffer | null>`null::bytea`,
}

export async function readSpecification(tx: Transaction, actor: Actor, specificationId: string): Promise<Specification> {
  const [row] = await tx
    .select()
    .from(specifications)
    .where(and(eq(specifications.id, specificationId), readableSpecifications(actor)))
  if (!row) throw notFound('specification')

  const { revisions, releases } = await revisionsOf(tx, [row.id])
  const names = await namesOf(tx, [row.ownerId, ...revisions.flatMap((revision) => [revision.createdBy, revision.checkedBy])])
  return {
    id: row.id,
    partNumber: row.partNumber,
    title: row.title,
    owner: personOf(names, row.ownerId),
    revisions: revisions.map((revision) => summaryOf(revision, releases.get(revision.id) ?? null, names)),
  }
}

/** Newest draft first. */
async function revisionsOf(tx: Transaction, specificationIds: string[]) {
  const revisions = await tx
    .select(REVISION_COLUMNS)
    .from(specificationRevisions)
    .where(inArray(specificationRevisions.specificationId, specificationIds))
    .orderBy(desc(specificationRevisions.draftNumber))
  const releases = await tx.select(RELEASE_COLUMNS).from(specificationReleases).where(inArray(specificationReleases.specificationId, specificationIds))
  return { revisions, releases: new Map<string, ReleaseRow>(releases.map((release) => [release.revisionId, release])) }
}

/** Released revisions with the news whether they are still in force, for choosing what to enquire about. */
export async function listReleases(tx: Transaction, actor: Actor) {
  const rows = await tx
    .select({ ...RELEASE_COLUMNS, state: specificationRevisions.state })
    .from(specificationReleases)
    .innerJoin(specificationRevisions, eq(specificationRevisions.id, specificationReleases.revisionId))
    .innerJoin(specifications, eq(specifications.id, specificationReleases.specificationId))
    .where(readableSpecifications(actor))
    .orderBy(desc(specificationReleases.createdAt))
  return rows.map((row) => ({ ...releaseSummary(row), specificationId: row.specificationId, revisionId: row.revisionId, current: row.state === 'released' }))
}

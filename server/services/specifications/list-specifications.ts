import type { Actor, Transaction } from '#server/db/as-actor'
import { specificationReleases, specificationRevisions, specifications } from '#server/db/schema/index'
import { notFound } from '#server/errors'
import { readableSpecifications } from '#server/policies/specifications'
import type { Specification, SpecificationSummary } from '#shared/contracts/specifications'
import { and, desc, eq, ilike, inArray, or, sql } from 'drizzle-orm'
import { namesOf, personOf, RELEASE_COLUMNS, releaseSummary, summaryOf, type ReleaseRow, type RevisionRow } from './read-revision'

const MAXIMUM_ROWS = 500

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

interface ListQuery {
  search: string
  state?: RevisionRow['state']
}

export async function listSpecifications(tx: Transaction, actor: Actor, query: ListQuery): Promise<SpecificationSummary[]> {
  const pattern = `%${query.search.replace(/[\\%_]/g, '\\$&')}%`
  const rows = await tx
    .select()
    .from(specifications)
    .where(and(readableSpecifications(actor), query.search ? or(ilike(specifications.partNumber, pattern), ilike(specifications.title, pattern)) : undefined))
    .orderBy(desc(specifications.createdAt))
    .limit(MAXIMUM_ROWS)
  if (rows.length === 0) return []

  const { revisions, releases } = await revisionsOf(
    tx,
    rows.map((row) => row.id),
  )
  const names = await namesOf(tx, [...rows.map((row) => row.ownerId), ...revisions.flatMap((row) => [row.createdBy, row.checkedBy])])

  return rows
    .flatMap((row) => {
      const own = revisions.filter((revision) => revision.specificationId === row.id)
      // A draft that was given up does not hide the release that is in force.
      const current = own.find(({ state }) => state !== 'withdrawn') ?? own[0]
      if (!current || (query.state && current.state !== query.state)) return []
      const { id, partNumber, title } = row
      const summary = summaryOf(current, releases.get(current.id) ?? null, names)
      return [{ id, partNumber, title, topology: current.topology, owner: personOf(names, row.ownerId), updatedAt: summary.updatedAt, current: summary }]
    })
    .sort((a, b) => b.updatedAt.localeCompare(a.updatedAt))
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

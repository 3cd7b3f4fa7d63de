import type { Actor, Transaction } from '#server/db/as-actor'
import { partRows, people, specificationReleases, specificationRevisions, specifications } from '#server/db/schema/index'
import { readableRevisions, readableSpecifications } from '#server/policies/specifications'
import type { QueryOf } from '#shared/contracts/endpoint'
import type { listSpecifications as endpoint, SpecificationPage } from '#shared/contracts/specifications'
import { and, asc, desc, eq, ilike, inArray, or, sql, type SQL } from 'drizzle-orm'
import { searchWords } from './list-columns'
import { namesOf, personOf, RELEASE_COLUMNS, releaseSummary } from './read-revision'

type ListQuery = QueryOf<typeof endpoint>

/** The newest revision of each part; a draft that was given up does not hide the release that is in force. */
const currentRevisions = (tx: Transaction, actor: Actor) =>
  tx
    .selectDistinctOn([specificationRevisions.specificationId], {
      id: specificationRevisions.id,
      specificationId: specificationRevisions.specificationId,
      createdBy: specificationRevisions.createdBy,
      checkedBy: specificationRevisions.checkedBy,
      draftNumber: specificationRevisions.draftNumber,
      state: specificationRevisions.state,
      topology: specificationRevisions.topology,
      figures: specificationRevisions.figures,
      searchText: specificationRevisions.searchText,
      updatedAt: specificationRevisions.updatedAt,
    })
    .from(specificationRevisions)
    .where(readableRevisions(actor))
    .orderBy(specificationRevisions.specificationId, sql`(${specificationRevisions.state} = 'withdrawn')`, desc(specificationRevisions.draftNumber))
    .as('current')

type Current = ReturnType<typeof currentRevisions>

const SORTS = {
  partNumber: () => specifications.partNumber,
  title: () => specifications.title,
  topology: (current: Current) => current.topology,
  state: (current: Current) => current.state,
  revision: (current: Current) => sql`coalesce(${specificationReleases.revision}, 'P' || lpad(${current.draftNumber}::text, 6, '0'))`,
  owner: () => people.name,
  core: (current: Current) => sql`${current.figures} ->> 'core'`,
  inductance: (current: Current) => sql`(${current.figures} ->> 'inductanceH')::float8`,
  updatedAt: (current: Current) => current.updatedAt,
} satisfies Record<string, (current: Current) => unknown>

function orderOf(current: Current, sort: ListQuery['sort']): SQL[] {
  const column = SORTS[sort.replace(/^-/, '') as keyof typeof SORTS](current) as SQL
  const direction = sort.startsWith('-') ? sql`${column} DESC NULLS LAST` : sql`${column} ASC NULLS LAST`
  // Equal rows keep their order from page to page.
  return [direction, asc(specifications.id)]
}

/** Number and title by any part of them, the words of the document by their beginnings. */
function found(current: Current, search: string): SQL | undefined {
  if (search === '') return undefined
  const pattern = `%${search.replace(/[\\%_]/g, '\\$&')}%`
  const words = searchWords(search)
  const inDocument = words.length > 0 ? and(...words.map((word) => sql`strpos(${current.searchText}, ${` ${word}`}) > 0`)) : undefined
  return or(ilike(specifications.partNumber, pattern), ilike(specifications.title, pattern), inDocument)
}

/** One page of the parts of the company with their newest revisions, and how many there are in all. */
export async function listSpecifications(tx: Transaction, actor: Actor, query: ListQuery): Promise<SpecificationPage> {
  const current = currentRevisions(tx, actor)
  const rows = await tx
    .select({
      specification: specifications,
      ownerName: people.name,
      current: { id: current.id, createdBy: current.createdBy, checkedBy: current.checkedBy, draftNumber: current.draftNumber, state: current.state, topology: current.topology, figures: current.figures, updatedAt: current.updatedAt },
      release: RELEASE_COLUMNS, total: sql<number>`(count(*) OVER ())::int`,
    })
    .from(specifications)
    .innerJoin(current, eq(current.specificationId, specifications.id))
    .leftJoin(people, eq(people.id, specifications.ownerId))
    .leftJoin(specificationReleases, eq(specificationReleases.revisionId, current.id))
    .where(
      and(
        readableSpecifications(actor),
        found(current, query.search.trim()),
        query.state && eq(current.state, query.state),
        query.topology ? eq(current.topology, query.topology) : undefined,
        query.owner === 'mine' ? eq(specifications.ownerId, actor.personId) : undefined,
      ),
    )
    .orderBy(...orderOf(current, query.sort))
    .limit(query.limit)
    .offset(query.offset)
  const names = await namesOf(tx, rows.flatMap(({ current: { createdBy, checkedBy } }) => [createdBy, checkedBy]))
  const cores = await coreNames(tx, rows.flatMap(({ current: { figures } }) => figures.core ?? []))
  return {
    total: rows[0]?.total ?? 0,
    rows: rows.map(({ specification: { id, partNumber, title, ownerId }, ownerName, current: revision, release }) => ({
      id,
      partNumber,
      title,
      topology: revision.topology,
      figures: revision.figures.core ? { ...revision.figures, core: cores.get(revision.figures.core) ?? revision.figures.core } : revision.figures,
      owner: { id: ownerId, name: ownerName ?? '—' },
      updatedAt: revision.updatedAt.toISOString(),
      current: {
        id: revision.id,
        label: release?.revision ?? `P${revision.draftNumber}`,
        state: revision.state,
        createdBy: personOf(names, revision.createdBy),
        checkedBy: revision.checkedBy === null ? null : personOf(names, revision.checkedBy),
        updatedAt: revision.updatedAt.toISOString(),
        release: release && releaseSummary(release),
      },
    })),
  }
}

/** What the library calls the cores of a page; a document keeps their identifiers. */
async function coreNames(tx: Transaction, ids: readonly string[]): Promise<Map<string, string>> {
  if (ids.length === 0) return new Map()
  const rows = await tx.select({ id: partRows.partId, name: partRows.name }).from(partRows).where(and(eq(partRows.kind, 'core'), inArray(partRows.partId, [...new Set(ids)]))).orderBy(partRows.version)
  return new Map(rows.map(({ id, name }) => [id, name]))
}

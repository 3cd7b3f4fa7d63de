import type { Actor, Transaction } from '#server/db/as-actor'
import { specificationReleases, specificationRevisions, specifications } from '#server/db/schema/index'
import { isSecondPerson, readableRevisions } from '#server/policies/specifications'
import type { WorklistItem } from '#shared/contracts/worklist'
import { and, eq, gte, inArray, or } from 'drizzle-orm'
import type { WorklistProvider } from './provider'

type Row = Awaited<ReturnType<typeof openRevisions>>[number]

function openRevisions(tx: Transaction, actor: Actor, doneSince: Date) {
  return tx
    .select({
      id: specificationRevisions.id,
      companyId: specificationRevisions.companyId,
      specificationId: specificationRevisions.specificationId,
      draftNumber: specificationRevisions.draftNumber,
      state: specificationRevisions.state,
      editorIds: specificationRevisions.editorIds,
      checkedBy: specificationRevisions.checkedBy,
      returnedReason: specificationRevisions.returnedReason,
      submittedAt: specificationRevisions.submittedAt,
      updatedAt: specificationRevisions.updatedAt,
      partNumber: specifications.partNumber,
      title: specifications.title,
      revision: specificationReleases.revision,
    })
    .from(specificationRevisions)
    .innerJoin(specifications, eq(specifications.id, specificationRevisions.specificationId))
    .leftJoin(specificationReleases, eq(specificationReleases.revisionId, specificationRevisions.id))
    .where(
      and(
        readableRevisions(actor),
        or(inArray(specificationRevisions.state, ['draft', 'in-check']), and(eq(specificationRevisions.state, 'released'), gte(specificationRevisions.updatedAt, doneSince))),
      ),
    )
}

const itemOf = (row: Row, kind: string, route: 'workbench' | 'revision'): Pick<WorklistItem, 'id' | 'kind' | 'dueAt' | 'link'> => ({
  id: `${kind}-${row.id}`,
  kind,
  dueAt: null,
  link: { route, params: { specificationId: row.specificationId, revisionId: row.id } },
})

const openItem = (row: Row, kind: string, route: 'workbench' | 'revision', texts: { title: string; detail: string; since: Date }): WorklistItem => ({
  ...itemOf(row, kind, route),
  title: texts.title,
  detail: texts.detail,
  state: 'open',
  since: texts.since.toISOString(),
})

function itemsFor(actor: Actor, row: Row): WorklistItem[] {
  const worked = row.editorIds.includes(actor.personId)
  const draft = `${row.partNumber}, P${row.draftNumber}`
  if (row.state === 'in-check') {
    if (!actor.roles.includes('checker') || !isSecondPerson(actor, row)) return []
    return [openItem(row, 'revision-check', 'revision', { title: `Check ${draft}`, detail: row.title, since: row.submittedAt ?? row.updatedAt })]
  }
  if (row.state === 'draft') {
    if (!worked || !actor.roles.includes('engineer')) return []
    const returned = row.returnedReason !== null
    return [
      openItem(row, returned ? 'draft-returned' : 'draft-open', 'workbench', {
        title: returned ? `Mend ${draft}, sent back by the checker` : `Go on with ${draft}`,
        detail: returned ? row.returnedReason! : row.title,
        since: row.updatedAt,
      }),
    ]
  }
  if (!worked && row.checkedBy !== actor.personId) return []
  return [{ ...itemOf(row, 'revision-released', 'revision'), title: `${row.partNumber}, revision ${row.revision}, was released`, detail: row.title, state: 'done', since: row.updatedAt.toISOString() }]
}

/** Checks that wait for a second person, drafts that came back, drafts left open, and what was released lately. */
export const specificationItems: WorklistProvider = async (tx, actor, { doneSince }) => {
  if (!actor.roles.includes('engineer') && !actor.roles.includes('checker')) return []
  return (await openRevisions(tx, actor, doneSince)).flatMap((row) => itemsFor(actor, row))
}

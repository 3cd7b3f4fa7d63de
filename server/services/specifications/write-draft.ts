import { appNow, type Actor, type Transaction } from '#server/db/as-actor'
import { specificationReleases, specificationRevisions, specifications } from '#server/db/schema/index'
import { AppError, notFound, violates } from '#server/errors'
import { recordAudit } from '#server/services/audit/record-audit'
import { canEditDraft, canReadSpecification } from '#server/policies/specifications'
import { canonicalJson } from '#shared/canonical-json'
import type { Revision } from '#shared/contracts/specifications'
import type { SpecificationDocument } from '#shared/engine/specification'
import { desc, eq, max } from 'drizzle-orm'
import { keyFigures, searchText } from './list-columns'
import { lockRevision, presentRevision, type RevisionRow } from './read-revision'

interface NewSpecification {
  partNumber: string
  title: string
  document: SpecificationDocument
}

const bytesOf = (document: SpecificationDocument) => Buffer.from(canonicalJson(document), 'utf8')

/** The columns of a revision that follow from its document. */
const documentColumns = (document: SpecificationDocument) => ({
  document: bytesOf(document),
  topology: document.specification.electrical.topology.value,
  figures: keyFigures(document),
  searchText: searchText(document),
})
type DocumentColumns = Pick<RevisionRow, 'document' | 'topology' | 'figures' | 'searchText'>

/** A part with its first draft, P1. */
export async function createSpecification(tx: Transaction, actor: Actor, input: NewSpecification): Promise<Revision> {
  const [specification] = await insertSpecification(tx, actor, input)
  const row = await insertDraft(tx, actor, specification!.id, 1, documentColumns(input.document), null)
  await recordAudit(tx, actor, { type: 'specification-created', specificationId: specification!.id, revisionId: row.id })
  return presentRevision(tx, row)
}

async function insertSpecification(tx: Transaction, actor: Actor, { partNumber, title }: NewSpecification) {
  try {
    return await tx.insert(specifications).values({ companyId: actor.companyId, ownerId: actor.personId, partNumber, title }).returning()
  } catch (error) {
    if (!violates(error, 'specifications_company_part_number_key')) throw error
    throw new AppError('part-number-in-use', `The part number ${partNumber} is taken; choose another or make a new draft of that part.`, {
      partNumber: 'This number is taken.',
    })
  }
}

async function insertDraft(
  tx: Transaction,
  actor: Actor,
  specificationId: string,
  draftNumber: number,
  columns: DocumentColumns,
  basedOnId: string | null,
): Promise<RevisionRow> {
  const [row] = await tx
    .insert(specificationRevisions)
    .values({
      specificationId,
      companyId: actor.companyId,
      createdBy: actor.personId,
      editorIds: [actor.personId],
      draftNumber,
      ...columns,
      basedOnId,
      updatedAt: await appNow(tx),
    })
    .returning()
  return row!
}

/** The next draft, from the newest release. One part has at most one open draft. */
export async function createNextDraft(tx: Transaction, actor: Actor, specificationId: string): Promise<Revision> {
  const [specification] = await tx.select().from(specifications).where(eq(specifications.id, specificationId)).for('update')
  if (!specification || !canReadSpecification(actor, specification)) throw notFound('specification')

  const [based] = await tx
    .select({ columns: { document: specificationRevisions.document, topology: specificationRevisions.topology, figures: specificationRevisions.figures, searchText: specificationRevisions.searchText }, releaseId: specificationReleases.id })
    .from(specificationReleases)
    .innerJoin(specificationRevisions, eq(specificationRevisions.id, specificationReleases.revisionId))
    .where(eq(specificationReleases.specificationId, specificationId))
    .orderBy(desc(specificationRevisions.draftNumber))
    .limit(1)
  if (!based) throw new AppError('conflict', 'Nothing of this part has been released yet; go on with the draft that is open.')

  const [last] = await tx
    .select({ draftNumber: max(specificationRevisions.draftNumber) })
    .from(specificationRevisions)
    .where(eq(specificationRevisions.specificationId, specificationId))
  try {
    const row = await insertDraft(tx, actor, specificationId, (last?.draftNumber ?? 0) + 1, based.columns, based.releaseId)
    await recordAudit(tx, actor, { type: 'draft-created', specificationId, revisionId: row.id })
    return await presentRevision(tx, row)
  } catch (error) {
    if (!violates(error, 'specification_revisions_one_open_key')) throw error
    throw new AppError('draft-open', 'A draft of this part is open already; go on with that one.')
  }
}

export interface DraftKey {
  specificationId: string
  revisionId: string
}

/** Stores a change made from `version`; a draft that somebody changed meanwhile is refused, nothing is lost on either side. */
export async function saveDraft(tx: Transaction, actor: Actor, key: DraftKey, version: number, document: SpecificationDocument): Promise<Revision> {
  const row = await lockDraft(tx, actor, key, version)
  const editorIds = row.editorIds.includes(actor.personId) ? row.editorIds : [...row.editorIds, actor.personId]
  const [saved] = await tx
    .update(specificationRevisions)
    .set({ ...documentColumns(document), editorIds, version: row.version + 1, updatedAt: await appNow(tx) })
    .where(eq(specificationRevisions.id, row.id))
    .returning()
  await keepTitle(tx, row.specificationId, document)
  return presentRevision(tx, saved!)
}

/** Lists show the title of the newest draft. */
async function keepTitle(tx: Transaction, specificationId: string, document: SpecificationDocument): Promise<void> {
  const title = document.specification.title.title.value
  if (title) await tx.update(specifications).set({ title: title.slice(0, 200) }).where(eq(specifications.id, specificationId))
}

export async function lockDraft(tx: Transaction, actor: Actor, { specificationId, revisionId }: DraftKey, version: number): Promise<RevisionRow> {
  const row = await lockRevision(tx, actor, specificationId, revisionId)
  if (!canEditDraft(actor, row)) throw new AppError('not-a-draft', 'Only a draft can be changed; make a new draft of the part.')
  if (row.version !== version) {
    throw new AppError('stale-version', `Somebody stored a change meanwhile (version ${row.version}, yours was made from ${version}). Load theirs and enter yours again.`)
  }
  return row
}


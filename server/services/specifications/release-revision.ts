import type { Context } from '#server/context'
import { appNow, asActor, type Actor, type Transaction } from '#server/db/as-actor'
import { companies, specificationReleases, specificationRevisions } from '#server/db/schema/index'
import { AppError } from '#server/errors'
import { queueMail } from '#server/mail/queue-mail'
import { recordAudit } from '#server/services/audit/record-audit'
import { referToFile } from '#server/services/files/store-file'
import { libraryFor } from '#server/services/parts/library-for'
import { placeOfCheck, type Revision } from '#shared/contracts/specifications'
import type { Library } from '#shared/engine/library'
import type { ReleaseRecord, SpecificationDocument } from '#shared/engine/specification'
import { nextReleaseLetter } from '#shared/workflow/revision-letters'
import { and, desc, eq } from 'drizzle-orm'
import { lockInCheck } from './check-draft'
import { namesOf, overridesInForce, presentRevision, readDocument, type RevisionRow } from './read-revision'
import { sealRelease, type SealedRelease } from './seal-release'
import type { DraftKey } from './write-draft'

interface Preparation {
  row: RevisionRow
  document: SpecificationDocument
  library: Library
  overridden: ReadonlySet<string>
  release: ReleaseRecord
  lastReleaseRevisionId: string | null
}

/**
 * Evaluates, draws and seals a revision in check. The calculation and the PDF are made between two
 * transactions; the second one refuses when the revision moved meanwhile.
 */
export async function releaseRevision(ctx: Context, actor: Actor, key: DraftKey, version: number): Promise<Revision> {
  const preparation = await asActor(ctx, actor, (tx) => prepare(tx, actor, key, version))
  const sealed = await sealRelease(ctx, preparation)
  return asActor(ctx, actor, (tx) => storeRelease(tx, actor, key, preparation, sealed))
}

async function prepare(tx: Transaction, actor: Actor, key: DraftKey, version: number): Promise<Preparation> {
  const row = await lockInCheck(tx, actor, key)
  if (row.version !== version) throw new AppError('stale-version', 'The revision changed meanwhile; load the page again.')

  const last = await lastRelease(tx, row.specificationId)
  const overrides = await overridesInForce(tx, row)
  const names = await namesOf(tx, [row.createdBy, actor.personId])
  return {
    row,
    document: readDocument(row.document),
    library: await libraryFor(tx, actor),
    overridden: new Set(overrides.map(placeOfCheck)),
    release: {
      revision: nextReleaseLetter(last?.revision ?? null),
      issuedOn: await todayIn(tx, actor),
      createdBy: names.get(row.createdBy) ?? '',
      checkedBy: names.get(actor.personId) ?? '',
      approvedBy: names.get(actor.personId) ?? '',
    },
    lastReleaseRevisionId: last?.revisionId ?? null,
  }
}

async function lastRelease(tx: Transaction, specificationId: string) {
  const [row] = await tx
    .select({ revision: specificationReleases.revision, revisionId: specificationReleases.revisionId })
    .from(specificationReleases)
    .where(eq(specificationReleases.specificationId, specificationId))
    .orderBy(desc(specificationReleases.createdAt))
    .limit(1)
  return row
}

/** The date of release is a date where the company is, by the database's clock. */
async function todayIn(tx: Transaction, actor: Actor): Promise<string> {
  const [company] = await tx.select({ timeZone: companies.timeZone }).from(companies).where(eq(companies.id, actor.companyId))
  return new Intl.DateTimeFormat('en-CA', { timeZone: company?.timeZone ?? 'UTC' }).format(await appNow(tx))
}

async function storeRelease(tx: Transaction, actor: Actor, key: DraftKey, preparation: Preparation, sealed: SealedRelease): Promise<Revision> {
  const row = await lockInCheck(tx, actor, key)
  if (row.version !== preparation.row.version) throw new AppError('stale-version', 'The revision changed while its sheets were drawn; load the page again.')
  const { release, document } = preparation

  const file = await referToFile(tx, actor, sealed.file)
  const at = await appNow(tx)
  const [saved] = await tx
    .update(specificationRevisions)
    .set({ state: 'released', checkedBy: actor.personId, evaluation: sealed.evaluation, updatedAt: at, version: row.version + 1 })
    .where(eq(specificationRevisions.id, row.id))
    .returning()
  const [stored] = await tx
    .insert(specificationReleases)
    .values({
      revisionId: row.id,
      companyId: row.companyId,
      specificationId: row.specificationId,
      pdfFileId: file.id,
      revision: release.revision,
      partNumber: document.specification.title.partNumber.value ?? '',
      title: document.specification.title.title.value ?? '',
      issuedOn: release.issuedOn,
      createdByName: release.createdBy,
      checkedByName: release.checkedBy,
      approvedByName: release.approvedBy,
      engine: sealed.engine,
      specification: sealed.specification,
      specificationSha256: sealed.specificationSha256,
      sheets: sealed.sheets,
      pdfSha256: sealed.file.sha256,
    })
    .returning({ id: specificationReleases.id })
  if (preparation.lastReleaseRevisionId) await supersede(tx, preparation.lastReleaseRevisionId, at)

  await recordAudit(tx, actor, {
    type: 'revision-released',
    specificationId: row.specificationId,
    revisionId: row.id,
    releaseId: stored!.id,
    revision: release.revision,
    specificationSha256: sealed.specificationSha256,
    pdfSha256: sealed.file.sha256,
  })
  await queueMail(tx, actor, {
    template: 'revision-released',
    props: { specificationId: row.specificationId, revisionId: row.id, revision: release.revision },
    to: { companyId: actor.companyId, roles: ['buyer', 'engineer'] },
  })
  return presentRevision(tx, saved!)
}

/** One part has one release in force. */
async function supersede(tx: Transaction, revisionId: string, at: Date): Promise<void> {
  await tx
    .update(specificationRevisions)
    .set({ state: 'superseded', updatedAt: at })
    .where(and(eq(specificationRevisions.id, revisionId), eq(specificationRevisions.state, 'released')))
}

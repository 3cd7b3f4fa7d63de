import { appNow, asActor } from '#server/db/as-actor'
import { specificationReleases, specificationRevisions, specifications } from '#server/db/schema/index'
import { keepMadeFile, referToFile } from '#server/services/files/store-file'
import { canonicalJson } from '#shared/canonical-json'
import type { WindingSpecification } from '#shared/engine/specification'
import { eq } from 'drizzle-orm'
import { createHash } from 'node:crypto'
import { blankSpecification } from './blank-specification'
import type { TestPerson } from './factories'
import type { TestApp } from './test-app'

let count = 0

export interface TestRelease {
  id: string
  specificationId: string
  revisionId: string
  partNumber: string
  specificationSha256: string
}

/** A released revision with the bytes that matter to what comes after it; the sheets are empty. */
export async function buildRelease(
  test: TestApp,
  engineer: TestPerson,
  checker: TestPerson,
  partNumber = `T-${++count}`,
  shape: (specification: WindingSpecification) => void = () => undefined,
): Promise<TestRelease> {
  const specification = blankSpecification()
  shape(specification)
  specification.title.partNumber.value = partNumber
  specification.title.title.value = 'Transformer, flyback'
  const document = Buffer.from(canonicalJson({ specification, requirement: null }))
  const { specificationId, revisionId } = await asActor(test.ctx, engineer, async (tx) => {
    const at = await appNow(tx)
    const [row] = await tx.insert(specifications).values({ companyId: engineer.companyId, ownerId: engineer.personId, partNumber, title: 'Transformer, flyback' }).returning()
    const [revision] = await tx
      .insert(specificationRevisions)
      .values({ specificationId: row!.id, companyId: engineer.companyId, createdBy: engineer.personId, editorIds: [engineer.personId], draftNumber: 1, document, updatedAt: at })
      .returning()
    await tx.update(specificationRevisions).set({ state: 'in-check' }).where(eq(specificationRevisions.id, revision!.id))
    return { specificationId: row!.id, revisionId: revision!.id }
  })

  const bytes = Buffer.from(canonicalJson({ specification, release: { revision: 'A' } }))
  const specificationSha256 = createHash('sha256').update(bytes).digest('hex')
  const kept = await keepMadeFile(test.ctx, Buffer.from(`%PDF-1.7 ${partNumber}`), `${partNumber}-A.pdf`, 'pdf')
  const id = await asActor(test.ctx, checker, async (tx) => {
    const file = await referToFile(tx, checker, kept)
    await tx.update(specificationRevisions).set({ state: 'released', checkedBy: checker.personId, evaluation: Buffer.from('{"engine":"test"}') }).where(eq(specificationRevisions.id, revisionId))
    const [release] = await tx
      .insert(specificationReleases)
      .values({
        revisionId,
        specificationId,
        companyId: checker.companyId,
        pdfFileId: file.id,
        revision: 'A',
        partNumber,
        title: 'Transformer, flyback',
        issuedOn: '2026-01-15',
        createdByName: engineer.name,
        checkedByName: checker.name,
        approvedByName: checker.name,
        engine: 'test',
        specification: bytes,
        specificationSha256,
        sheets: Buffer.from('[]'),
        pdfSha256: kept.sha256,
      })
      .returning({ id: specificationReleases.id })
    return release!.id
  })
  return { id, specificationId, revisionId, partNumber, specificationSha256 }
}

import type { Context } from '#server/context'
import { asActor } from '#server/db/as-actor'
import { overrideCheck, returnDraft, submitDraft, withdrawRevision } from '#server/services/specifications/check-draft'
import { listComments, settleComment, writeComment } from '#server/services/specifications/comments'
import { listSpecifications } from '#server/services/specifications/list-page'
import { listReleases, readSpecification } from '#server/services/specifications/list-specifications'
import { downloadCalculation } from '#server/services/specifications/read-calculation'
import { readOutline } from '#server/services/specifications/read-outline'
import { readSpecificationUse } from '#server/services/specifications/read-use'
import { readRevision } from '#server/services/specifications/read-revision'
import { downloadReleasedDocument, downloadSheets, readReleasedResults } from '#server/services/specifications/read-sheets'
import { releaseRevision } from '#server/services/specifications/release-revision'
import { searchCandidates } from '#server/services/specifications/search-candidates'
import { createNextDraft, createSpecification, saveDraft } from '#server/services/specifications/write-draft'
import * as contract from '#shared/contracts/specifications'
import { windingSpecificationSchema } from '#shared/contracts/specification-document'
import { Router } from 'express'
import { z } from 'zod'
import { handle } from './handle'

export function specificationRoutes(ctx: Context): Router {
  const router = Router()

  handle(router, contract.listSpecifications, ({ actor, query }) => asActor(ctx, actor, (tx) => listSpecifications(tx, actor, query)))
  handle(router, contract.searchCandidates, ({ actor, body }) => searchCandidates(ctx, actor, body))
  handle(router, contract.createSpecification, ({ actor, body }) => asActor(ctx, actor, (tx) => createSpecification(tx, actor, body)))
  handle(router, contract.getSpecification, ({ actor, params }) => asActor(ctx, actor, (tx) => readSpecification(tx, actor, params.specificationId)))
  handle(router, contract.specificationUse, ({ actor, params }) => asActor(ctx, actor, (tx) => readSpecificationUse(tx, actor, params.specificationId)))
  handle(router, contract.getRevision, ({ actor, params }) => asActor(ctx, actor, (tx) => readRevision(tx, actor, params.specificationId, params.revisionId)))
  handle(router, contract.createDraft, ({ actor, params }) => asActor(ctx, actor, (tx) => createNextDraft(tx, actor, params.specificationId)))
  handle(router, contract.saveDraft, ({ actor, params, body }) => asActor(ctx, actor, (tx) => saveDraft(tx, actor, params, body.version, body.document)))
  handle(router, contract.submitDraft, ({ actor, params, body }) => asActor(ctx, actor, (tx) => submitDraft(tx, actor, params, body.version)))
  handle(router, contract.returnDraft, ({ actor, params, body }) => asActor(ctx, actor, (tx) => returnDraft(tx, actor, params, body.reason)))
  handle(router, contract.overrideCheck, ({ actor, params, body }) =>
    asActor(ctx, actor, (tx) => overrideCheck(tx, actor, params, body)),
  )
  handle(router, contract.releaseRevision, ({ actor, params, body }) => releaseRevision(ctx, actor, params, body.version))
  handle(router, contract.withdrawRevision, ({ actor, params, body }) => asActor(ctx, actor, (tx) => withdrawRevision(tx, actor, params, body.reason)))
  handle(router, contract.listComments, ({ actor, params }) => asActor(ctx, actor, (tx) => listComments(tx, actor, params)))
  handle(router, contract.writeComment, ({ actor, params, body }) => asActor(ctx, actor, (tx) => writeComment(tx, actor, params, body)))
  handle(router, contract.settleComment, ({ actor, params, body }) => asActor(ctx, actor, (tx) => settleComment(tx, actor, params, body.settled)))
  handle(router, contract.draftPdf, ({ actor, params }) => downloadSheets(ctx, actor, params))
  handle(router, contract.outlineDxf, ({ actor, params }) => asActor(ctx, actor, (tx) => readOutline(tx, actor, params)))
  handle(router, contract.calculationPdf, ({ actor, params }) => downloadCalculation(ctx, actor, params))
  handle(router, contract.releasedDocument, ({ actor, params }) => downloadReleasedDocument(ctx, actor, params))
  handle(router, contract.releasedResults, ({ actor, params }) => asActor(ctx, actor, (tx) => readReleasedResults(tx, actor, params)))
  handle(router, contract.listReleases, ({ actor }) => asActor(ctx, actor, (tx) => listReleases(tx, actor)))
  handle(router, contract.specificationJsonSchema, async () => ({ ...z.toJSONSchema(windingSpecificationSchema, { io: 'input' }) }))

  return router
}

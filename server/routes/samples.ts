import type { Context } from '#server/context'
import { asActor } from '#server/db/as-actor'
import { answerQuestions, saveReport } from '#server/services/samples/answer-questions'
import { confirmSet } from '#server/services/samples/confirm-set'
import { disposeSet } from '#server/services/samples/dispose-set'
import { listSampleRequests, readSampleRequest } from '#server/services/samples/list-samples'
import { cancelSampleRequest, requestSamples } from '#server/services/samples/request-samples'
import { downloadSampleFile, downloadTemplate } from '#server/services/samples/sample-files'
import { uploadEvidence, uploadReport } from '#server/services/samples/upload-report'
import { viewSet } from '#server/services/samples/view-set'
import * as contract from '#shared/contracts/samples'
import { Router } from 'express'
import { handle } from './handle'

export function samplesRoutes(ctx: Context): Router {
  const router = Router()

  handle(router, contract.listSampleRequests, ({ actor, query }) => asActor(ctx, actor, (tx) => listSampleRequests(tx, actor, query.rfqId)))
  handle(router, contract.requestSamples, ({ actor, body }) => asActor(ctx, actor, (tx) => requestSamples(tx, actor, body)))
  handle(router, contract.getSampleRequest, ({ actor, params }) => asActor(ctx, actor, (tx) => readSampleRequest(tx, actor, params.requestId)))
  handle(router, contract.cancelSampleRequest, ({ actor, params, body }) => asActor(ctx, actor, (tx) => cancelSampleRequest(tx, actor, params.requestId, body.reason)))
  handle(router, contract.getSampleSet, ({ actor, params }) => viewSet(ctx, actor, params.setId))
  handle(router, contract.sampleFile, ({ actor, params }) => downloadSampleFile(ctx, actor, params.setId, params.fileId))
  handle(router, contract.disposeSet, ({ actor, params, body }) => disposeSet(ctx, actor, params.setId, body))

  handle(router, contract.listVendorSamples, ({ actor }) => asActor(ctx, actor, (tx) => listSampleRequests(tx, actor)))
  handle(router, contract.getVendorSample, ({ actor, params }) => asActor(ctx, actor, (tx) => readSampleRequest(tx, actor, params.requestId)))
  handle(router, contract.sampleTemplate, ({ actor, params }) => downloadTemplate(ctx, actor, params.requestId))
  // The contract requires the file, so it is there.
  handle(router, contract.uploadReport, ({ actor, params, file }) => uploadReport(ctx, actor, params.requestId, file!))
  handle(router, contract.getVendorSet, ({ actor, params }) => viewSet(ctx, actor, params.setId))
  handle(router, contract.answerQuestions, ({ actor, params, body }) => answerQuestions(ctx, actor, params.setId, body.version, body.answers))
  handle(router, contract.saveReport, ({ actor, params, body }) => saveReport(ctx, actor, params.setId, body.version, body.report))
  handle(router, contract.uploadEvidence, ({ actor, params, file }) => uploadEvidence(ctx, actor, params.setId, file!))
  handle(router, contract.confirmSet, ({ actor, params, body }) => confirmSet(ctx, actor, params.setId, body.version))
  handle(router, contract.vendorSampleFile, ({ actor, params }) => downloadSampleFile(ctx, actor, params.setId, params.fileId))

  return router
}

import type { Context } from '#server/context'
import { asActor } from '#server/db/as-actor'
import { downloadOf } from '#server/services/files/download'
import { removeQuoteFile, saveQuoteDraft, uploadQuoteFile } from '#server/services/quotes/draft-quote'
import { findOpenedQuoteFile, findOwnQuoteFile, listQuotes, readOwnQuote } from '#server/services/quotes/read-quotes'
import { submitQuote, withdrawQuote } from '#server/services/quotes/submit-quote'
import * as contract from '#shared/contracts/quotes'
import { Router } from 'express'
import { handle } from './handle'

export function quoteRoutes(ctx: Context): Router {
  const router = Router()

  handle(router, contract.getOwnQuote, ({ actor, params }) => asActor(ctx, actor, (tx) => readOwnQuote(tx, actor, params.rfqId)))
  handle(router, contract.saveQuoteDraft, ({ actor, params, body: { version, form } }) => asActor(ctx, actor, (tx) => saveQuoteDraft(tx, actor, params.rfqId, version, { form })))
  handle(router, contract.uploadQuoteFile, ({ actor, params, file }) => uploadQuoteFile(ctx, actor, params.rfqId, file!))
  handle(router, contract.removeQuoteFile, ({ actor, params }) => asActor(ctx, actor, (tx) => removeQuoteFile(tx, actor, params.rfqId)))
  handle(router, contract.submitQuote, ({ actor, params, body }) => asActor(ctx, actor, (tx) => submitQuote(tx, actor, params.rfqId, body)))
  handle(router, contract.withdrawQuote, ({ actor, params }) => asActor(ctx, actor, (tx) => withdrawQuote(tx, actor, params.rfqId, params.quoteId)))
  handle(router, contract.ownQuoteFile, async ({ actor, params }) => downloadOf(ctx, await asActor(ctx, actor, (tx) => findOwnQuoteFile(tx, actor, params.rfqId, params.fileId))))
  handle(router, contract.listQuotes, ({ actor, params }) => asActor(ctx, actor, (tx) => listQuotes(tx, actor, params.rfqId)))
  handle(router, contract.quoteFile, async ({ actor, params }) => downloadOf(ctx, await asActor(ctx, actor, (tx) => findOpenedQuoteFile(tx, actor, params.rfqId, params.quoteId))))

  return router
}

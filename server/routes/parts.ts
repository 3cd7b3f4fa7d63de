import type { Context } from '#server/context'
import { asActor } from '#server/db/as-actor'
import { AppError } from '#server/errors'
import { canWriteParts } from '#server/policies/parts'
import { currentLibrary, libraryFor } from '#server/services/parts/library-for'
import { importParts, previewPartImport } from '#server/services/parts/import-parts'
import { listParts } from '#server/services/parts/list-parts'
import { flaggedRows, setFlags } from '#server/services/parts/part-flags'
import { readPart } from '#server/services/parts/read-part'
import { changePart, createPart } from '#server/services/parts/write-part'
import type { ResponseOf } from '#shared/contracts/endpoint'
import * as contract from '#shared/contracts/parts'
import { Router } from 'express'
import { handle } from './handle'

export function partsRoutes(ctx: Context): Router {
  const router = Router()

  handle(router, contract.listParts, ({ actor, query }) => asActor(ctx, actor, (tx) => listParts(tx, actor, query)))

  // Large and seldom changed: the browser asks each time whether its copy still holds, for this session only.
  router.get(contract.getLibrary.path, (_req, res, next) => {
    res.set('cache-control', 'private, no-cache').vary('cookie')
    next()
  })
  handle(router, contract.getLibrary, ({ actor, query }) =>
    asActor(ctx, actor, async (tx) => {
      const library = query.versions === 'all' ? await libraryFor(tx, actor) : await currentLibrary(tx, actor)
      // The engine's rows are read-only, the contract's are not; the figures are the same.
      return library as ResponseOf<typeof contract.getLibrary>
    }),
  )

  handle(router, contract.getPart, ({ actor, params }) => asActor(ctx, actor, (tx) => readPart(tx, actor, params)))

  handle(router, contract.createPart, ({ actor, body }) => {
    if (!canWriteParts(actor)) throw new AppError('not-allowed', 'Only an engineer adds rows to the library.')
    return asActor(ctx, actor, (tx) => createPart(tx, actor, body.row, body.reason))
  })

  handle(router, contract.changePart, ({ actor, params, body }) => {
    if (!canWriteParts(actor)) throw new AppError('not-allowed', 'Only an engineer changes rows of the library.')
    return asActor(ctx, actor, (tx) => changePart(tx, actor, params, body))
  })

  handle(router, contract.getPartFlags, ({ actor }) => asActor(ctx, actor, (tx) => flaggedRows(tx, actor)))

  handle(router, contract.setPartFlags, ({ actor, params, body }) => {
    if (!canWriteParts(actor)) throw new AppError('not-allowed', 'Only an engineer says which rows are preferred or in the store.')
    return asActor(ctx, actor, (tx) => setFlags(tx, actor, params, body))
  })

  handle(router, contract.previewPartImport, async ({ actor, body, file }) => {
    if (!canWriteParts(actor)) throw new AppError('not-allowed', 'Only an engineer takes rows into the library.')
    return previewPartImport(ctx, actor, body.kind, file!)
  })

  handle(router, contract.importParts, async ({ actor, body, file }) => {
    if (!canWriteParts(actor)) throw new AppError('not-allowed', 'Only an engineer takes rows into the library.')
    return importParts(ctx, actor, body, file!)
  })

  return router
}

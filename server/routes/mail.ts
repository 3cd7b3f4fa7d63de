import type { Context } from '#server/context'
import { asActor } from '#server/db/as-actor'
import { listUndeliverable, readMailHealth, retryMail } from '#server/services/mail/undeliverable'
import * as contract from '#shared/contracts/mail'
import { Router } from 'express'
import { handle } from './handle'

export function mailRoutes(ctx: Context): Router {
  const router = Router()
  handle(router, contract.listUndeliverable, ({ actor }) => asActor(ctx, actor, (tx) => listUndeliverable(tx, actor)))
  handle(router, contract.retryMail, ({ actor, params }) =>
    asActor(ctx, actor, async (tx) => {
      await retryMail(tx, actor, params.mailId)
      return {}
    }),
  )
  handle(router, contract.readMailHealth, ({ actor }) => asActor(ctx, actor, (tx) => readMailHealth(tx)))
  return router
}

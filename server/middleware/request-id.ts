import { stateOf } from '#server/routes/request-state'
import type { RequestHandler } from 'express'
import { randomUUID } from 'node:crypto'

/** Gives every request a number that stands in the answer and in the log. */
export const requestId: RequestHandler = (_req, res, next) => {
  const state = stateOf(res)
  state.requestId = randomUUID()
  state.session = null
  res.set('x-request-id', state.requestId)
  next()
}

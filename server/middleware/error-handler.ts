import type { Context } from '#server/context'
import { AppError, databaseError } from '#server/errors'
import { stateOf } from '#server/routes/request-state'
import type { ErrorBody } from '#shared/contracts/errors'
import type { ErrorRequestHandler, Request } from 'express'

/** Serialization failure, deadlock, lock not to be had in time: nothing was done, trying again helps. */
const BUSY = new Set(['40001', '40P01', '55P03'])
/** A value that a column cannot hold and no contract has caught: too large, too long, no such character. */
const DOES_NOT_FIT = new Set(['22001', '22003', '22008', '22021', '22P05'])

export const errorHandler =
  (ctx: Context): ErrorRequestHandler =>
  (error: unknown, req, res, _next) => {
    const { requestId } = stateOf(res)
    const failure = failureOf(error)
    const fields = { requestId, method: req.method, route: routeOf(req), error }
    if (failure.code === 'internal') ctx.logger.error('Request failed', fields)
    else if (!(error instanceof AppError)) ctx.logger.warn('Request refused', fields)
    if (res.headersSent) return res.destroy()
    const body: ErrorBody = { code: failure.code, message: failure.message, fields: failure.fields, requestId }
    res.status(failure.status).json(body)
  }

// Not the address itself, which may hold what nobody should read in a log.
const routeOf = (req: Request): string => (req.route as { path?: string } | undefined)?.path ?? 'none'

function failureOf(error: unknown): AppError {
  if (error instanceof AppError) return error
  const database = databaseError(error)
  if (database && BUSY.has(database.code)) return new AppError('busy', 'Somebody else is changing this at the same moment; nothing was changed. Please try again.')
  if (database && DOES_NOT_FIT.has(database.code)) return new AppError('invalid-input', 'A value is too large or too long to be kept; nothing was changed.')
  return parserFault(error) ?? new AppError('internal', 'This failed on our side; nothing was changed. Please try again, and tell the operator the number of the request if it stays so.')
}

/** Faults of the request that Express and its body parser find before we do. */
function parserFault(error: unknown): AppError | null {
  if (!(error instanceof Error) || !('status' in error) || typeof error.status !== 'number' || error.status < 400 || error.status >= 500) return null
  // A file of the client that is not there: the message would name a folder of this machine.
  if (error.status === 404) return new AppError('not-found', 'There is no such address.')
  if (error.status === 413) return new AppError('body-too-large', 'The request is larger than 2 MB.')
  if ('type' in error && error.type === 'entity.parse.failed') return new AppError('invalid-json', `The request is not JSON: ${error.message}`)
  return new AppError('invalid-input', `The request cannot be read: ${error.message}`)
}

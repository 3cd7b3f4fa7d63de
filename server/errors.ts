import { ERROR_STATUS, type ErrorCode } from '#shared/contracts/errors'

/** A failure the caller is told about: a permanent code and a sentence saying what, where and what to do. */
export class AppError extends Error {
  override readonly name = 'AppError'

  constructor(
    readonly code: ErrorCode,
    message: string,
    readonly fields?: Readonly<Record<string, string>>,
  ) {
    super(message)
  }

  get status(): number {
    return ERROR_STATUS[this.code]
  }
}

/** Absent and not yours answer alike: `what` is the same word in both cases. */
export const notFound = (what: string) => new AppError('not-found', `There is no such ${what}, or it is not yours to see.`)

/** The PostgreSQL error behind an error of the query builder, if there is one. */
export function databaseError(error: unknown): { code: string; constraint?: string } | null {
  for (let cause: unknown = error; cause instanceof Error; cause = cause.cause) {
    if ('code' in cause && typeof cause.code === 'string' && /^[0-9A-Z]{5}$/.test(cause.code)) {
      return { code: cause.code, constraint: 'constraint' in cause && typeof cause.constraint === 'string' ? cause.constraint : undefined }
    }
  }
  return null
}

/** True when the error is a violation (unique, check or foreign key) of the named constraint or index. */
export const violates = (error: unknown, constraint: string): boolean => databaseError(error)?.constraint === constraint

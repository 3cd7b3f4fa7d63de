import type { ErrorBody, ErrorCode } from '#shared/contracts/errors'

/** Failures that only the browser's end can meet, beside those of the contract. */
export type ClientErrorCode = ErrorCode | 'no-connection' | 'stopped' | 'answer-unreadable'

/** Every failed call ends in one of these; `message` is a sentence that can be shown. */
export class ApiError extends Error {
  readonly code: ClientErrorCode
  /** Dotted input path → what is wrong there. */
  readonly fields: Readonly<Record<string, string>>
  readonly requestId: string | undefined

  constructor({ code, message, fields, requestId }: Omit<ErrorBody, 'code'> & { code: ClientErrorCode }) {
    super(message)
    this.name = 'ApiError'
    this.code = code
    this.fields = fields ?? {}
    this.requestId = requestId
  }
}

export const noConnection = () =>
  new ApiError({ code: 'no-connection', message: 'The server could not be reached. What you typed is still here; try again.' })

export const stopped = () => new ApiError({ code: 'stopped', message: 'Stopped.' })

export const answerUnreadable = () =>
  new ApiError({ code: 'answer-unreadable', message: 'The server’s answer could not be read. Reload the page; the program may have been renewed.' })

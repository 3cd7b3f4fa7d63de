import { z } from 'zod'

/**
 * Every failure a caller can meet, with its HTTP status (RFC 9110, RFC 6585).
 * Codes are permanent: clients and tests decide by them, so add codes, never rename or reuse one.
 */
export const ERROR_STATUS = {
  'not-signed-in': 401,
  'sign-in-refused': 401,
  'too-many-attempts': 429,
  'wrong-origin': 403,
  'not-allowed': 403,
  'second-person-needed': 403,
  'not-found': 404,
  'invalid-input': 400,
  'invalid-json': 400,
  'body-too-large': 413,
  'link-expired': 410,
  'address-in-use': 409,
  'already-invited': 409,
  'already-decided': 409,
  'already-accepted': 409,
  conflict: 409,
  busy: 409,
  'file-empty': 400,
  'file-missing': 400,
  'file-name-mismatch': 400,
  'file-unreadable': 400,
  'file-too-large': 413,
  'file-type-not-accepted': 415,
  'part-number-in-use': 409,
  'part-id-in-use': 409,
  'draft-open': 409,
  'not-a-draft': 409,
  'not-in-check': 409,
  'stale-version': 409,
  'rfq-issued': 409,
  'rfq-closed': 409,
  'rfq-cancelled': 409,
  'terms-not-accepted': 409,
  'too-early': 409,
  'release-stopped': 409,
  'unprintable-text': 409,
  'rfq-not-opened': 409,
  'questions-open': 409,
  'answer-not-fitting': 400,
  'report-missing': 409,
  'already-confirmed': 409,
  'disposition-not-possible': 409,
  'request-cancelled': 409,
  'rate-missing': 400,
  'price-missing': 409,
  'line-awarded': 409,
  'offer-expired': 409,
  'comparison-changed': 409,
  'over-limit': 403,
  'limit-currency': 403,
  'not-approved': 409,
  'already-ordered': 409,
  'already-acknowledged': 409,
  internal: 500,
} as const satisfies Record<string, number>

export type ErrorCode = keyof typeof ERROR_STATUS

export const ERROR_CODES = Object.keys(ERROR_STATUS) as [ErrorCode, ...ErrorCode[]]

/** The body of every answer that is not a success. `fields` maps a dotted input path to what is wrong there. */
export const errorBodySchema = z.object({
  code: z.enum(ERROR_CODES),
  message: z.string(),
  fields: z.record(z.string(), z.string()).optional(),
  requestId: z.string().optional(),
})

export type ErrorBody = z.infer<typeof errorBodySchema>

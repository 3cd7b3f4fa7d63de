import { z } from 'zod'
import { ROLES } from './endpoint'

/** Limits of text that both ends know. Counted in UTF-16 units, as the browser's maxlength does. */
export const TEXT_LIMITS = { name: 120, line: 200, email: 254, note: 4000, password: 200, passwordMinimum: 12 } as const

/** Longest text that is written in one line; what may be longer has paragraphs. */
const LONGEST_LINE = TEXT_LIMITS.email

/** Characters that turn the direction of writing (UAX #9) and control characters other than tab and line end. */
const UNSEEN = /[\u202a-\u202e\u2066-\u2069\u0001-\u0008\u000b\u000c\u000e-\u001f\u007f]/g

/** Without unseen characters, and a line as one line: a name must not write a line of its own into a mail or a sheet. */
const visible = (limit: number) => (text: string) => (limit > LONGEST_LINE ? text : text.replace(/\s*[\r\n\u2028\u2029]+\s*/g, ' ')).replace(UNSEEN, '').trim()

/** Text with content, trimmed; says what is missing in a sentence. */
export const requiredText = (what: string, limit: number = TEXT_LIMITS.line) =>
  z
    .string({ error: `${what} is missing.` })
    .overwrite(visible(limit))
    .min(1, `${what} is missing.`)
    .max(limit, `${what} has more than ${limit} characters.`)

export const optionalText = (what: string, limit: number = TEXT_LIMITS.line) =>
  z.string().overwrite(visible(limit)).max(limit, `${what} has more than ${limit} characters.`)

/** A mail address in lower case (RFC 5321 leaves the local part to the receiver; no system in use tells its case apart). */
export const emailSchema = z
  .string({ error: 'The mail address is missing.' })
  .trim()
  .max(TEXT_LIMITS.email, `A mail address has at most ${TEXT_LIMITS.email} characters (RFC 5321).`)
  .toLowerCase()
  .pipe(z.email('This is not a mail address; it is written like name@company.example.'))

export const passwordSchema = z
  .string({ error: 'The password is missing.' })
  .min(TEXT_LIMITS.passwordMinimum, `A password has at least ${TEXT_LIMITS.passwordMinimum} characters.`)
  .max(TEXT_LIMITS.password, `A password has at most ${TEXT_LIMITS.password} characters.`)

export const idSchema = z.uuid('This is not an identifier.')
export const roleSchema = z.enum(ROLES)

/** Currency code (ISO 4217). */
export const currencySchema = z.string().regex(/^[A-Z]{3}$/, 'A currency is written with its three letters, such as EUR (ISO 4217).')

/** Country code (ISO 3166-1 alpha-2). */
export const countrySchema = z.string().regex(/^[A-Z]{2}$/, 'A country is written with its two letters, such as DE (ISO 3166-1).')

/** Decimal text with six places, as PostgreSQL numeric(18,6) returns it. Never a float. */
export const moneySchema = z.string().regex(/^\d{1,12}\.\d{6}$/)

/** Decimal text as entered, with a point and at most six places; at most twelve digits before it. */
export const moneyInputSchema = z
  .string('The amount is missing.')
  .trim()
  .regex(/^\d{1,12}(\.\d{1,6})?$/, 'An amount is written as digits with a decimal point and at most six places.')

/** A moment (ISO 8601, UTC, as the server sends it). */
export const momentSchema = z.iso.datetime()

/** A time zone of the IANA database, such as Europe/Berlin. */
export const timeZoneSchema = z.string().regex(/^[A-Za-z_]+(\/[A-Za-z0-9_+-]+){0,2}$/, 'A time zone is written like Europe/Berlin.')

export const pageQuerySchema = z.strictObject({
  limit: z.coerce.number().int().min(1).max(500).default(100),
  offset: z.coerce.number().int().min(0).max(1_000_000).default(0),
})

import { wellFormed } from '#server/well-formed'
import { AppError } from '#server/errors'
import type { z } from 'zod'

/** No contract goes deeper than a dozen levels; what is nested without end would exhaust the stack. */
const DEEPEST = 40
/** Faults that an answer names; a person mends the first few, and an answer should not outgrow its request. */
const MOST_FAULTS = 100

/** Fits the caller's input to the contract, or tells the caller what does not fit and where. */
export function parseInput<S extends z.ZodType>(schema: S, value: unknown): z.output<S> {
  const parsed = schema.safeParse(cleaned(value, '', 0))
  if (parsed.success) return parsed.data
  throw invalidInput(parsed.error)
}

/**
 * Text fields of a form: text stays text where the contract asks for text; other fields are JSON values
 * (numbers, lists, truth values), as a form has only text.
 */
export function parseForm<S extends z.ZodType>(schema: S, fields: Record<string, unknown>): z.output<S> {
  const asText = schema.safeParse(fields)
  if (asText.success) return parseInput(schema, fields)
  const wrongType = new Set(asText.error.issues.map((issue) => String(issue.path[0])))
  const asValues = Object.entries(fields).map(([key, value]) => [key, wrongType.has(key) ? jsonOrText(value) : value])
  return parseInput(schema, Object.fromEntries(asValues))
}

function jsonOrText(value: unknown): unknown {
  try {
    return JSON.parse(String(value))
  } catch {
    return value
  }
}

function invalidInput(error: z.ZodError): AppError {
  const fields: Record<string, string> = {}
  for (const issue of error.issues.slice(0, MOST_FAULTS)) {
    const message = issue.code === 'unrecognized_keys' ? `Not known here: ${issue.keys.join(', ')}.` : issue.message
    fields[issue.path.join('.')] ??= message
  }
  const [where, first] = Object.entries(fields)[0] ?? ['', 'The request does not fit.']
  return new AppError('invalid-input', where ? `Please correct “${where}”: ${first}` : first, fields)
}

/** Text in normalization form C. PostgreSQL holds no character U+0000, so it is refused here. */
function cleaned(value: unknown, path: string, depth: number): unknown {
  if (typeof value === 'string') return cleanedText(value, path)
  if (typeof value !== 'object' || value === null) return value
  if (depth >= DEEPEST) throw new AppError('invalid-input', `The request is nested deeper than ${DEEPEST} levels; nothing here is.`, { [path]: 'Nested too deeply.' })
  if (Array.isArray(value)) return value.map((item, index) => cleaned(item, join(path, String(index)), depth + 1))
  return Object.fromEntries(Object.entries(value).map(([key, member]) => [cleanedText(key, path), cleaned(member, join(path, key), depth + 1)]))
}

const join = (path: string, key: string) => (path ? `${path}.${key}` : key)

function cleanedText(text: string, path: string): string {
  if (text.includes('\u0000')) throw new AppError('invalid-input', 'A text holds the character U+0000, which cannot be kept; remove it.', { [path]: 'Holds the character U+0000.' })
  return wellFormed(text)
}

import type { z } from 'zod'
import { valueAt } from '../document-paths'

/** One thing in a file that does not fit, by its place in the file. */
export interface Misfit {
  /** Dotted path; empty for the file as a whole. */
  path: string
  sentence: string
}

type Issue = z.core.$ZodIssue

const KINDS: Readonly<Record<string, string>> = { string: 'a text', number: 'a number', int: 'a whole number', boolean: 'true or false', array: 'a list', object: 'an object', null: 'nothing (null)' }

const found = (value: unknown): string => {
  if (value === undefined) return 'it is missing'
  if (value === null) return 'it is empty (null)'
  if (Array.isArray(value)) return 'a list stands there'
  if (typeof value === 'object') return 'an object stands there'
  return `“${String(value).slice(0, 60)}” stands there`
}
const listed = (values: readonly unknown[]) => values.map((value) => `“${String(value)}”`).join(', ')

function sentence(issue: Issue, value: unknown): string {
  switch (issue.code) {
    case 'invalid_type':
      return value === undefined ? 'The field is missing.' : `Expected ${KINDS[issue.expected] ?? issue.expected}, but ${found(value)}.`
    case 'invalid_value':
      return issue.values.length === 1 ? `Must be ${listed(issue.values)}, but ${found(value)}.` : `Must be one of ${listed(issue.values)}, but ${found(value)}.`
    case 'unrecognized_keys':
      return `This program knows no ${issue.keys.length === 1 ? 'field' : 'fields'} ${listed(issue.keys)} here.`
    case 'invalid_union':
      return `None of the forms that are possible here fits; ${found(value)}.`
    default:
      return `${issue.message.replace(/\.?$/, '')}; ${found(value)}.`
  }
}

/** What a schema refuses in a value, each by its path, in sentences. */
export const misfits = (error: z.ZodError, value: unknown): Misfit[] =>
  error.issues.map((issue) => {
    const path = issue.path.join('.')
    return { path, sentence: sentence(issue, path === '' ? value : valueAt(value, path)) }
  })

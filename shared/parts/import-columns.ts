import { z } from 'zod'
import { coreDraftSchema, formerDraftSchema, materialDraftSchema, sleeveDraftSchema, tapeDraftSchema, wireDraftSchema } from '#shared/contracts/part-rows'
import type { LibraryKind } from '#shared/engine/library'

/** One column of the table in which rows of a kind are handed in: its heading is the dotted path of the field. */
export interface ImportColumn {
  path: string
  /** `list`: values set apart by blanks. `lines`: a list of records as JSON. */
  holds: 'text' | 'choice' | 'figure' | 'list' | 'lines'
  /** Whether a new row needs a value here. */
  required: boolean
  /** What a cell may say, where that is settled. */
  choices: readonly string[]
  /** Keys of the records of `lines`. */
  keys: readonly string[]
}

const DRAFTS = { core: coreDraftSchema, former: formerDraftSchema, material: materialDraftSchema, wire: wireDraftSchema, tape: tapeDraftSchema, sleeve: sleeveDraftSchema } as const

export const draftSchemaOf = (kind: LibraryKind) => DRAFTS[kind]

/** The columns of a kind, in the order of its fields; taken from the schema of the row, so that neither parts from the other. */
export function importColumns(kind: LibraryKind): ImportColumn[] {
  return columnsOf(draftSchemaOf(kind), '', true).filter(({ path }) => path !== 'kind')
}

export const joinPath = (path: string, key: string): string => (path === '' ? key : `${path}.${key}`)

/** The schema under `optional` and `nullable`, and whether there was either. */
export function unwrapped(schema: z.ZodType): { inner: z.ZodType; optional: boolean } {
  if (!(schema instanceof z.ZodOptional) && !(schema instanceof z.ZodNullable)) return { inner: schema, optional: false }
  return { inner: unwrapped(schema.unwrap() as z.ZodType).inner, optional: true }
}

/** The fields of all variants of a union, each once; the same key holds the same kind of value in each. */
export function variantShape(union: z.ZodDiscriminatedUnion): Record<string, z.ZodType> {
  return Object.assign({}, ...[...union.options].reverse().map((option) => (option as z.ZodObject).shape)) as Record<string, z.ZodType>
}

function columnsOf(schema: z.ZodType, path: string, required: boolean): ImportColumn[] {
  const { inner, optional } = unwrapped(schema)
  const needed = required && !optional
  if (inner instanceof z.ZodObject) return Object.entries(inner.shape as Record<string, z.ZodType>).flatMap(([key, member]) => columnsOf(member, joinPath(path, key), needed))
  if (inner instanceof z.ZodDiscriminatedUnion) return variantColumns(inner, path, needed)
  return [leafColumn(inner, path, needed)]
}

function variantColumns(union: z.ZodDiscriminatedUnion, path: string, required: boolean): ImportColumn[] {
  const choices = union.options.map((option) => String(((option as z.ZodObject).shape.shape as z.ZodLiteral).value))
  return Object.entries(variantShape(union)).flatMap(([key, member]) =>
    key === 'shape' ? [{ path: joinPath(path, key), holds: 'choice', required, choices, keys: [] } satisfies ImportColumn] : columnsOf(member, joinPath(path, key), false),
  )
}

function leafColumn(schema: z.ZodType, path: string, needed: boolean): ImportColumn {
  const column = { path, choices: [], keys: [] }
  if (schema instanceof z.ZodEnum) return { ...column, holds: 'choice', required: needed, choices: schema.options.map(String) }
  if (schema instanceof z.ZodNumber) return { ...column, holds: 'figure', required: needed }
  if (schema instanceof z.ZodArray) {
    const required = needed && !schema.safeParse([]).success
    const { element } = schema
    return element instanceof z.ZodObject ? { ...column, holds: 'lines', required, keys: Object.keys(element.shape) } : { ...column, holds: 'list', required }
  }
  return { ...column, holds: 'text', required: needed && !schema.safeParse('').success }
}

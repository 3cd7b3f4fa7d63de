import { specificationDocumentSchema, windingSpecificationSchema } from '#shared/contracts/specification-document'
import { RELEASED_SCHEMA, referencesOf } from '#shared/engine/released'
import type { Library } from '#shared/engine/library'
import { SPECIFICATION_SCHEMA, type SpecificationDocument } from '#shared/engine/specification'
import { isTree } from '#shared/workflow/document-rows'
import { referenceKey, rowsOf } from '../entries/choice-sources'
import { misfits, type Misfit } from './misfit-words'

export type ReadFile =
  | { kind: 'fits'; document: SpecificationDocument; /** References to library rows that the library does not hold. */ missing: readonly string[] }
  | { kind: 'misfits'; misfits: readonly Misfit[] }

export const MAXIMUM_BYTES = 2_000_000

const wrong = (sentence: string, path = ''): ReadFile => ({ kind: 'misfits', misfits: [{ path, sentence }] })

/**
 * Reads a specification from the text of a file: a winding specification by the published schema, one with its requirement
 * sheet, or a released one. All of it fits, or a list says by path what does not.
 */
export function readSpecificationFile(text: string, library: Library): ReadFile {
  const parsed = parse(text)
  if ('failure' in parsed) return wrong(parsed.failure)
  const { value } = parsed
  if (!isTree(value)) return wrong('The file holds no object: a winding specification begins with { and names its schema.')
  if (value.schema === RELEASED_SCHEMA) return readWhole({ specification: value.specification, requirement: null }, 'specification', library)
  if ('specification' in value) return readWhole({ specification: value.specification, requirement: value.requirement ?? null }, '', library)
  if (value.schema !== SPECIFICATION_SCHEMA) return foreign(value)
  return readWhole({ specification: value, requirement: null }, 'bare', library)
}

function parse(text: string): { value: unknown } | { failure: string } {
  if (text.trim() === '') return { failure: 'The file is empty.' }
  try {
    return { value: JSON.parse(text.replace(/^\uFEFF/, '')) as unknown }
  } catch (error) {
    return { failure: `The file is not JSON: ${error instanceof Error ? error.message : String(error)}.` }
  }
}

/** A file that names another schema is told so first; what else does not fit follows. */
function foreign(value: Readonly<Record<string, unknown>>): ReadFile {
  const says = typeof value.schema === 'string' ? `This file follows the schema “${value.schema.slice(0, 80)}”` : 'This file names no schema'
  const others = windingSpecificationSchema.safeParse({ ...value, schema: SPECIFICATION_SCHEMA })
  return { kind: 'misfits', misfits: [{ path: 'schema', sentence: `${says}; this program reads “${SPECIFICATION_SCHEMA}”.` }, ...(others.success ? [] : misfits(others.error, value))] }
}

function readWhole(document: { specification: unknown; requirement: unknown }, form: 'specification' | 'bare' | '', library: Library): ReadFile {
  const parsed = specificationDocumentSchema.safeParse(document)
  if (!parsed.success) return { kind: 'misfits', misfits: misfits(parsed.error, document).map((one) => (form === 'bare' ? { ...one, path: one.path.replace(/^specification\.?/, '') } : one)) }
  const doubled = doubledIds(parsed.data.specification)
  if (doubled.length > 0) return { kind: 'misfits', misfits: doubled }
  return { kind: 'fits', document: parsed.data, missing: missingRows(parsed.data, library) }
}

/** Rows are told apart by their ids, so two of one id would be one row to everything that names it. */
function doubledIds(tree: unknown, path = ''): Misfit[] {
  if (Array.isArray(tree)) {
    const ids = tree.map((row: unknown) => (isTree(row) && typeof row.id === 'string' ? row.id : null))
    return ids.flatMap((id, index) => (id !== null && ids.indexOf(id) !== index ? [{ path: `${path}.${index}.id`, sentence: `“${id}” is the id of row ${ids.indexOf(id) + 1} too; each row needs its own.` }] : []))
  }
  return isTree(tree) ? Object.entries(tree).flatMap(([key, value]) => doubledIds(value, path === '' ? key : `${path}.${key}`)) : []
}

const missingRows = ({ specification }: SpecificationDocument, library: Library): string[] =>
  referencesOf(specification)
    .filter((reference) => !rowsOf(library, reference.kind).some((row) => referenceKey(row) === referenceKey(reference)))
    .map(({ kind, id, version }) => `${kind} ${id}, version ${version}`)

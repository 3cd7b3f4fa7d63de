import { z } from 'zod'
import { partProblems } from '#shared/contracts/part-rules'
import type { PartDraft } from '#shared/contracts/part-rows'
import type { LibraryKind } from '#shared/engine/library'
import { draftSchemaOf, joinPath, unwrapped, variantShape, type ImportColumn } from './import-columns'
import { readImportFigure, readImportLines, readImportList, type CellValue, type ImportCell } from './read-import-cell'

export interface CellProblem {
  /** Heading of the column; empty when the whole row is meant. */
  column: string
  message: string
}

/** A fault with its row of the spreadsheet; the headings are row 1. */
export interface TableProblem extends CellProblem {
  line: number
}

export type Assembled = { draft: PartDraft; problems: [] } | { draft: null; problems: CellProblem[] }

/** The cells of one row by the path of their field. */
export type RowCells = ReadonlyMap<string, ImportCell>

/** Builds a row of the library from its cells and says cell by cell what does not fit. */
export function assembleDraft(kind: LibraryKind, columns: readonly ImportColumn[], cells: RowCells): Assembled {
  const problems = new Map<string, string>()
  const builder: Builder = { cells, columns: new Map(columns.map((column) => [column.path, column])), problems }
  const parsed = draftSchemaOf(kind).safeParse(build(draftSchemaOf(kind), '', builder))
  for (const issue of parsed.error?.issues ?? []) noteIssue(builder, issue)
  if (parsed.success && problems.size === 0) for (const { path, message } of partProblems(parsed.data)) note(builder, path, message)
  if (parsed.success && problems.size === 0) return { draft: parsed.data, problems: [] }
  return { draft: null, problems: [...problems].map(([column, message]) => ({ column, message })) }
}

interface Builder {
  cells: RowCells
  columns: ReadonlyMap<string, ImportColumn>
  problems: Map<string, string>
}

function build(schema: z.ZodType, path: string, builder: Builder): unknown {
  const { inner, optional } = unwrapped(schema)
  // Nullable within optional: what is left empty is absent, as in rows that never had the field.
  if (optional && isEmpty(path, builder)) return schema instanceof z.ZodOptional ? undefined : null
  if (inner instanceof z.ZodObject) return buildMembers(inner.shape as Record<string, z.ZodType>, path, builder, () => true)
  // Of a union only what is filled in: a figure of another variant is refused by the schema.
  if (inner instanceof z.ZodDiscriminatedUnion) return buildMembers({ ...variantShape(inner), shape: z.string() }, path, builder, (member) => member.endsWith('.shape') || !isEmpty(member, builder))
  return inner instanceof z.ZodLiteral ? inner.value : buildLeaf(inner, path, builder)
}

function buildMembers(shape: Record<string, z.ZodType>, path: string, builder: Builder, wanted: (path: string) => boolean): object {
  const entries = Object.entries(shape).filter(([key]) => wanted(joinPath(path, key)))
  return Object.fromEntries(entries.map(([key, member]) => [key, build(member, joinPath(path, key), builder)]).filter(([, value]) => value !== undefined))
}

function buildLeaf(schema: z.ZodType, path: string, builder: Builder): unknown {
  const cell = builder.cells.get(path) ?? { text: '', decimalSign: 'point' }
  const column = builder.columns.get(path)!
  if (cell.text === '') {
    if (column.required) builder.problems.set(path, emptySentence(column))
    return column.holds === 'list' || column.holds === 'lines' ? [] : column.holds === 'figure' ? undefined : ''
  }
  const read = readLeaf(schema, cell, column)
  if ('value' in read) return read.value
  builder.problems.set(path, read.problem)
  return undefined
}

function readLeaf(schema: z.ZodType, cell: ImportCell, { holds, keys, choices }: ImportColumn): CellValue<unknown> {
  switch (holds) {
    case 'figure':
      return readImportFigure(cell)
    case 'list':
      return readImportList(cell, schema instanceof z.ZodArray && schema.element instanceof z.ZodNumber)
    case 'lines':
      return readImportLines(cell, keys)
    case 'choice':
      return choices.includes(cell.text) ? { value: cell.text } : { problem: `“${cell.text}” is not known here. Write one of: ${choices.join(', ')}.` }
    case 'text':
      return { value: cell.text }
  }
}

function emptySentence({ holds, choices }: ImportColumn): string {
  if (holds === 'choice') return `The cell is empty. Write one of: ${choices.join(', ')}.`
  return `The cell is empty. Enter a ${holds === 'figure' ? 'number' : holds === 'text' ? 'text' : 'list'}.`
}

const isEmpty = (path: string, { cells }: Builder): boolean => ![...cells].some(([key, { text }]) => text !== '' && (key === path || key.startsWith(`${path}.`)))

function noteIssue(builder: Builder, issue: z.core.$ZodIssue): void {
  const path = issue.path.join('.')
  if (issue.code !== 'unrecognized_keys') return note(builder, path, issue.message)
  for (const key of issue.keys) note(builder, joinPath(path, key), builder.columns.has(joinPath(path, key)) ? 'Leave this cell empty: the shape that was chosen has no such figure.' : `“${key}” is not known here; take it away.`)
}

/** Puts a fault at its column: the longest heading that the path begins with. The first fault of a cell counts. */
function note({ columns, problems }: Builder, path: string, message: string): void {
  const column = [...columns.keys()].filter((heading) => path === heading || path.startsWith(`${heading}.`)).sort((a, b) => b.length - a.length)[0] ?? [...columns.keys()].find((heading) => heading.startsWith(`${path}.`)) ?? ''
  // What could not be read is not there for the schema, which then complains of what follows from it.
  if (problems.has(column)) return
  problems.set(column, placed(path.slice(column.length + 1), message))
}

/** `2.xMm` of a list becomes its third record. */
function placed(rest: string, message: string): string {
  const [index, ...keys] = rest.split('.')
  if (!/^\d+$/.test(index ?? '')) return message
  return `Entry ${Number(index) + 1}${keys.length > 0 ? `, ${keys.join('.')}` : ''}: ${message}`
}

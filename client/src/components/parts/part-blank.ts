import type { LibraryKind } from '#shared/engine/library'
import type { PartField } from './field-types'
import { partFields } from './part-fields'

/** A row while it is typed: figures may still be missing. */
export type PartEntry = Record<string, unknown> & { kind: LibraryKind; id: string; unverified: string[] }

/** An empty row of a kind: every field is there, choices at their first answer. */
export function blankPart(kind: LibraryKind): PartEntry {
  const entry: PartEntry = { kind, id: '', name: '', source: '', edition: '', confidence: 'medium', unverified: [], note: '' }
  for (const field of partFields(kind)) place(entry, field.path.split('.'), blankValue(field))
  return entry
}

function blankValue(field: PartField): unknown {
  switch (field.type) {
    case 'figure':
      return field.path === 'sections' || field.path === 'strands' ? 1 : null
    case 'text':
      return ''
    case 'choice':
      return field.choices[0]!.value
    case 'variant':
      return field.forms[0]!.make()
    case 'list':
    case 'figures':
      return []
  }
}

function place(owner: Record<string, unknown>, [key, ...rest]: string[], value: unknown): void {
  if (rest.length === 0) {
    owner[key!] = value
    return
  }
  owner[key!] ??= {}
  place(owner[key!] as Record<string, unknown>, rest, value)
}

/** One empty line of a list. */
export const blankLine = (columns: readonly PartField[]): Record<string, unknown> => Object.fromEntries(columns.map((column) => [column.path, blankValue(column)]))

/** A copy to type in, which shares nothing with what was fetched. */
export const copyOf = <T extends object>(row: T): T => JSON.parse(JSON.stringify(row)) as T

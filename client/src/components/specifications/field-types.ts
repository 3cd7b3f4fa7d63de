import type { LibraryKind } from '#shared/engine/library'

export interface Choice {
  value: string | number | boolean
  label: string
}

/** What kind of entry a field has. */
export type FieldType =
  | { type: 'text'; long?: boolean; maximum?: number }
  | { type: 'figure'; unit: string; suffix?: string; min?: number; max?: number; whole?: boolean }
  | { type: 'choice'; choices: readonly Choice[] }
  | { type: 'yes-no' }
  /** One text per line. */
  | { type: 'lines' }
  /** Changes of a revision, one per line: field: old → new. */
  | { type: 'changes' }
  /** Points of an impedance curve, one per line. */
  | { type: 'impedance' }
  | { type: 'date' }
  | { type: 'terminal' }
  | { type: 'terminals' }
  /** Several groups of terminals, each shorted on itself. */
  | { type: 'terminal-groups' }
  | { type: 'winding' }
  | { type: 'windings' }
  | { type: 'boundary' }
  | { type: 'output' }
  /** One end of an insulation boundary. */
  | { type: 'end' }
  | { type: 'reference'; kind: LibraryKind }
  /** Several figures that are stated together or not at all. */
  | { type: 'group'; fields: readonly FieldSpec[]; blank: () => object }

export type FieldSpec = FieldType & {
  /** Place in the document as the engine names it; relative to the row inside a row. */
  path: string
  label: string
  help?: string
  /** May be left empty: the document then holds null. */
  optional?: boolean
}

type Options = Pick<FieldSpec, 'help' | 'optional'>

export const text = (path: string, label: string, options: Options & { long?: boolean; maximum?: number } = {}): FieldSpec => ({ type: 'text', path, label, ...options })
export const figure = (path: string, label: string, unit: string, options: Options & { suffix?: string; min?: number; max?: number; whole?: boolean } = {}): FieldSpec => ({ type: 'figure', path, label, unit, ...options })
export const count = (path: string, label: string, options: Options & { min?: number; max?: number } = {}): FieldSpec => ({ type: 'figure', path, label, unit: '', whole: true, min: 0, ...options })
export const choice = (path: string, label: string, choices: readonly Choice[], options: Options = {}): FieldSpec => ({ type: 'choice', path, label, choices, ...options })
export const yesNo = (path: string, label: string, options: Options = {}): FieldSpec => ({ type: 'yes-no', path, label, ...options })
export const reference = (path: string, label: string, kind: LibraryKind, options: Options = {}): FieldSpec => ({ type: 'reference', path, label, kind, ...options })
export const group = (path: string, label: string, fields: readonly FieldSpec[], blank: () => object, options: Options = {}): FieldSpec => ({ type: 'group', path, label, fields, blank, ...options })

/** Choices from a table of words, in its order. */
export const words = (table: Readonly<Record<string, string>>): Choice[] => Object.entries(table).map(([value, label]) => ({ value, label }))

/** Choices whose values read as they stand. */
export const plainly = (...values: readonly (string | number)[]): Choice[] => values.map((value) => ({ value, label: String(value).replaceAll('-', ' ') }))

/** A table of the document. */
export interface RowsSpec {
  path: string
  title: string
  /** One row, such as `winding`. */
  one: string
  /** Fields that stand in the table itself; null where a row has no such field. */
  columns: readonly { header: string; field: (row: Row) => FieldSpec | null; figure?: boolean; wide?: boolean; narrow?: boolean }[]
  /** Fields that open below the row. */
  more: (row: Row) => readonly FieldSpec[]
  /** Kinds of row to add, each with the row it begins as. */
  add: readonly { label: string; row: (known: KnownToRows) => object | null }[]
  /** False where rows carry no status and origin of their own. */
  stated: boolean
  empty: string
  ordered?: boolean
  /** Folded away while it has no row. */
  rare?: boolean
}

export type Row = Readonly<Record<string, unknown>>

/** What a new row may build on; null from `row` says that something must be chosen first. */
export interface KnownToRows {
  rows: readonly Row[]
  freeId: (prefix: string) => string
  windingIds: readonly string[]
  boundaryIds: readonly string[]
  first: (kind: LibraryKind) => { kind: LibraryKind; id: string; version: number } | null
}

export type SectionPart =
  /** `rare`: folded away while nothing in it is stated. */
  | { kind: 'stated'; title: string; fields: readonly FieldSpec[]; rare?: boolean }
  /** Without status and origin: the requirement sheet. */
  | { kind: 'plain'; title: string; fields: readonly FieldSpec[] }
  | { kind: 'rows'; rows: RowsSpec }
  | { kind: 'pins' }
  | { kind: 'requirement' }

export interface SectionSpec {
  key: string
  title: string
  /** Beginnings of the places that belong here. */
  places: readonly string[]
  parts: readonly SectionPart[]
}

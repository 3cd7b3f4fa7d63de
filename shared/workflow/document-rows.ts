/** How a stored document is read as fields and rows, without knowing what it is about. */

export type Tree = Readonly<Record<string, unknown>>

export const isTree = (value: unknown): value is Tree => typeof value === 'object' && value !== null && !Array.isArray(value)

/** A field with its status and origin, a reference to a library row, one end of a boundary: one answer, never half of one. */
export function isWhole(value: Tree): boolean {
  return ('value' in value && 'status' in value && 'origin' in value) || ('version' in value && 'id' in value) || (typeof value.kind === 'string' && !('id' in value))
}

/** What a row of a table is known by through edits; null for what is no row. */
export function rowKey(row: unknown): string | null {
  if (!isTree(row)) return null
  if (typeof row.id === 'string' && !('version' in row)) return row.id
  if (typeof row.number === 'string') return row.number
  return typeof row.revision === 'string' && row.revision !== '' ? row.revision : null
}

/** Identities of the rows of a table. */
export const keysOf = (rows: readonly unknown[]): string[] => rows.map((row) => rowKey(row)!)

/** True for a table whose rows can be told apart; an empty list is one beside a table. */
export function isTable(list: readonly unknown[]): boolean {
  const keys = list.map(rowKey)
  return !keys.includes(null) && new Set(keys).size === keys.length
}

/** Equality of JSON values; the order of keys says nothing. */
export function same(one: unknown, other: unknown): boolean {
  if (Object.is(one, other)) return true
  if (Array.isArray(one) && Array.isArray(other)) return one.length === other.length && one.every((value, index) => same(value, other[index]))
  if (!isTree(one) || !isTree(other)) return false
  const keys = Object.keys(one).filter((key) => one[key] !== undefined)
  return keys.length === Object.keys(other).filter((key) => other[key] !== undefined).length && keys.every((key) => same(one[key], other[key]))
}

export const joinPath = (path: string, key: string | number): string => (path === '' ? String(key) : `${path}.${key}`)

/** Places in a document are named as the engine names them: relative to the specification, or under `requirement`. */

type Tree = Record<string, unknown>

const isTree = (value: unknown): value is Tree => typeof value === 'object' && value !== null

/** The value behind a dotted path; undefined where the way ends. */
export function valueAt(tree: unknown, path: string): unknown {
  let value = tree
  for (const key of path.split('.')) {
    if (!isTree(value)) return undefined
    value = value[key]
  }
  return value
}

function replaced(tree: unknown, [key, ...rest]: readonly string[], value: unknown): unknown {
  if (key === undefined) return value
  if (!isTree(tree)) return tree
  const inner = replaced(tree[key], rest, value)
  if (Array.isArray(tree)) return tree.map((entry: unknown, index) => (String(index) === key ? inner : entry))
  return { ...tree, [key]: inner }
}

/** A copy with another value behind the path; everything beside the way stays the same object. */
export const withValue = <T>(tree: T, path: string, value: unknown): T => replaced(tree, path.split('.'), value) as T

/** The path inside a stored document of a place as the engine names it. */
export const documentPath = (path: string) => (path === 'requirement' || path.startsWith('requirement.') ? path : `specification.${path}`)

/** And back. */
export const placeOf = (path: string) => path.replace(/^(document\.)?(specification\.)?/, '')

/** True when `path` is the place or lies within it. */
export const isWithin = (path: string, place: string) => path === place || path.startsWith(`${place}.`)

/** The first row id of the form `<prefix><number>` that no row has yet. */
export function freeId(rows: readonly { id: string }[], prefix: string): string {
  const taken = new Set(rows.map(({ id }) => id))
  let number = rows.length + 1
  while (taken.has(`${prefix}${number}`)) number += 1
  return `${prefix}${number}`
}

/** The rows with one of them taken out and put in at another position; unchanged when that lies outside. */
export function movedTo<T>(rows: readonly T[], from: number, to: number): T[] {
  const row = rows[from]
  if (row === undefined || to < 0 || to >= rows.length) return [...rows]
  const rest = rows.filter((_, position) => position !== from)
  return [...rest.slice(0, to), row, ...rest.slice(to)]
}

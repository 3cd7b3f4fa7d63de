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

/** Puts a value behind a dotted path whose way exists. */
export function setAt(tree: unknown, path: string, value: unknown): void {
  const keys = path.split('.')
  const last = keys.pop()!
  const owner = keys.length === 0 ? tree : valueAt(tree, keys.join('.'))
  if (isTree(owner)) owner[last] = value
}

/** True when the field, or a whole that it belongs to, is among those that nobody vouches for. */
export const isUnverified = (unverified: readonly string[], path: string) =>
  unverified.some((marked) => path === marked || path.startsWith(`${marked}.`))

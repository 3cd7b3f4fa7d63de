import { isTable, isTree, isWhole, joinPath, keysOf, rowKey, same, type Tree } from './document-rows'

/** One difference between two documents. */
export interface DocumentChange {
  kind: 'changed' | 'added' | 'removed' | 'moved'
  /** Place in the newer document; of a removed row its place in the older one. */
  path: string
  /** The same place by the identity of its rows, the same in both documents: `windings.[w1].turns`. */
  key: string
  /** Undefined for an added row. Of a moved row its position, counted from 1. */
  before: unknown
  /** Undefined for a removed row. */
  after: unknown
}

interface Place {
  path: string
  key: string
}

/**
 * What differs between two documents, field by field and row by row. Rows are matched by their identity, never by their
 * position. Where a value came from is no difference; how it binds is one.
 */
export const compareDocuments = (before: unknown, after: unknown): DocumentChange[] => compareValues({ path: '', key: '' }, before, after)

function compareValues(place: Place, before: unknown, after: unknown): DocumentChange[] {
  if (same(before, after)) return []
  // A table that one of both does not have is empty there.
  const [older, newer] = [before ?? (Array.isArray(after) ? [] : null), after ?? (Array.isArray(before) ? [] : null)]
  if (Array.isArray(older) && Array.isArray(newer) && isTable(older) && isTable(newer)) return compareRows(place, older, newer)
  if (isTree(before) && isTree(after) && !isWhole(before) && !isWhole(after)) return compareTrees(place, before, after)
  return sameButOrigin(before, after) ? [] : [{ kind: 'changed', ...place, before, after }]
}

function sameButOrigin(before: unknown, after: unknown): boolean {
  return isTree(before) && isTree(after) && 'status' in before && same({ ...before, origin: null }, { ...after, origin: null })
}

function compareTrees({ path, key }: Place, before: Tree, after: Tree): DocumentChange[] {
  const names = [...new Set([...Object.keys(before), ...Object.keys(after)])].filter((name) => name !== 'origin')
  return names.flatMap((name) => compareValues({ path: joinPath(path, name), key: joinPath(key, name) }, before[name] ?? null, after[name] ?? null))
}

function compareRows({ path, key }: Place, before: readonly unknown[], after: readonly unknown[]): DocumentChange[] {
  const [older, newer] = [keysOf(before), keysOf(after)]
  const at = (id: string, index: number): Place => ({ path: joinPath(path, index), key: joinPath(key, `[${id}]`) })
  const moved = new Set(movedKeys(older, newer))
  const kept = after.flatMap((row, index): DocumentChange[] => {
    const id = rowKey(row)!
    const place = at(id, index)
    const position = older.indexOf(id)
    if (position < 0) return [{ kind: 'added', ...place, before: undefined, after: row }]
    const changes = compareValues(place, before[position], row)
    return moved.has(id) ? [{ kind: 'moved', ...place, before: position + 1, after: index + 1 }, ...changes] : changes
  })
  const removed = before.flatMap((row, index): DocumentChange[] => (newer.includes(older[index]!) ? [] : [{ kind: 'removed', ...at(older[index]!, index), before: row, after: undefined }]))
  return [...kept, ...removed]
}

/** The fewest rows whose moving explains the new order: those outside of a longest run that kept its order. */
export function movedKeys(older: readonly string[], newer: readonly string[]): string[] {
  const positions = newer.flatMap((key) => (older.includes(key) ? [{ key, at: older.indexOf(key) }] : []))
  const best: { key: string; at: number }[][] = []
  positions.forEach((one, index) => {
    const before = best.slice(0, index).filter((run) => run.at(-1)!.at < one.at)
    best.push([...(before.sort((a, b) => b.length - a.length)[0] ?? []), one])
  })
  const longest = best.reduce<{ key: string; at: number }[]>((found, run) => (run.length > found.length ? run : found), [])
  return positions.filter(({ key }) => !longest.some((kept) => kept.key === key)).map(({ key }) => key)
}

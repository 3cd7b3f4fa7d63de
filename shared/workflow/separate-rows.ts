import { isTable, isTree, keysOf, rowKey, same, type Tree } from './document-rows'

const WINDING_REFERENCE = /[wW]indingIds?$/

/** Fields by which other tables name a row of this one. */
const REFERENCES: Readonly<Record<string, RegExp>> = { windings: WINDING_REFERENCE, boundaries: /^boundaryId$/ }

type Path = readonly string[]

/**
 * Two people add a row each, and both rows are given the same id: they are two rows. Mine gets the next free id, and what
 * names it in my document follows. Everything else of my document stays as it is.
 */
export function separateRows<T>(base: T, mine: T, theirs: T): T {
  let result: unknown = mine
  for (const [path, rows] of tablesIn(mine)) {
    const [before, other] = [tableAt(base, path), tableAt(theirs, path)]
    if (!before || !other) continue
    const taken = new Set([...keysOf(rows), ...keysOf(other), ...keysOf(before)])
    for (const id of clashing(rows, before, other)) result = renamed(result, path, id, freeId(taken, id))
  }
  return result as T
}

/** Ids that are new in both and stand for different rows. */
function clashing(rows: readonly unknown[], before: readonly unknown[], other: readonly unknown[]): string[] {
  const known = new Set(keysOf(before))
  return rows.flatMap((row) => {
    if (!isTree(row) || typeof row.id !== 'string' || known.has(row.id)) return []
    const theirs = other.find((one) => rowKey(one) === row.id)
    return theirs !== undefined && !same(theirs, row) ? [row.id] : []
  })
}

function freeId(taken: Set<string>, id: string): string {
  const prefix = id.replace(/\d+$/, '')
  let number = 1
  while (taken.has(`${prefix}${number}`)) number += 1
  taken.add(`${prefix}${number}`)
  return `${prefix}${number}`
}

function tablesIn(tree: unknown, path: Path = []): [Path, unknown[]][] {
  if (Array.isArray(tree)) return isTable(tree) && tree.length > 0 ? [[path, tree]] : []
  return isTree(tree) ? Object.entries(tree).flatMap(([key, value]) => tablesIn(value, [...path, key])) : []
}

function tableAt(tree: unknown, path: Path): readonly unknown[] | null {
  const found = path.reduce<unknown>((value, key) => (isTree(value) ? value[key] : undefined), tree)
  return Array.isArray(found) && isTable(found) ? found : null
}

function renamed(tree: unknown, table: Path, from: string, to: string): unknown {
  const reference = REFERENCES[table.at(-1)!]
  const isRow = (entry: unknown, path: Path): entry is Tree => path.join('.') === table.join('.') && isTree(entry) && entry.id === from
  const refers = (key: string) => reference?.test(key) ?? false

  function visit(value: unknown, key: string, path: Path): unknown {
    if (Array.isArray(value)) return value.map((entry: unknown) => visit(isRow(entry, path) ? { ...entry, id: to } : entry, key, [...path, '']))
    if (isTree(value)) return Object.fromEntries(Object.entries(value).map(([inner, one]) => [inner, visit(one, inner, [...path, inner])]))
    return value === from && refers(key) ? to : value
  }
  return visit(tree, '', [])
}

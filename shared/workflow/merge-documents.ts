import { isTable, isTree, isWhole, joinPath, keysOf, rowKey, same, type Tree } from './document-rows'
import { separateRows } from './separate-rows'

export type Side = 'mine' | 'theirs'

/** One place that two people changed in different ways. */
export interface MergeConflict {
  /** Unique; rows stand by their identity: `windings.[w1].turns`. */
  key: string
  /** The place in my document, or in theirs where mine has no such row any more. */
  path: string
  kind: 'value' | 'row' | 'order'
  base: unknown
  /** Undefined where the row was removed. */
  mine: unknown
  theirs: unknown
}

export interface Merged<T> {
  document: T
  conflicts: readonly MergeConflict[]
}

type Choices = ReadonlyMap<string, Side>

interface Place {
  key: string
  path: string
}

interface Run {
  choices: Choices
  conflicts: MergeConflict[]
}

const ROOT: Place = { key: '', path: '' }

/**
 * Brings two documents together that were made from the same base. What one of both changed is taken; what both changed
 * in different ways is a conflict, decided by `choices` and mine until then. Rows are matched by their identity, so that
 * adding, removing and reordering rows does not mix up their fields.
 */
export function mergeDocuments<T>(base: T, mine: T, theirs: T, choices: Choices = new Map()): Merged<T> {
  const run: Run = { choices, conflicts: [] }
  const document = mergeValue(run, ROOT, base, separateRows(base, mine, theirs), theirs) as T
  return { document, conflicts: run.conflicts }
}

const within = ({ key, path }: Place, name: string): Place => ({ key: joinPath(key, name), path: joinPath(path, name) })

function mergeValue(run: Run, place: Place, base: unknown, mine: unknown, theirs: unknown): unknown {
  if (same(mine, theirs) || same(base, theirs)) return mine
  if (same(base, mine)) return theirs
  if (areTables(base ?? [], mine, theirs)) return mergeRows(run, place, (base ?? []) as unknown[], mine as unknown[], theirs as unknown[])
  if (areAlike(mine, theirs)) return mergeTree(run, place, isTree(base) ? base : {}, mine as Tree, theirs as Tree)
  return choose(run, place, 'value', base, mine, theirs)
}

function choose(run: Run, place: Place, kind: MergeConflict['kind'], base: unknown, mine: unknown, theirs: unknown): unknown {
  run.conflicts.push({ ...place, kind, base, mine, theirs })
  return run.choices.get(place.key) === 'theirs' ? theirs : mine
}

/** Where a row's value comes from follows the values in it and is no question of its own. */
function mergeTree(run: Run, place: Place, base: Tree, mine: Tree, theirs: Tree): Tree {
  const merged = [...new Set([...Object.keys(mine), ...Object.keys(theirs)])].map((key) => {
    const of = [base[key], mine[key], theirs[key]] as const
    return [key, key === 'origin' ? mergeOrigin(...of) : mergeValue(run, within(place, key), ...of)] as const
  })
  return Object.fromEntries(merged.filter(([, value]) => value !== undefined))
}

const mergeOrigin = (base: unknown, mine: unknown, theirs: unknown) => (same(base, mine) ? theirs : mine)

/** Two forms of one thing, such as two kinds of supply, are not mixed field by field. */
function areAlike(mine: unknown, theirs: unknown): boolean {
  if (!isTree(mine) || !isTree(theirs) || isWhole(mine) || isWhole(theirs)) return false
  return mine.kind === theirs.kind && mine.topology === theirs.topology
}

const areTables = (...lists: unknown[]) => lists.every((list) => Array.isArray(list) && isTable(list)) && lists.some((list) => (list as unknown[]).length > 0)

// --- rows ------------------------------------------------------------------------------------------

const GONE = Symbol('removed')

const byKey = (rows: readonly unknown[]) => new Map<string, unknown>(rows.map((row) => [rowKey(row)!, row]))

function mergeRows(run: Run, place: Place, base: unknown[], mine: unknown[], theirs: unknown[]): unknown[] {
  const [before, own, other] = [byKey(base), byKey(mine), byKey(theirs)]
  const order = mergeOrder(run, place, keysOf(base), keysOf(mine), keysOf(theirs))
  return order.flatMap((key) => {
    const index = own.has(key) ? keysOf(mine).indexOf(key) : keysOf(theirs).indexOf(key)
    const at = { key: joinPath(place.key, `[${key}]`), path: joinPath(place.path, index) }
    const row = mergeRow(run, at, before.get(key), own.get(key), other.get(key))
    return row === GONE ? [] : [row]
  })
}

/** One side removed what the other changed: a question. What nobody else touched goes, what is new stays. */
function mergeRow(run: Run, place: Place, base: unknown, mine: unknown, theirs: unknown): unknown {
  if (mine !== undefined && theirs !== undefined) return mergeValue(run, place, base, mine, theirs)
  const left = mine ?? theirs
  if (base === undefined) return left
  if (same(base, left)) return GONE
  return choose(run, place, 'row', base, mine, theirs) ?? GONE
}

/** Rows in the order of whoever changed it; new ones follow the row that they were put behind. */
function mergeOrder(run: Run, place: Place, base: string[], mine: string[], theirs: string[]): string[] {
  const common = (keys: readonly string[]) => keys.filter((key) => base.includes(key) && mine.includes(key) && theirs.includes(key))
  const [before, own, other] = [common(base), common(mine), common(theirs)]
  const leading = same(own, before) ? 'theirs' : same(other, before) || same(own, other) ? 'mine' : null
  const at = { key: joinPath(place.key, '[order]'), path: place.path }
  const chosen = leading ?? (choose(run, at, 'order', base, mine, theirs) === mine ? 'mine' : 'theirs')
  const [lead, follow] = chosen === 'mine' ? [mine, theirs] : [theirs, mine]
  return follow.reduce((order, key, index) => (order.includes(key) ? order : insertAfter(order, follow.slice(0, index), key)), [...lead])
}

function insertAfter(order: readonly string[], before: readonly string[], key: string): string[] {
  const predecessor = before.findLast((one) => order.includes(one))
  const at = predecessor === undefined ? 0 : order.indexOf(predecessor) + 1
  return [...order.slice(0, at), key, ...order.slice(at)]
}

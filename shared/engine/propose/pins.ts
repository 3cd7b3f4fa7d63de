import type { FormerRow } from '../library'
import type { Pin } from '../specification'
import type { PlannedWinding } from './design'

export interface WindingPins {
  start: string
  finish: string
  /** Where the two halves of a split winding meet. */
  middle: string | null
}

export interface PinPlan {
  pins: Pin[]
  of: ReadonlyMap<string, WindingPins>
  /** Terminals that found no pin of their own. */
  missing: number
}

/** Pins of one row of the former: those left of its middle, or right of it, in the order of their numbers. */
const rowOf = (former: FormerRow, left: boolean) =>
  [...former.pins].filter(({ xMm }) => xMm < 0 === left).sort((a, b) => Number(a.number) - Number(b.number)).map(({ number }) => number)

/**
 * Pins for all windings: the primary's side in the row of pin 1, the others in the opposite row. Without a protective
 * boundary a winding that finds no room in its row goes to the other.
 */
export function planPins(former: FormerRow, windings: readonly PlannedWinding[], { split, protective }: { split: string | null; protective: boolean }): PinPlan {
  const rows = { left: rowOf(former, true), right: rowOf(former, false) }
  const free = { left: [...rows.left], right: [...rows.right] }
  const of = new Map<string, WindingPins>()
  let missing = 0
  const take = (row: 'left' | 'right'): string => {
    const pin = free[row].shift() ?? (protective ? undefined : free[row === 'left' ? 'right' : 'left'].shift())
    if (pin === undefined) missing += 1
    return pin ?? ''
  }
  const ordered = [...windings].sort((a, b) => Number(a.side !== 'primary') - Number(b.side !== 'primary'))
  for (const { id, side } of ordered) {
    const row = side === 'primary' ? 'left' : 'right'
    const start = take(row)
    const middle = id === split ? take(row) : null
    of.set(id, { start, middle, finish: take(row) })
  }
  const used = new Set([...of.values()].flatMap(({ start, finish, middle }) => [start, finish, middle]))
  return { pins: former.pins.map(({ number, xMm, yMm }) => ({ number, xMm, yMm, state: used.has(number) ? 'fitted' : 'no-connection' })), of, missing }
}

import { notCheckable, known } from './answer'
import type { Answer } from './answer'

export type TablePoint = readonly [x: number, y: number]

/**
 * Straight-line interpolation between the rows of a table, ascending in x; never beyond its first or last row.
 *
 * @throws RangeError when the table is empty or x is not a number
 */
export function interpolateTable(points: readonly TablePoint[], x: number): Answer<number> {
  const first = points[0]
  const last = points[points.length - 1]
  if (!first || !last) throw new RangeError('points must hold at least one row')
  if (Number.isNaN(x)) throw new RangeError(`x must be a number: ${x}`)
  if (x < first[0]) return notCheckable('before-first-row', { asked: x, firstRow: first[0] })
  if (x > last[0]) return notCheckable('past-last-row', { asked: x, lastRow: last[0] })

  const upper = Math.max(1, points.findIndex(([rowX]) => rowX >= x))
  const [x0, y0] = points[upper - 1]!
  const [x1, y1] = points[upper] ?? first
  return known(x1 === x0 ? y0 : y0 + ((y1 - y0) * (x - x0)) / (x1 - x0))
}

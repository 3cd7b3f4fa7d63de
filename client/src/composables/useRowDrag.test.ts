import { expect, it, vi } from 'vitest'
import { dropIndex, useRowDrag } from './useRowDrag'

it.each([
  [0, 2, 'after', 2],
  [0, 2, 'before', 1],
  [2, 0, 'before', 0],
  [2, 0, 'after', 1],
  [1, 1, 'before', 1],
  [1, 1, 'after', 1],
] as const)('row %i dropped at row %i, %s, comes to position %i', (from, index, side, to) => {
  expect(dropIndex(from, { index, side })).toBe(to)
})

it('moves only what was picked up here, once', () => {
  const move = vi.fn()
  const { start, enter, drop, over } = useRowDrag(move)
  enter(1, 'before')
  drop()
  expect([move.mock.calls.length, over.value]).toEqual([0, null])
  start(3)
  enter(0, 'after')
  drop()
  drop()
  expect(move.mock.calls).toEqual([[3, 1]])
})

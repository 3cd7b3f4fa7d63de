import { describe, expect, it } from 'vitest'
import { interpolateTable } from './interpolate'

const table = [[25, 510], [100, 390], [120, 350]] as const

describe('interpolateTable', () => {
  it.each([
    { name: 'the first row itself', x: 25, y: 510 },
    { name: 'half way between two rows', x: 62.5, y: 450 },
    { name: 'an inner row itself', x: 100, y: 390 },
    { name: 'the last row itself', x: 120, y: 350 },
  ])('reads $name', ({ x, y }) => expect(interpolateTable(table, x)).toEqual({ state: 'known', value: y }))

  it('does not extend the table at either end', () => {
    expect(interpolateTable(table, 20)).toMatchObject({ state: 'not-checkable', reason: 'before-first-row' })
    expect(interpolateTable(table, 121)).toMatchObject({ state: 'not-checkable', reason: 'past-last-row' })
  })

  it('reads a table of one row at that row only', () => {
    expect(interpolateTable([[100, 0.39]], 100)).toEqual({ state: 'known', value: 0.39 })
    expect(interpolateTable([[100, 0.39]], 99).state).toBe('not-checkable')
  })

  it('refuses an empty table', () => expect(() => interpolateTable([], 1)).toThrow(RangeError))
})

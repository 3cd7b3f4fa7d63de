import { describe, expect, it } from 'vitest'
import type { SearchCandidate } from '#shared/engine/index'
import { bestOf, FIGURE_COLUMNS, figureText, inOrder, windingText } from './candidate-figures'

const candidate = (id: string, lossW: number | null, core = id): SearchCandidate =>
  ({ id, core, figures: { lossW, volumeMm3: 23_700, leakageH: 7.25e-6 } }) as SearchCandidate

const [loss, , , , volume, , , leakage] = FIGURE_COLUMNS

describe('the figures of a candidate', () => {
  it('have their unit', () => {
    expect(figureText(loss!, candidate('a', 0.734))).toBe('0.734 W')
    expect(figureText(volume!, candidate('a', 1))).toBe('23.7 cm³')
    expect(figureText(leakage!, candidate('a', 1)).replace(/\s/, ' ')).toBe('7.25 µH')
    expect(figureText(loss!, candidate('a', null))).toBe('– W')
  })
  it('mark the least of several, and nothing alone', () => {
    expect(bestOf(loss!, [candidate('a', 2), candidate('b', 1), candidate('c', null)])).toBe(1)
    expect(bestOf(loss!, [candidate('a', 2)])).toBeNull()
  })
})

describe('inOrder', () => {
  const rows = [candidate('a', 2, 'ETD39'), candidate('b', null, 'E5'), candidate('c', 1, 'ETD29')]
  const ids = (list: SearchCandidate[]) => list.map(({ id }) => id).join('')
  it('keeps the search’s own order, and turns it round', () => {
    expect(ids(inOrder(rows, 'rank', false))).toBe('abc')
    expect(ids(inOrder(rows, 'rank', true))).toBe('cba')
  })
  it('puts a missing figure last either way', () => {
    expect(ids(inOrder(rows, 'lossW', false))).toBe('cab')
    expect(ids(inOrder(rows, 'lossW', true))).toBe('acb')
  })
  it('sorts names by their numbers', () => expect(ids(inOrder(rows, 'core', false))).toBe('bca'))
})

it('names a winding with its wire', () => {
  expect(windingText({ winding: 'S1', turns: 4, wire: 'grade-1 0.5 mm', parallel: 3 })).toBe('S1: 4 turns of 3 × grade-1 0.5 mm')
})

import { describe, expect, it } from 'vitest'
import { inWords, withUnit } from './working-words'

describe('the words of a working', () => {
  it.each([
    [0.00010728, 'H', '107.28\u00a0µH'],
    [7, '1', '7'],
    [49, 'mm²', '49\u00a0mm²'],
    ['spread', '', 'spread'],
    [null, 'T', '–'],
  ])('write %s in %s as %s', (value, unit, text) => {
    expect(withUnit(value, unit)).toBe(text)
  })

  it.each([
    ['electrical.inductance, upper tolerance', 'Electrical › Inductance, upper tolerance'],
    ['magnetics.worstCurrentA', 'calculated'],
    ['E30/15/7, version 1: catalogue', 'E30/15/7, version 1: catalogue'],
  ])('%s comes from %s', (origin, words) => {
    expect(inWords(origin)).toBe(words)
  })
})

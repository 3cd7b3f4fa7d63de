import { describe, expect, it } from 'vitest'
import { remainingText } from './remaining-time'

const H = 3_600_000

describe('remainingText', () => {
  it.each([
    [3 * 24 * H + 4 * H + 59 * 60_000, '3 d 4 h'],
    [24 * H, '1 d 0 h'],
    [24 * H - 1, '23 h 59 min'],
    [H, '1 h 0 min'],
    [H - 1, '59 min 59 s'],
    [999, '0 min 0 s'],
    [0, 'none'],
    [-5000, 'none'],
  ])('says %d ms as %s, never more than there is', (left, text) => {
    expect(remainingText(left)).toBe(text)
  })
})

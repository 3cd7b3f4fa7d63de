import { normalShareBelow, predictedIndex, shareOutside } from '#shared/engine/limits/normal'
import jstat from 'jstat'
import { describe, expect, it } from 'vitest'

describe('normalShareBelow', () => {
  // Source: jstat, a general-purpose statistics library.
  it.each([-4.3, -4.2, -3, -2.13, -2.11, -1.96, -0.5, -1e-3, 0, 0.2, 1, 2.5, 4.24, 4.25, 7])('agrees with a statistics library at %s', (z) => {
    const expected = jstat.normal.cdf(z, 0, 1)
    expect(Math.abs(normalShareBelow(z) - expected)).toBeLessThan(1e-11 * expected)
  })
  // Source: Abramowitz & Stegun, Table 26.2: −log10 of the tail beyond 6 is 9.00586 and beyond 12 is 32.75044. The library above is 1e-10 off there.
  it.each([[6, 9.00586], [12, 32.75044]])('keeps its figures in the tail beyond %s', (z, digits) => expect(-Math.log10(normalShareBelow(-z))).toBeCloseTo(digits, 5))
  it('is monotone through the change from series to fraction', () => {
    const steps = Array.from({ length: 400 }, (_, index) => normalShareBelow(-2.2 + index * 5e-4))
    expect(steps.every((value, index) => index === 0 || value > steps[index - 1]!)).toBe(true)
  })
  it('refuses what is no number', () => expect(() => normalShareBelow(Number.NaN)).toThrow(RangeError))
})

describe('limits', () => {
  it('three deviations on both sides leave 2700 in a million outside', () => expect(shareOutside(0, 1, { minimum: -3, maximum: 3 }) * 1e6).toBeCloseTo(2699.796, 2))
  it('an open side refuses nothing', () => expect(shareOutside(10, 1, { minimum: null, maximum: 100 })).toBe(0))
  it('gives the nearer side as the index', () => {
    expect(predictedIndex(1, 0.1, { minimum: 0.4, maximum: 1.3 })).toBeCloseTo(1, 12)
    expect(predictedIndex(1, 0.1, { minimum: null, maximum: null })).toBeNull()
  })
})

import { describe, expect, it } from 'vitest'
import { clean, limitsAround, toDigits } from './digits'

describe('figures that a specification states', () => {
  it.each([
    [730.296e-6, 3, 'nearest', 730e-6],
    [591.3e-6, 3, 'up', 592e-6],
    [591.3e-6, 3, 'down', 591e-6],
    [592e-6, 3, 'up', 592e-6],
    [0.3 - 0.1, 2, 'down', 0.2],
    [9.996, 3, 'nearest', 10],
  ] as const)('rounds %f to %i digits, %s', (value, digits, rounding, expected) => {
    expect(toDigits(value, digits, rounding)).toBe(expected)
  })

  it('leaves what has no digits as it is', () => {
    expect(toDigits(0, 3)).toBe(0)
    expect(toDigits(Infinity, 3)).toBe(Infinity)
  })

  it('takes the noise of binary fractions off', () => {
    expect(clean(0.1 + 0.05)).toBe(0.15)
    expect(clean(3.6e-7 * 45 ** 2)).toBe(0.000729)
  })

  it('states limits with four digits that never loosen', () => {
    expect(limitsAround(730e-6, { lower: -0.1, upper: 0.1 })).toEqual({ minimum: 657e-6, maximum: 803e-6 })
    // 45:7 ± 1 %: 6.36428… and 6.49285…
    expect(limitsAround(45 / 7, { lower: -0.01, upper: 0.01 })).toEqual({ minimum: 6.365, maximum: 6.492 })
    expect(limitsAround(2e-3, { lower: -0.25, upper: null })).toEqual({ minimum: 1.5e-3, maximum: null })
  })

  it('takes more digits where the tolerance is as fine as the fourth', () => {
    const { minimum, maximum } = limitsAround(1000 / 999, { lower: -0.0005, upper: 0.0005 })
    expect(minimum).toBeGreaterThanOrEqual((1000 / 999) * 0.9995)
    expect(maximum! - minimum!).toBeGreaterThan(0.9 * 2 * 0.0005)
  })
})

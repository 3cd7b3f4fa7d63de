import { describe, expect, it } from 'vitest'
import { assessCapability, lowerBound, performanceIndex, spreadIndex } from '#shared/measurement/capability'
import { failureShareBound } from '#shared/measurement/failure-bound'
import { resistanceAt } from '#shared/measurement/resistance-temperature'
import { deviationFromRanges, pooledDeviation, summarise } from '#shared/measurement/statistics'

/** Inductance in % of nominal, five ordered subgroups of five. Figures by ISO 22514-2 with d2 = 2.326. */
const STABLE = [
  [99.2, 100.4, 101.1, 99.8, 100.3],
  [100.9, 99.5, 100.0, 101.4, 100.2],
  [98.9, 100.1, 99.7, 100.8, 99.6],
  [100.5, 101.2, 99.9, 100.6, 101.0],
  [99.4, 100.7, 98.8, 100.2, 99.9],
]
const DRIFTING = STABLE.map((group, index) => group.map((value) => value + (index - 2) * 0.6))
const WIDE = { minimum: 95, maximum: 105 }
const NARROW = { minimum: 97, maximum: 103 }

describe('process performance, ISO 22514-2', () => {
  it.each([
    { name: 'stable', groups: STABLE, total: 0.70821, wide: { spread: 2.3533, index: 2.2761 }, narrow: { spread: 1.412, index: 1.3348 } },
    { name: 'drifting', groups: DRIFTING, total: 1.06375, wide: { spread: 1.5668, index: 1.5154 }, narrow: { spread: 0.9401, index: 0.8887 } },
  ])('$name readings', ({ groups, total, wide, narrow }) => {
    const { mean, deviation, n } = summarise(groups.flat())
    expect(n).toBe(25)
    expect(mean).toBeCloseTo(100.164, 6)
    expect(deviation).toBeCloseTo(total, 5)
    expect(performanceIndex(mean!, deviation!, WIDE)).toBeCloseTo(wide.index, 4)
    expect(spreadIndex(deviation!, WIDE)).toBeCloseTo(wide.spread, 4)
    expect(performanceIndex(mean!, deviation!, NARROW)).toBeCloseTo(narrow.index, 4)
    expect(spreadIndex(deviation!, NARROW)).toBeCloseTo(narrow.spread, 4)
  })

  it.each([
    { name: 'stable', groups: STABLE },
    { name: 'drifting', groups: DRIFTING },
  ])('$name readings look alike within their subgroups', ({ groups }) => {
    const within = deviationFromRanges(groups)
    expect(within).toBeCloseTo(0.76526, 5)
    expect(performanceIndex(100.164, within, WIDE)).toBeCloseTo(2.1065, 4)
    expect(performanceIndex(100.164, within, NARROW)).toBeCloseTo(1.2353, 4)
    expect(spreadIndex(within, NARROW)).toBeCloseTo(1.3067, 4)
    expect(pooledDeviation(groups)).toBeCloseTo(0.68454, 5)
  })

  it('is one-sided where there is one limit', () => {
    expect(performanceIndex(10, 1, { minimum: null, maximum: 13 })).toBeCloseTo(1, 12)
    expect(spreadIndex(1, { minimum: null, maximum: 13 })).toBeNull()
  })
})

/** Lower one-sided 95 % bound, A. F. Bissell, Applied Statistics 39 (1990). */
describe('lower bound of an index', () => {
  it('is 0.9995 for 25 stable readings within 97 to 103', () => {
    expect(lowerBound(1.3348, 25)).toBeCloseTo(0.9995, 4)
  })

  it.each([
    [3, 0.19, 0.26, 0.32],
    [5, 0.52, 0.67, 0.81],
    [10, 0.79, 1.0, 1.21],
    [20, 0.95, 1.21, 1.45],
    [30, 1.03, 1.3, 1.56],
    [50, 1.1, 1.38, 1.66],
    [100, 1.17, 1.47, 1.76],
    [125, 1.18, 1.49, 1.79],
    [200, 1.21, 1.53, 1.83],
  ])('n = %i: %f, %f and %f for 1.33, 1.67 and 2.00', (n, low, middle, high) => {
    expect([1.33, 1.67, 2].map((index) => Number(lowerBound(index, n).toFixed(2)))).toEqual([low, middle, high])
  })
})

/** Zero failures of n, C. J. Clopper and E. S. Pearson, Biometrika 26 (1934). */
describe('upper bound of the failing share', () => {
  it.each([
    [5, 0.451],
    [30, 0.095],
    [60, 0.0487],
    [125, 0.0237],
  ])('no failure of %i leaves %f', (n, share) => {
    expect(failureShareBound(0, n)).toBeCloseTo(share, 3)
  })

  // Tabulated Clopper–Pearson limits: 1 of 10 and 2 of 20 at one-sided 95 %.
  it.each([
    [1, 10, 0.3942],
    [2, 20, 0.2826],
    [10, 10, 1],
  ])('%i of %i leave %f', (failures, n, share) => {
    expect(failureShareBound(failures, n)).toBeCloseTo(share, 4)
  })

  it('refuses counts that do not belong together', () => {
    expect(() => failureShareBound(2, 1)).toThrow(RangeError)
    expect(() => failureShareBound(0, 0)).toThrow(RangeError)
  })
})

/** IEC 60028 with 0.00393 per kelvin at 20 °C. */
it.each([
  [20, 25, 1.0197],
  [25, 100, 1.289],
  [20, 100, 1.314],
])('copper from %i to %i °C: factor %f', (fromC, toC, factor) => {
  expect(resistanceAt(1, fromC, toC)).toBeCloseTo(factor, 3)
})

describe('what may be said about capability', () => {
  const thirty = [...STABLE.flat(), 100.05, 99.95, 100.15, 99.85, 100.25]

  it('is nothing below five readings', () => {
    expect(assessCapability([99, 100, 101, 102], WIDE, 'pilot-lot')).toEqual({ kind: 'values-only', n: 4 })
  })

  it('is preliminary below thirty readings and for hand-made parts', () => {
    expect(assessCapability(STABLE.flat(), NARROW, 'pilot-lot')).toMatchObject({ kind: 'index', n: 25, preliminary: true, sampleKind: 'pilot-lot' })
    expect(assessCapability(thirty, NARROW, 'hand-made')).toMatchObject({ preliminary: true })
    expect(assessCapability(thirty, NARROW, 'pilot-lot')).toMatchObject({ n: 30, preliminary: false })
  })

  it.each([
    { name: 'identical readings', values: [1, 1, 1, 1, 1], limits: WIDE, reason: 'identical-readings' },
    { name: 'a resolution of a few steps', values: [0.03, 0.03, 0.04, 0.03, 0.04], limits: { minimum: null, maximum: 0.05 }, reason: 'resolution-too-coarse' },
    { name: 'no limits', values: [1, 2, 3, 4, 5], limits: { minimum: null, maximum: null }, reason: 'no-limits' },
  ])('is no index for $name', ({ values, limits, reason }) => {
    expect(assessCapability(values, limits, 'pilot-lot')).toMatchObject({ kind: 'none', reason })
  })
})

it('gives the sample standard deviation, median and extremes', () => {
  expect(summarise([2, 4, 4, 4, 5, 5, 7, 9])).toMatchObject({ n: 8, mean: 5, minimum: 2, maximum: 9, median: 4.5, deviation: expect.closeTo(Math.sqrt(32 / 7), 12) })
  expect(summarise([3])).toMatchObject({ n: 1, mean: 3, deviation: null, median: 3 })
  expect(summarise([])).toMatchObject({ n: 0, mean: null })
})

import { expect, it } from 'vitest'
import { logMarks, logScale } from './plot-scale'

it('marks 1, 2 and 5 in every decade', () => expect(logMarks(0.3, 30)).toEqual([0.5, 1, 2, 5, 10, 20]))

it('puts equal ratios at equal distances, inside the stretch', () => {
  const { at } = logScale([1, 10, 100], 0, 100)
  expect(at(10) - at(1)).toBeCloseTo(at(100) - at(10), 9)
  expect(at(1)).toBeGreaterThan(0)
  expect(at(100)).toBeLessThan(100)
})

it('has marks for a single point and for none', () => {
  expect(logScale([7], 0, 10).marks.length).toBeGreaterThan(0)
  expect(logScale([], 0, 10).marks.length).toBeGreaterThan(0)
})

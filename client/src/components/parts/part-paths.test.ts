import { describe, expect, it } from 'vitest'
import { isUnverified, setAt, valueAt } from './part-paths'

describe('valueAt', () => {
  it('follows a dotted path through objects and lists', () => {
    expect(valueAt({ overallMm: { 'enamel-grade-1': 0.5 }, pins: [{ number: '1' }] }, 'overallMm.enamel-grade-1')).toBe(0.5)
    expect(valueAt({ pins: [{ number: '1' }] }, 'pins.0.number')).toBe('1')
  })

  it('is undefined where the way ends in nothing', () => {
    expect(valueAt({ centreLeg: null }, 'centreLeg.diameterMm')).toBeUndefined()
  })
})

describe('setAt', () => {
  it('changes the one value and leaves the rest', () => {
    const row = { dimensionsMm: { a: 1, b: 2 } }
    setAt(row, 'dimensionsMm.b', 3)
    expect(row).toEqual({ dimensionsMm: { a: 1, b: 3 } })
  })
})

describe('isUnverified', () => {
  it.each([
    { path: 'tube.diameterMm', marked: ['tube'], expected: true },
    { path: 'tubeWallMm', marked: ['tube'], expected: false },
    { path: 'dimensionsMm.d', marked: ['dimensionsMm.d'], expected: true },
    { path: 'dimensionsMm.a', marked: ['dimensionsMm.d'], expected: false },
  ])('$path among $marked: $expected', ({ path, marked, expected }) => {
    expect(isUnverified(marked, path)).toBe(expected)
  })
})

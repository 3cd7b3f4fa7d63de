import { expect, it } from 'vitest'
import { isEarlierRelease, nextDraftNumber, nextReleaseLetter } from './revision-letters'

it.each([
  [null, 'A'],
  ['A', 'B'],
  ['H', 'J'],
  ['N', 'P'],
  ['P', 'R'],
  ['R', 'T'],
  ['W', 'Y'],
  ['Y', 'AA'],
  ['AY', 'BA'],
  ['YY', 'AAA'],
])('after %s follows %s', (last, next) => {
  expect(nextReleaseLetter(last)).toBe(next)
})

it.each(['I', 'O', 'Q', 'S', 'X', 'Z', 'a', '', 'P1'])('refuses “%s” as a release letter', (last) => {
  expect(() => nextReleaseLetter(last)).toThrow(RangeError)
})

it('numbers drafts', () => {
  expect(nextDraftNumber(null)).toBe('P1')
  expect(nextDraftNumber('P9')).toBe('P10')
  expect(() => nextDraftNumber('A')).toThrow(RangeError)
  expect(() => nextDraftNumber('P0')).toThrow(RangeError)
})

it('orders releases', () => {
  expect(isEarlierRelease('Y', 'AA')).toBe(true)
  expect(isEarlierRelease('B', 'A')).toBe(false)
  expect(isEarlierRelease('A', 'A')).toBe(false)
})

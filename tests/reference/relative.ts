import { expect } from 'vitest'

/** Asserts that a value lies within a relative tolerance of the published one. */
export function expectWithin(actual: number, published: number, toleranceFraction: number): void {
  const deviation = published === 0 ? Math.abs(actual) : Math.abs(actual / published - 1)
  expect(deviation, `${actual} against ${published}`).toBeLessThanOrEqual(toleranceFraction)
}

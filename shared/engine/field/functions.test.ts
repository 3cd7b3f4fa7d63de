import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { modifiedBessel } from './bessel'
import { erf } from './error-function'

describe('modifiedBessel', () => {
  // Source: M. Abramowitz, I. Stegun, Handbook of Mathematical Functions, tables 9.8 and 9.11.
  it.each([
    { x: 0.1, i0: 1.0025015629, i1: 0.0500625260, k0: 2.4270690247, k1: 9.8538447809 },
    { x: 1, i0: 1.2660658778, i1: 0.5651591040, k0: 0.4210244382, k1: 0.6019072302 },
    { x: 5, i0: 27.2398718236, i1: 24.3356421425, k0: 0.0036910983, k1: 0.0040446134 },
  ])('at $x', ({ x, ...published }) => {
    const own = modifiedBessel(x)
    for (const name of ['i0', 'i1', 'k0', 'k1'] as const) expect(own[name] / published[name]).toBeCloseTo(1, 6)
  })

  it('keeps the Wronskian I0·K1 + I1·K0 = 1/x', () => {
    fc.assert(fc.property(fc.double({ min: 1e-3, max: 300, noNaN: true }), (x) => {
      const { i0, i1, k0, k1 } = modifiedBessel(x)
      expect((i0 * k1 + i1 * k0) * x).toBeCloseTo(1, 5)
    }))
  })

  it('refuses an argument that is not positive', () => expect(() => modifiedBessel(0)).toThrow(RangeError))
})

describe('erf', () => {
  // Source: Abramowitz and Stegun, table 7.1.
  it.each([[0, 0], [0.5, 0.5204998778], [1, 0.8427007929], [-1, -0.8427007929], [2, 0.995322265]])('of %d is %d', (x, published) => expect(erf(x)).toBeCloseTo(published, 6))
})

import { describe, expect, it } from 'vitest'
import { canonicalJson } from './canonical-json'

describe('canonicalJson', () => {
  // RFC 8785, section 3.2.2 and 3.2.3 (the published sample object).
  it('serialises the sample of RFC 8785', () => {
    const sample = {
      numbers: [333333333.33333329, 1e30, 4.5, 2e-3, 0.000000000000000000000000001],
      string: '€$\u000f\nA\'B"\\\\"/',
      literals: [null, true, false],
    }
    expect(canonicalJson(sample)).toBe(
      '{"literals":[null,true,false],"numbers":[333333333.3333333,1e+30,4.5,0.002,1e-27],"string":"€$\\u000f\\nA\'B\\"\\\\\\\\\\"/"}',
    )
  })

  it('gives composed and decomposed letters the same bytes', () => {
    expect(canonicalJson({ name: 'Gru\u0308n' })).toBe(canonicalJson({ name: 'Gr\u00fcn' }))
  })

  it('orders the keys and leaves out undefined members', () => {
    expect(canonicalJson({ b: 1, a: undefined, A: 2 })).toBe('{"A":2,"b":1}')
  })

  it.each([Number.NaN, Number.POSITIVE_INFINITY])('refuses %s', (value) => {
    expect(() => canonicalJson({ value })).toThrow(RangeError)
  })
})

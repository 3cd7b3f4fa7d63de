import { describe, expect, it } from 'vitest'
import { decideDecimalSign, evidenceOf, gatherEvidence, readMantissa } from './decimal-sign'

it.each([
  ['12,5', 'comma'],
  ['12.5', 'point'],
  ['0,250', 'comma'],
  ['1.250,0', 'comma'],
  ['1,250.0', 'point'],
  ['1,250,000', 'point'],
  ['6.120E-04', 'point'],
  ['1250.125', 'point'],
  ['1,250', null],
  ['1.250', null],
  ['612', null],
  ['OK', null],
])('%s speaks for %s', (text, sign) => {
  expect(evidenceOf(text)).toBe(sign)
})

describe('a file', () => {
  const decide = (texts: string[], separator = ';') => decideDecimalSign(gatherEvidence(texts.map((text, index) => ({ text, address: `B${index}` }))), separator)

  it('is decided by one cell that leaves no doubt', () => {
    expect(decide(['1,250', '12,5'])).toBe('comma')
    expect(decide(['1.250', '0.91'])).toBe('point')
  })

  it('with plain commas between its fields writes points', () => {
    expect(decide(['1.250'], ',')).toBe('point')
  })

  it('without evidence is not decided, and with both is mixed', () => {
    expect(decide(['1,250', '1,300'])).toBe('undecided')
    expect(decide(['12,5', '12.5'])).toBe('mixed')
  })
})

it.each([
  { mantissa: '1,250', sign: 'comma', reading: { kind: 'one', decimal: '1.250' } },
  { mantissa: '1,250', sign: 'point', reading: { kind: 'one', decimal: '1250' } },
  { mantissa: '1.250', sign: 'comma', reading: { kind: 'one', decimal: '1250' } },
  { mantissa: '1,250', sign: 'undecided', reading: { kind: 'two', decimal: '1.250', grouped: '1250' } },
  { mantissa: '12,5', sign: 'point', reading: { kind: 'one', decimal: '12.5' } },
  { mantissa: '1,25,0', sign: 'point', reading: { kind: 'none' } },
] as const)('reads $mantissa by $sign', ({ mantissa, sign, reading }) => {
  expect(readMantissa(mantissa, sign)).toEqual(reading)
})

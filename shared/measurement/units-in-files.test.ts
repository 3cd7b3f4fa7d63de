import { describe, expect, it } from 'vitest'
import type { MeasuredUnit } from './model'
import { readUnit, splitHeading } from './units-in-files'

const MICRO = '\u00b5'
const MU = '\u03bc'
const OHM_SIGN = '\u2126'
const OMEGA = '\u03a9'

describe('readUnit', () => {
  it.each<[string, MeasuredUnit, string]>([
    ['uH', 'H', 'µH'],
    [`${MICRO}H`, 'H', 'µH'],
    [`${MU}H`, 'H', 'µH'],
    ['UH', 'H', 'µH'],
    ['mH', 'H', 'mH'],
    [`m${OHM_SIGN}`, 'Ω', 'mΩ'],
    [`m${OMEGA}`, 'Ω', 'mΩ'],
    ['mohm', 'Ω', 'mΩ'],
    ['Mohm', 'Ω', 'MΩ'],
    ['Ohm', 'Ω', 'Ω'],
    ['R', 'Ω', 'Ω'],
    ['mR', 'Ω', 'mΩ'],
    ['khz', 'Hz', 'kHz'],
    ['pF', 'F', 'pF'],
    ['mm', 'mm', 'mm'],
  ])('reads %s as %s: %s', (text, base, symbol) => {
    expect(readUnit(text, base)).toMatchObject({ kind: 'unit', unit: { symbol } })
  })

  it('does not take mohm for Mohm', () => {
    const exponents = ['mohm', 'Mohm'].map((text) => readUnit(text, 'Ω')).map((unit) => (unit.kind === 'unit' ? unit.unit.modelExponent : null))
    expect(exponents).toEqual([-3, 6])
  })

  it('calls capitals ambiguous', () => {
    expect(readUnit('MOHM', 'Ω')).toMatchObject({ kind: 'ambiguous', units: [{ symbol: 'mΩ' }, { symbol: 'MΩ' }] })
    expect(readUnit('MH', 'H').kind).toBe('ambiguous')
  })

  it.each<[string, MeasuredUnit, string]>([
    ['mΩ', 'H', 'unlike'],
    ['', 'H', 'none'],
    ['turns', 'H', 'none'],
    ['cm', 'mm', 'none'],
  ])('answers to “%s” for %s: %s', (text, base, kind) => {
    expect(readUnit(text, base).kind).toBe(kind)
  })
})

it.each([
  ['Lp (uH)', 'Lp', 'uH'],
  ['Lp[µH]', 'Lp', 'µH'],
  ['DCR/mΩ', 'DCR', 'mΩ'],
  ['DCR S1, mohm', 'DCR S1', 'mohm'],
  ['Lp in µH', 'Lp', 'µH'],
  ['Lp\n(µH)', 'Lp', 'µH'],
  ['Llk uH', 'Llk', 'uH'],
  ['Rdc S1', 'Rdc S1', null],
  ['Rdc P', 'Rdc P', null],
  ['P:S1', 'P:S1', null],
  ['HV P–S', 'HV P–S', null],
])('parts “%s” into %s and %s', (heading, label, unit) => {
  expect(splitHeading(heading)).toEqual({ label, unit: unit === null ? null : unit.normalize('NFKC') })
})

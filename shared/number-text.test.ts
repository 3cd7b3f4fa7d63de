import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { enteredText } from './number-format'
import { explainUnreadable, readDecimal, readFigure } from './number-text'
import { plainUnit, shownUnit } from './shown-units'

describe('readDecimal', () => {
  it.each([
    ['12.5', '12.5'],
    ['12,5', '12.5'],
    ['0,250', '0.250'],
    [',5', '0.5'],
    ['1.250,00', '1250.00'],
    ['1,250.00', '1250.00'],
    ['1,250,000', '1250000'],
    ['1.250.000', '1250000'],
    ['1 250,5', '1250.5'],
    ['1\u202f250', '1250'],
    ["12'500.75", '12500.75'],
    ['1250,125', '1250.125'],
    ['1.250', '1.250'],
    ['+7', '7'],
    ['−3,2', '-3.2'],
    ['  42 ', '42'],
    ['１２．５', '12.5'],
    ['007', '7'],
  ])('reads %j as %s', (text, decimal) => {
    expect(readDecimal(text)).toEqual({ kind: 'decimal', decimal })
  })

  it('asks about one comma before three digits', () => {
    expect(readDecimal('1,250')).toEqual({ kind: 'ambiguous', readings: ['1.250', '1250'] })
    expect(readDecimal('-12,500')).toEqual({ kind: 'ambiguous', readings: ['-12.500', '-12500'] })
  })

  it('asks about one point before three digits only when told to', () => {
    expect(readDecimal('1.250', { askAboutPoint: true })).toEqual({ kind: 'ambiguous', readings: ['1.250', '1250'] })
    expect(readDecimal('0.250', { askAboutPoint: true })).toEqual({ kind: 'decimal', decimal: '0.250' })
  })

  it.each(['12 5', '1,25,0', '1.25.000', '1,2,3', '1.2,5', '1,250,00'])('refuses the uneven groups of %j', (text) => {
    expect(readDecimal(text)).toEqual({ kind: 'unreadable', reason: 'uneven-groups' })
  })

  it.each(['abc', '12 EUR', '--3', '1e3', '.', ',', 'NaN', '∞'])('refuses %j', (text) => {
    expect(readDecimal(text)).toEqual({ kind: 'unreadable', reason: 'not-a-number' })
  })

  it('calls blanks empty', () => {
    expect(readDecimal(' \u00a0')).toEqual({ kind: 'empty' })
  })
})

describe('readFigure', () => {
  it.each([
    ['120', 'µH', 120e-6],
    ['120 uH', 'µH', 120e-6],
    ['120 μH', 'µH', 120e-6],
    ['0,61 mH', 'µH', 0.61e-3],
    ['610u', 'µH', 610e-6],
    ['6.12E-04 H', 'µH', 612e-6],
    ['4.7k', 'Ω', 4700],
    ['4k7', 'Ω', 4700],
    ['2R2', 'Ω', 2.2],
    ['120R', 'Ω', 120],
    ['33 mohm', 'Ω', 0.033],
    ['33 Mohm', 'Ω', 33e6],
    ['65', 'kHz', 65e3],
    ['65k', 'kHz', 65e3],
    ['65000 Hz', 'kHz', 65e3],
    ['0.3', 'mm', 0.3],
    ['300 µm', 'mm', 0.3],
    ['2 m', 'mm', 2000],
    ['85', '%', 0.85],
    ['85 %', '%', 0.85],
    ['-40 °C', '°C', -40],
    ['4.5 A/mm2', 'A/mm²', 4.5e6],
    ['12', '', 12],
  ])('reads %j in a %s field', (text, symbol, value) => {
    expect(readFigure(text, shownUnit(symbol))).toEqual({ kind: 'figure', value })
  })

  it('offers both values of an ambiguous text, scaled to the unit', () => {
    expect(readFigure('1,250 mH', shownUnit('µH'))).toEqual({ kind: 'ambiguous', values: [1.25e-3, 1.25] })
  })

  it('takes a comma before an exponent for the decimal sign', () => {
    expect(readFigure('1,250e-3', shownUnit('H'))).toEqual({ kind: 'figure', value: 1.25e-3 })
  })

  it.each([
    ['5 V', 'A', 'V'],
    ['12m', '', 'm'],
    ['3k', 'mm', 'k'],
    ['5R', 'V', 'R'],
    ['10 in', 'mm', 'in'],
    ['3 s?', 'ms', 's?'],
  ])('refuses the unit of %j in a %j field', (text, symbol, found) => {
    expect(readFigure(text, shownUnit(symbol))).toEqual({ kind: 'unreadable', reason: 'unknown-unit', found })
  })

  it('reads back exactly what an entry field shows', () => {
    const units = ['µH', 'mm', '%', 'kHz', 'mΩ', 'A/mm²', 'pF'].map(shownUnit)
    fc.assert(
      fc.property(fc.integer({ min: -999_999_999, max: 999_999_999 }), fc.integer({ min: -6, max: 6 }), fc.constantFrom(...units), (digits, power, unit) => {
        const value = Number(`${digits}e${power + unit.modelExponent}`)
        expect(readFigure(enteredText(value, unit), unit)).toEqual({ kind: 'figure', value })
      }),
    )
  })
})

describe('plainUnit', () => {
  it.each([
    ['kOhm', 'kΩ'],
    ['mΩ', 'mΩ'],
    ['A / mm^2', 'A/mm2'],
    ['um', 'µm'],
  ])('writes %j as %s', (text, plain) => {
    expect(plainUnit(text)).toBe(plain)
  })
})

describe('explainUnreadable', () => {
  it('names the unit found and the unit expected', () => {
    expect(explainUnreadable('unknown-unit', 'µH', 'V')).toBe('“V” is not a unit of this field. Give the value in µH.')
  })
})

describe('shownUnit', () => {
  it('refuses a unit that is not listed', () => {
    expect(() => shownUnit('furlong')).toThrow(RangeError)
  })
})

import { describe, expect, it } from 'vitest'
import { enteredText, formatEngineering, formatMoney, formatNumber, formatQuantity, groupDigits, shiftDecimal } from './number-format'
import { shownUnit } from './shown-units'

describe('shiftDecimal', () => {
  it.each([
    ['0.00012', 6, '120'],
    ['120', -6, '0.00012'],
    ['-1.5', 3, '-1500'],
    ['1e-7', 9, '100'],
    ['6.02e+23', -23, '6.02'],
    ['0', -3, '0'],
    ['.5', 0, '0.5'],
    ['100.500', 0, '100.5'],
  ])('moves the point of %s by %i', (text, places, result) => {
    expect(shiftDecimal(text, places)).toBe(result)
  })

  it('refuses what is not decimal text', () => {
    expect(() => shiftDecimal('1,5', 1)).toThrow(RangeError)
  })
})

describe('enteredText', () => {
  it('shows a kept value without binary noise', () => {
    expect(enteredText(0.1 + 0.2, shownUnit('V'))).toBe('0.3')
    expect(enteredText(120e-6, shownUnit('µH'))).toBe('120')
  })
})

describe('formatNumber', () => {
  it('rounds to four significant digits unless told otherwise', () => {
    expect(formatNumber(3.14159)).toBe('3.142')
    expect(formatNumber(3.14159, { significant: 2 })).toBe('3.1')
    expect(formatNumber(2.5, { decimals: 2 })).toBe('2.50')
  })

  it('sets groups of three from five digits on and writes a true minus', () => {
    expect(groupDigits('-12500.75')).toBe('\u221212\u202f500.75')
    expect(groupDigits('1250')).toBe('1250')
  })

  it('shows no minus before a rounded zero, and a dash for no value', () => {
    expect(formatNumber(-0.001, { decimals: 2 })).toBe('0.00')
    expect(formatNumber(null)).toBe('–')
    expect(formatNumber(Number.POSITIVE_INFINITY)).toBe('∞')
  })
})

describe('formatQuantity', () => {
  it('keeps figure and unit together', () => {
    expect(formatQuantity(120e-6, shownUnit('µH'))).toBe('120\u00a0µH')
    expect(formatQuantity(0.853, shownUnit('%'), { significant: 3 })).toBe('85.3\u00a0%')
    expect(formatQuantity(7, shownUnit(''))).toBe('7')
    expect(formatQuantity(undefined, shownUnit('V'))).toBe('–')
  })
})

describe('formatEngineering', () => {
  it.each([
    [0.00012, 'H', '120\u00a0µH'],
    [4700, 'Ω', '4.7\u00a0kΩ'],
    [999.96e-6, 'H', '1\u00a0mH'],
    [0, 'A', '0\u00a0A'],
    [2e-14, 'F', '0.02\u00a0pF'],
    [-0.25, 'V', '\u2212250\u00a0mV'],
  ])('%d %s', (value, base, text) => {
    expect(formatEngineering(value, base)).toBe(text)
  })
})

describe('formatMoney', () => {
  it('shows every digit the amount has and at least two decimals', () => {
    expect(formatMoney('1.180000', 'USD')).toBe('1.18\u00a0USD')
    expect(formatMoney('0.985600', 'EUR')).toBe('0.9856\u00a0EUR')
    expect(formatMoney('123456789012.100000', 'EUR')).toBe('123\u202f456\u202f789\u202f012.10\u00a0EUR')
  })
})

import { describe, expect, it } from 'vitest'
import { addMoney, AMOUNT_PATTERN, amountText, Decimal, isCurrency, multiplyMoney, roundedAmountText } from './money'

describe('amountText', () => {
  it.each([
    { value: '1.18', text: '1.180000' },
    { value: '0.1', text: '0.100000' },
    { value: '-3500', text: '-3500.000000' },
    { value: '999999999999.999999', text: '999999999999.999999' },
  ])('writes $value as $text', ({ value, text }) => {
    expect(amountText(value)).toBe(text)
    expect(text).toMatch(AMOUNT_PATTERN)
  })

  it('refuses a seventh place instead of rounding it away', () => {
    expect(() => amountText('1.1234567')).toThrow(RangeError)
  })

  it('refuses what the column cannot hold', () => {
    expect(() => amountText('1000000000000')).toThrow(RangeError)
  })
})

it('adds tenths without the error of binary fractions', () => {
  expect(addMoney({ amount: '0.1', currency: 'EUR' }, { amount: '0.2', currency: 'EUR' })).toEqual({ amount: '0.300000', currency: 'EUR' })
})

it('refuses to add two currencies', () => {
  expect(() => addMoney({ amount: '1', currency: 'EUR' }, { amount: '1', currency: 'USD' })).toThrow(RangeError)
})

it('multiplies a price by a quantity exactly', () => {
  expect(multiplyMoney({ amount: '1.090001', currency: 'USD' }, 5000)).toEqual({ amount: '5450.005000', currency: 'USD' })
})

it('rounds a computed figure half away from zero at the sixth place', () => {
  expect(roundedAmountText(new Decimal('0.0000005'))).toBe('0.000001')
  expect(roundedAmountText(new Decimal('-0.0000005'))).toBe('-0.000001')
})

it.each([
  ['EUR', true],
  ['eur', false],
  ['XYZ', false],
  ['toString', false],
])('knows whether %s is a currency: %s', (code, known) => {
  expect(isCurrency(code)).toBe(known)
})

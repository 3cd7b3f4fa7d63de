import { describe, expect, it } from 'vitest'
import { amountText, unitPriceAt } from './quote-cells'

const line = {
  priceBreaks: [
    { fromQuantity: 1000, price: '1.41', unitPrice: '1.41' },
    { fromQuantity: 5000, price: '1.29', unitPrice: '1.29' },
  ],
}

describe('unitPriceAt', () => {
  it.each([
    { name: 'below the first break there is no price', quantity: 999, price: null },
    { name: 'at a break its price', quantity: 5000, price: '1.29' },
    { name: 'between two breaks the lower one, not something between', quantity: 4999, price: '1.41' },
    { name: 'above the last break the last', quantity: 90_000, price: '1.29' },
  ])('$name', ({ quantity, price }) => {
    expect(unitPriceAt(line, quantity)).toBe(price)
  })
})

describe('amountText', () => {
  it('tells not quoted, included and an amount apart', () => {
    expect(amountText(null, 'EUR')).toBe('not quoted')
    expect(amountText('0.000000', 'EUR')).toBe('included')
    expect(amountText('3500.000000', 'EUR')).toContain('EUR')
  })
})

import { describe, expect, it } from 'vitest'
import { priceAtQuantity, priceBreakDoubts } from './price-at-quantity'

const breaks = [
  { minimumQuantity: 5000, price: '1.180000' },
  { minimumQuantity: 1000, price: '1.400000' },
  { minimumQuantity: 10000, price: '1.100000' },
]

describe('priceAtQuantity', () => {
  it.each([
    { quantity: 1000, price: '1.400000' },
    { quantity: 4999, price: '1.400000' },
    { quantity: 5000, price: '1.180000' },
    { quantity: 7500, price: '1.180000' },
    { quantity: 20000, price: '1.100000' },
  ])('takes the highest break not above $quantity: $price', ({ quantity, price }) => {
    expect(priceAtQuantity(breaks, quantity)).toMatchObject({ kind: 'price', price })
  })

  it('has no price below the first break', () => {
    expect(priceAtQuantity(breaks, 999)).toEqual({ kind: 'below-first-break', firstQuantity: 1000 })
  })

  it('calls an empty table missing', () => {
    expect(priceAtQuantity([], 10)).toEqual({ kind: 'missing' })
  })

  it.each([0, -1, 1.5])('refuses the quantity %s', (quantity) => {
    expect(() => priceAtQuantity(breaks, quantity)).toThrow(RangeError)
  })
})

describe('priceBreakDoubts', () => {
  it('asks about a break that is dearer than a smaller one', () => {
    expect(priceBreakDoubts([...breaks, { minimumQuantity: 20000, price: '1.150000' }], null)).toEqual([
      { minimumQuantity: 20000, code: 'dearer-than-smaller-break' },
    ])
  })

  it('asks about a break below the minimum order quantity', () => {
    expect(priceBreakDoubts(breaks, 3000)).toEqual([{ minimumQuantity: 1000, code: 'below-minimum-order-quantity' }])
  })

  it('has nothing to ask about a plain table', () => {
    expect(priceBreakDoubts(breaks, 1000)).toEqual([])
  })
})

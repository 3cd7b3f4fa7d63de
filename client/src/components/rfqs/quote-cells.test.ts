import { describe, expect, it } from 'vitest'
import { exampleQuote, exampleRfq } from '../../../../tests/support/rfq-example'
import { amountText, breaksAsWritten, rowsOf, standing, unitPriceAt } from './quote-cells'

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

describe('rowsOf', () => {
  const [asked] = exampleRfq().lines
  const cell = (label: RegExp, ...quotes: Parameters<typeof rowsOf>[1][number][]) => rowsOf(asked!, quotes).find((row) => label.test(row.label))?.cells

  it('gives the price of one piece whatever unit it was written for, and says where there is none', () => {
    const quote = exampleQuote()
    expect(cell(/^Unit price at 500\s/, quote)).toEqual([['not quoted']])
    expect(cell(/^Unit price at 5000\s/, quote)).toEqual([['1.09 USD'.replace(' ', '\u00a0')]])
    expect(breaksAsWritten(quote.lines[0]!, 'USD')[1]).toMatch(/^from 5000\spcs: 109\.00\sUSD per 100$/)
  })

  it('adds the quantity that is compared where it is no price break', () => {
    expect(cell(/^Unit price at 2000\spcs, compared here$/, exampleQuote())).toEqual([[expect.stringMatching(/^1\.185\sUSD$/)]])
  })

  it('says not quoted all the way down where a vendor left the part out', () => {
    const without = exampleQuote({ id: 'other', lines: [] })
    const rows = rowsOf(asked!, [without])
    expect(rows.length).toBeGreaterThan(9)
    expect(rows.flatMap(({ cells }) => cells.flat()).every((text) => text === 'not quoted')).toBe(true)
  })

  it('compares the revision that counts and no earlier or withdrawn one', () => {
    const quotes = [exampleQuote({ id: '1', state: 'superseded' }), exampleQuote({ id: '2', revision: 2 }), exampleQuote({ id: '3', state: 'withdrawn' })]
    expect(standing(quotes).map(({ id }) => id)).toEqual(['2'])
  })
})

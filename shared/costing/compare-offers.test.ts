import { describe, expect, it } from 'vitest'
import { awardedTotal, compareOffersForLine, type AskedLine, type BuyerFigures, type CommonBasis, type OfferedTerms } from './compare-offers'

const TODAY = '2026-05-04'
const asked: AskedLine = { lineId: 'l1', quantities: [1000, 5000, 10000], orderQuantity: 5000, annualQuantity: 20000 }
const basis: CommonBasis = {
  years: 2,
  exchange: { base: 'EUR', date: TODAY, source: 'entered for this test', rates: { USD: '0.92', CNY: '0.13' } },
  capitalRatePerYear: '0.08',
  dutyRate: '0',
  insuranceRate: '0',
  customsValue: 'CIF',
  stockShare: '0.5',
}
const known: BuyerFigures = { freightPerShipment: { amount: '0', currency: 'EUR' }, inspectionPerShipment: { amount: '0', currency: 'EUR' }, yieldLoss: '0' }

function offer(quoteId: string, price: string, more: Partial<OfferedTerms> = {}, line: Partial<OfferedTerms['lines'][number]> = {}): OfferedTerms {
  return {
    quoteId,
    currency: 'EUR',
    deliveryTerm: 'DDP',
    creditDays: 30,
    validUntil: '2026-12-31',
    lines: [{ lineId: 'l1', priceUnit: 1, breaks: [{ minimumQuantity: 1000, price: '2' }, { minimumQuantity: 5000, price }], oneTimeCost: '0', samplesPrice: null, leadTimeDays: 28, minimumOrderQuantity: 1000, ...line }],
    ...more,
  }
}
const compare = (...offers: OfferedTerms[]) => compareOffersForLine(asked, offers, basis, new Map(offers.map(({ quoteId }) => [quoteId, known])), TODAY)

it('shows the price at every quantity that was asked and none below the first break', () => {
  const [line] = compareOffersForLine({ ...asked, quantities: [500, 1000, 7000] }, [offer('a', '1.3')], basis, new Map(), TODAY)
  expect(line!.prices).toEqual([{ quantity: 500, unitPrice: null }, { quantity: 1000, unitPrice: '2' }, { quantity: 7000, unitPrice: '1.3' }])
  expect(line).toMatchObject({ breakUsed: 5000, unitPriceAtOrder: '1.3' })
})

it('brings a price per hundred to one piece', () => {
  expect(compare(offer('a', '109', {}, { priceUnit: 100 }))[0]!.unitPriceAtOrder).toBe('1.09')
})

it('ranks by landed cost and gives equal cost the same rank', () => {
  expect(compare(offer('a', '1.3'), offer('b', '1.2'), offer('c', '1.2')).map(({ rank }) => rank)).toEqual([3, 1, 1])
})

describe('shows and does not rank', () => {
  it.each([
    { name: 'an expired offer', offer: offer('x', '1', { validUntil: '2026-05-03' }), flag: 'expired' },
    { name: 'a minimum above the order', offer: offer('x', '1', {}, { minimumOrderQuantity: 6000 }), flag: 'below-minimum-order' },
    { name: 'a one-time cost that is not quoted', offer: offer('x', '1', {}, { oneTimeCost: null }), flag: 'incomplete' },
    { name: 'a currency without a rate', offer: offer('x', '1', { currency: 'GBP' }), flag: 'incomplete' },
    { name: 'an order below the first break', offer: offer('x', '1', {}, { breaks: [{ minimumQuantity: 6000, price: '1' }] }), flag: 'below-first-break' },
    { name: 'a line that is not quoted', offer: offer('x', '1', { lines: [] }), flag: 'line-not-quoted' },
  ])('$name', ({ offer: doubtful, flag }) => {
    const [doubted, sound] = compare(doubtful, offer('b', '1.2'))
    expect(doubted!.rank).toBeNull()
    expect(doubted!.flags).toContain(flag)
    expect(sound!.rank).toBe(1)
  })
})

it('ranks an offer on its last day', () => {
  expect(compare(offer('a', '1', { validUntil: TODAY }))[0]).toMatchObject({ rank: 1, flags: [] })
})

it('asks about an offer far from the median, as one in a wrong currency is', () => {
  const [, , wrong] = compare(offer('a', '1.3'), offer('b', '1.2'), offer('c', '9.85'))
  expect(wrong!.flags).toEqual(['outlier-above'])
  expect(Number(wrong!.medianRatio)).toBeCloseTo(7.58, 2)
})

describe('awardedTotal', () => {
  it('counts one-time cost with the pieces, exactly', () => {
    expect(awardedTotal(offer('a', '1.290001', {}, { oneTimeCost: '3500' }), [asked])).toEqual({ pieces: '6450.005', oneTime: '3500', total: '9950.005', unpriced: [] })
  })

  it('names lines without a price', () => {
    expect(awardedTotal(offer('a', '1'), [asked, { ...asked, lineId: 'l2' }])).toMatchObject({ unpriced: ['l2'] })
    expect(awardedTotal(offer('a', '1'), [{ ...asked, orderQuantity: 10 }])).toMatchObject({ total: '0', unpriced: ['l1'] })
  })
})

import { describe, expect, it } from 'vitest'
import { Decimal } from '#shared/money'
import { landedCost, type LandedCostBasis, type LandedCostOffer } from './landed-cost'

const basis: LandedCostBasis = {
  orderQuantity: 5000,
  annualQuantity: 20000,
  years: 2,
  exchange: { base: 'EUR', date: '2026-03-27', source: 'entered for this example', rates: { USD: '0.92' } },
  capitalRatePerYear: '0.08',
  dutyRate: '0.037',
  insuranceRate: '0.002',
  customsValue: 'CIF',
  stockShare: '0.5',
}

const quillon: LandedCostOffer = {
  currency: 'USD',
  priceBasis: 1,
  breaks: [{ minimumQuantity: 5000, price: '1.180000' }],
  deliveryTerm: 'FCA',
  oneTimeCost: { kind: 'quoted', amount: '3500' },
  freightPerShipment: { amount: '900', currency: 'USD' },
  inspectionPerShipment: { amount: '400', currency: 'EUR' },
  creditDays: 60,
  leadTimeDays: 56,
  yieldLoss: '0.003',
}
const tamsen: LandedCostOffer = {
  currency: 'EUR',
  priceBasis: 1,
  breaks: [{ minimumQuantity: 5000, price: '1.290000' }],
  deliveryTerm: 'DDP',
  oneTimeCost: { kind: 'included' },
  freightPerShipment: null,
  inspectionPerShipment: { amount: '200', currency: 'EUR' },
  creditDays: 30,
  leadTimeDays: 28,
  yieldLoss: '0.001',
}
const oakhollow: LandedCostOffer = {
  currency: 'USD',
  priceBasis: 100,
  breaks: [{ minimumQuantity: 5000, price: '109.000000' }],
  deliveryTerm: 'EXW',
  oneTimeCost: { kind: 'quoted', amount: '6800' },
  freightPerShipment: { amount: '1350', currency: 'USD' },
  inspectionPerShipment: { amount: '400', currency: 'EUR' },
  creditDays: 0,
  leadTimeDays: 70,
  yieldLoss: '0.006',
}

const rounded = (amount: string | null, places: number) => (amount === null ? null : new Decimal(amount).toFixed(places))
const lineAmounts = (offer: LandedCostOffer) =>
  Object.fromEntries(landedCost(offer, basis).lines.map(({ name, amount }) => [name, rounded(amount, 4)]))

/** Worked by hand for 5000 pieces, USD at 0.92 EUR, capital 8 %, duty 3.7 % on CIF, insurance 0.2 %. */
describe('a worked comparison of three offers', () => {
  it.each([
    { name: 'FCA in dollars', offer: quillon, landed: '1.4565', perYear: '29131', lines: { unit: '1.0856', freight: '0.1656', insurance: '0.0022', duty: '0.0464', 'one-time': '0.0805', terms: '-0.0143', stock: '0.0067', inspection: '0.0800', yield: '0.0039' } },
    { name: 'DDP in euro', offer: tamsen, landed: '1.3268', perYear: '26535', lines: { unit: '1.2900', freight: '0.0000', insurance: '0.0000', duty: '0.0000', 'one-time': '0.0000', terms: '-0.0085', stock: '0.0040', inspection: '0.0400', yield: '0.0013' } },
    { name: 'EXW in dollars per hundred', offer: oakhollow, landed: '1.5515', perYear: '31029', lines: { unit: '1.0028', freight: '0.2484', insurance: '0.0020', duty: '0.0464', 'one-time': '0.1564', terms: '0.0000', stock: '0.0077', inspection: '0.0800', yield: '0.0078' } },
  ])('$name: $landed EUR', ({ offer, landed, perYear, lines }) => {
    const result = landedCost(offer, basis)
    expect(lineAmounts(offer)).toEqual(Object.fromEntries(Object.entries(lines).map(([key, value]) => [key, value === '0.0000' ? expect.stringMatching(/^-?0\.0000$/) : value])))
    expect(rounded(result.landed, 4)).toBe(landed)
    expect(rounded(result.perYear, 0)).toBe(perYear)
    expect(result.missing).toEqual([])
  })

  it('ranks by landed cost the other way round than by unit price', () => {
    const ranked = (key: (offer: LandedCostOffer) => number) => [quillon, tamsen, oakhollow].sort((a, b) => key(a) - key(b))
    const unit = (offer: LandedCostOffer) => Number(landedCost(offer, basis).lines[0]!.amount)
    const landed = (offer: LandedCostOffer) => Number(landedCost(offer, basis).landed)
    expect(ranked(unit)).toEqual([oakhollow, quillon, tamsen])
    expect(ranked(landed)).toEqual([tamsen, quillon, oakhollow])
  })

  it('adds up from unrounded lines', () => {
    const { lines, landed } = landedCost(quillon, basis)
    expect(lines.reduce((sum, { amount }) => sum.plus(amount!), new Decimal(0)).toString()).toBe(landed)
  })
})

describe('what is missing', () => {
  it('is not zero: no landed cost without the one-time cost', () => {
    const result = landedCost({ ...quillon, oneTimeCost: { kind: 'missing' } }, basis)
    expect(result).toMatchObject({ landed: null, perYear: null, missing: ['one-time cost'] })
    expect(Number(result.partial)).toBeGreaterThan(1)
  })

  it('is named once, not again in every line that rests on it', () => {
    expect(landedCost({ ...quillon, freightPerShipment: null }, basis).missing).toEqual(['freight per shipment'])
    expect(landedCost({ ...quillon, breaks: [] }, basis).missing).toEqual(['price'])
  })

  it('includes a rate that the table does not have', () => {
    expect(landedCost({ ...quillon, currency: 'GBP', freightPerShipment: null }, basis).missing).toEqual(['rate GBP', 'freight per shipment'])
  })

  it('includes a price below the first break', () => {
    expect(landedCost(quillon, { ...basis, orderQuantity: 4999 }).missing).toEqual(['price'])
  })

  it('never asks for freight that the delivery term covers', () => {
    expect(landedCost({ ...quillon, deliveryTerm: 'DAP', freightPerShipment: null }, basis).missing).toEqual([])
  })
})

it('takes duty on the goods alone where customs value is FOB', () => {
  const duty = landedCost(quillon, { ...basis, customsValue: 'FOB' }).lines.find(({ name }) => name === 'duty')!
  expect(rounded(duty.amount, 6)).toBe('0.040167')
  expect(duty.formula).toBe('(unit) × duty rate')
})

it('says how each line was made', () => {
  const [unit, freight] = landedCost(quillon, basis).lines
  expect(unit).toMatchObject({ formula: 'price / price basis × rate USD', inputs: { price: '1.18', 'price basis': '1', 'rate USD': '0.92' } })
  expect(freight!.formula).toBe('freight per shipment × rate USD / order quantity')
})

it.each([
  { name: 'no annual quantity', basis: { ...basis, annualQuantity: 0 }, offer: quillon },
  { name: 'no years', basis: { ...basis, years: 0 }, offer: quillon },
  { name: 'a price basis of nothing', basis, offer: { ...quillon, priceBasis: 0 } },
])('refuses $name', (row) => {
  expect(() => landedCost(row.offer, row.basis)).toThrow(RangeError)
})

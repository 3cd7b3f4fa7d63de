import { expect, it } from 'vitest'
import { comparisonBasisSchema } from '#shared/contracts/awards'
import type { Quote } from '#shared/contracts/quotes'
import type { Rfq } from '#shared/contracts/rfqs'
import { basisOf, emptyBasis, needsRates } from './basis-draft'

const ids = ['3f0c2f3a-0c57-4b51-9c52-0d1f5b0a5d01', '3f0c2f3a-0c57-4b51-9c52-0d1f5b0a5d02', '3f0c2f3a-0c57-4b51-9c52-0d1f5b0a5d03'] as const
const rfq = { id: 'r', lines: [{ id: ids[0], orderQuantity: 5000, annualQuantity: null }] } as unknown as Rfq
const quotes = [
  { id: ids[1], currency: 'USD' },
  { id: ids[2], currency: 'EUR' },
] as unknown as Quote[]

it('asks for a rate of every currency but the base', () => {
  const draft = emptyBasis(rfq, quotes, 'EUR')
  expect(draft.rates).toEqual({ USD: null })
  expect(needsRates(draft)).toBe(true)
  expect(needsRates(emptyBasis(rfq, quotes.slice(1), 'EUR'))).toBe(false)
})

it('keeps what is empty as not stated, and shares as exact text', () => {
  const draft = emptyBasis(rfq, quotes, 'EUR')
  Object.assign(draft, { date: '2026-03-27', source: 'central bank', dutyRate: 0.037 })
  draft.rates.USD = '0.92'
  draft.offers[ids[1]]!.freight = '900'
  draft.offers[ids[1]]!.yieldLoss = 0.003
  const basis = basisOf(draft)
  expect(comparisonBasisSchema.parse(basis)).toEqual(basis)
  expect(basis).toMatchObject({
    dutyRate: '0.037',
    insuranceRate: '0.002',
    lines: [{ orderQuantity: 5000, annualQuantity: 5000 }],
    offers: [
      { freightPerShipment: { amount: '900', currency: 'USD' }, inspectionPerShipment: null, yieldLoss: '0.003' },
      { freightPerShipment: null, inspectionPerShipment: null, yieldLoss: null },
    ],
  })
})

import { describe, expect, it } from 'vitest'
import { quoteHints, type HintedLine, type HintedOffer } from './quote-hints'

const asked = [{ id: 'a', quantities: [1000, 5000, 10_000] }]
const rfq = { currency: 'EUR', deliveryRule: 'DAP', terms: { validityDays: 60 } }

const line = (change: Partial<HintedLine> = {}): HintedLine => ({
  lineId: 'a',
  priceBreaks: [
    { fromQuantity: 1000, price: '1.41' },
    { fromQuantity: 5000, price: '1.29' },
  ],
  minimumOrderQuantity: 1000,
  packQuantity: 100,
  ...change,
})
const offer = (change: Partial<HintedOffer> = {}): HintedOffer => ({ currency: 'EUR', deliveryRule: 'DAP', validUntil: '2026-06-01', submittedAt: '2026-03-27T10:00:00Z', lines: [line()], ...change })
const found = (value: HintedOffer) => quoteHints(value, rfq, asked).map(({ code, path }) => [code, path])

describe('quoteHints', () => {
  it('says nothing about an offer that answers what was asked', () => {
    expect(found(offer())).toEqual([])
  })

  it.each([
    ['a break dearer than the one before', { lines: [line({ priceBreaks: [{ fromQuantity: 5000, price: '1.2' }, { fromQuantity: 10_000, price: '1.21' }] })] }, 'dearer-break', 'lines.0.priceBreaks.1.price'],
    ['a minimum of 3000 above the break at 1000', { lines: [line({ minimumOrderQuantity: 3000 })] }, 'minimum-above-break', 'lines.0.minimumOrderQuantity'],
    ['a minimum that is no multiple of the pack', { lines: [line({ minimumOrderQuantity: 950 })] }, 'minimum-not-packs', 'lines.0.minimumOrderQuantity'],
    ['an asked quantity below the first break', { lines: [line({ priceBreaks: [{ fromQuantity: 5000, price: '1' }] })] }, 'quantity-not-quoted', 'lines.0.priceBreaks'],
    ['another currency', { currency: 'CNY' }, 'other-currency', 'currency'],
    ['another delivery rule', { deliveryRule: 'EXW' }, 'other-delivery', 'deliveryRule'],
    ['a validity shorter than asked', { validUntil: '2026-04-27' }, 'short-validity', 'validUntil'],
    ['a part left out', { lines: [] }, 'parts-not-quoted', 'lines'],
  ] as const)('points at %s', (_, change, code, path) => {
    expect(found(offer(change as Partial<HintedOffer>))).toContainEqual([code, path])
  })

  it('compares over a row that is not finished and hints at nothing that is not typed yet', () => {
    const rows = [{ fromQuantity: 1000, price: '1.2' }, { fromQuantity: 5000, price: null }, { fromQuantity: 10_000, price: '1.3' }]
    expect(found(offer({ validUntil: null, lines: [line({ priceBreaks: rows, minimumOrderQuantity: null })] }))).toEqual([['dearer-break', 'lines.0.priceBreaks.2.price']])
  })
})

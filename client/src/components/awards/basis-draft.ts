import type { ComparisonBasis } from '#shared/contracts/awards'
import type { Quote } from '#shared/contracts/quotes'
import type { Rfq } from '#shared/contracts/rfqs'
import { shiftDecimal } from '#shared/number-format'

/** What the form of a comparison holds: figures as they are entered, shares as fractions. */
export interface BasisDraft {
  base: string
  date: string | null
  source: string
  rates: Record<string, string | null>
  lines: Record<string, { orderQuantity: number | null; annualQuantity: number | null }>
  years: number | null
  capitalRate: number | null
  dutyRate: number | null
  insuranceRate: number | null
  customsValue: 'CIF' | 'FOB'
  stockShare: number | null
  offers: Record<string, { freight: string | null; freightCurrency: string; inspection: string | null; yieldLoss: number | null }>
}

export function emptyBasis(rfq: Rfq, quotes: readonly Quote[], base: string): BasisDraft {
  const currencies = [...new Set(quotes.map(({ currency }) => currency))].filter((currency) => currency !== base)
  return {
    base,
    date: null,
    source: '',
    rates: Object.fromEntries(currencies.map((currency) => [currency, null])),
    lines: Object.fromEntries(rfq.lines.map(({ id, orderQuantity, annualQuantity }) => [id, { orderQuantity, annualQuantity: annualQuantity ?? orderQuantity }])),
    years: 1,
    capitalRate: 0.08,
    dutyRate: 0,
    insuranceRate: 0.002,
    customsValue: 'CIF',
    stockShare: 0.5,
    offers: Object.fromEntries(quotes.map(({ id, currency }) => [id, { freight: null, freightCurrency: currency, inspection: null, yieldLoss: null }])),
  }
}

const share = (value: number | null) => (value === null ? '' : shiftDecimal(String(value), 0))
const stated = (amount: string | null, currency: string) => (amount === null ? null : { amount, currency })

/** Whether the comparison needs a rate at all. */
export const needsRates = (draft: BasisDraft): boolean => Object.keys(draft.rates).length > 0

/** As the server takes it; what is left empty is "not stated". */
export function basisOf(draft: BasisDraft): ComparisonBasis {
  const rates = Object.entries(draft.rates).filter((entry): entry is [string, string] => entry[1] !== null)
  return {
    exchange: { base: draft.base, date: draft.date ?? '', source: draft.source, rates: Object.fromEntries(rates) },
    lines: Object.entries(draft.lines).map(([lineId, { orderQuantity, annualQuantity }]) => ({ lineId, orderQuantity: orderQuantity ?? 0, annualQuantity: annualQuantity ?? 0 })),
    years: draft.years ?? 0,
    capitalRatePerYear: share(draft.capitalRate),
    dutyRate: share(draft.dutyRate),
    insuranceRate: share(draft.insuranceRate),
    customsValue: draft.customsValue,
    stockShare: share(draft.stockShare),
    offers: Object.entries(draft.offers).map(([quoteId, { freight, freightCurrency, inspection, yieldLoss }]) => ({
      quoteId,
      freightPerShipment: stated(freight, freightCurrency),
      inspectionPerShipment: stated(inspection, draft.base),
      yieldLoss: yieldLoss === null ? null : share(yieldLoss),
    })),
  }
}

import type { APPROVAL_REFUSALS, Award, Comparison, OFFER_FLAGS } from '#shared/contracts/awards'
import type { CostLineName } from '#shared/costing/landed-cost'
import { formatNumber } from '#shared/number-format'

export const AWARD_STATE_WORDS: Record<Award['state'], string> = {
  proposed: 'Waits for approval',
  approved: 'Approved',
  rejected: 'Rejected',
  void: 'Void: proposed anew',
  ordered: 'Ordered',
}

export const FLAG_WORDS: Record<(typeof OFFER_FLAGS)[number], string> = {
  expired: 'Expired',
  'other-issue': 'Answers an earlier issue of the enquiry',
  'below-first-break': 'No price at this quantity',
  'below-minimum-order': 'Order below the vendor’s minimum',
  'line-not-quoted': 'Not quoted',
  'outlier-below': 'More than 40 % below the median: was the drawing read?',
  'outlier-above': 'More than 40 % above the median: currency and price unit right?',
  incomplete: 'Not ranked: figures are missing',
}

export const COST_LINE_WORDS: Record<CostLineName, string> = {
  unit: 'Unit price',
  freight: 'Freight',
  insurance: 'Insurance',
  duty: 'Duty',
  'one-time': 'One-time cost',
  terms: 'Payment terms',
  stock: 'Stock in transit',
  inspection: 'Inspection',
  yield: 'Expected loss',
}

export const REFUSAL_WORDS: Record<(typeof APPROVAL_REFUSALS)[number], string> = {
  'not-proposed': 'This proposal does not wait for approval.',
  'comparison-changed': 'The comparison has changed.',
  'own-proposal': 'You proposed this award yourself; another person approves it.',
  'conflict-of-interest': 'You declared an interest in this vendor; another approver decides.',
  'offer-expired': 'The quotation has expired; it cannot be awarded without an extension.',
  'no-limit': 'You have no approval limit.',
  'limit-currency': 'Your limit is in a currency for which the comparison has no rate.',
  'over-limit': 'The award is above your limit, one-time cost included; an approver with a higher limit decides.',
}

/** Cost per piece, rounded to the four decimals that prices of such parts are compared with. */
export const costText = (amount: string | null): string => (amount === null ? 'missing' : formatNumber(Number(amount), { decimals: 4 }))

export const offerName = (comparison: Comparison, quoteId: string): string => comparison.offers.find((offer) => offer.quoteId === quoteId)?.vendorName ?? '–'

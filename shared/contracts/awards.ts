import { COST_LINES } from '#shared/costing/landed-cost'
import { CURRENCIES } from '#shared/money'
import { z } from 'zod'
import { idSchema, momentSchema, moneySchema, optionalText, requiredText, TEXT_LIMITS } from './common'
import { defineEndpoint } from './endpoint'
import { deliveryRuleSchema } from './rfqs'

const knownCurrency = z.enum(CURRENCIES as [string, ...string[]], 'Choose a currency by its three letters (ISO 4217).')
const decimalText = (what: string, pattern: RegExp, rule: string) => z.string({ error: `${what} is missing.` }).trim().regex(pattern, `${what} ${rule}`)
const rate = decimalText('The rate', /^\d{1,6}(\.\d{1,10})?$/, 'is written as digits with a decimal point.').refine((value) => Number(value) > 0, 'A rate is above zero.')
const share = (what: string) =>
  decimalText(what, /^\d(\.\d{1,8})?$/, 'is a share written with a decimal point, such as 0.08 for 8 %.').refine((value) => Number(value) <= 1, `${what} is at most 1 (100 %).`)
const amount = decimalText('The amount', /^\d{1,12}(\.\d{1,6})?$/, 'is written as digits with a decimal point and at most six places.')
const pieces = z.int('Enter a whole number of pieces.').min(1, 'Enter at least one piece.').max(100_000_000)
const statedAmount = z.strictObject({ amount, currency: knownCurrency }).nullable()

/** What the comparison assumes alike for all offers; kept with it word for word. */
export const comparisonBasisSchema = z.strictObject({
  exchange: z.strictObject({
    base: knownCurrency,
    date: z.iso.date('Give the date of the exchange rates.'),
    source: requiredText('The source of the exchange rates'),
    /** Base units for one unit of the currency. */
    rates: z.record(z.string().regex(/^[A-Z]{3}$/, 'A currency has three letters.'), rate),
  }),
  lines: z.array(z.strictObject({ lineId: idSchema, orderQuantity: pieces, annualQuantity: pieces })).max(20),
  years: z.int('Enter whole years.').min(1, 'At least one year.').max(20, 'At most 20 years.'),
  capitalRatePerYear: share('The cost of capital'),
  dutyRate: share('The duty rate'),
  insuranceRate: share('The insurance rate'),
  customsValue: z.enum(['CIF', 'FOB']),
  stockShare: share('The stock share'),
  /** What the buyer knows about each offer that the vendor does not quote; null is "not stated". */
  offers: z.array(z.strictObject({ quoteId: idSchema, freightPerShipment: statedAmount, inspectionPerShipment: statedAmount, yieldLoss: share('The expected loss').nullable() })).max(60),
})
export type ComparisonBasis = z.infer<typeof comparisonBasisSchema>

export const OFFER_FLAGS = ['expired', 'other-issue', 'below-first-break', 'below-minimum-order', 'line-not-quoted', 'outlier-below', 'outlier-above', 'incomplete'] as const

const costLineSchema = z.object({
  name: z.enum(COST_LINES),
  amount: z.string().nullable(),
  formula: z.string(),
  inputs: z.record(z.string(), z.string().nullable()),
  missing: z.array(z.string()),
  coveredByTerm: z.boolean(),
})

/** One vendor's offer for one line, on equal terms. Unit prices are for one piece, exact, in the offer's currency. */
export const comparedLineSchema = z.object({
  quoteId: idSchema,
  quoted: z.boolean(),
  priceUnit: z.int().nullable(),
  /** At each quantity that was asked; null where the offer has no price. */
  prices: z.array(z.object({ quantity: z.int(), unitPrice: z.string().nullable() })),
  unitPriceAtOrder: z.string().nullable(),
  breakUsed: z.int().nullable(),
  oneTimeCost: z.object({ kind: z.enum(['quoted', 'included', 'missing']), amount: moneySchema.nullable() }),
  samplesPrice: moneySchema.nullable(),
  leadTimeDays: z.int().nullable(),
  minimumOrderQuantity: z.int().nullable(),
  landed: z.object({ currency: z.string(), landed: z.string().nullable(), perYear: z.string().nullable(), partial: z.string(), missing: z.array(z.string()), lines: z.array(costLineSchema) }).nullable(),
  /** 1 for the lowest landed cost among comparable offers; null when it cannot be ranked. */
  rank: z.int().nullable(),
  flags: z.array(z.enum(OFFER_FLAGS)),
  /** Landed cost over the median of all. */
  medianRatio: z.string().nullable(),
})

export const comparedOfferSchema = z.object({
  quoteId: idSchema,
  vendorCompanyId: idSchema,
  vendorName: z.string(),
  revision: z.int(),
  vendorReference: z.string(),
  issueNumber: z.int(),
  sha256: z.string(),
  submittedAt: momentSchema,
  currency: z.string(),
  deliveryRule: deliveryRuleSchema,
  deliveryPlace: z.string(),
  paymentTerms: z.string(),
  paymentDays: z.int().nullable(),
  validUntil: z.iso.date(),
  remarks: z.string(),
  flags: z.array(z.enum(OFFER_FLAGS)),
})

export const comparisonSchema = z.object({
  rfqId: idSchema,
  rfqNumber: z.string(),
  issueNumber: z.int(),
  basis: comparisonBasisSchema,
  /** Calendar date in the buying company's zone that validity was judged by. */
  comparedOn: z.iso.date(),
  offers: z.array(comparedOfferSchema),
  lines: z.array(
    z.object({
      lineId: idSchema,
      position: z.int(),
      partNumber: z.string(),
      title: z.string(),
      revision: z.string(),
      specificationSha256: z.string(),
      quantities: z.array(z.int()),
      orderQuantity: z.int(),
      annualQuantity: z.int(),
      offers: z.array(comparedLineSchema),
    }),
  ),
})
export type Comparison = z.infer<typeof comparisonSchema>

export const AWARD_STATES = ['proposed', 'approved', 'rejected', 'void', 'ordered'] as const
export const APPROVAL_REFUSALS = ['not-proposed', 'comparison-changed', 'own-proposal', 'conflict-of-interest', 'offer-expired', 'no-limit', 'limit-currency', 'over-limit'] as const

export const awardSummarySchema = z.object({
  id: idSchema,
  rfqId: idSchema,
  rfqNumber: z.string(),
  rfqTitle: z.string(),
  state: z.enum(AWARD_STATES),
  vendorCompanyId: idSchema,
  vendorName: z.string(),
  /** Pieces and one-time cost of the awarded lines. */
  total: z.object({ amount: moneySchema, currency: z.string() }),
  proposedBy: z.string(),
  proposedAt: momentSchema,
  decidedBy: z.string().nullable(),
  decidedAt: momentSchema.nullable(),
  orderId: idSchema.nullable(),
})
export type AwardSummary = z.infer<typeof awardSummarySchema>

export const awardSchema = z.object({
  ...awardSummarySchema.shape,
  quoteId: idSchema,
  quoteRevision: z.int(),
  lines: z.array(z.object({ lineId: idSchema, position: z.int(), partNumber: z.string(), revision: z.string(), orderQuantity: z.int() })),
  reason: z.string(),
  decisionReason: z.string().nullable(),
  comparisonNumber: z.int(),
  comparisonSha256: z.string(),
  comparison: comparisonSchema,
  /** Whether the person who asks could approve it now, and if not, why. Null for who is no approver. */
  approval: z.object({ refusal: z.enum(APPROVAL_REFUSALS).nullable() }).nullable(),
})
export type Award = z.infer<typeof awardSchema>

const rfqParams = z.strictObject({ rfqId: idSchema })
const awardParams = z.strictObject({ awardId: idSchema })

export const compareOffers = defineEndpoint({
  method: 'POST',
  path: '/api/rfqs/:rfqId/comparison',
  summary: 'The opened quotations side by side on equal terms; nothing is stored',
  access: ['buyer', 'approver'],
  params: rfqParams,
  body: z.strictObject({ basis: comparisonBasisSchema }),
  response: comparisonSchema,
})

export const proposeAward = defineEndpoint({
  method: 'POST',
  path: '/api/rfqs/:rfqId/awards',
  summary: 'Propose a quotation: the comparison is frozen, and earlier proposals that were not ordered become void',
  access: ['buyer'],
  params: rfqParams,
  body: z.strictObject({
    basis: comparisonBasisSchema,
    quoteId: idSchema,
    lineIds: z.array(idSchema).min(1, 'Choose at least one part.').max(20),
    reason: requiredText('The reason for the proposal', TEXT_LIMITS.note),
  }),
  response: awardSchema,
})

export const listAwards = defineEndpoint({
  method: 'GET',
  path: '/api/awards',
  summary: 'Proposals and awards, newest first; who does not buy sees what was approved',
  access: ['buyer', 'approver', 'engineer', 'checker', 'quality'],
  query: z.strictObject({ rfqId: idSchema.optional() }),
  response: z.array(awardSummarySchema),
})

export const getAward = defineEndpoint({
  method: 'GET',
  path: '/api/awards/:awardId',
  summary: 'One proposal with the comparison it rests on',
  access: ['buyer', 'approver', 'engineer', 'checker', 'quality'],
  params: awardParams,
  response: awardSchema,
})

export const approveAward = defineEndpoint({
  method: 'POST',
  path: '/api/awards/:awardId/approval',
  summary: 'Approve a proposal within the own limit, one-time cost included, as another person than the proposer',
  access: ['approver'],
  params: awardParams,
  body: z.strictObject({
    /** Of the comparison that was looked at. */
    comparisonSha256: z.string().regex(/^[0-9a-f]{64}$/, 'This is not a SHA-256.'),
    remark: optionalText('The remark', TEXT_LIMITS.note),
  }),
  response: awardSchema,
})

export const rejectAward = defineEndpoint({
  method: 'POST',
  path: '/api/awards/:awardId/rejection',
  summary: 'Reject a proposal with a reason',
  access: ['approver'],
  params: awardParams,
  body: z.strictObject({ reason: requiredText('The reason', TEXT_LIMITS.note) }),
  response: awardSchema,
})

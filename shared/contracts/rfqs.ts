import { z } from 'zod'
import { currencySchema, idSchema, momentSchema, optionalText, requiredText, TEXT_LIMITS, timeZoneSchema } from './common'
import { defineEndpoint } from './endpoint'
import { releaseSummarySchema } from './specifications'

export const RFQ_STATES = ['preparing', 'issued', 'closed', 'opened', 'awarded', 'cancelled'] as const
export const QUOTE_STATES = ['submitted', 'superseded', 'withdrawn'] as const
export const INVITATION_STATES = ['invited', 'seen', 'terms-accepted', 'intends-to-quote', 'no-bid'] as const

/** Reasons for declining, as a list so that they can be counted; the text beside says the rest. */
export const NO_BID_REASONS = [
  'capacity',
  'volume-too-small',
  'volume-too-large',
  'below-minimum-order-value',
  'lead-time-impossible',
  'target-price-unreachable',
  'wire-type-not-processed',
  'core-or-former-not-obtainable',
  'no-impregnation',
  'no-insulation-system',
  'test-voltage-beyond-equipment',
  'safety-responsibility-unclear',
  'specification-contradictory',
  'test-beyond-equipment',
  'quality-level-not-offered',
  'commercial-terms',
  'export-restriction',
  'conflict-with-customer',
  'other',
] as const

/** Incoterms® 2020 rules. */
export const DELIVERY_RULES = ['EXW', 'FCA', 'FAS', 'FOB', 'CFR', 'CIF', 'CPT', 'CIP', 'DAP', 'DPU', 'DDP'] as const
export const deliveryRuleSchema = z.enum(DELIVERY_RULES, 'Choose one of the eleven Incoterms® 2020 rules.')

/** What stays words in an enquiry. */
export const rfqTermsSchema = z.strictObject({
  paymentTerms: optionalText('Payment terms', TEXT_LIMITS.line),
  packing: optionalText('Packing', TEXT_LIMITS.note),
  quality: optionalText('Quality requirements', TEXT_LIMITS.note),
  compliance: optionalText('Compliance', TEXT_LIMITS.note),
  awardBasis: optionalText('Award basis', TEXT_LIMITS.note),
  general: optionalText('Terms', TEXT_LIMITS.note),
  /** Minimum validity that is asked for, days. */
  validityDays: z.int('Enter whole days.').min(1, 'Enter at least one day.').max(730, 'Enter at most 730 days.'),
  samplesNeededOn: z.iso.date('Give the date as year, month and day.').nullable(),
  questionsUntil: momentSchema.nullable(),
})
export type RfqTerms = z.infer<typeof rfqTermsSchema>

const quantity = z.int('Enter a whole number of pieces.').min(1, 'Enter at least one piece.').max(100_000_000, 'Enter at most 100 000 000 pieces.')

/** Indices of quantities that do not rise. Empty when the list is in order. */
export function quantitiesOutOfOrder(quantities: readonly number[]): number[] {
  return quantities.flatMap((value, index) => (index > 0 && value <= quantities[index - 1]! ? [index] : []))
}

export const rfqLineInputSchema = z.strictObject({
  releaseId: z.uuid('Choose a released revision.'),
  quantities: z
    .array(quantity)
    .min(1, 'Ask for at least one quantity.')
    .max(12, 'At most 12 quantities.')
    .refine((values) => quantitiesOutOfOrder(values).length === 0, 'The quantities must rise from one price break to the next.'),
  orderQuantity: quantity,
  annualQuantity: quantity.nullable(),
  sampleQuantity: z.int('Enter a whole number of pieces.').min(0, 'Samples are counted; enter 0 for none.').max(10_000, 'Enter at most 10 000 samples.'),
})

export const rfqInputSchema = z.strictObject({
  title: requiredText('The title'),
  /** The due moment with its offset, ISO 8601. */
  dueAt: z.iso.datetime({ offset: true, error: 'Give the due date and time with its zone.' }),
  dueZone: timeZoneSchema,
  currency: currencySchema,
  deliveryRule: deliveryRuleSchema,
  deliveryPlace: requiredText('The named place'),
  terms: rfqTermsSchema,
  lines: z.array(rfqLineInputSchema).min(1, 'Add at least one released part.').max(20, 'At most 20 parts.'),
  vendorCompanyIds: z.array(idSchema).max(30, 'At most 30 vendors.'),
})
export type RfqInput = z.infer<typeof rfqInputSchema>

export const rfqLineSchema = z.object({
  id: idSchema,
  position: z.int(),
  release: releaseSummarySchema,
  quantities: z.array(z.int()),
  orderQuantity: z.int(),
  annualQuantity: z.int().nullable(),
  sampleQuantity: z.int(),
})

/** Buying side only: which vendors were asked and how far each is. No content of any quotation before the opening. */
export const invitationSchema = z.object({
  id: idSchema,
  vendorCompanyId: idSchema,
  vendorName: z.string(),
  state: z.enum(INVITATION_STATES),
  noBidReason: z.enum(NO_BID_REASONS).nullable(),
  noBidText: z.string(),
  seenAt: momentSchema.nullable(),
  termsAcceptedAt: momentSchema.nullable(),
  /** Mails of the company to this vendor's people that could not be delivered. */
  undeliverable: z.int(),
})

export const rfqSummarySchema = z.object({
  id: idSchema,
  number: z.string(),
  title: z.string(),
  state: z.enum(RFQ_STATES),
  dueAt: momentSchema,
  dueZone: z.string(),
  currency: z.string(),
  buyerName: z.string(),
  lineCount: z.int(),
  invitationCount: z.int(),
})

export const rfqSchema = z.object({
  ...rfqSummarySchema.shape,
  /** The database's clock when this was read: whether the due time has passed is not the browser's opinion. */
  now: momentSchema,
  version: z.int(),
  issueNumber: z.int(),
  issueSha256: z.string().nullable(),
  issuedAt: momentSchema.nullable(),
  openingAskedAt: momentSchema.nullable(),
  openingAskedBy: z.object({ id: idSchema, name: z.string() }).nullable(),
  openedAt: momentSchema.nullable(),
  openedBy: z.object({ id: idSchema, name: z.string() }).nullable(),
  cancelledReason: z.string().nullable(),
  deliveryRule: z.enum(DELIVERY_RULES),
  deliveryPlace: z.string(),
  terms: rfqTermsSchema,
  lines: z.array(rfqLineSchema),
  invitations: z.array(invitationSchema),
})
export type Rfq = z.infer<typeof rfqSchema>
export type RfqSummary = z.infer<typeof rfqSummarySchema>

const readers = ['buyer', 'approver', 'engineer', 'checker', 'quality'] as const
const rfqParams = z.strictObject({ rfqId: idSchema })
const atVersion = { version: z.int().nonnegative() }

export const listRfqs = defineEndpoint({
  method: 'GET',
  path: '/api/rfqs',
  summary: 'The enquiries of the company, nearest due time first',
  access: readers,
  query: z.strictObject({ state: z.enum(RFQ_STATES).optional() }),
  response: z.array(rfqSummarySchema),
})

export const createRfq = defineEndpoint({
  method: 'POST',
  path: '/api/rfqs',
  summary: 'Prepare an enquiry from released revisions',
  access: ['buyer'],
  body: rfqInputSchema,
  response: rfqSchema,
})

export const getRfq = defineEndpoint({
  method: 'GET',
  path: '/api/rfqs/:rfqId',
  summary: 'One enquiry',
  access: readers,
  params: rfqParams,
  response: rfqSchema,
})

export const updateRfq = defineEndpoint({
  method: 'PUT',
  path: '/api/rfqs/:rfqId',
  summary: 'Change an enquiry that is still prepared',
  access: ['buyer'],
  params: rfqParams,
  body: z.strictObject({ ...atVersion, ...rfqInputSchema.shape }),
  response: rfqSchema,
})

export const issueRfq = defineEndpoint({
  method: 'POST',
  path: '/api/rfqs/:rfqId/issue',
  summary: 'Issue an enquiry: seal its content and tell every person of the invited vendors',
  access: ['buyer'],
  params: rfqParams,
  body: z.strictObject(atVersion),
  response: rfqSchema,
})

export const extendRfq = defineEndpoint({
  method: 'POST',
  path: '/api/rfqs/:rfqId/extension',
  summary: 'Move the due time later, for all vendors alike, before it has passed',
  access: ['buyer'],
  params: rfqParams,
  body: z.strictObject({
    dueAt: z.iso.datetime({ offset: true, error: 'Give the due date and time with its zone.' }),
    reason: requiredText('The reason', TEXT_LIMITS.note),
  }),
  response: rfqSchema,
})

export const cancelRfq = defineEndpoint({
  method: 'POST',
  path: '/api/rfqs/:rfqId/cancellation',
  summary: 'Cancel an enquiry with a reason; the vendors are told',
  access: ['buyer'],
  params: rfqParams,
  body: z.strictObject({ reason: requiredText('The reason', TEXT_LIMITS.note) }),
  response: rfqSchema,
})

export const askOpening = defineEndpoint({
  method: 'POST',
  path: '/api/rfqs/:rfqId/opening-request',
  summary: 'After the due time: the buyer asks for the opening',
  access: ['buyer'],
  params: rfqParams,
  response: rfqSchema,
})

export const openRfq = defineEndpoint({
  method: 'POST',
  path: '/api/rfqs/:rfqId/opening',
  summary: 'After the due time: a second person of another role opens the quotations',
  access: ['approver', 'quality', 'engineer'],
  params: rfqParams,
  response: rfqSchema,
})

// --- the vendor's side ---------------------------------------------------------------------------------

export const vendorRfqSchema = z.object({
  id: idSchema,
  invitationId: idSchema,
  number: z.string(),
  title: z.string(),
  customerName: z.string(),
  buyerName: z.string(),
  buyerEmail: z.string(),
  /** As far as it concerns the vendor. */
  state: z.enum(['open', 'closed', 'opened', 'decided', 'cancelled']),
  invitationState: z.enum(INVITATION_STATES),
  issueNumber: z.int(),
  issuedAt: momentSchema,
  dueAt: momentSchema,
  dueZone: z.string(),
  /** The database's clock when this was read, so that the time left is not the browser's opinion. */
  now: momentSchema,
  currency: z.string(),
  deliveryRule: z.enum(DELIVERY_RULES),
  deliveryPlace: z.string(),
  /** Null until confidentiality is accepted, as are the lines' contents. */
  terms: rfqTermsSchema.nullable(),
  confidentialityText: z.string(),
  termsAcceptedAt: momentSchema.nullable(),
  noBidReason: z.enum(NO_BID_REASONS).nullable(),
  noBidText: z.string(),
  /** The latest revision of the own quotation. */
  quotation: z.object({ revision: z.int(), state: z.enum(QUOTE_STATES) }).nullable(),
  lines: z.array(rfqLineSchema),
})
export type VendorRfq = z.infer<typeof vendorRfqSchema>

export const vendorRfqSummarySchema = vendorRfqSchema.pick({
  id: true,
  number: true,
  title: true,
  customerName: true,
  state: true,
  invitationState: true,
  issuedAt: true,
  dueAt: true,
  dueZone: true,
  now: true,
  quotation: true,
})
export type VendorRfqSummary = z.infer<typeof vendorRfqSummarySchema>

export const listVendorRfqs = defineEndpoint({
  method: 'GET',
  path: '/api/vendor/rfqs',
  summary: 'The enquiries that this vendor was invited to',
  access: ['vendor'],
  response: z.array(vendorRfqSummarySchema),
})

export const getVendorRfq = defineEndpoint({
  method: 'GET',
  path: '/api/vendor/rfqs/:rfqId',
  summary: 'One enquiry as its vendor sees it; the first look is recorded as seen',
  access: ['vendor'],
  params: rfqParams,
  response: vendorRfqSchema,
})

export const acceptConfidentiality = defineEndpoint({
  method: 'POST',
  path: '/api/vendor/rfqs/:rfqId/confidentiality',
  summary: 'Accept confidentiality, after which the drawings can be read',
  access: ['vendor'],
  params: rfqParams,
  body: z.strictObject({ accepted: z.literal(true, 'Tick the box to accept.') }),
  response: vendorRfqSchema,
})

export const noBidSchema = z
  .strictObject({ reason: z.enum(NO_BID_REASONS, 'Choose a reason.'), text: optionalText('The explanation', TEXT_LIMITS.note) })
  .refine(({ reason, text }) => reason !== 'other' || text !== '', { path: ['text'], message: 'Say what the reason is.' })
export type NoBid = z.infer<typeof noBidSchema>

export const declineRfq = defineEndpoint({
  method: 'POST',
  path: '/api/vendor/rfqs/:rfqId/no-bid',
  summary: 'Decline with a reason; possible until the due time, and taken back by quoting',
  access: ['vendor'],
  params: rfqParams,
  body: noBidSchema,
  response: vendorRfqSchema,
})

export const vendorDrawing = defineEndpoint({
  method: 'GET',
  path: '/api/vendor/rfqs/:rfqId/lines/:lineId/drawing.pdf',
  summary: "The vendor's own watermarked copy of the drawing",
  access: ['vendor'],
  params: z.strictObject({ rfqId: idSchema, lineId: idSchema }),
  download: ['application/pdf'],
})

/** What a vendor accepts before a drawing opens. */
export const CONFIDENTIALITY_TEXT =
  'The drawings and documents of this enquiry are the property of the customer and confidential. We use them only to prepare a quotation and, if ordered, to make the parts; we show them only to those of our people who need them, pass them to nobody else without written consent, and delete them when the customer asks. An agreement signed separately goes before this text.'

import { z } from 'zod'
import { countrySchema, currencySchema, idSchema, momentSchema, moneyInputSchema, moneySchema, optionalText, requiredText, TEXT_LIMITS } from './common'
import { defineEndpoint } from './endpoint'
import { deliveryRuleSchema, QUOTE_STATES, quantitiesOutOfOrder } from './rfqs'

const pieces = z.int('Enter a whole number of pieces.').min(1, 'Enter at least one piece.').max(100_000_000)
const days = z.int('Enter whole days.').min(1, 'Enter at least one day.').max(730, 'Enter at most 730 days.')

/** Price as the vendor writes it: for `priceUnit` pieces, in the quotation's currency. */
export const priceBreakInputSchema = z.strictObject({
  fromQuantity: pieces,
  price: moneyInputSchema.refine((value) => Number(value) > 0, 'Enter a price above zero.'),
})

export const quoteLineInputSchema = z.strictObject({
  lineId: idSchema,
  priceUnit: z.union([z.literal(1), z.literal(100), z.literal(1000)], 'A price is for 1, 100 or 1000 pieces.'),
  priceBreaks: z
    .array(priceBreakInputSchema)
    .min(1, 'Give at least one price.')
    .max(20, 'At most 20 price breaks.')
    .refine((breaks) => quantitiesOutOfOrder(breaks.map((row) => row.fromQuantity)).length === 0, 'The quantities must rise from one price break to the next.'),
  /** Null: not quoted. Zero: included in the price. */
  oneTimeCost: moneyInputSchema.nullable(),
  oneTimeCostText: optionalText('What the one-time cost covers', TEXT_LIMITS.note),
  samplesPrice: moneyInputSchema.nullable(),
  sampleLeadTimeDays: days.nullable(),
  firstOrderLeadTimeDays: days,
  repeatLeadTimeDays: days.nullable(),
  minimumOrderQuantity: pieces,
  packQuantity: pieces.nullable(),
  countryOfOrigin: countrySchema.nullable(),
})

export const quoteInputSchema = z.strictObject({
  vendorReference: requiredText('Your quotation number', 60),
  reason: optionalText('The reason for this revision', TEXT_LIMITS.note),
  currency: currencySchema,
  deliveryRule: deliveryRuleSchema,
  deliveryPlace: requiredText('The named place'),
  paymentTerms: requiredText('Payment terms'),
  paymentDays: z.int('Enter whole days.').min(0).max(365).nullable(),
  validUntil: z.iso.date('Give the date until which the quotation is valid.'),
  remarks: optionalText('Remarks', TEXT_LIMITS.note),
  lines: z.array(quoteLineInputSchema).min(1, 'Quote at least one part.').max(20),
})
export type QuoteInput = z.infer<typeof quoteInputSchema>

/** What a form holds while it is typed: any field may be missing or unfinished text. */
export const quoteDraftSchema = z.strictObject({
  form: z.record(z.string().max(120), z.union([z.string().max(TEXT_LIMITS.note), z.number(), z.boolean(), z.null()])),
})
export type QuoteDraft = z.infer<typeof quoteDraftSchema>

/** A remark on an offer that does not stop it: break dearer than the one before, minimum above a break … */
export const quoteHintSchema = z.object({ code: z.string(), path: z.string(), message: z.string() })

const fileSchema = z.object({ id: idSchema, name: z.string(), sizeBytes: z.int(), sha256: z.string() })

export const quoteLineSchema = z.object({
  id: idSchema,
  lineId: idSchema,
  priceUnit: z.int(),
  priceBreaks: z.array(z.object({ fromQuantity: z.int(), price: moneySchema, unitPrice: z.string() })),
  oneTimeCost: moneySchema.nullable(),
  oneTimeCostText: z.string(),
  samplesPrice: moneySchema.nullable(),
  sampleLeadTimeDays: z.int().nullable(),
  firstOrderLeadTimeDays: z.int(),
  repeatLeadTimeDays: z.int().nullable(),
  minimumOrderQuantity: z.int(),
  packQuantity: z.int().nullable(),
  countryOfOrigin: z.string().nullable(),
})

export const quoteSchema = z.object({
  id: idSchema,
  rfqId: idSchema,
  invitationId: idSchema,
  vendorCompanyId: idSchema,
  vendorName: z.string(),
  revision: z.int(),
  state: z.enum(QUOTE_STATES),
  issueNumber: z.int(),
  vendorReference: z.string(),
  reason: z.string(),
  currency: z.string(),
  deliveryRule: deliveryRuleSchema,
  deliveryPlace: z.string(),
  paymentTerms: z.string(),
  paymentDays: z.int().nullable(),
  validUntil: z.iso.date(),
  remarks: z.string(),
  sha256: z.string(),
  submittedAt: momentSchema,
  submittedBy: z.string(),
  file: fileSchema.nullable(),
  lines: z.array(quoteLineSchema),
  hints: z.array(quoteHintSchema),
})
export type Quote = z.infer<typeof quoteSchema>

const rfqParams = z.strictObject({ rfqId: idSchema })

/** The vendor's own quotation: what is typed, the file laid beside it, and what was submitted. */
export const ownQuoteSchema = z.object({
  draft: z.object({ version: z.int(), form: quoteDraftSchema.shape.form, file: fileSchema.nullable(), updatedAt: momentSchema }).nullable(),
  submitted: z.array(quoteSchema),
})

export const getOwnQuote = defineEndpoint({
  method: 'GET',
  path: '/api/vendor/rfqs/:rfqId/quote',
  summary: 'The own quotation with its draft and every submitted revision',
  access: ['vendor'],
  params: rfqParams,
  response: ownQuoteSchema,
})

export const saveQuoteDraft = defineEndpoint({
  method: 'PUT',
  path: '/api/vendor/rfqs/:rfqId/quote/draft',
  summary: 'Keep what was typed',
  access: ['vendor'],
  params: rfqParams,
  body: z.strictObject({ version: z.int().nonnegative(), ...quoteDraftSchema.shape }),
  response: ownQuoteSchema,
})

export const uploadQuoteFile = defineEndpoint({
  method: 'POST',
  path: '/api/vendor/rfqs/:rfqId/quote/file',
  summary: 'Lay the quotation file beside the draft',
  access: ['vendor'],
  params: rfqParams,
  upload: { field: 'file', kinds: ['pdf', 'docx', 'xlsx', 'odt', 'ods', 'doc-xls-ppt'], required: true },
  response: ownQuoteSchema,
})

export const removeQuoteFile = defineEndpoint({
  method: 'DELETE',
  path: '/api/vendor/rfqs/:rfqId/quote/file',
  summary: 'Take the file away from the draft',
  access: ['vendor'],
  params: rfqParams,
  response: ownQuoteSchema,
})

export const submitQuote = defineEndpoint({
  method: 'POST',
  path: '/api/vendor/rfqs/:rfqId/quotes',
  summary: 'Submit a complete revision of the quotation; it stays sealed until the opening',
  access: ['vendor'],
  params: rfqParams,
  body: quoteInputSchema,
  response: ownQuoteSchema,
})

export const withdrawQuote = defineEndpoint({
  method: 'POST',
  path: '/api/vendor/rfqs/:rfqId/quotes/:quoteId/withdrawal',
  summary: 'Withdraw the submitted quotation before the due time',
  access: ['vendor'],
  params: z.strictObject({ rfqId: idSchema, quoteId: idSchema }),
  response: ownQuoteSchema,
})

export const ownQuoteFile = defineEndpoint({
  method: 'GET',
  path: '/api/vendor/rfqs/:rfqId/quote/files/:fileId',
  summary: 'A file of the own quotation',
  access: ['vendor'],
  params: z.strictObject({ rfqId: idSchema, fileId: idSchema }),
  download: ['application/pdf', 'application/octet-stream'],
})

/** Buying side, after the opening. Before it the answer is the same as for an enquiry without quotations. */
export const listQuotes = defineEndpoint({
  method: 'GET',
  path: '/api/rfqs/:rfqId/quotes',
  summary: 'The opened quotations with all their revisions',
  access: ['buyer', 'approver'],
  params: rfqParams,
  response: z.array(quoteSchema),
})

export const quoteFile = defineEndpoint({
  method: 'GET',
  path: '/api/rfqs/:rfqId/quotes/:quoteId/file',
  summary: 'The quotation file of an opened quotation',
  access: ['buyer', 'approver'],
  params: z.strictObject({ rfqId: idSchema, quoteId: idSchema }),
  download: ['application/pdf', 'application/octet-stream'],
})

import { z } from 'zod'
import { idSchema, momentSchema, moneySchema, optionalText, requiredText, TEXT_LIMITS } from './common'
import { defineEndpoint } from './endpoint'
import { deliveryRuleSchema } from './rfqs'

/** Written into every stored order; a change of shape is a new number. */
export const ORDER_SCHEMA = 'dotside/purchase-order/1'

const address = (what: string) => requiredText(what, 1000)

/** What the buyer adds to the award to make it an order. */
export const orderInputSchema = z.strictObject({
  legalEntity: requiredText('The buying legal entity'),
  vatNumber: optionalText('The VAT number', 40),
  billTo: address('The invoice address'),
  shipTo: address('The delivery address'),
  vendorNumber: optionalText('The vendor number', 40),
  deliveryOn: z.iso.date('Give the date of delivery.'),
  acknowledgeBy: z.iso.date('Give the date by which the order is to be acknowledged.'),
  carrier: optionalText('The carrier'),
  overUnderPercent: z.number('Enter per cent.').min(0, 'From 0 % to 20 %.').max(20, 'From 0 % to 20 %.'),
  packing: optionalText('Packing and labels', TEXT_LIMITS.note),
  documents: optionalText('Accompanying documents', TEXT_LIMITS.note),
  quality: optionalText('Quality clauses', TEXT_LIMITS.note),
  tooling: optionalText('Tool ownership', TEXT_LIMITS.note),
  termsVersion: optionalText('Terms and their version'),
  remarks: optionalText('Remarks', TEXT_LIMITS.note),
})
export type OrderInput = z.infer<typeof orderInputSchema>

export const orderLineSchema = z.object({
  position: z.int(),
  partNumber: z.string(),
  description: z.string(),
  drawingRevision: z.string(),
  specificationSha256: z.string(),
  quantity: z.int(),
  unit: z.literal('pcs'),
  /** For `priceUnit` pieces, as quoted. */
  price: moneySchema,
  priceUnit: z.int(),
  lineTotal: moneySchema,
  countryOfOrigin: z.string().nullable(),
})

/** The whole order as it was placed: the record, and what the PDF shows. */
export const orderContentSchema = z.object({
  schema: z.literal(ORDER_SCHEMA),
  number: z.string(),
  revision: z.int(),
  date: z.iso.date(),
  buyer: z.object({ legalEntity: z.string(), vatNumber: z.string(), billTo: z.string(), shipTo: z.string(), contactName: z.string(), contactEmail: z.string() }),
  vendor: z.object({ name: z.string(), number: z.string(), address: z.string() }),
  rfqNumber: z.string(),
  quotation: z.object({ reference: z.string(), revision: z.int(), sha256: z.string(), validUntil: z.iso.date() }),
  currency: z.string(),
  lines: z.array(orderLineSchema),
  oneTimeCosts: z.array(z.object({ position: z.int(), text: z.string(), amount: moneySchema })),
  total: moneySchema,
  deliveryRule: deliveryRuleSchema,
  deliveryPlace: z.string(),
  deliveryOn: z.iso.date(),
  carrier: z.string(),
  overUnderPercent: z.number(),
  paymentTerms: z.string(),
  packing: z.string(),
  documents: z.string(),
  quality: z.string(),
  tooling: z.string(),
  termsVersion: z.string(),
  remarks: z.string(),
  acknowledgeBy: z.iso.date(),
})
export type OrderContent = z.infer<typeof orderContentSchema>

export const ORDER_ANSWERS = ['accepted', 'accepted-with-changes', 'refused'] as const

export const acknowledgementSchema = z.object({ answer: z.enum(ORDER_ANSWERS), text: z.string(), answeredBy: z.string(), answeredAt: momentSchema })

export const orderSummarySchema = z.object({
  id: idSchema,
  number: z.string(),
  rfqNumber: z.string(),
  /** The vendor for the buying company, the customer for the vendor. */
  counterpart: z.string(),
  total: z.object({ amount: moneySchema, currency: z.string() }),
  deliveryOn: z.iso.date(),
  acknowledgeBy: z.iso.date(),
  placedAt: momentSchema,
  answer: z.enum(ORDER_ANSWERS).nullable(),
})
export type OrderSummary = z.infer<typeof orderSummarySchema>

export const orderSchema = z.object({
  ...orderSummarySchema.shape,
  content: orderContentSchema,
  /** SHA-256 of the canonical JSON of the content, and of the PDF. */
  sha256: z.string(),
  pdfSha256: z.string(),
  placedBy: z.string(),
  acknowledgement: acknowledgementSchema.nullable(),
})
export type Order = z.infer<typeof orderSchema>

const readers = ['buyer', 'approver', 'engineer', 'checker', 'quality'] as const
const orderParams = z.strictObject({ orderId: idSchema })

export const placeOrder = defineEndpoint({
  method: 'POST',
  path: '/api/awards/:awardId/order',
  summary: 'Place the purchase order of an approved award; the vendor is told, and so are the others when all parts are awarded',
  access: ['buyer'],
  params: z.strictObject({ awardId: idSchema }),
  body: orderInputSchema,
  response: orderSchema,
})

export const listOrders = defineEndpoint({ method: 'GET', path: '/api/orders', summary: 'The purchase orders of the company, newest first', access: readers, response: z.array(orderSummarySchema) })

export const getOrder = defineEndpoint({ method: 'GET', path: '/api/orders/:orderId', summary: 'One purchase order', access: readers, params: orderParams, response: orderSchema })

export const orderPdf = defineEndpoint({
  method: 'GET',
  path: '/api/orders/:orderId/order.pdf',
  summary: 'The archived PDF of a purchase order',
  access: readers,
  params: orderParams,
  download: ['application/pdf'],
})

// --- the vendor's side ---------------------------------------------------------------------------------

export const listVendorOrders = defineEndpoint({ method: 'GET', path: '/api/vendor/orders', summary: 'The purchase orders placed with the own company', access: ['vendor'], response: z.array(orderSummarySchema) })

export const getVendorOrder = defineEndpoint({ method: 'GET', path: '/api/vendor/orders/:orderId', summary: 'One purchase order placed with the own company', access: ['vendor'], params: orderParams, response: orderSchema })

export const vendorOrderPdf = defineEndpoint({
  method: 'GET',
  path: '/api/vendor/orders/:orderId/order.pdf',
  summary: 'The archived PDF of an own purchase order',
  access: ['vendor'],
  params: orderParams,
  download: ['application/pdf'],
})

export const acknowledgeOrder = defineEndpoint({
  method: 'POST',
  path: '/api/vendor/orders/:orderId/acknowledgement',
  summary: 'Accept an order, accept it with changes, or refuse it; once',
  access: ['vendor'],
  params: orderParams,
  body: z
    .strictObject({ answer: z.enum(ORDER_ANSWERS, 'Choose an answer.'), text: optionalText('The text', TEXT_LIMITS.note) })
    .refine(({ answer, text }) => answer === 'accepted' || text !== '', { path: ['text'], message: 'Say what you would change, or why you refuse.' }),
  response: orderSchema,
})

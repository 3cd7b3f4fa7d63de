import { SAMPLE_KINDS } from '#shared/measurement/capability'
import { DISPOSITIONS } from '#shared/workflow/sample-state'
import { z } from 'zod'
import { idSchema, momentSchema, optionalText, requiredText, TEXT_LIMITS } from './common'
import { defineEndpoint } from './endpoint'
import { answerSchema, expectedRowSchema, judgementSchema, measurementReadingSchema, verdictSchema } from './measurements'

export { SAMPLE_KINDS, DISPOSITIONS }

const pieces = z.int('Enter a whole number of pieces.').min(1, 'Enter at least one piece.')

export const sampleRequestInputSchema = z.strictObject({
  rfqId: idSchema,
  lineId: idSchema,
  vendorCompanyId: idSchema,
  quantity: pieces.max(10_000, 'At most 10000 samples.'),
  sampleKind: z.enum(SAMPLE_KINDS, 'Choose what kind of sample it is.'),
  dueOn: z.iso.date('Give the date by which the samples are needed.'),
  note: optionalText('The note', TEXT_LIMITS.note),
})
export type SampleRequestInput = z.infer<typeof sampleRequestInputSchema>

/** What the vendor declares beside the readings. */
export const sampleReportSchema = z.strictObject({
  measuredOn: z.iso.date('Give the date of the measurement.'),
  temperatureC: z
    .number('Enter the temperature in °C.')
    .min(-50, 'A temperature from −50 °C to 200 °C.')
    .max(200, 'A temperature from −50 °C to 200 °C.')
    .nullable(),
  humidityPercent: z.number('Enter the humidity in %.').min(0, 'A humidity from 0 % to 100 %.').max(100, 'A humidity from 0 % to 100 %.').nullable(),
  instruments: requiredText('The instruments with their calibration dates', TEXT_LIMITS.note),
  operator: requiredText('Who measured', TEXT_LIMITS.name),
  lotCode: optionalText('The lot or date code', 60),
  sampleKind: z.enum(SAMPLE_KINDS, 'Choose what kind of sample it is.'),
  /** A part that passes its tests but is built otherwise is not a pass. */
  asBuilt: z.discriminatedUnion(
    'kind',
    [
      z.strictObject({ kind: z.literal('as-drawing') }),
      z.strictObject({ kind: z.literal('differs'), differences: requiredText('What differs from the drawing', TEXT_LIMITS.note) }),
    ],
    'Say whether the parts are built as drawn.',
  ),
  /** Wire, tape, former and core as used, with lots. */
  materials: optionalText('The materials used', TEXT_LIMITS.note),
})
export type SampleReport = z.infer<typeof sampleReportSchema>

const fileSchema = z.object({ id: idSchema, name: z.string(), kind: z.string(), sizeBytes: z.int(), sha256: z.string() })

export const dispositionSchema = z.object({
  disposition: z.enum(DISPOSITIONS),
  reason: z.string(),
  decidedBy: z.string(),
  decidedAt: momentSchema,
  concession: z.object({ quantity: z.int(), expiresOn: z.iso.date() }).nullable(),
})

export const SAMPLE_SET_PHASES = ['read', 'judged', 'disposed', 'superseded'] as const

export const sampleSetSummarySchema = z.object({
  id: idSchema,
  number: z.int(),
  kind: z.enum(['readings', 'evidence']),
  phase: z.enum(SAMPLE_SET_PHASES),
  fileName: z.string(),
  uploadedAt: momentSchema,
  confirmedAt: momentSchema.nullable(),
  verdict: verdictSchema.nullable(),
  disposition: dispositionSchema.nullable(),
})

/** One report with all that was read from it. A superseded report that was never confirmed shows no readings. */
export const sampleSetSchema = z.object({
  ...sampleSetSummarySchema.shape,
  requestId: idSchema,
  version: z.int(),
  file: fileSchema,
  evidence: z.array(fileSchema),
  uploadedBy: z.string(),
  confirmedBy: z.string().nullable(),
  report: sampleReportSchema.nullable(),
  reading: measurementReadingSchema.nullable(),
  answers: z.array(answerSchema),
  judgement: judgementSchema.nullable(),
  /** SHA-256 over the canonical JSON of what was confirmed. */
  recordSha256: z.string().nullable(),
})
export type SampleSet = z.infer<typeof sampleSetSchema>

export const SAMPLE_REQUEST_STATES = ['requested', 'reported', 'disposed', 'cancelled'] as const

export const sampleRequestSummarySchema = z.object({
  id: idSchema,
  number: z.string(),
  /** `reported`: a confirmed report waits for its disposition. */
  state: z.enum(SAMPLE_REQUEST_STATES),
  rfqId: idSchema,
  rfqNumber: z.string(),
  partNumber: z.string(),
  title: z.string(),
  revision: z.string(),
  quantity: z.int(),
  sampleKind: z.enum(SAMPLE_KINDS),
  dueOn: z.iso.date(),
  requestedAt: momentSchema,
  /** The other side: the vendor for the buying company, the customer for the vendor. */
  counterpart: z.string(),
  verdict: verdictSchema.nullable(),
})
export type SampleRequestSummary = z.infer<typeof sampleRequestSummarySchema>

export const sampleRequestSchema = z.object({
  ...sampleRequestSummarySchema.shape,
  lineId: idSchema,
  releaseId: idSchema,
  /** SHA-256 of the released specification that the samples are judged by. */
  specificationSha256: z.string(),
  note: z.string(),
  requestedBy: z.string(),
  cancelledReason: z.string().nullable(),
  /** The test table of exactly that released revision. */
  rows: z.array(expectedRowSchema),
  sets: z.array(sampleSetSummarySchema),
})
export type SampleRequest = z.infer<typeof sampleRequestSchema>

const readers = ['engineer', 'checker', 'quality', 'buyer', 'approver'] as const
const requestParams = z.strictObject({ requestId: idSchema })
const setParams = z.strictObject({ setId: idSchema })

export const listSampleRequests = defineEndpoint({
  method: 'GET',
  path: '/api/samples',
  summary: 'Samples that the company asked for, nearest date first',
  access: readers,
  query: z.strictObject({ rfqId: idSchema.optional() }),
  response: z.array(sampleRequestSummarySchema),
})

export const requestSamples = defineEndpoint({
  method: 'POST',
  path: '/api/samples',
  summary: 'Ask a vendor whose quotation was opened for samples; its people are told',
  access: ['buyer', 'engineer', 'quality'],
  body: sampleRequestInputSchema,
  response: sampleRequestSchema,
})

export const getSampleRequest = defineEndpoint({
  method: 'GET',
  path: '/api/samples/:requestId',
  summary: 'One request for samples with the reports that the vendor confirmed',
  access: readers,
  params: requestParams,
  response: sampleRequestSchema,
})

export const cancelSampleRequest = defineEndpoint({
  method: 'POST',
  path: '/api/samples/:requestId/cancellation',
  summary: 'Take back a request for samples, with a reason',
  access: ['buyer', 'engineer', 'quality'],
  params: requestParams,
  body: z.strictObject({ reason: requiredText('The reason', TEXT_LIMITS.note) }),
  response: sampleRequestSchema,
})

export const getSampleSet = defineEndpoint({
  method: 'GET',
  path: '/api/sample-sets/:setId',
  summary: 'A confirmed report, judged by the limits of its drawing revision',
  access: readers,
  params: setParams,
  response: sampleSetSchema,
})

export const sampleFile = defineEndpoint({
  method: 'GET',
  path: '/api/sample-sets/:setId/files/:fileId',
  summary: 'A file of a confirmed report, byte for byte as it came',
  access: readers,
  params: z.strictObject({ setId: idSchema, fileId: idSchema }),
  download: ['application/octet-stream'],
})

export const disposeSet = defineEndpoint({
  method: 'POST',
  path: '/api/sample-sets/:setId/disposition',
  summary: 'Decide about a judged report; final, since what comes later is a new report',
  access: ['quality', 'engineer'],
  params: setParams,
  body: z
    .strictObject({
      disposition: z.enum(DISPOSITIONS, 'Choose a disposition.'),
      reason: requiredText('The reason', TEXT_LIMITS.note),
      concession: z.strictObject({ quantity: pieces.max(100_000_000), expiresOn: z.iso.date('Give the last day of the concession.') }).nullable(),
    })
    .refine(({ disposition, concession }) => (disposition === 'accepted-with-concession') === (concession !== null), {
      path: ['concession'],
      message: 'A concession has a quantity and a last day, and only a concession has them.',
    }),
  response: sampleSetSchema,
})

// --- the vendor's side ---------------------------------------------------------------------------------

export const listVendorSamples = defineEndpoint({
  method: 'GET',
  path: '/api/vendor/samples',
  summary: 'Samples that customers asked the own company for',
  access: ['vendor'],
  response: z.array(sampleRequestSummarySchema),
})

export const getVendorSample = defineEndpoint({
  method: 'GET',
  path: '/api/vendor/samples/:requestId',
  summary: 'One request with the test table and the own reports',
  access: ['vendor'],
  params: requestParams,
  response: sampleRequestSchema,
})

export const sampleTemplate = defineEndpoint({
  method: 'GET',
  path: '/api/vendor/samples/:requestId/template.csv',
  summary: 'An empty report made from the test table of the drawing',
  access: ['vendor'],
  params: requestParams,
  download: ['text/csv'],
})

export const uploadReport = defineEndpoint({
  method: 'POST',
  path: '/api/vendor/samples/:requestId/sets',
  summary: 'Hand in a report: readings as delimited text, or a PDF or picture as evidence. The same file again changes nothing; another takes the place of an unconfirmed one',
  access: ['vendor'],
  params: requestParams,
  upload: { field: 'file', kinds: ['csv', 'txt', 'pdf', 'png', 'jpeg'], required: true, maxBytes: 10 * 1024 * 1024 },
  response: sampleSetSchema,
})

export const getVendorSet = defineEndpoint({
  method: 'GET',
  path: '/api/vendor/sample-sets/:setId',
  summary: 'One own report with its questions by cell and what it would be judged as',
  access: ['vendor'],
  params: setParams,
  response: sampleSetSchema,
})

const atVersion = { version: z.int().nonnegative() }

export const answerQuestions = defineEndpoint({
  method: 'POST',
  path: '/api/vendor/sample-sets/:setId/answers',
  summary: 'Answer questions about cells; all of the answers are taken or none',
  access: ['vendor'],
  params: setParams,
  body: z.strictObject({ ...atVersion, answers: z.array(answerSchema).min(1, 'Answer at least one question.').max(2000) }),
  response: sampleSetSchema,
})

export const saveReport = defineEndpoint({
  method: 'PUT',
  path: '/api/vendor/sample-sets/:setId/report',
  summary: 'Keep the declaration that goes with the readings',
  access: ['vendor'],
  params: setParams,
  body: z.strictObject({ ...atVersion, report: sampleReportSchema }),
  response: sampleSetSchema,
})

export const uploadEvidence = defineEndpoint({
  method: 'POST',
  path: '/api/vendor/sample-sets/:setId/evidence',
  summary: 'Lay a scan, picture or certificate beside a report',
  access: ['vendor'],
  params: setParams,
  upload: { field: 'file', kinds: ['pdf', 'png', 'jpeg'], required: true },
  response: sampleSetSchema,
})

export const confirmSet = defineEndpoint({
  method: 'POST',
  path: '/api/vendor/sample-sets/:setId/confirmation',
  summary: 'Confirm and send a report: from here it is judged, immutable and seen by the customer',
  access: ['vendor'],
  params: setParams,
  body: z.strictObject(atVersion),
  response: sampleSetSchema,
})

export const vendorSampleFile = defineEndpoint({
  method: 'GET',
  path: '/api/vendor/sample-sets/:setId/files/:fileId',
  summary: 'A file of an own report',
  access: ['vendor'],
  params: z.strictObject({ setId: idSchema, fileId: idSchema }),
  download: ['application/octet-stream'],
})

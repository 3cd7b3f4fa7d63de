import { z } from 'zod'
import { idSchema, momentSchema, optionalText, requiredText, TEXT_LIMITS } from './common'
import { defineEndpoint } from './endpoint'
import { specificationDocumentSchema } from './specification-document'

export const REVISION_STATES = ['draft', 'in-check', 'released', 'superseded', 'withdrawn'] as const
export const revisionStateSchema = z.enum(REVISION_STATES)

/** What a list shows of a document; what nobody has filled is left out. */
export const keyFiguresSchema = z.object({
  core: z.string().optional(),
  inductanceH: z.number().optional(),
  /** Of the first winding. */
  turns: z.number().optional(),
  windings: z.number().optional(),
  frequencyHz: z.number().optional(),
})
export type KeyFigures = z.infer<typeof keyFiguresSchema>

const personNameSchema = z.object({ id: idSchema, name: z.string() })

/** A released revision: what every later document points at. */
export const releaseSummarySchema = z.object({
  /** The release's own id, which RFQ lines refer to. */
  id: idSchema,
  revision: z.string(),
  issuedOn: z.iso.date(),
  specificationSha256: z.string(),
  pdfSha256: z.string(),
  partNumber: z.string(),
  title: z.string(),
  engine: z.string(),
})

export const revisionSummarySchema = z.object({
  id: idSchema,
  /** `P1`, `P2` … until released, then the letter. */
  label: z.string(),
  state: revisionStateSchema,
  createdBy: personNameSchema,
  checkedBy: personNameSchema.nullable(),
  updatedAt: momentSchema,
  release: releaseSummarySchema.nullable(),
})

export const specificationSummarySchema = z.object({
  id: idSchema,
  partNumber: z.string(),
  title: z.string(),
  topology: z.string().nullable(),
  owner: personNameSchema,
  updatedAt: momentSchema,
  figures: keyFiguresSchema,
  current: revisionSummarySchema,
})

export const specificationPageSchema = z.object({
  /** How many fit the search and the filters in all. */
  total: z.int(),
  rows: z.array(specificationSummarySchema),
})

const SORT_COLUMNS = ['partNumber', 'title', 'topology', 'revision', 'state', 'owner', 'core', 'inductance', 'updatedAt'] as const
export const SPECIFICATION_SORTS = SORT_COLUMNS.flatMap((column) => [column, `-${column}`] as const)

export const specificationSchema = z.object({
  id: idSchema,
  partNumber: z.string(),
  title: z.string(),
  owner: personNameSchema,
  revisions: z.array(revisionSummarySchema),
})

/** A stopped check that a second person let pass at one place of the document, with the reason. */
export const overrideSchema = z.object({
  code: z.string(),
  /** Dotted path of the place; empty where it was let pass before places were told apart, which counts for none. */
  path: z.string(),
  reason: z.string(),
  by: personNameSchema,
  at: momentSchema,
})

export const revisionSchema = z.object({
  ...revisionSummarySchema.shape,
  specificationId: idSchema,
  /** Rises with every stored change; a change names the version it was made from. */
  version: z.int(),
  document: specificationDocumentSchema,
  overrides: z.array(overrideSchema),
  /** Why the checker sent it back; null when never. */
  returnedReason: z.string().nullable(),
  /** Why it was withdrawn; null when it was not. */
  withdrawnReason: z.string().nullable(),
  /** Persons who changed this draft: none of them may release it. */
  editors: z.array(personNameSchema),
})

/** What one answer of a second person covers: one check at one place. The same check elsewhere stays open. */
export const placeOfCheck = ({ code, path }: { code: string; path: string }): string => `${code} ${path}`

/** What rests on the releases of one part, each with the revision that it names. */
export const specificationUseSchema = z.object({
  enquiries: z.array(z.object({ id: idSchema, number: z.string(), title: z.string(), state: z.string(), dueAt: momentSchema, revision: z.string() })),
  /** Submitted and neither superseded nor withdrawn; only after the opening and for who reads prices. */
  quotes: z.array(z.object({ rfqId: idSchema, rfqNumber: z.string(), vendorName: z.string(), revision: z.string() })),
  samples: z.array(z.object({ id: idSchema, number: z.string(), vendorName: z.string(), dueOn: z.iso.date(), cancelled: z.boolean(), revision: z.string() })),
  orders: z.array(z.object({ id: idSchema, number: z.string(), vendorName: z.string(), answer: z.string().nullable(), revision: z.string() })),
})

/** A comment pinned to one place of a revision. */
export const specificationCommentSchema = z.object({
  id: idSchema,
  /** Place by the identity of its rows: `windings.[w1].turns`; empty for the revision as a whole. */
  place: z.string(),
  text: z.string(),
  by: personNameSchema,
  at: momentSchema,
  /** Null while it is open. */
  settled: z.object({ by: personNameSchema, at: momentSchema }).nullable(),
})

export type SpecificationComment = z.infer<typeof specificationCommentSchema>
export type SpecificationUse = z.infer<typeof specificationUseSchema>
export type RevisionSummary = z.infer<typeof revisionSummarySchema>
export type ReleaseSummary = z.infer<typeof releaseSummarySchema>
export type Specification = z.infer<typeof specificationSchema>
export type SpecificationPage = z.infer<typeof specificationPageSchema>
export type SpecificationSummary = z.infer<typeof specificationSummarySchema>
export type Revision = z.infer<typeof revisionSchema>

const readers = ['engineer', 'checker', 'quality', 'buyer', 'approver'] as const
const specificationParams = z.strictObject({ specificationId: idSchema })
const revisionParams = z.strictObject({ specificationId: idSchema, revisionId: idSchema })
const atVersion = { version: z.int().nonnegative() }

export const listSpecifications = defineEndpoint({
  method: 'GET',
  path: '/api/specifications',
  summary: 'A page of the winding specifications of the company, searched by number, title and the words of the document',
  access: readers,
  query: z.strictObject({
    search: z.string().max(TEXT_LIMITS.line).default(''),
    state: revisionStateSchema.optional(),
    topology: z.string().max(40).optional(),
    owner: z.enum(['mine']).optional(),
    /** Column, with a minus for falling order. */
    sort: z.enum(SPECIFICATION_SORTS).default('-updatedAt'),
    offset: z.coerce.number().int().min(0).max(1_000_000).default(0),
    limit: z.coerce.number().int().min(1).max(200).default(50),
  }),
  response: specificationPageSchema,
})

export const createSpecification = defineEndpoint({
  method: 'POST',
  path: '/api/specifications',
  summary: 'Start a winding specification with its first draft',
  access: ['engineer'],
  body: z.strictObject({
    partNumber: requiredText('The part number', 40),
    title: requiredText('The title', TEXT_LIMITS.line),
    document: specificationDocumentSchema,
  }),
  response: revisionSchema,
})

export const getSpecification = defineEndpoint({
  method: 'GET',
  path: '/api/specifications/:specificationId',
  summary: 'One winding specification with its revisions',
  access: readers,
  params: specificationParams,
  response: specificationSchema,
})

export const specificationUse = defineEndpoint({
  method: 'GET',
  path: '/api/specifications/:specificationId/use',
  summary: 'Enquiries, quotations, samples and orders that rest on a release of the part: what a new revision touches',
  access: readers,
  params: specificationParams,
  response: specificationUseSchema,
})

export const getRevision = defineEndpoint({
  method: 'GET',
  path: '/api/specifications/:specificationId/revisions/:revisionId',
  summary: 'One revision with its document',
  access: readers,
  params: revisionParams,
  response: revisionSchema,
})

export const createDraft = defineEndpoint({
  method: 'POST',
  path: '/api/specifications/:specificationId/revisions',
  summary: 'Start the next draft from the newest released revision',
  access: ['engineer'],
  params: specificationParams,
  response: revisionSchema,
})

export const saveDraft = defineEndpoint({
  method: 'PUT',
  path: '/api/specifications/:specificationId/revisions/:revisionId/document',
  summary: 'Store a change of a draft',
  access: ['engineer'],
  params: revisionParams,
  body: z.strictObject({ ...atVersion, document: specificationDocumentSchema }),
  response: revisionSchema,
})

export const submitDraft = defineEndpoint({
  method: 'POST',
  path: '/api/specifications/:specificationId/revisions/:revisionId/submission',
  summary: 'Hand a draft to the checker',
  access: ['engineer'],
  params: revisionParams,
  body: z.strictObject(atVersion),
  response: revisionSchema,
})

export const returnDraft = defineEndpoint({
  method: 'POST',
  path: '/api/specifications/:specificationId/revisions/:revisionId/return',
  summary: 'Send a revision in check back to its author',
  access: ['checker'],
  params: revisionParams,
  body: z.strictObject({ reason: requiredText('The reason', TEXT_LIMITS.note) }),
  response: revisionSchema,
})

export const overrideCheck = defineEndpoint({
  method: 'POST',
  path: '/api/specifications/:specificationId/revisions/:revisionId/overrides',
  summary: 'Let a check that stops release pass at one place, with a reason, as a person who did not work on the draft',
  access: ['checker', 'quality'],
  params: revisionParams,
  body: z.strictObject({ code: z.string().regex(/^[A-Z]\d{2}$/, 'A check has a letter and two digits.'), path: z.string().min(1, 'Name the place of the document that the check is about.').max(200), reason: requiredText('The reason', TEXT_LIMITS.note) }),
  response: revisionSchema,
})

export const releaseRevision = defineEndpoint({
  method: 'POST',
  path: '/api/specifications/:specificationId/revisions/:revisionId/release',
  summary: 'Release a checked revision: the server evaluates it again, draws it and seals it',
  access: ['checker'],
  params: revisionParams,
  body: z.strictObject(atVersion),
  response: revisionSchema,
})

export const withdrawRevision = defineEndpoint({
  method: 'POST',
  path: '/api/specifications/:specificationId/revisions/:revisionId/withdrawal',
  summary: 'Withdraw a draft or a released revision, with a reason',
  access: ['engineer', 'checker'],
  params: revisionParams,
  body: z.strictObject({ reason: optionalText('The reason', TEXT_LIMITS.note).min(3, 'Say why in at least three letters.') }),
  response: revisionSchema,
})

const commentPlace = z.string().regex(/^[A-Za-z0-9._[\]/ -]{0,200}$/, 'A place is a dotted path of the document, with rows by their id in brackets.')

export const listComments = defineEndpoint({
  method: 'GET',
  path: '/api/specifications/:specificationId/revisions/:revisionId/comments',
  summary: 'The comments on one revision, oldest first',
  access: readers,
  params: revisionParams,
  response: z.array(specificationCommentSchema),
})

export const writeComment = defineEndpoint({
  method: 'POST',
  path: '/api/specifications/:specificationId/revisions/:revisionId/comments',
  summary: 'Say something about one place of a revision',
  access: ['engineer', 'checker', 'quality'],
  params: revisionParams,
  body: z.strictObject({ place: commentPlace, text: requiredText('The comment', TEXT_LIMITS.note) }),
  response: z.array(specificationCommentSchema),
})

export const settleComment = defineEndpoint({
  method: 'POST',
  path: '/api/specifications/:specificationId/revisions/:revisionId/comments/:commentId/settlement',
  summary: 'Settle a comment, or open it again',
  access: ['engineer', 'checker', 'quality'],
  params: revisionParams.extend({ commentId: idSchema }),
  body: z.strictObject({ settled: z.boolean() }),
  response: z.array(specificationCommentSchema),
})

export const draftPdf = defineEndpoint({
  method: 'GET',
  path: '/api/specifications/:specificationId/revisions/:revisionId/sheets.pdf',
  summary: 'The sheets: archived bytes of a released revision, a marked print of a draft',
  access: readers,
  params: revisionParams,
  download: ['application/pdf'],
})

export const outlineDxf = defineEndpoint({
  method: 'GET',
  path: '/api/specifications/:specificationId/revisions/:revisionId/outline.dxf',
  summary: 'Outline and pin-out for the layout of a board: DXF, 1:1 in mm, seen from the component side',
  access: readers,
  params: revisionParams,
  download: ['image/vnd.dxf'],
})

export const calculationPdf = defineEndpoint({
  method: 'GET',
  path: '/api/specifications/:specificationId/revisions/:revisionId/calculation.pdf',
  summary: 'The whole calculation of a revision with its working; for the company itself, since it holds the requirement sheet',
  access: readers,
  params: revisionParams,
  download: ['application/pdf'],
})

export const releasedDocument = defineEndpoint({
  method: 'GET',
  path: '/api/specifications/:specificationId/revisions/:revisionId/specification.json',
  summary: 'The canonical bytes of a released specification, whose SHA-256 stands in the title block',
  access: readers,
  params: revisionParams,
  download: ['application/json'],
})

export const releasedResults = defineEndpoint({
  method: 'GET',
  path: '/api/specifications/:specificationId/revisions/:revisionId/results',
  summary: 'What was calculated and drawn at release, as it was sealed: never calculated again by a later engine',
  access: readers,
  params: revisionParams,
  response: z.object({
    /** The engine's evaluation. */
    evaluation: z.looseObject({ engine: z.string() }),
    /** The drawn sheets as data. */
    sheets: z.array(z.looseObject({ number: z.int() })),
  }),
})

export const listReleases = defineEndpoint({
  method: 'GET',
  path: '/api/releases',
  summary: 'Released revisions that an RFQ can be made from',
  access: readers,
  response: z.array(z.object({ ...releaseSummarySchema.shape, specificationId: idSchema, revisionId: idSchema, current: z.boolean() })),
})

export const specificationJsonSchema = defineEndpoint({
  method: 'GET',
  path: '/api/schemas/winding-specification.json',
  summary: 'JSON Schema of the winding specification that is attached to each released PDF',
  access: 'public',
  response: z.looseObject({}),
})

export { searchCandidates } from './specification-search'

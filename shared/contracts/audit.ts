import { z } from 'zod'
import { idSchema, momentSchema, roleSchema } from './common'
import { BUYING_ROLES, defineEndpoint } from './endpoint'

const roles = z.array(roleSchema)

/** Stored for years: add variants, never change or drop one. Identifiers, not content. */
export const auditEventSchema = z.discriminatedUnion('type', [
  z.object({ type: z.literal('signed-in'), personId: idSchema }),
  z.object({ type: z.literal('signed-out'), personId: idSchema }),
  z.object({ type: z.literal('password-set'), personId: idSchema }),
  z.object({ type: z.literal('password-reset-requested'), personId: idSchema }),
  z.object({ type: z.literal('person-invited'), personId: idSchema, roles }),
  z.object({ type: z.literal('invitation-repeated'), personId: idSchema }),
  z.object({ type: z.literal('invitation-accepted'), personId: idSchema }),
  z.object({ type: z.literal('person-change-requested'), personId: idSchema, changeId: idSchema, change: z.enum(['roles', 'email', 'removal']), roles: roles.optional() }),
  z.object({ type: z.literal('person-change-confirmed'), personId: idSchema, changeId: idSchema, change: z.enum(['roles', 'email', 'removal']), roles: roles.optional() }),
  z.object({ type: z.literal('person-change-refused'), personId: idSchema, changeId: idSchema }),
  z.object({ type: z.literal('address-changed'), personId: idSchema, changeId: idSchema }),
  z.object({ type: z.literal('company-created'), companyId: idSchema }),
  z.object({ type: z.literal('company-updated'), companyId: idSchema }),
  z.object({ type: z.literal('vendor-invited'), vendorCompanyId: idSchema }),
  z.object({ type: z.literal('vendor-updated'), vendorCompanyId: idSchema, approval: z.string() }),
  z.object({ type: z.literal('vendor-agreement-stored'), vendorCompanyId: idSchema, fileId: idSchema, sha256: z.string() }),
  z.object({ type: z.literal('customer-accepted'), buyingCompanyId: idSchema }),
  z.object({ type: z.literal('mail-retried'), mailId: idSchema }),
  z.object({ type: z.literal('part-created'), kind: z.string(), partId: z.string(), version: z.int() }),
  z.object({ type: z.literal('part-changed'), kind: z.string(), partId: z.string(), version: z.int() }),
  z.object({ type: z.literal('part-flagged'), kind: z.string(), partId: z.string(), preferred: z.boolean(), stocked: z.boolean() }),
  z.object({ type: z.literal('parts-imported'), kind: z.string(), created: z.int(), changed: z.int(), fileSha256: z.string() }),
  z.object({ type: z.literal('specification-created'), specificationId: idSchema, revisionId: idSchema }),
  z.object({ type: z.literal('draft-created'), specificationId: idSchema, revisionId: idSchema }),
  z.object({ type: z.literal('draft-submitted'), specificationId: idSchema, revisionId: idSchema }),
  z.object({ type: z.literal('draft-returned'), specificationId: idSchema, revisionId: idSchema }),
  z.object({ type: z.literal('check-overridden'), specificationId: idSchema, revisionId: idSchema, code: z.string(), path: z.string().optional() }),
  z.object({ type: z.literal('revision-withdrawn'), specificationId: idSchema, revisionId: idSchema }),
  z.object({ type: z.literal('comment-written'), specificationId: idSchema, revisionId: idSchema, commentId: idSchema }),
  z.object({ type: z.literal('comment-settled'), specificationId: idSchema, revisionId: idSchema, commentId: idSchema, settled: z.boolean() }),
  z.object({
    type: z.literal('revision-released'),
    specificationId: idSchema,
    revisionId: idSchema,
    releaseId: idSchema,
    revision: z.string(),
    specificationSha256: z.string(),
    pdfSha256: z.string(),
  }),
  z.object({ type: z.literal('rfq-created'), rfqId: idSchema }),
  z.object({ type: z.literal('rfq-issued'), rfqId: idSchema, issueNumber: z.int() }),
  z.object({ type: z.literal('rfq-extended'), rfqId: idSchema, dueAt: momentSchema, reason: z.string() }),
  z.object({ type: z.literal('rfq-cancelled'), rfqId: idSchema }),
  z.object({ type: z.literal('rfq-closed'), rfqId: idSchema }),
  z.object({ type: z.literal('rfq-opening-asked'), rfqId: idSchema }),
  z.object({ type: z.literal('rfq-opened'), rfqId: idSchema }),
  z.object({ type: z.literal('confidentiality-accepted'), rfqId: idSchema, invitationId: idSchema }),
  z.object({ type: z.literal('no-bid'), rfqId: idSchema, invitationId: idSchema, reason: z.string() }),
  z.object({ type: z.literal('drawing-copied'), rfqId: idSchema, lineId: idSchema, sha256: z.string() }),
  z.object({ type: z.literal('quote-submitted'), rfqId: idSchema, quoteId: idSchema, revision: z.int(), sha256: z.string() }),
  z.object({ type: z.literal('quote-withdrawn'), rfqId: idSchema, quoteId: idSchema }),
  z.object({ type: z.literal('samples-requested'), requestId: idSchema, rfqId: idSchema, lineId: idSchema, vendorCompanyId: idSchema }),
  z.object({ type: z.literal('samples-cancelled'), requestId: idSchema }),
  z.object({ type: z.literal('sample-report-confirmed'), requestId: idSchema, setId: idSchema, fileSha256: z.string(), recordSha256: z.string(), verdict: z.string() }),
  z.object({ type: z.literal('sample-report-disposed'), requestId: idSchema, setId: idSchema, disposition: z.string() }),
  z.object({ type: z.literal('award-proposed'), rfqId: idSchema, awardId: idSchema, quoteId: idSchema, comparisonSha256: z.string() }),
  z.object({ type: z.literal('award-void'), rfqId: idSchema, awardId: idSchema }),
  z.object({ type: z.literal('award-approved'), rfqId: idSchema, awardId: idSchema, comparisonSha256: z.string() }),
  z.object({ type: z.literal('award-rejected'), rfqId: idSchema, awardId: idSchema }),
  z.object({ type: z.literal('order-placed'), rfqId: idSchema, awardId: idSchema, orderId: idSchema, sha256: z.string(), pdfSha256: z.string() }),
  z.object({ type: z.literal('order-acknowledged'), orderId: idSchema, answer: z.string() }),
])

export type AuditEvent = z.infer<typeof auditEventSchema>
export type AuditType = AuditEvent['type']

/**
 * What an entry is about, which decides who reads it: accounts (administrator, operator), engineering
 * (engineer, checker, quality) or purchasing. Buyers and approvers read all three, a vendor its own actions.
 */
export const AUDIT_AREAS = ['account', 'engineering', 'purchasing'] as const
export type AuditArea = (typeof AUDIT_AREAS)[number]

export const AUDIT_AREA: Record<AuditType, AuditArea> = {
  'signed-in': 'account',
  'signed-out': 'account',
  'password-set': 'account',
  'password-reset-requested': 'account',
  'person-invited': 'account',
  'invitation-repeated': 'account',
  'invitation-accepted': 'account',
  'person-change-requested': 'account',
  'person-change-confirmed': 'account',
  'person-change-refused': 'account',
  'address-changed': 'account',
  'company-created': 'account',
  'company-updated': 'account',
  'vendor-invited': 'account',
  'vendor-updated': 'purchasing',
  'vendor-agreement-stored': 'purchasing',
  'customer-accepted': 'account',
  'mail-retried': 'account',
  'part-created': 'engineering',
  'part-changed': 'engineering',
  'part-flagged': 'engineering',
  'parts-imported': 'engineering',
  'specification-created': 'engineering',
  'draft-created': 'engineering',
  'draft-submitted': 'engineering',
  'draft-returned': 'engineering',
  'check-overridden': 'engineering',
  'revision-withdrawn': 'engineering',
  'comment-written': 'engineering',
  'comment-settled': 'engineering',
  'revision-released': 'engineering',
  'rfq-created': 'purchasing',
  'rfq-issued': 'purchasing',
  'rfq-extended': 'purchasing',
  'rfq-cancelled': 'purchasing',
  'rfq-closed': 'purchasing',
  'rfq-opening-asked': 'purchasing',
  'rfq-opened': 'purchasing',
  'confidentiality-accepted': 'purchasing',
  'no-bid': 'purchasing',
  'drawing-copied': 'purchasing',
  'quote-submitted': 'purchasing',
  'quote-withdrawn': 'purchasing',
  'samples-requested': 'engineering',
  'samples-cancelled': 'engineering',
  'sample-report-confirmed': 'engineering',
  'sample-report-disposed': 'engineering',
  'award-proposed': 'purchasing',
  'award-void': 'purchasing',
  'award-approved': 'purchasing',
  'award-rejected': 'purchasing',
  'order-placed': 'purchasing',
  'order-acknowledged': 'purchasing',
}

export const auditEntrySchema = z.object({
  id: idSchema,
  at: momentSchema,
  actorId: idSchema.nullable(),
  actorName: z.string().nullable(),
  area: z.enum(AUDIT_AREAS),
  event: auditEventSchema,
  /** Place in the hash chain, SHA-256 in hex; null until the entry is chained. */
  chainHash: z.string().nullable(),
})
export type AuditEntry = z.infer<typeof auditEntrySchema>

export const listAudit = defineEndpoint({
  method: 'GET',
  path: '/api/audit',
  summary: 'The audit trail, newest first, as far as the role reads it',
  access: [...BUYING_ROLES, 'vendor', 'operator'],
  query: z.strictObject({
    /** Entries before this entry, for the next page. */
    before: idSchema.optional(),
    type: z.string().max(60).optional(),
    limit: z.coerce.number().int().min(1).max(200).default(50),
  }),
  response: z.array(auditEntrySchema),
})

import type { SampleReport } from '#shared/contracts/samples'
import type { Answer } from '#shared/measurement/model'
import type { SampleKind } from '#shared/measurement/capability'
import type { Disposition, SetVerdict } from '#shared/workflow/sample-state'
import { sql } from 'drizzle-orm'
import { check, date, doublePrecision, foreignKey, index, integer, jsonb, pgTable, text, unique, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import { bytea, createdAt, id, timestamptz } from './columns'
import { files } from './files'
import { people } from './people'
import { rfqInvitations, rfqLines } from './rfqs'
import { specificationReleases } from './specifications'

/** Samples of one released revision asked of one vendor whose quotation was opened. */
export const sampleRequests = pgTable(
  'sample_requests',
  {
    id: id(),
    companyId: uuid('company_id').notNull(),
    vendorCompanyId: uuid('vendor_company_id').notNull(),
    rfqId: uuid('rfq_id').notNull(),
    invitationId: uuid('invitation_id').notNull(),
    lineId: uuid('line_id').notNull(),
    releaseId: uuid('release_id').notNull(),
    requestedBy: uuid('requested_by')
      .notNull()
      .references(() => people.id),
    cancelledBy: uuid('cancelled_by').references(() => people.id),
    /** Drawn at random, since a vendor sees it: it tells neither order nor count. */
    number: text('number').notNull(),
    quantity: integer('quantity').notNull(),
    sampleKind: text('sample_kind').$type<SampleKind>().notNull(),
    dueOn: date('due_on').notNull(),
    note: text('note').notNull().default(''),
    requestedAt: timestamptz('requested_at').notNull(),
    cancelledAt: timestamptz('cancelled_at'),
    cancelledReason: text('cancelled_reason'),
    createdAt: createdAt(),
  },
  (t) => [
    foreignKey({
      name: 'sample_requests_invitation_fk',
      columns: [t.invitationId, t.rfqId, t.companyId, t.vendorCompanyId],
      foreignColumns: [rfqInvitations.id, rfqInvitations.rfqId, rfqInvitations.companyId, rfqInvitations.vendorCompanyId],
    }),
    foreignKey({ name: 'sample_requests_line_fk', columns: [t.lineId, t.rfqId], foreignColumns: [rfqLines.id, rfqLines.rfqId] }),
    foreignKey({
      name: 'sample_requests_release_fk',
      columns: [t.releaseId, t.companyId],
      foreignColumns: [specificationReleases.id, specificationReleases.companyId],
    }),
    unique('sample_requests_company_number_key').on(t.companyId, t.number),
    unique('sample_requests_id_parties_key').on(t.id, t.companyId, t.vendorCompanyId),
    index('sample_requests_vendor_company_id_idx').on(t.vendorCompanyId),
    index('sample_requests_invitation_idx').on(t.invitationId, t.rfqId, t.companyId, t.vendorCompanyId),
    index('sample_requests_line_idx').on(t.lineId, t.rfqId),
    index('sample_requests_release_idx').on(t.releaseId, t.companyId),
    index('sample_requests_requested_by_idx').on(t.requestedBy),
    index('sample_requests_cancelled_by_idx').on(t.cancelledBy),
    check('sample_requests_quantity_positive', sql`${t.quantity} > 0`),
    check('sample_requests_cancelled_together', sql`(${t.cancelledAt} is null) = (${t.cancelledBy} is null) and (${t.cancelledAt} is null) = (${t.cancelledReason} is null)`),
  ],
)

/**
 * One report of a vendor about the parts of one request. Until the vendor confirms it, it is the vendor's alone;
 * what was confirmed never changes. A corrected report is a new set.
 */
export const sampleSets = pgTable(
  'sample_sets',
  {
    id: id(),
    requestId: uuid('request_id').notNull(),
    companyId: uuid('company_id').notNull(),
    vendorCompanyId: uuid('vendor_company_id').notNull(),
    /** The report as it came, byte for byte. */
    fileId: uuid('file_id')
      .notNull()
      .references(() => files.id),
    uploadedBy: uuid('uploaded_by')
      .notNull()
      .references(() => people.id),
    confirmedBy: uuid('confirmed_by').references(() => people.id),
    /** 1, 2 … within the request. */
    number: integer('number').notNull(),
    kind: text('kind').$type<'readings' | 'evidence'>().notNull(),
    fileSha256: text('file_sha256').notNull(),
    phase: text('phase').$type<'read' | 'judged' | 'superseded'>().notNull().default('read'),
    version: integer('version').notNull().default(1),
    answers: jsonb('answers').$type<Answer[]>().notNull(),
    report: jsonb('report').$type<SampleReport>(),
    verdict: text('verdict').$type<SetVerdict>(),
    /** Canonical JSON of everything that was confirmed: report, answers, readings and judgement. */
    record: bytea('record'),
    recordSha256: text('record_sha256'),
    uploadedAt: timestamptz('uploaded_at').notNull(),
    confirmedAt: timestamptz('confirmed_at'),
    createdAt: createdAt(),
  },
  (t) => [
    foreignKey({
      name: 'sample_sets_request_fk',
      columns: [t.requestId, t.companyId, t.vendorCompanyId],
      foreignColumns: [sampleRequests.id, sampleRequests.companyId, sampleRequests.vendorCompanyId],
    }),
    unique('sample_sets_number_key').on(t.requestId, t.number),
    // A file that was replaced before it was confirmed may come back; any other comes once.
    uniqueIndex('sample_sets_file_key').on(t.requestId, t.fileSha256).where(sql`phase <> 'superseded' or confirmed_at is not null`),
    unique('sample_sets_id_parties_key').on(t.id, t.companyId, t.vendorCompanyId),
    uniqueIndex('sample_sets_one_open_key').on(t.requestId).where(sql`phase = 'read'`),
    index('sample_sets_request_idx').on(t.requestId, t.companyId, t.vendorCompanyId),
    index('sample_sets_vendor_company_id_idx').on(t.vendorCompanyId),
    index('sample_sets_file_id_idx').on(t.fileId),
    index('sample_sets_uploaded_by_idx').on(t.uploadedBy),
    index('sample_sets_confirmed_by_idx').on(t.confirmedBy),
    check('sample_sets_phase_known', sql`${t.phase} in ('read', 'judged', 'superseded')`),
    check('sample_sets_kind_known', sql`${t.kind} in ('readings', 'evidence')`),
    check('sample_sets_verdict_known', sql`${t.verdict} in ('met', 'not-met', 'not-evidenced')`),
    check(
      'sample_sets_confirmed_together',
      sql`(${t.confirmedAt} is null) = (${t.confirmedBy} is null) and (${t.confirmedAt} is null) = (${t.record} is null) and (${t.confirmedAt} is null) = (${t.recordSha256} is null) and (${t.confirmedAt} is null) = (${t.verdict} is null)`,
    ),
    check('sample_sets_judged_is_confirmed', sql`${t.phase} <> 'judged' or ${t.confirmedAt} is not null`),
    check('sample_sets_read_is_not', sql`${t.phase} <> 'read' or ${t.confirmedAt} is null`),
  ],
)

/** Further evidence beside a report: scans, pictures, certificates. */
export const sampleEvidence = pgTable(
  'sample_evidence',
  {
    id: id(),
    setId: uuid('set_id').notNull(),
    companyId: uuid('company_id').notNull(),
    vendorCompanyId: uuid('vendor_company_id').notNull(),
    fileId: uuid('file_id')
      .notNull()
      .references(() => files.id),
    createdAt: createdAt(),
  },
  (t) => [
    foreignKey({
      name: 'sample_evidence_set_fk',
      columns: [t.setId, t.companyId, t.vendorCompanyId],
      foreignColumns: [sampleSets.id, sampleSets.companyId, sampleSets.vendorCompanyId],
    }),
    unique('sample_evidence_file_key').on(t.setId, t.fileId),
    index('sample_evidence_set_idx').on(t.setId, t.companyId, t.vendorCompanyId),
    index('sample_evidence_file_id_idx').on(t.fileId),
  ],
)

/** One reading of a confirmed set with its verdict, in the SI unit of its test row. */
export const sampleReadings = pgTable(
  'sample_readings',
  {
    id: id(),
    setId: uuid('set_id').notNull(),
    companyId: uuid('company_id').notNull(),
    vendorCompanyId: uuid('vendor_company_id').notNull(),
    /** Of the released specification's test table. */
    testRowId: text('test_row_id').notNull(),
    symbol: text('symbol').notNull(),
    serial: text('serial').notNull(),
    run: integer('run').notNull(),
    /** Cell of the file. */
    address: text('address').notNull(),
    text: text('text').notNull(),
    kind: text('kind').$type<'value' | 'censored' | 'attribute' | 'withstand' | 'no-number'>().notNull(),
    value: doublePrecision('value'),
    verdict: text('verdict').$type<SetVerdict>().notNull(),
    reason: text('reason').notNull(),
  },
  (t) => [
    foreignKey({
      name: 'sample_readings_set_fk',
      columns: [t.setId, t.companyId, t.vendorCompanyId],
      foreignColumns: [sampleSets.id, sampleSets.companyId, sampleSets.vendorCompanyId],
    }),
    unique('sample_readings_cell_key').on(t.setId, t.testRowId, t.serial, t.run),
    index('sample_readings_set_idx').on(t.setId, t.companyId, t.vendorCompanyId),
    check('sample_readings_verdict_known', sql`${t.verdict} in ('met', 'not-met', 'not-evidenced')`),
    check('sample_readings_run_positive', sql`${t.run} > 0`),
  ],
)

/** What quality or engineering decided about a confirmed set. Final: what comes later is a new set. */
export const sampleDispositions = pgTable(
  'sample_dispositions',
  {
    id: id(),
    setId: uuid('set_id').notNull(),
    companyId: uuid('company_id').notNull(),
    vendorCompanyId: uuid('vendor_company_id').notNull(),
    decidedBy: uuid('decided_by')
      .notNull()
      .references(() => people.id),
    disposition: text('disposition').$type<Disposition>().notNull(),
    reason: text('reason').notNull(),
    /** Pieces and last day of a concession. */
    concessionQuantity: integer('concession_quantity'),
    concessionExpiresOn: date('concession_expires_on'),
    decidedAt: timestamptz('decided_at').notNull(),
  },
  (t) => [
    foreignKey({
      name: 'sample_dispositions_set_fk',
      columns: [t.setId, t.companyId, t.vendorCompanyId],
      foreignColumns: [sampleSets.id, sampleSets.companyId, sampleSets.vendorCompanyId],
    }),
    unique('sample_dispositions_set_key').on(t.setId),
    index('sample_dispositions_set_idx').on(t.setId, t.companyId, t.vendorCompanyId),
    index('sample_dispositions_decided_by_idx').on(t.decidedBy),
    check('sample_dispositions_known', sql`${t.disposition} in ('accepted', 'accepted-with-concession', 'change-drawing', 'rework', 'rejected', 'on-hold')`),
    check(
      'sample_dispositions_concession_bounded',
      sql`(${t.disposition} = 'accepted-with-concession') = (${t.concessionQuantity} is not null) and (${t.concessionQuantity} is null) = (${t.concessionExpiresOn} is null)`,
    ),
  ],
)

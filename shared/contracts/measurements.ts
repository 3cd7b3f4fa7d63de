import { SAMPLE_KINDS } from '#shared/measurement/capability'
import { z } from 'zod'

/** Shapes of `shared/measurement` as they travel. Values are in the SI unit of their test row. */

const values = z.record(z.string(), z.union([z.string(), z.number()]))
const limit = z.number().nullable()

export const expectedRowSchema = z.object({
  id: z.string(),
  symbol: z.string(),
  characteristic: z.enum([
    'inductance',
    'inductance-at-bias',
    'leakage',
    'dc-resistance',
    'turns-ratio',
    'polarity',
    'self-resonance',
    'interwinding-capacitance',
    'hipot',
    'insulation-resistance',
    'surge',
    'impulse',
    'partial-discharge',
    'dimension',
    'visual',
  ]),
  unit: z.enum(['H', 'Ω', 'V', 'A', 'Hz', 'F', 'mm', '1']),
  minimum: limit,
  nominal: limit,
  maximum: limit,
  levelV: limit,
  temperatureC: limit,
  extent: z.enum(['every-part', 'sample', 'type-test', 'reference']),
  record: z.enum(['reading', 'pass-fail']),
})

export const readingSchema = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('value'), value: z.number() }),
  z.object({ kind: z.literal('censored'), side: z.enum(['above', 'below']), bound: limit }),
  z.object({ kind: z.literal('attribute'), passed: z.boolean() }),
  z.object({ kind: z.literal('withstand'), voltageV: limit, timeS: limit, currentA: limit, passed: z.boolean() }),
  z.object({ kind: z.literal('no-number') }),
])

export const questionSchema = z.object({
  id: z.string(),
  code: z.enum([
    'column-target',
    'unit-missing',
    'unit-ambiguous',
    'unit-unlike',
    'column-factor',
    'inverted-ratio',
    'ambiguous-number',
    'cell-factor',
    'zero-or-negative',
    'unsure-verdict',
    'date-for-number',
    'formula-error',
    'unreadable-cell',
    'unit-unknown',
    'serial-missing',
    'serial-duplicate',
    'serial-range',
  ]),
  address: z.string(),
  text: z.string(),
  values,
  options: z.array(z.object({ id: z.string(), values })),
  typed: z.boolean(),
})

export const answerSchema = z.strictObject({
  questionId: z.string().min(1).max(80),
  option: z.string().min(1).max(120),
  text: z.string().trim().max(120, 'A typed answer has at most 120 characters.').optional(),
})

export const noteSchema = z.object({
  code: z.enum([
    'mixed-units',
    'mixed-decimal-signs',
    'repaired-characters',
    'limit-differs',
    'summary-disagrees',
    'identical-readings',
    'line-ignored',
    'cells-outside-table',
    'row-without-readings',
    'other-revision',
    'other-drawing',
  ]),
  address: z.string(),
  values,
})

const columnTargetSchema = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('serial') }),
  z.object({ kind: z.literal('row'), rowId: z.string() }),
  z.object({ kind: z.literal('ignored') }),
  z.object({ kind: z.literal('open') }),
])

export const measurementReadingSchema = z.object({
  kind: z.literal('read'),
  facts: z.object({
    encoding: z.string(),
    separator: z.string(),
    decimalSign: z.enum(['comma', 'point', 'undecided', 'mixed']),
    evidence: z.object({ comma: z.int(), point: z.int(), commaAt: z.string().nullable(), pointAt: z.string().nullable() }),
    orientation: z.enum(['parts-in-rows', 'parts-in-columns']),
    headingAddress: z.string(),
  }),
  columns: z.array(
    z.object({
      address: z.string(),
      heading: z.string(),
      target: columnTargetSchema,
      how: z.enum(['symbol', 'synonym', 'position', 'answer', 'known-word', 'open']),
      unit: z.string().nullable(),
    }),
  ),
  titleBlock: z.array(z.object({ address: z.string(), label: z.string(), value: z.string() })),
  serials: z.array(z.object({ serial: z.string(), address: z.string(), provisional: z.boolean(), run: z.int() })),
  accepted: z.array(
    z.object({
      serial: z.string(),
      run: z.int(),
      rowId: z.string(),
      address: z.string(),
      text: z.string(),
      reading: readingSchema,
      scaledBy: z.number().nullable(),
    }),
  ),
  questions: z.array(questionSchema),
  rejected: z.array(
    z.object({ address: z.string(), text: z.string(), serial: z.string().nullable(), rowId: z.string().nullable(), reason: z.enum(['left-out', 'part-left-out']) }),
  ),
  notes: z.array(noteSchema),
})

export const verdictSchema = z.enum(['met', 'not-met', 'not-evidenced'])

const judgedCellSchema = z.object({
  serial: z.string(),
  run: z.int(),
  rowId: z.string(),
  address: z.string().nullable(),
  text: z.string().nullable(),
  reading: readingSchema.nullable(),
  judged: z.number().nullable(),
  correctedFromC: z.number().nullable(),
  verdict: verdictSchema,
  reason: z.enum([
    'within-limits',
    'below-minimum',
    'above-maximum',
    'passed',
    'failed',
    'no-reading',
    'no-number',
    'beyond-range',
    'word-for-reading',
    'test-voltage-too-low',
    'no-limits',
  ]),
  superseded: z.boolean(),
})

const capabilitySchema = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('values-only'), n: z.int() }),
  z.object({ kind: z.literal('none'), n: z.int(), reason: z.enum(['no-limits', 'identical-readings', 'resolution-too-coarse']) }),
  z.object({ kind: z.literal('index'), n: z.int(), ppk: z.number(), lowerBound95: z.number(), preliminary: z.boolean(), sampleKind: z.enum(SAMPLE_KINDS) }),
])

export const judgementSchema = z.object({
  verdict: verdictSchema,
  rows: z.array(
    z.object({
      row: expectedRowSchema,
      cells: z.array(judgedCellSchema),
      verdict: verdictSchema,
      summary: z.object({ n: z.int(), mean: limit, deviation: limit, minimum: limit, maximum: limit, median: limit }),
      censored: z.int(),
      outOfLimits: z.array(z.string()),
      notEvidenced: z.array(z.string()),
      capability: capabilitySchema.nullable(),
      attributes: z.object({ n: z.int(), failures: z.int(), failureShareBound95: z.number() }).nullable(),
      decides: z.boolean(),
    }),
  ),
})

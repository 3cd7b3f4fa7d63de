import { z } from 'zod'
import { idSchema, momentSchema, pageQuerySchema, requiredText, TEXT_LIMITS } from './common'
import { defineEndpoint } from './endpoint'
import {
  confidenceSchema,
  coreDraftSchema,
  coreRowSchema,
  formerDraftSchema,
  formerRowSchema,
  materialDraftSchema,
  materialRowSchema,
  partIdSchema,
  partKindSchema,
  partRowSchema,
  sleeveDraftSchema,
  sleeveRowSchema,
  tapeDraftSchema,
  tapeRowSchema,
  wireDraftSchema,
  wireRowSchema,
} from './part-rows'
import { partProblems } from './part-rules'

/** Who may look into the library; accounts are managed without it. */
export const PART_READERS = ['engineer', 'checker', 'quality', 'buyer', 'approver'] as const

/** Shipped with the installation, or the company's own. */
export const partOriginSchema = z.enum(['shared', 'company'])

const partDraftSchema = z
  .discriminatedUnion('kind', [coreDraftSchema, formerDraftSchema, materialDraftSchema, wireDraftSchema, tapeDraftSchema, sleeveDraftSchema])
  .superRefine((row, context) => {
    for (const { path, message } of partProblems(row)) context.addIssue({ code: 'custom', path: path.split('.'), message })
  })

/** What the company says about a row, whatever its version. */
export const partFlagsSchema = z.object({
  /** Comes first among equals in a search. */
  preferred: z.boolean(),
  /** Lies in the company's store. */
  stocked: z.boolean(),
})
export type PartFlags = z.infer<typeof partFlagsSchema>

export const partSummarySchema = z.object({
  kind: partKindSchema,
  id: z.string(),
  version: z.int(),
  name: z.string(),
  /** Shape of a core or of a former's core, form of a wire, use of a material or tape. */
  family: z.string(),
  /** The figures that tell one row from the next, in the order of `PART_FIGURES`. */
  figures: z.record(z.string(), z.number().nullable()),
  source: z.string(),
  confidence: confidenceSchema,
  unverified: z.int(),
  origin: partOriginSchema,
  flags: partFlagsSchema,
})

export const partVersionSchema = z.object({
  row: partRowSchema,
  origin: partOriginSchema,
  /** The version that new work takes. */
  current: z.boolean(),
  createdAt: momentSchema,
  createdBy: z.object({ id: idSchema, name: z.string() }).nullable(),
  /** Why this version was made; empty for shipped rows. */
  reason: z.string(),
})

/** A row with all its versions, newest first. */
export const partSchema = z.object({ versions: z.array(partVersionSchema).min(1), flags: partFlagsSchema })

export const librarySchema = z.object({
  cores: z.array(coreRowSchema),
  formers: z.array(formerRowSchema),
  materials: z.array(materialRowSchema),
  wires: z.array(wireRowSchema),
  tapes: z.array(tapeRowSchema),
  sleeves: z.array(sleeveRowSchema),
})

export type PartSummary = z.infer<typeof partSummarySchema>
export type PartVersion = z.infer<typeof partVersionSchema>
export type Part = z.infer<typeof partSchema>
export type PartOrigin = z.infer<typeof partOriginSchema>

/** A table of rows is read whole into memory. */
const LARGEST_IMPORT_BYTES = 2 * 1024 * 1024

/** One thing that does not fit; `column` is the heading, empty when the whole row or table is meant. */
const importProblemSchema = z.object({ column: z.string(), message: z.string() })

export const partImportPreviewSchema = z.object({
  /** What the preview was made of: the file and the library as they were. Handed back to confirm exactly this. */
  fingerprint: z.string(),
  /** What is wrong with the table itself; then no row is read. */
  problems: z.array(importProblemSchema.extend({ line: z.int() })),
  rows: z.array(
    z.object({
      /** Row of the spreadsheet; the headings are row 1. */
      line: z.int(),
      id: z.string(),
      name: z.string(),
      state: z.enum(['new', 'changed', 'unchanged', 'unfit']),
      /** The version for new work that this one would follow; null for a new row. */
      basedOn: z.int().nullable(),
      /** Headings of the columns that differ from that version. */
      changes: z.array(z.string()),
      problems: z.array(importProblemSchema),
    }),
  ),
})

export type PartImportPreview = z.infer<typeof partImportPreviewSchema>
export type PartImportRow = PartImportPreview['rows'][number]

const partParams = z.strictObject({ kind: partKindSchema, id: partIdSchema })
const reason = requiredText('The reason', TEXT_LIMITS.note)

export const listParts = defineEndpoint({
  method: 'GET',
  path: '/api/parts',
  summary: 'Rows of the parts library of one kind, the newest version of each, by name',
  access: PART_READERS,
  query: z.strictObject({
    ...pageQuerySchema.shape,
    kind: partKindSchema,
    search: z.string().max(TEXT_LIMITS.line).default(''),
    family: z.string().max(60).optional(),
    confidence: confidenceSchema.optional(),
    origin: partOriginSchema.optional(),
  }),
  response: z.object({
    total: z.int(),
    rows: z.array(partSummarySchema),
    /** The families of the kind with how many rows each has, whatever else is asked for. */
    families: z.array(z.object({ family: z.string(), count: z.int() })),
  }),
})

export const getLibrary = defineEndpoint({
  method: 'GET',
  path: '/api/parts/library',
  summary: 'The library as the engine reads it: of every row the version for new work, or every version with that one first',
  access: PART_READERS,
  query: z.strictObject({ versions: z.enum(['current', 'all']).default('current') }),
  response: librarySchema,
})

export const getPart = defineEndpoint({
  method: 'GET',
  path: '/api/parts/:kind/:id',
  summary: 'One row with all its versions',
  access: PART_READERS,
  params: partParams,
  response: partSchema,
})

export const createPart = defineEndpoint({
  method: 'POST',
  path: '/api/parts',
  summary: 'Add a row of the company’s own',
  access: ['engineer'],
  body: z.strictObject({ row: partDraftSchema, reason }),
  response: partSchema,
})

export const changePart = defineEndpoint({
  method: 'POST',
  path: '/api/parts/:kind/:id/versions',
  summary: 'Change a row: makes the next version, which is the company’s own; earlier versions stay',
  access: ['engineer'],
  params: partParams,
  body: z.strictObject({
    row: partDraftSchema,
    /** The version that was on the screen; a newer one in between is a conflict. */
    basedOn: z.int().positive(),
    reason,
  }),
  response: partSchema,
})

export const getPartFlags = defineEndpoint({
  method: 'GET',
  path: '/api/parts/flags',
  summary: 'The rows that the company prefers and those in its store, as a search takes them: core/etd34-17-11',
  access: PART_READERS,
  response: z.object({ preferredRows: z.array(z.string()), stockedRows: z.array(z.string()) }),
})

export const setPartFlags = defineEndpoint({
  method: 'PUT',
  path: '/api/parts/:kind/:id/flags',
  summary: 'Say whether the company prefers a row and whether it lies in its store; makes no version',
  access: ['engineer'],
  params: partParams,
  body: z.strictObject(partFlagsSchema.shape),
  response: partFlagsSchema,
})

const importUpload = { field: 'file', kinds: ['csv', 'txt'], required: true, maxBytes: LARGEST_IMPORT_BYTES } as const

export const previewPartImport = defineEndpoint({
  method: 'POST',
  path: '/api/parts/import/preview',
  summary: 'Read a table of rows of one kind (CSV) and say row by row what would become of it; stores nothing',
  access: ['engineer'],
  body: z.strictObject({ kind: partKindSchema }),
  upload: importUpload,
  response: partImportPreviewSchema,
})

export const importParts = defineEndpoint({
  method: 'POST',
  path: '/api/parts/import',
  summary: 'Take in a table of rows as its preview showed it: all of it, or nothing',
  access: ['engineer'],
  body: z.strictObject({
    kind: partKindSchema,
    /** Of the preview that was confirmed; a library that changed since is a conflict. */
    fingerprint: z.string().regex(/^[0-9a-f]{64}$/, 'This is not the mark of a preview.'),
    reason,
  }),
  upload: importUpload,
  response: z.object({ created: z.int(), changed: z.int(), unchanged: z.int() }),
})

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
export const partSchema = z.object({ versions: z.array(partVersionSchema).min(1) })

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

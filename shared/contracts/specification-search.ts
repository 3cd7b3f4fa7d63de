import { z } from 'zod'
import { CORE_SHAPES } from './part-rows'
import { defineEndpoint } from './endpoint'
import { requirementSheetSchema, specificationDocumentSchema } from './specification-document'
import type { SearchOutcome, SearchPreferences } from '#shared/engine/index'

const figure = z.number().nullable()
const rowKey = z.string().regex(/^(core|former|material)\/[a-z0-9][a-z0-9.-]{0,63}$/, 'Name a row like core/etd-34.')
const method = z.enum(['margin-tape', 'triple-insulated-wire', 'functional'])

const preferences = z.strictObject({
  shapes: z.array(z.enum(CORE_SHAPES)).max(CORE_SHAPES.length).optional(),
  materialIds: z.array(z.string().max(64)).max(50).optional(),
  insulationMethods: z.array(method).min(1).max(3).optional(),
  preferredRows: z.array(rowKey).max(500).optional(),
  stockedRows: z.array(rowKey).max(500).optional(),
  onlyStocked: z.boolean().optional(),
  finalists: z.int().min(1).max(60).optional(),
  wireSystem: z.enum(['IEC', 'AWG']).optional(),
})

const candidateSchema = z.object({
  id: z.string(),
  core: z.string(),
  former: z.string(),
  material: z.string(),
  method,
  primaryTurns: z.number(),
  wires: z.array(z.object({ winding: z.string(), wire: z.string(), parallel: z.number(), turns: z.number() })),
  figures: z.object({
    lossW: figure,
    copperLossW: figure,
    coreLossW: figure,
    volumeMm3: z.number(),
    heightMm: z.number(),
    copperG: figure,
    leakageH: figure,
    riseK: figure,
    fluxUtilisation: figure,
    buildRatio: z.number(),
  }),
  onFront: z.boolean(),
  compromises: z.int(),
  isPreferred: z.boolean(),
  isStocked: z.boolean(),
  document: specificationDocumentSchema,
})

const outcomeSchema = z.object({
  candidates: z.array(candidateSchema),
  rejected: z.array(z.object({ core: z.string(), former: z.string(), shape: z.enum(CORE_SHAPES), check: z.string() })),
  findings: z.array(z.object({ code: z.string(), severity: z.enum(['note', 'warning', 'error']), path: z.string(), values: z.record(z.string(), z.union([z.number(), z.string()])) })),
  screened: z.int(),
  evaluated: z.int(),
  /** It took longer than the server allows; what was found by then is here. */
  stopped: z.boolean(),
})

/** What the wire carries is what the engine makes. */
type Fits<A extends B, B> = [A, B]
export type SearchContract = [Fits<z.infer<typeof preferences>, SearchPreferences>, Fits<Omit<SearchOutcome, 'findings'>, Omit<z.infer<typeof outcomeSchema>, 'findings'>>]

/** The same search as in the browser, for programs and for machines that are slower than the server. */
export const searchCandidates = defineEndpoint({
  method: 'POST',
  path: '/api/specifications/search',
  summary: 'Candidates for a duty over the whole parts library, ranked, with what fell out and why',
  access: ['engineer'],
  body: z.strictObject({ requirement: requirementSheetSchema, preferences: preferences.default({}) }),
  response: outcomeSchema,
})

/**
 * Rows of the parts library as they are entered: everything but the version, which the server counts.
 * The engine owns the types; `satisfies` fails to compile when a schema parts from them.
 */

import { z } from 'zod'
import type { AnyLibraryRow, CoreRow, FormerRow, LibraryKind, MaterialRow, SleeveRow, TapeRow, WireRow } from '#shared/engine/library'
import { optionalText, requiredText, TEXT_LIMITS } from './common'

export const PART_KINDS = ['core', 'former', 'material', 'wire', 'tape', 'sleeve'] as const satisfies readonly LibraryKind[]
export const partKindSchema = z.enum(PART_KINDS)

export const CONFIDENCES = ['high', 'medium', 'low', 'generic'] as const
export const confidenceSchema = z.enum(CONFIDENCES)

/** Stands in an address and in every document that uses the row. */
export const partIdSchema = z
  .string({ error: 'The identifier is missing.' })
  .trim()
  .regex(/^[a-z0-9][a-z0-9.-]{0,63}$/, 'An identifier has small letters, figures, points and hyphens, starts with a letter or figure and is at most 64 long.')

const figure = z.number({ error: 'Enter a number.' }).refine((value) => Math.abs(value) < 1e12, 'The number is out of range.')
const positive = figure.refine((value) => value > 0, 'Enter a number above zero.')
const notNegative = figure.refine((value) => value >= 0, 'Enter zero or more.')
const share = figure.refine((value) => value >= 0 && value <= 1, 'Enter a share from 0 to 100 %.')
const celsius = figure.refine((value) => value >= -100 && value <= 1000, 'Enter a temperature from −100 °C to 1000 °C.')
const lengthMm = positive.refine((value) => value <= 1000, 'Enter a length up to 1000 mm.')
const coordinateMm = figure.refine((value) => Math.abs(value) <= 500, 'Enter a place within 500 mm.')

const MAXIMUM_UNVERIFIED = 60

const common = {
  id: partIdSchema,
  name: requiredText('The name', TEXT_LIMITS.name),
  source: requiredText('The source', 500),
  edition: requiredText('The edition'),
  confidence: confidenceSchema,
  unverified: z.array(z.string().max(80)).max(MAXIMUM_UNVERIFIED),
  note: optionalText('The note', 1000),
}

const materialGroup = z.enum(['I', 'II', 'IIIa', 'IIIb'])

const centreLeg = z.discriminatedUnion('shape', [
  z.strictObject({ shape: z.literal('round'), diameterMm: lengthMm }),
  z.strictObject({ shape: z.literal('rectangular'), widthMm: lengthMm, depthMm: lengthMm }),
])

export const CORE_SHAPES = ['E', 'ETD', 'ER', 'EFD', 'EP', 'EQ', 'PQ', 'RM', 'P', 'U', 'EI', 'E-planar', 'toroid', 'other'] as const

const dimension = lengthMm.nullable()

export const coreDraftSchema = z.strictObject({
  kind: z.literal('core'),
  ...common,
  shape: z.enum(CORE_SHAPES),
  standard: optionalText('The standard'),
  dimensionsMm: z.strictObject({ a: dimension, b: dimension, c: dimension, d: dimension, e: dimension, f: dimension }),
  coatedMm: z.strictObject({ outside: lengthMm, inside: lengthMm, height: lengthMm }).nullable().optional(),
  effectiveAreaMm2: positive,
  minimumAreaMm2: positive,
  effectiveLengthMm: lengthMm.refine((value) => value > 0),
  effectiveVolumeMm3: positive,
  massG: positive.nullable(),
  centreLeg: centreLeg.nullable(),
})

const tube = z.discriminatedUnion('shape', [
  z.strictObject({ shape: z.literal('round'), diameterMm: lengthMm }),
  z.strictObject({ shape: z.literal('rectangular'), widthMm: lengthMm, depthMm: lengthMm, cornerRadiusMm: notNegative }),
])

const pin = z.strictObject({ number: requiredText('The pin number', 12), xMm: coordinateMm, yMm: coordinateMm })

export const formerDraftSchema = z.strictObject({
  kind: z.literal('former'),
  ...common,
  coreId: partIdSchema,
  windingWidthMm: lengthMm,
  windingHeightMm: lengthMm,
  sections: z.int('Enter a whole number.').min(1, 'A former has at least one section.').max(50, 'At most 50 sections.'),
  tube,
  tubeWallMm: notNegative,
  flangeThicknessMm: notNegative,
  meanTurnLengthMm: positive.nullable(),
  pins: z.array(pin).max(100, 'At most 100 pins.'),
  pinRowSpacingMm: notNegative,
  pinPitchMm: notNegative,
  pinSection: z.strictObject({ shape: z.enum(['round', 'square']), sizeMm: lengthMm }),
  pinLengthMm: notNegative,
  standoffMm: notNegative,
  mounting: z.enum(['vertical', 'horizontal']),
  material: requiredText('The material'),
  plastic: z.enum(['thermoset', 'thermoplastic']),
  flammability: optionalText('The flammability'),
  materialGroup,
  thermalClassC: celsius,
  envelopeMm: z.strictObject({ length: lengthMm, width: lengthMm, height: lengthMm }),
})

const saturationPoint = z.strictObject({ temperatureC: celsius, fluxDensityT: positive.refine((value) => value <= 5, 'Enter a flux density up to 5 T.') })

const lossFit = z.strictObject({
  cm: positive,
  x: positive.refine((value) => value <= 10, 'The exponent of frequency lies between 0 and 10.'),
  y: positive.refine((value) => value <= 10, 'The exponent of flux density lies between 0 and 10.'),
  ct0: figure,
  ct1: figure,
  ct2: figure,
  minimumHz: positive,
  maximumHz: positive,
  minimumC: celsius.nullable().optional(),
  maximumC: celsius.nullable().optional(),
  minimumT: notNegative.nullable().optional(),
  maximumT: positive.nullable().optional(),
  source: requiredText('The source of the fit', 500),
  confidence: confidenceSchema,
})

const lossPoint = z.strictObject({ frequencyHz: positive, fluxDensityT: positive, temperatureC: celsius, lossWPerM3: positive })

export const materialDraftSchema = z.strictObject({
  kind: z.literal('material'),
  ...common,
  use: z.enum(['power', 'wideband', 'common-mode', 'powder']),
  initialPermeability: positive,
  permeabilityTolerance: share,
  saturation: z.array(saturationPoint).min(1, 'Enter at least one point of saturation.').max(50),
  biasPoints: z.array(z.strictObject({ fieldAPerM: notNegative, permeabilityShare: share })).max(60).optional(),
  remanenceT: notNegative.nullable(),
  curieC: celsius.nullable(),
  lossFits: z.array(lossFit).max(20),
  lossPoints: z.array(lossPoint).max(100),
  densityKgPerM3: positive,
  frequencyRangeHz: z.strictObject({ minimum: notNegative, maximum: positive }).nullable(),
})

const overall = lengthMm.nullable()

export const wireDraftSchema = z.strictObject({
  kind: z.literal('wire'),
  ...common,
  form: z.enum(['round', 'litz', 'foil']),
  standard: optionalText('The standard'),
  size: requiredText('The size', 60),
  conductorMm: lengthMm,
  conductorToleranceMm: notNegative.nullable(),
  strands: z.int('Enter a whole number.').min(1, 'A wire has at least one strand.').max(100_000, 'At most 100 000 strands.'),
  copperAreaMm2: positive,
  resistance20: z.strictObject({ nominalOhmPerM: positive, minimumOhmPerM: positive.nullable(), maximumOhmPerM: positive.nullable() }),
  overallMm: z.strictObject({
    'enamel-grade-1': overall,
    'enamel-grade-2': overall,
    'enamel-grade-3': overall,
    'triple-insulated': overall,
    'fully-insulated': overall,
    bare: overall,
  }),
  widthMm: lengthMm.nullable(),
})

export const tapeDraftSchema = z.strictObject({
  kind: z.literal('tape'),
  ...common,
  use: z.enum(['insulation', 'margin']),
  material: requiredText('The material'),
  thicknessMm: positive.refine((value) => value <= 10, 'Enter a thickness up to 10 mm.'),
  widthsMm: z.array(lengthMm).max(100),
  thermalClassC: celsius,
  layerWithstandVRms: positive.nullable(),
  materialGroup,
})

export const sleeveDraftSchema = z.strictObject({
  kind: z.literal('sleeve'),
  ...common,
  material: requiredText('The material'),
  boreMm: lengthMm,
  wallMm: positive.refine((value) => value <= 10, 'Enter a wall up to 10 mm.'),
  thermalClassC: celsius,
  withstandVRms: positive.nullable(),
})

export type PartDraft =
  | z.infer<typeof coreDraftSchema>
  | z.infer<typeof formerDraftSchema>
  | z.infer<typeof materialDraftSchema>
  | z.infer<typeof wireDraftSchema>
  | z.infer<typeof tapeDraftSchema>
  | z.infer<typeof sleeveDraftSchema>

const version = z.int().positive()

export const coreRowSchema = coreDraftSchema.extend({ version }) satisfies z.ZodType<CoreRow>
export const formerRowSchema = formerDraftSchema.extend({ version }) satisfies z.ZodType<FormerRow>
export const materialRowSchema = materialDraftSchema.extend({ version }) satisfies z.ZodType<MaterialRow>
export const wireRowSchema = wireDraftSchema.extend({ version }) satisfies z.ZodType<WireRow>
export const tapeRowSchema = tapeDraftSchema.extend({ version }) satisfies z.ZodType<TapeRow>
export const sleeveRowSchema = sleeveDraftSchema.extend({ version }) satisfies z.ZodType<SleeveRow>

export const partRowSchema = z.discriminatedUnion('kind', [
  coreRowSchema,
  formerRowSchema,
  materialRowSchema,
  wireRowSchema,
  tapeRowSchema,
  sleeveRowSchema,
]) satisfies z.ZodType<AnyLibraryRow>

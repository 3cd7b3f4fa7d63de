/**
 * The winding specification as zod reads it. The types are owned by the engine; the assertions at the
 * end of the file fail to compile when schema and types part.
 */

import { z } from 'zod'
import type { RequirementSheet, SpecificationDocument, WindingSpecification } from '#shared/engine/specification'
import { SPECIFICATION_SCHEMA } from '#shared/engine/specification'
import { dutySchema } from './duties'
import { finite, name, notNegative, positive, rowId, share, side } from './duties/fields'

const MAXIMUM_ROWS = 200

const text = z.string().max(500, 'Use at most 500 characters.')
const longText = z.string().max(4000, 'Use at most 4000 characters.')
const terminal = z.string().trim().max(12, 'A terminal name has at most 12 characters.')
const celsius = z.number().min(-100, 'Temperatures start at −100 °C.').max(500, 'Temperatures end at 500 °C.')
const count = z.int('Enter a whole number.').nonnegative().max(100_000)

const status = z.enum(['mandatory', 'reference', 'vendor-choice'])
const libraryKind = z.enum(['core', 'former', 'material', 'wire', 'tape', 'sleeve'])

export const libraryReferenceSchema = z.strictObject({
  kind: libraryKind,
  id: z.string().min(1).max(120),
  version: z.int().positive(),
})

const origin = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('entered'), reason: text.optional() }),
  z.strictObject({ kind: z.literal('proposed'), engine: text }),
  z.strictObject({ kind: z.literal('library'), row: libraryReferenceSchema }),
  z.strictObject({ kind: z.literal('default'), source: text }),
])

const stated = <T extends z.ZodType>(value: T) => z.strictObject({ value: value.nullable(), status, origin })

const statedRow = { id: rowId, status, origin }
const rows = <T extends z.ZodType>(row: T, maximum = MAXIMUM_ROWS) => z.array(row).max(maximum, `At most ${maximum} rows.`)

// --- requirement sheet ---------------------------------------------------------------------------

export const requirementSheetSchema = z.strictObject({
  duty: dutySchema,
  ambientC: celsius,
  permittedRiseK: positive.nullable(),
  fluxUtilisation: z.number().gt(0.05).max(1),
  targetCurrentDensityAPerMm2: z.number().gt(0.1).max(50),
  insulationMethod: z.enum(['margin-tape', 'triple-insulated-wire', 'functional']),
  maximumHeightMm: positive.nullable(),
})

// --- A title block ---------------------------------------------------------------------------------

const titleBlock = z.strictObject({
  legalOwner: stated(text),
  confidentiality: stated(text),
  partNumber: stated(text),
  drawingNumber: stated(text),
  title: stated(text),
  supplementaryTitle: stated(text),
  documentType: stated(text),
  responsibleDepartment: stated(text),
  technicalReference: stated(text),
  languageCode: stated(text),
  classification: stated(text),
  documentStatus: stated(z.enum(['for-quotation-only', 'for-samples-only', 'released', 'obsolete'])),
  paperSize: stated(z.enum(['A3', 'A4'])),
  projection: stated(z.enum(['first-angle', 'third-angle'])),
  relatedDocuments: rows(
    z.strictObject({ ...statedRow, kind: z.enum(['footprint', 'safety-report', 'test-fixture', 'other']), number: text, title: text }),
  ),
})

// --- B electrical data -------------------------------------------------------------------------------

const range = z.strictObject({ minimum: finite, maximum: finite })
const condition = { frequencyHz: positive, levelV: positive, temperatureC: celsius, model: z.enum(['series', 'parallel']) }
const capacitanceLimit = z.strictObject({
  ...statedRow,
  windingIds: z.array(rowId).max(20),
  maximumF: positive,
  frequencyHz: positive,
  terminalsTied: text,
})

const electricalData = z.strictObject({
  topology: stated(
    z.enum([
      'flyback',
      'forward',
      'half-bridge',
      'full-bridge',
      'push-pull',
      'llc',
      'coupled-inductor',
      'inductor',
      'common-mode-choke',
      'gate-drive',
      'current-sense',
    ]),
  ),
  switchingFrequencyHz: stated(range),
  dutyRatio: stated(range),
  inductance: stated(
    z.strictObject({
      ...condition,
      windingId: rowId,
      nominalH: positive,
      lowerTolerance: z.number().min(-1).max(0).nullable(),
      upperTolerance: z.number().min(0).max(10).nullable(),
    }),
  ),
  leakage: rows(
    z.strictObject({
      ...statedRow,
      ...condition,
      windingId: rowId,
      shortedWindingIds: z.array(rowId).max(20),
      maximumH: positive,
      minimumH: notNegative.nullable(),
    }),
  ),
  saturation: rows(
    z.strictObject({
      ...statedRow,
      windingId: rowId,
      currentA: positive,
      temperatureC: celsius,
      remainingShare: share,
      method: z.enum(['dc-superposition', 'pulse']),
    }),
  ),
  turnsRatios: rows(
    z.strictObject({
      ...statedRow,
      numeratorWindingId: rowId,
      denominatorWindingId: rowId,
      tolerance: share,
      frequencyHz: positive,
      levelV: positive,
    }),
  ),
  polarity: stated(z.literal('as-dotted')),
  voltSecondProduct: stated(
    z.strictObject({
      windingId: rowId,
      minimumVs: positive,
      waveform: z.enum(['unipolar-pulse', 'bipolar-pulse', 'sine']),
      temperatureC: celsius,
    }),
  ),
  selfResonance: stated(z.strictObject({ minimumHz: positive, windingId: rowId, terminalsTied: text })),
  interwindingCapacitance: rows(capacitanceLimit),
  windingCapacitance: rows(capacitanceLimit),
  currentSense: stated(
    z.strictObject({
      burdenOhm: positive,
      ratioError: share,
      droop: share,
      bandwidthHz: range,
      maximumPrimaryCurrentA: positive,
      maximumDcA: notNegative,
    }),
  ),
  commonMode: stated(
    z.strictObject({
      impedance: z.array(z.strictObject({ frequencyHz: positive, minimumOhm: positive })).max(20),
      differentialLeakageH: positive.nullable(),
      ratedCurrentA: positive,
      ratedVoltageV: positive,
      ratedTemperatureC: celsius,
    }),
  ),
  gateDrive: stated(
    z.strictObject({ dvDtImmunityVPerS: positive, propagationDelayS: positive.nullable(), isolationCapacitanceF: positive }),
  ),
})

// --- C core -------------------------------------------------------------------------------------------

const core = z.strictObject({
  core: stated(libraryReferenceSchema),
  material: stated(libraryReferenceSchema),
  approvedEquivalents: stated(z.array(text).max(20)),
  equivalenceRule: stated(z.enum(['listed-alternates-only', 'subject-to-written-approval'])),
  numberOfSets: stated(z.int().positive().max(20)),
  orientation: stated(text),
  gap: z.strictObject({
    control: stated(z.enum(['al', 'length', 'none'])),
    alH: stated(positive),
    alTolerance: stated(share),
    lengthMm: stated(notNegative),
    lengthToleranceMm: stated(notNegative),
    position: stated(z.enum(['centre-leg', 'all-legs-spacer', 'distributed', 'none'])),
    grinding: stated(z.enum(['one-half', 'both-halves'])),
  }),
  assembly: z.strictObject({
    adhesive: stated(text),
    adhesivePosition: stated(text),
    clip: stated(text),
    tapeLayers: stated(count),
    bandingTensionN: stated(notNegative),
  }),
  potential: stated(z.strictObject({ connection: z.enum(['floating', 'pin']), pin: terminal.nullable(), side })),
  fluxBand: stated(text),
  insulationOverCore: stated(text),
  coating: stated(z.strictObject({ material: text, withstandVRms: positive.nullable() })),
  surfaceIrregularities: stated(text),
})

// --- D coil former -----------------------------------------------------------------------------------

const materialGroup = z.enum(['I', 'II', 'IIIa', 'IIIb'])

const former = z.strictObject({
  former: stated(libraryReferenceSchema),
  toolNumber: stated(text),
  material: stated(text),
  plastic: stated(z.enum(['thermoset', 'thermoplastic'])),
  flammability: stated(text),
  materialGroup: stated(materialGroup),
  relativeTemperatureIndexC: stated(celsius),
  fileNumber: stated(text),
  mounting: stated(z.enum(['vertical', 'horizontal'])),
  pins: rows(z.strictObject({ number: terminal, xMm: finite, yMm: finite, state: z.enum(['fitted', 'no-connection', 'missing']) }), 60),
  pinView: stated(z.enum(['top', 'bottom'])),
  pinOneMark: stated(text),
  pinPitchMm: stated(positive),
  rowSpacingMm: stated(positive),
  pinSection: stated(z.strictObject({ shape: z.enum(['round', 'square']), sizeMm: positive })),
  pinLengthMm: stated(positive),
  standoffMm: stated(notNegative),
  truePositionMm: stated(positive),
  recommendedHoleMm: stated(positive),
  coplanarityMm: stated(positive),
  envelope: stated(z.strictObject({ lengthMm: positive, widthMm: positive, heightMm: positive })),
  leadSlotWidthMm: stated(positive),
  flyingLeads: rows(
    z.strictObject({
      ...statedRow,
      name: terminal,
      wireStyle: text,
      lengthMm: positive,
      measuredFrom: text,
      stripLengthMm: notNegative,
      tinned: z.boolean(),
      colour: text,
      sleeve: text,
      termination: text,
    }),
    40,
  ),
  massG: stated(positive),
  fixing: stated(text),
})

// --- windings and sequence ------------------------------------------------------------------------------

const wireUse = z.strictObject({
  wire: libraryReferenceSchema,
  parallel: z.int().positive('At least one wire.').max(200),
  thermalClassC: celsius,
  insulation: z.enum(['enamel-grade-1', 'enamel-grade-2', 'enamel-grade-3', 'triple-insulated', 'fully-insulated', 'bare']),
  certificate: z
    .strictObject({ standard: text, number: text, peakVoltageV: positive.nullable(), maximumFrequencyHz: positive.nullable() })
    .nullable(),
  lay: z.strictObject({ lengthMm: positive, direction: z.enum(['S', 'Z']) }).nullable(),
})

const winding = z.strictObject({
  ...statedRow,
  name,
  role: z.enum(['primary', 'secondary', 'auxiliary', 'shield', 'reset']),
  side,
  outputId: rowId.nullable(),
  startTerminal: terminal,
  finishTerminal: terminal,
  turns: positive.max(20_000, 'At most 20 000 turns.'),
  wire: wireUse,
  rmsCurrentA: notNegative.nullable(),
  peakCurrentA: notNegative.nullable(),
  dcCurrentA: finite.nullable(),
  dcResistance: z
    .strictObject({
      nominalOhm: positive,
      maximumOhm: positive,
      minimumOhm: positive.nullable(),
      temperatureC: z.union([z.literal(20), z.literal(25)]),
      fourTerminal: z.boolean(),
    })
    .nullable(),
})

const stepBase = { ...statedRow, remark: text }
const leadSleeve = z.strictObject({ sleeve: libraryReferenceSchema, lengthMm: positive, intoWindingMm: notNegative })

const sequenceStep = z.discriminatedUnion('kind', [
  z.strictObject({
    ...stepBase,
    kind: z.literal('winding'),
    windingId: rowId,
    startTerminal: terminal,
    finishTerminal: terminal,
    turns: positive.max(20_000),
    section: z.int().positive().max(20),
    direction: z.enum(['clockwise', 'counter-clockwise']),
    lay: z.enum(['close-wound', 'spread', 'centred', 'close-wound-left', 'close-wound-right']),
    layers: z.int().positive().max(200).nullable(),
    marginLeftMm: notNegative,
    marginRightMm: notNegative,
    interlayerTape: libraryReferenceSchema.nullable(),
    leadExitStart: z.enum(['left', 'right']),
    leadExitFinish: z.enum(['left', 'right']),
    startSleeve: leadSleeve.nullable(),
    finishSleeve: leadSleeve.nullable(),
    withPrevious: z.boolean().optional(),
  }),
  z.strictObject({
    ...stepBase,
    kind: z.literal('tape'),
    tape: libraryReferenceSchema,
    layers: z.int().positive().max(100),
    widthMm: positive.nullable(),
    purpose: z.enum(['interlayer', 'interwinding', 'outer', 'base']),
  }),
  z.strictObject({
    ...stepBase,
    kind: z.literal('margin'),
    tape: libraryReferenceSchema,
    leftMm: notNegative,
    rightMm: notNegative,
    heightMm: positive.nullable(),
  }),
  z.strictObject({
    ...stepBase,
    kind: z.literal('shield'),
    windingId: rowId,
    form: z.enum(['foil', 'wire']),
    thicknessMm: positive,
    widthMm: positive,
    overlapMm: notNegative,
    overlapInsulation: text,
    connectedTerminal: terminal,
  }),
  z.strictObject({ ...stepBase, kind: z.literal('sleeve'), sleeve: libraryReferenceSchema, lead: text, lengthMm: positive }),
  z.strictObject({
    ...stepBase,
    kind: z.literal('core-tape'),
    tape: libraryReferenceSchema,
    layers: z.int().positive().max(100),
    purpose: z.enum(['insulation', 'banding', 'flux-band']),
  }),
  z.strictObject({ ...stepBase, kind: z.literal('varnish'), extent: z.enum(['coil-only', 'coil-and-core']) }),
])

// --- F impregnation, G insulation --------------------------------------------------------------------------

const impregnation = z.strictObject({
  process: stated(z.enum(['none', 'dip', 'vacuum', 'potting'])),
  resin: stated(text),
  thermalClassC: stated(celsius),
  compatibility: stated(text),
  pressureCycle: stated(text),
  bake: stated(z.strictObject({ temperatureC: celsius, durationS: positive })),
  extent: stated(z.enum(['coil-only', 'coil-and-core'])),
  pinsMasked: stated(z.boolean()),
  fillLevelMm: stated(positive),
})

const boundaryEnd = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('side'), side }),
  z.strictObject({ kind: z.literal('winding'), windingId: rowId }),
  z.strictObject({ kind: z.literal('core') }),
])

const withstandTest = z.strictObject({
  voltageV: positive,
  kind: z.enum(['ac-rms', 'dc']),
  frequencyHz: notNegative,
  rampS: notNegative,
  dwellS: positive,
  tripA: positive,
  routineDwellS: positive,
  routineVoltageV: positive,
})

const insulation = z.strictObject({
  productStandard: stated(z.enum(['IEC 62368-1', 'IEC 61558-1', 'IEC 60335-1', 'IEC 60601-1', 'IEC 60664-1'])),
  standardEdition: stated(text),
  mainsVoltageV: stated(positive),
  overvoltageCategory: stated(z.enum(['I', 'II', 'III', 'IV'])),
  pollutionDegree: stated(z.union([z.literal(1), z.literal(2), z.literal(3)])),
  altitudeM: stated(z.number().min(0).max(20_000)),
  materialGroup: stated(materialGroup),
  boundaries: rows(
    z.strictObject({
      ...statedRow,
      name,
      between: z.tuple([boundaryEnd, boundaryEnd]),
      insulation: z.enum(['functional', 'basic', 'supplementary', 'double', 'reinforced']),
      // Optional: documents stored before it was asked keep their bytes.
      meansOfProtection: z.enum(['MOOP', 'MOPP']).nullable().optional(),
      workingVoltageVRms: notNegative.nullable(),
      recurringPeakV: notNegative.nullable(),
      frequencyHz: notNegative.nullable(),
      clearanceMm: notNegative.nullable(),
      creepageMm: notNegative.nullable(),
      distanceThroughInsulationMm: notNegative.nullable(),
      insulationLayers: count.nullable(),
      test: withstandTest.nullable(),
    }),
    60,
  ),
  systemThermalClassC: stated(celsius),
  systemFileNumber: stated(text),
  maximumAmbientC: stated(celsius),
  maximumWindingC: stated(z.strictObject({ temperatureC: celsius, method: z.enum(['resistance', 'thermocouple']) })),
  polymers: rows(z.strictObject({ ...statedRow, use: text, material: text, flammability: text, fileNumber: text })),
  // No default: an older document keeps its bytes, and so its hash, when it is read and written again.
  criticalMaterials: rows(
    z.strictObject({ ...statedRow, part: text, maker: text, type: text, rating: text, standard: text, certificate: text, expiresOn: z.iso.date().nullable() }),
  ).optional(),
  partialDischarge: stated(
    z.strictObject({ required: z.boolean(), extinctionVPeak: positive.nullable(), limitC: positive.nullable(), method: text }),
  ),
  impulse: stated(
    z.strictObject({ voltageV: positive, shots: z.int().positive().max(1000), polarity: z.enum(['both', 'positive', 'negative']), where: text }),
  ),
  cautions: stated(z.array(longText).max(20)),
})

// --- H marking, packing, compliance ---------------------------------------------------------------------------

const marking = z.strictObject({
  content: stated(z.array(text).max(20)),
  position: stated(text),
  dateCode: stated(z.enum(['YYWW', 'IEC 60062'])),
  revisionOnPart: stated(z.boolean()),
  safetyMark: stated(text),
  machineReadable: stated(z.enum(['none', 'ISO/IEC 16022', 'ISO/IEC 18004'])),
  legibleAfter: stated(text),
})

const packing = z.strictObject({
  form: stated(z.enum(['tray', 'tube', 'tape-and-reel', 'box'])),
  piecesPerPack: stated(z.int().positive()),
  piecesPerCarton: stated(z.int().positive()),
  pinProtection: stated(text),
  orientation: stated(text),
  cartonLabel: stated(text),
  moistureLevel: stated(text),
  storage: stated(text),
  solderability: stated(text),
  solderProfile: stated(z.enum(['wave', 'reflow', 'hand'])),
  washable: stated(z.boolean()),
})

const compliance = z.strictObject({
  rohs: stated(text),
  rohsExemption: stated(z.strictObject({ exemption: text, expiresOn: z.iso.date() })),
  reachListDate: stated(text),
  halogenFree: stated(z.boolean()),
  conflictMinerals: stated(text),
  pfas: stated(text),
  packagingMarks: stated(text),
  traceability: stated(text),
  retentionYears: stated(z.int().positive().max(100)),
})

// --- I tests, J notes, K tolerances, L revisions -----------------------------------------------------------------

const testRow = z.strictObject({
  ...statedRow,
  number: z.int().positive().max(999),
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
  symbol: z.string().trim().min(1, 'Give the row a symbol.').max(40),
  windingId: rowId.nullable(),
  boundaryId: rowId.nullable(),
  drivenTerminals: z.array(terminal).max(60),
  shortedTerminals: z.array(z.array(terminal).max(60)).max(20),
  openTerminals: z.array(terminal).max(60),
  method: text,
  instrumentClass: text,
  frequencyHz: notNegative.nullable(),
  levelV: notNegative.nullable(),
  biasA: finite.nullable(),
  temperatureC: celsius.nullable(),
  minimum: finite.nullable(),
  nominal: finite.nullable(),
  maximum: finite.nullable(),
  unit: z.enum(['H', 'Ω', 'V', 'A', 'Hz', 'F', 'mm', '1']),
  extent: z.enum(['every-part', 'sample', 'type-test', 'reference']),
  acceptableQualityLimit: positive.nullable(),
  criticalToQuality: z.boolean(),
  reaction: text,
  record: z.enum(['reading', 'pass-fail']),
})

export const windingSpecificationSchema = z.strictObject({
  schema: z.literal(SPECIFICATION_SCHEMA),
  contract: z.enum(['build-to-print', 'build-to-performance']),
  title: titleBlock,
  electrical: electricalData,
  core,
  former,
  windings: rows(winding, 24),
  sequence: rows(sequenceStep),
  impregnation,
  insulation,
  marking,
  packing,
  compliance,
  tests: rows(testRow),
  notes: rows(z.strictObject({ ...statedRow, number: z.int().positive().max(999), text: longText, fields: z.array(text).max(40) })),
  tolerances: z.strictObject({ general: stated(text), angular: stated(text), pins: stated(text), electrical: stated(text) }),
  revisions: rows(
    z.strictObject({
      revision: text,
      date: text,
      zones: text,
      changes: z.array(z.strictObject({ field: text, before: longText, after: longText })).max(500),
      reason: text,
      effect: text,
      by: text,
      checkedBy: text,
      approvedBy: text,
    }),
  ),
})

export const specificationDocumentSchema = z.strictObject({
  specification: windingSpecificationSchema,
  requirement: requirementSheetSchema.nullable(),
})

// --- the schema and the engine's types are the same thing -----------------------------------------------------------

type Same<A, B> = [A] extends [B] ? ([B] extends [A] ? true : never) : never

export const SCHEMA_MATCHES_TYPES: [
  Same<z.infer<typeof windingSpecificationSchema>, WindingSpecification>,
  Same<z.infer<typeof requirementSheetSchema>, RequirementSheet>,
  Same<z.infer<typeof specificationDocumentSchema>, SpecificationDocument>,
] = [true, true, true]

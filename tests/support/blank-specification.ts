import type { FieldStatus, Origin, Stated, WindingSpecification } from '#shared/engine/specification'

const ENTERED: Origin = { kind: 'entered' }

export const stated = <T>(value: T | null, status: FieldStatus = 'mandatory'): Stated<T> => ({ value, status, origin: ENTERED })

const none = <T>(): Stated<T> => stated<T>(null)

export const row = <T extends object>(id: string, fields: T, status: FieldStatus = 'mandatory') => ({ id, status, origin: ENTERED, ...fields })

/** A specification in which nothing is stated. */
export function blankSpecification(): WindingSpecification {
  return {
    schema: 'dotside/winding-specification/1',
    contract: 'build-to-print',
    title: {
      legalOwner: none(), confidentiality: none(), partNumber: none(), drawingNumber: none(), title: none(), supplementaryTitle: none(),
      documentType: none(), responsibleDepartment: none(), technicalReference: none(), languageCode: none(), classification: none(),
      documentStatus: none(), paperSize: none(), projection: none(), relatedDocuments: [],
    },
    electrical: {
      topology: none(), switchingFrequencyHz: none(), dutyRatio: none(), inductance: none(), leakage: [], saturation: [], turnsRatios: [],
      polarity: none(), voltSecondProduct: none(), selfResonance: none(), interwindingCapacitance: [], windingCapacitance: [],
      currentSense: none(), commonMode: none(), gateDrive: none(),
    },
    core: {
      core: none(), material: none(), approvedEquivalents: none(), equivalenceRule: none(), numberOfSets: none(), orientation: none(),
      gap: { control: none(), alH: none(), alTolerance: none(), lengthMm: none(), lengthToleranceMm: none(), position: none(), grinding: none() },
      assembly: { adhesive: none(), adhesivePosition: none(), clip: none(), tapeLayers: none(), bandingTensionN: none() },
      potential: none(), fluxBand: none(), insulationOverCore: none(), coating: none(), surfaceIrregularities: none(),
    },
    former: {
      former: none(), toolNumber: none(), material: none(), plastic: none(), flammability: none(), materialGroup: none(),
      relativeTemperatureIndexC: none(), fileNumber: none(), mounting: none(), pins: [], pinView: none(), pinOneMark: none(), pinPitchMm: none(),
      rowSpacingMm: none(), pinSection: none(), pinLengthMm: none(), standoffMm: none(), truePositionMm: none(), recommendedHoleMm: none(),
      coplanarityMm: none(), envelope: none(), leadSlotWidthMm: none(), flyingLeads: [], massG: none(), fixing: none(),
    },
    windings: [],
    sequence: [],
    impregnation: {
      process: none(), resin: none(), thermalClassC: none(), compatibility: none(), pressureCycle: none(), bake: none(), extent: none(),
      pinsMasked: none(), fillLevelMm: none(),
    },
    insulation: {
      productStandard: none(), standardEdition: none(), mainsVoltageV: none(), overvoltageCategory: none(), pollutionDegree: none(),
      altitudeM: none(), materialGroup: none(), boundaries: [], systemThermalClassC: none(), systemFileNumber: none(), maximumAmbientC: none(),
      maximumWindingC: none(), polymers: [], partialDischarge: none(), impulse: none(), cautions: none(),
    },
    marking: { content: none(), position: none(), dateCode: none(), revisionOnPart: none(), safetyMark: none(), machineReadable: none(), legibleAfter: none() },
    packing: {
      form: none(), piecesPerPack: none(), piecesPerCarton: none(), pinProtection: none(), orientation: none(), cartonLabel: none(),
      moistureLevel: none(), storage: none(), solderability: none(), solderProfile: none(), washable: none(),
    },
    compliance: {
      rohs: none(), rohsExemption: none(), reachListDate: none(), halogenFree: none(), conflictMinerals: none(), pfas: none(),
      packagingMarks: none(), traceability: none(), retentionYears: none(),
    },
    tests: [],
    notes: [],
    tolerances: { general: none(), angular: none(), pins: none(), electrical: none() },
    revisions: [],
  }
}

import { SPECIFICATION_SCHEMA } from '../specification'
import type {
  Compliance, CoreSpecification, ElectricalData, FormerSpecification, Impregnation, InsulationSpecification, Marking, Packing,
  TitleBlock, ToleranceBlock, WindingSpecification,
} from '../specification'
import { byDefault, open, vendorChoice } from './stated'

/** An empty winding specification for direct entry: defaults of the document type, and nothing of the part itself. */
export function blankSpecification(): WindingSpecification {
  return {
    schema: SPECIFICATION_SCHEMA,
    contract: 'build-to-print',
    title: blankTitle(),
    electrical: blankElectrical(),
    core: blankCore(),
    former: blankFormer(),
    windings: [],
    sequence: [],
    impregnation: noImpregnation(),
    insulation: blankInsulation(),
    marking: defaultMarking(),
    packing: defaultPacking(),
    compliance: defaultCompliance(),
    tests: [],
    notes: [],
    tolerances: defaultTolerances(),
    revisions: [],
  }
}

const blankTitle = (): TitleBlock => ({
  legalOwner: open('mandatory'),
  confidentiality: byDefault('Confidential. Not to be passed on without written consent of the owner.'),
  partNumber: open('mandatory'),
  drawingNumber: open(),
  title: open('mandatory'),
  supplementaryTitle: open(),
  documentType: byDefault('Component drawing'),
  responsibleDepartment: open(),
  technicalReference: open(),
  languageCode: byDefault('en', 'ISO 639-1'),
  classification: open(),
  documentStatus: byDefault('for-quotation-only'),
  paperSize: byDefault('A3', 'ISO 5457'),
  projection: byDefault('first-angle', 'ISO 5456-2'),
  relatedDocuments: [],
})

const blankElectrical = (): ElectricalData => ({
  topology: open('reference'),
  switchingFrequencyHz: open('reference'),
  dutyRatio: open('reference'),
  inductance: open('mandatory'),
  leakage: [],
  saturation: [],
  turnsRatios: [],
  polarity: byDefault('as-dotted'),
  voltSecondProduct: open(),
  selfResonance: open(),
  interwindingCapacitance: [],
  windingCapacitance: [],
  currentSense: open(),
  commonMode: open(),
  gateDrive: open(),
})

const blankCore = (): CoreSpecification => ({
  core: open('mandatory'),
  material: open('mandatory'),
  approvedEquivalents: byDefault<string[]>([]),
  equivalenceRule: byDefault('subject-to-written-approval'),
  numberOfSets: byDefault(1),
  orientation: open(),
  gap: {
    control: open('mandatory'),
    alH: open('mandatory'),
    alTolerance: open('mandatory'),
    lengthMm: open('reference'),
    lengthToleranceMm: open('reference'),
    position: byDefault('centre-leg'),
    grinding: byDefault('one-half', 'common practice', 'vendor-choice'),
  },
  assembly: {
    adhesive: byDefault('Epoxy, one component, heat-cured'),
    adhesivePosition: byDefault('Outer legs; ground faces free of adhesive'),
    clip: byDefault('None'),
    tapeLayers: byDefault(2),
    bandingTensionN: vendorChoice(),
  },
  potential: open('mandatory'),
  fluxBand: byDefault('None'),
  insulationOverCore: byDefault('None'),
  coating: open(),
  surfaceIrregularities: byDefault('IEC 63093-1', 'IEC 63093-1'),
})

const blankFormer = (): FormerSpecification => ({
  former: open('mandatory'),
  toolNumber: vendorChoice(),
  material: open('mandatory'),
  plastic: open('mandatory'),
  flammability: open('mandatory'),
  materialGroup: open('mandatory'),
  relativeTemperatureIndexC: vendorChoice(),
  fileNumber: vendorChoice(),
  mounting: open('mandatory'),
  pins: [],
  pinView: byDefault('bottom'),
  pinOneMark: byDefault('Dot on the former beside pin 1'),
  pinPitchMm: open('mandatory'),
  rowSpacingMm: open('mandatory'),
  pinSection: open('mandatory'),
  pinLengthMm: open('mandatory'),
  standoffMm: open('mandatory'),
  truePositionMm: byDefault(0.4),
  recommendedHoleMm: open(),
  coplanarityMm: open(),
  envelope: open('mandatory'),
  leadSlotWidthMm: open(),
  flyingLeads: [],
  massG: open('reference'),
  fixing: byDefault('Soldered pins'),
})

const noImpregnation = (): Impregnation => ({
  process: byDefault('none'),
  resin: byDefault('None'),
  thermalClassC: open(),
  compatibility: open(),
  pressureCycle: open(),
  bake: open(),
  extent: open(),
  pinsMasked: open(),
  fillLevelMm: open(),
})

const blankInsulation = (): InsulationSpecification => ({
  productStandard: open('mandatory'),
  standardEdition: open('mandatory'),
  mainsVoltageV: open(),
  overvoltageCategory: byDefault('II', 'IEC 60664-1'),
  pollutionDegree: byDefault(2, 'IEC 60664-1'),
  altitudeM: byDefault(2000, 'IEC 60664-1'),
  materialGroup: byDefault('IIIb', 'IEC 60664-1: unknown counts as IIIb'),
  boundaries: [],
  systemThermalClassC: open('mandatory'),
  systemFileNumber: vendorChoice(),
  maximumAmbientC: open('mandatory'),
  maximumWindingC: open(),
  polymers: [],
  partialDischarge: byDefault({ required: false, extinctionVPeak: null, limitC: null, method: 'not required' }),
  impulse: open(),
  cautions: byDefault([
    'Electric-strength tests use voltages that kill. Trained persons only, guarded test place, discharge before touching.',
    'The standard in force and the certification body decide; the edition named here is the one used for this drawing.',
  ]),
})

const defaultMarking = (): Marking => ({
  content: byDefault(['Part number', 'Vendor code', 'Date code']),
  position: byDefault('On the outer tape or the core, readable from above'),
  dateCode: byDefault('YYWW'),
  revisionOnPart: byDefault(false),
  safetyMark: byDefault('None'),
  machineReadable: byDefault('none'),
  legibleAfter: byDefault('Soldering and washing of the board'),
})

const defaultPacking = (): Packing => ({
  form: byDefault('tray'),
  piecesPerPack: vendorChoice(),
  piecesPerCarton: vendorChoice(),
  pinProtection: byDefault('Pins in foam or in the tray’s cavities'),
  orientation: byDefault('All parts in one direction, pin 1 to one edge'),
  cartonLabel: byDefault('Part number, revision, quantity, date code, lot'),
  moistureLevel: byDefault('Not moisture sensitive'),
  storage: byDefault('12 months at 5–35 °C, up to 70 % relative humidity'),
  solderability: byDefault('IEC 60068-2-20, test Ta', 'IEC 60068-2-20'),
  solderProfile: byDefault('wave'),
  washable: byDefault(false),
})

const defaultCompliance = (): Compliance => ({
  rohs: byDefault('2011/65/EU with (EU) 2015/863', '2011/65/EU'),
  rohsExemption: open(),
  reachListDate: vendorChoice(),
  halogenFree: open(),
  conflictMinerals: byDefault('Declaration on request', 'common practice', 'reference'),
  pfas: byDefault('Declare any PTFE, ETFE or FEP'),
  packagingMarks: open(),
  traceability: byDefault('Part lot to core lot, wire lot and test record'),
  retentionYears: byDefault(10),
})

const defaultTolerances = (): ToleranceBlock => ({
  general: byDefault('ISO 2768-1 m', 'ISO 2768-1'),
  angular: byDefault('ISO 2768-1 m', 'ISO 2768-1'),
  pins: byDefault('True position Ø 0.4 mm at the seating plane'),
  electrical: byDefault('No electrical value without stated tolerance'),
})

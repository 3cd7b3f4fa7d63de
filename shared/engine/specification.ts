/**
 * The winding specification: the document that fixes the construction and the limits of a wound part.
 *
 * Lengths are in millimetres (suffix `Mm`), temperatures in °C (suffix `C`), everything else in SI.
 * Nothing here says how a value was calculated: predicted values live in `evaluation.ts`, measured
 * ones with the sample data. A value in this document is what the drawing *specifies*.
 */

import type { FullBridgeDuty, HalfBridgeDuty, PushPullDuty } from './duties/bridges'
import type { ForwardDuty } from './duties/forward'
import type { LlcDuty } from './duties/llc'
import type { CommonModeChokeDuty } from './duties/common-mode-choke'
import type { CurrentSenseDuty } from './duties/current-sense'
import type { GateDriveDuty } from './duties/gate-drive'
import type { InductorDuty } from './duties/inductor'
import type { LibraryKind } from './library'

/** Written into every stored document; a change of shape is a new number with a reader for the old one. */
export const SPECIFICATION_SCHEMA = 'dotside/winding-specification/1'

// ---------------------------------------------------------------------------------------------
// How a field binds, and where its value came from

/**
 * `mandatory`: the vendor answers for it. `reference`: for information, not inspected.
 * `vendor-choice`: the vendor chooses and declares it, and it is frozen at approval.
 */
export type FieldStatus = 'mandatory' | 'reference' | 'vendor-choice'

export type Origin =
  /** Typed by a person; `reason` when it replaces a proposal or a library value. */
  | { kind: 'entered'; reason?: string }
  /** Proposed by the engine and not touched since. */
  | { kind: 'proposed'; engine: string }
  /** Taken from a library row. */
  | { kind: 'library'; row: LibraryReference }
  /** A default of the document type; `source` names the standard or says common practice. */
  | { kind: 'default'; source: string }

/** One field of the document. `value` is null while nobody has filled it. */
export interface Stated<T> {
  value: T | null
  status: FieldStatus
  origin: Origin
}

/** What every row of a table in the document carries. */
export interface StatedRow {
  /** Unique within its table and stable through edits, e.g. `w1`. */
  id: string
  status: FieldStatus
  origin: Origin
}

/** Exactly one version of one library row. */
export interface LibraryReference {
  kind: LibraryKind
  id: string
  version: number
}

// ---------------------------------------------------------------------------------------------
// The whole

/** How far the customer fixes the construction; decides what a silent field means. */
export type Contract = 'build-to-print' | 'build-to-performance'

/** What a vendor receives. Its canonical bytes are hashed at release. */
export interface WindingSpecification {
  schema: typeof SPECIFICATION_SCHEMA
  contract: Contract
  title: TitleBlock
  electrical: ElectricalData
  core: CoreSpecification
  former: FormerSpecification
  windings: Winding[]
  sequence: SequenceStep[]
  impregnation: Impregnation
  insulation: InsulationSpecification
  marking: Marking
  packing: Packing
  compliance: Compliance
  tests: TestRow[]
  notes: Note[]
  tolerances: ToleranceBlock
  revisions: RevisionEntry[]
}

/**
 * A specification with the requirement sheet it was made from. The requirement sheet holds circuit
 * know-how and never leaves the buying company, so it is no part of the hashed document.
 */
export interface SpecificationDocument {
  specification: WindingSpecification
  requirement: RequirementSheet | null
}

// ---------------------------------------------------------------------------------------------
// Requirement sheet (circuit side)

export interface RequirementSheet {
  duty: Duty
  /** Air temperature around the part, neighbours' heat included. */
  ambientC: number
  /** Largest permitted temperature rise of the winding, kelvin; null leaves it to the thermal class. */
  permittedRiseK: number | null
  /** Share of saturation flux density that the worst case may use, e.g. 0.8. */
  fluxUtilisation: number
  /** Current density that the proposal aims at, A/mm². */
  targetCurrentDensityAPerMm2: number
  /** How primary and secondary are kept apart when the proposal lays out the coil. */
  insulationMethod: InsulationMethod
  /** Height available over the board, mm; null when free. */
  maximumHeightMm: number | null
}

export type InsulationMethod = 'margin-tape' | 'triple-insulated-wire' | 'functional'

export type Duty =
  | FlybackDuty
  | ForwardDuty
  | HalfBridgeDuty
  | FullBridgeDuty
  | PushPullDuty
  | LlcDuty
  | CoupledInductorDuty
  | InductorDuty
  | CommonModeChokeDuty
  | GateDriveDuty
  | CurrentSenseDuty

/** The duty of one topology. */
export type DutyOf<T extends Duty['topology']> = Extract<Duty, { topology: T }>

export type ConductionChoice =
  | { kind: 'discontinuous'; /** Share of the period in which no current flows at full load and minimum input. */ idleShare: number }
  | { kind: 'boundary' }
  | { kind: 'continuous'; /** ΔI peak-to-peak over the mean current during the on time, at minimum input and full load. */ rippleRatio: number }
  /** The switch closes in a minimum of the ringing: the frequency is found, `switchingFrequencyHz` is that aimed at at minimum input and full load. */
  | { kind: 'quasi-resonant'; maximumFrequencyHz: number; /** At the switched node, winding and switch together. */ nodeCapacitanceF: number }

/** How the outputs of a flyback share the current while the switch is open. */
export type FlybackSharing = 'in-proportion-to-load' | 'from-leakages'

export interface FlybackOutputDuty extends ConverterOutput {
  /**
   * The output that this one stands on: `winding` joins the windings in series before the rectifiers, so that the lower one
   * carries both currents; `output` stands on the lower output's voltage behind its rectifier. Null or absent: on its own return.
   */
  stackedOn?: { outputId: string; at: 'winding' | 'output' } | null
}

export interface FlybackDuty {
  topology: 'flyback'
  supply: Supply
  outputs: FlybackOutputDuty[]
  switchingFrequencyHz: number
  conduction: ConductionChoice
  /** Output power over input power at full load, 0…1. */
  efficiency: number
  /** Largest duty ratio at minimum input; the ratio of turns follows from it unless `reflectedVoltageV` is given. */
  maximumDutyRatio: number
  /** Voltage that the outputs reflect to the primary during the off time; null derives it from the duty ratio. */
  reflectedVoltageV: number | null
  /** Drop of the closed switch and its sense resistor at full load. */
  switchDropV: number
  currentLimit: CurrentLimit | null
  /** Turn-off spike above input plus reflected voltage, as the clamp holds it; null when not known. */
  clampSpikeV: number | null
  /** Rated drain-source voltage of the switch; null when not known. */
  switchRatingV: number | null
  /** Absent: in proportion to load. */
  sharing?: FlybackSharing
}

/** Two windings on one core, each carrying direct current: SEPIC, Ćuk, Zeta and filter use. */
export interface CoupledInductorDuty {
  topology: 'coupled-inductor'
  /** The voltage applied to the first winding while it charges, over the input range. */
  supply: DcSupply
  outputVoltageV: number
  outputDropV: number
  outputCurrentA: number
  /** Second over first winding. 1 for a 1:1 part. */
  ratio: number
  switchingFrequencyHz: number
  /** ΔI peak-to-peak of the first winding over its mean at minimum input. */
  rippleRatio: number
  efficiency: number
  switchDropV: number
  currentLimit: CurrentLimit | null
}

export type Supply = DcSupply | MainsSupply

export interface DcSupply {
  kind: 'dc'
  minimumV: number
  nominalV: number
  maximumV: number
}

export interface MainsSupply {
  kind: 'mains'
  /** Rms, tolerance included. */
  minimumV: number
  nominalV: number
  maximumV: number
  lineFrequencyHz: number
  bulkCapacitanceF: number
  /** Time for which the bridge recharges the bulk capacitor in each half cycle. */
  conductionTimeS: number
}

export interface ConverterOutput {
  id: string
  name: string
  role: 'main' | 'auxiliary'
  /** Signed: a negative output has a negative voltage. */
  voltageV: number
  /** Forward drop of the rectifier, positive. */
  rectifierDropV: number
  fullLoadCurrentA: number
  lightLoadCurrentA: number
  /** The side of the insulation on which this output lies; an auxiliary usually lies on the primary's. */
  side: Side
}

export interface CurrentLimit {
  nominalA: number
  /** Relative, e.g. 0.08 for ±8 %. */
  tolerance: number
  /** From crossing the limit to the switch being open. */
  delayS: number
}

// ---------------------------------------------------------------------------------------------
// A  Title block (ISO 7200) — revision, dates and names come from the release record

export interface TitleBlock {
  legalOwner: Stated<string>
  confidentiality: Stated<string>
  /** Number of the part; at most 16 characters are recommended by ISO 7200. */
  partNumber: Stated<string>
  /** Number of the drawing where it differs from the part's. */
  drawingNumber: Stated<string>
  title: Stated<string>
  supplementaryTitle: Stated<string>
  documentType: Stated<string>
  responsibleDepartment: Stated<string>
  technicalReference: Stated<string>
  languageCode: Stated<string>
  classification: Stated<string>
  documentStatus: Stated<DocumentStatus>
  paperSize: Stated<'A3' | 'A4'>
  projection: Stated<'first-angle' | 'third-angle'>
  relatedDocuments: RelatedDocument[]
}

export type DocumentStatus = 'for-quotation-only' | 'for-samples-only' | 'released' | 'obsolete'

export interface RelatedDocument extends StatedRow {
  kind: 'footprint' | 'safety-report' | 'test-fixture' | 'other'
  number: string
  title: string
}

/** Who made a revision what it is; written at release, never by hand. */
export interface ReleaseRecord {
  /** `P1`, `P2` … for drafts, `A`, `B` … (without I, O, Q, S, X, Z) for releases. */
  revision: string
  /** Date of release of this revision, ISO 8601. */
  issuedOn: string
  createdBy: string
  checkedBy: string
  approvedBy: string
}

// ---------------------------------------------------------------------------------------------
// B  Electrical data

export type Topology =
  | 'flyback'
  | 'forward'
  | 'half-bridge'
  | 'full-bridge'
  | 'push-pull'
  | 'llc'
  | 'coupled-inductor'
  | 'inductor'
  | 'common-mode-choke'
  | 'gate-drive'
  | 'current-sense'

export interface Range {
  minimum: number
  maximum: number
}

export interface ElectricalData {
  topology: Stated<Topology>
  switchingFrequencyHz: Stated<Range>
  dutyRatio: Stated<Range>
  /** Seen at the terminals of `inductanceWindingId` with the others open. */
  inductance: Stated<InductanceLimit>
  leakage: LeakageLimit[]
  saturation: SaturationLimit[]
  turnsRatios: TurnsRatio[]
  polarity: Stated<'as-dotted'>
  voltSecondProduct: Stated<VoltSecondProduct>
  selfResonance: Stated<{ minimumHz: number; windingId: string; terminalsTied: string }>
  interwindingCapacitance: CapacitanceLimit[]
  windingCapacitance: CapacitanceLimit[]
  currentSense: Stated<CurrentSenseData>
  commonMode: Stated<CommonModeData>
  gateDrive: Stated<GateDriveData>
}

/** Conditions under which an inductance means something. */
export interface TestCondition {
  frequencyHz: number
  /** Rms at the terminals. */
  levelV: number
  temperatureC: number
  model: 'series' | 'parallel'
}

export interface InductanceLimit extends TestCondition {
  windingId: string
  nominalH: number
  /** Relative; `lower` negative, e.g. −0.1. Null is an open side. */
  lowerTolerance: number | null
  upperTolerance: number | null
}

export interface LeakageLimit extends StatedRow, TestCondition {
  /** Winding at whose terminals the leakage is measured. */
  windingId: string
  /** Windings shorted at their pins; never "the secondary". */
  shortedWindingIds: string[]
  maximumH: number
  minimumH: number | null
}

export interface SaturationLimit extends StatedRow {
  windingId: string
  currentA: number
  temperatureC: number
  /** Share of the inductance without bias that must be left, e.g. 0.9. */
  remainingShare: number
  method: 'dc-superposition' | 'pulse'
}

export interface TurnsRatio extends StatedRow {
  numeratorWindingId: string
  denominatorWindingId: string
  tolerance: number
  frequencyHz: number
  levelV: number
}

export interface VoltSecondProduct {
  windingId: string
  minimumVs: number
  waveform: 'unipolar-pulse' | 'bipolar-pulse' | 'sine'
  temperatureC: number
}

export interface CapacitanceLimit extends StatedRow {
  windingIds: string[]
  maximumF: number
  frequencyHz: number
  terminalsTied: string
}

export interface CurrentSenseData {
  burdenOhm: number
  ratioError: number
  droop: number
  bandwidthHz: Range
  maximumPrimaryCurrentA: number
  maximumDcA: number
}

export interface CommonModeData {
  impedance: { frequencyHz: number; minimumOhm: number }[]
  differentialLeakageH: number | null
  ratedCurrentA: number
  ratedVoltageV: number
  ratedTemperatureC: number
}

export interface GateDriveData {
  dvDtImmunityVPerS: number
  propagationDelayS: number | null
  isolationCapacitanceF: number
}

// ---------------------------------------------------------------------------------------------
// C  Core

export interface CoreSpecification {
  core: Stated<LibraryReference>
  material: Stated<LibraryReference>
  /** Makers' grades that are approved instead of the named one. */
  approvedEquivalents: Stated<string[]>
  equivalenceRule: Stated<'listed-alternates-only' | 'subject-to-written-approval'>
  numberOfSets: Stated<number>
  orientation: Stated<string>
  gap: GapSpecification
  assembly: CoreAssembly
  /** The potential and the side of the insulation that the core belongs to. */
  potential: Stated<CorePotential>
  fluxBand: Stated<string>
  insulationOverCore: Stated<string>
  /** Toroids: coating and its withstand voltage. */
  coating: Stated<{ material: string; withstandVRms: number | null }>
  surfaceIrregularities: Stated<string>
}

export interface GapSpecification {
  /** Exactly one controls; the other is for reference. */
  control: Stated<'al' | 'length' | 'none'>
  /** Inductance per turn squared, H. */
  alH: Stated<number>
  alTolerance: Stated<number>
  /** Total length in the centre leg; for spacers the sheet's thickness, which is in the path twice. */
  lengthMm: Stated<number>
  lengthToleranceMm: Stated<number>
  position: Stated<'centre-leg' | 'all-legs-spacer' | 'distributed' | 'none'>
  grinding: Stated<'one-half' | 'both-halves'>
}

export interface CoreAssembly {
  adhesive: Stated<string>
  adhesivePosition: Stated<string>
  clip: Stated<string>
  tapeLayers: Stated<number>
  bandingTensionN: Stated<number>
}

export interface CorePotential {
  connection: 'floating' | 'pin'
  pin: string | null
  side: Side
}

// ---------------------------------------------------------------------------------------------
// D  Coil former, pins, mechanics

export interface FormerSpecification {
  former: Stated<LibraryReference>
  toolNumber: Stated<string>
  material: Stated<string>
  plastic: Stated<'thermoset' | 'thermoplastic'>
  flammability: Stated<string>
  materialGroup: Stated<MaterialGroup>
  relativeTemperatureIndexC: Stated<number>
  fileNumber: Stated<string>
  mounting: Stated<'vertical' | 'horizontal'>
  pins: Pin[]
  /** Which view the pin-out is drawn and numbered in. */
  pinView: Stated<'top' | 'bottom'>
  pinOneMark: Stated<string>
  pinPitchMm: Stated<number>
  rowSpacingMm: Stated<number>
  pinSection: Stated<PinSection>
  pinLengthMm: Stated<number>
  standoffMm: Stated<number>
  truePositionMm: Stated<number>
  recommendedHoleMm: Stated<number>
  coplanarityMm: Stated<number>
  /** Largest size over solder bumps, tape, varnish and label. */
  envelope: Stated<{ lengthMm: number; widthMm: number; heightMm: number }>
  leadSlotWidthMm: Stated<number>
  flyingLeads: FlyingLead[]
  massG: Stated<number>
  fixing: Stated<string>
}

/** Seen from above the board (top view), x to the right, y upwards, origin at the centre. One model for all views. */
export interface Pin {
  number: string
  xMm: number
  yMm: number
  state: 'fitted' | 'no-connection' | 'missing'
}

export interface PinSection {
  shape: 'round' | 'square'
  sizeMm: number
}

export interface FlyingLead extends StatedRow {
  /** Used as a terminal name, e.g. `FL1`. */
  name: string
  wireStyle: string
  lengthMm: number
  measuredFrom: string
  stripLengthMm: number
  tinned: boolean
  colour: string
  sleeve: string
  termination: string
}

// ---------------------------------------------------------------------------------------------
// Windings and the winding sequence

/** The parts of the insulation system: what is on one side may touch, what is on two may not. */
export type Side = 'primary' | 'secondary' | 'secondary-2' | 'secondary-3' | 'floating'

export interface Winding extends StatedRow {
  /** As it stands in the schematic: `P`, `AUX`, `S1`, `SH`. */
  name: string
  /** `reset`: demagnetises the core of a forward converter back into the supply. */
  role: 'primary' | 'secondary' | 'auxiliary' | 'shield' | 'reset'
  side: Side
  /** The output of the requirement sheet that this winding feeds; null for others. */
  outputId: string | null
  /** The dotted end: positive at the same time as the other dotted ends. */
  startTerminal: string
  finishTerminal: string
  turns: number
  wire: WireUse
  /** Specified for the vendor's choice of pins and copper; null while not known. */
  rmsCurrentA: number | null
  peakCurrentA: number | null
  dcCurrentA: number | null
  dcResistance: DcResistanceLimit | null
}

export interface WireUse {
  wire: LibraryReference
  /** Wires laid side by side and joined at the terminals. */
  parallel: number
  /** Thermal class of the insulation, °C. */
  thermalClassC: number
  insulation: WireInsulation
  certificate: WireCertificate | null
  /** Litz only. */
  lay: { lengthMm: number; direction: 'S' | 'Z' } | null
}

export type WireInsulation = 'enamel-grade-1' | 'enamel-grade-2' | 'enamel-grade-3' | 'triple-insulated' | 'fully-insulated' | 'bare'

export interface WireCertificate {
  standard: string
  number: string
  peakVoltageV: number | null
  maximumFrequencyHz: number | null
}

export interface DcResistanceLimit {
  nominalOhm: number
  maximumOhm: number
  minimumOhm: number | null
  temperatureC: 20 | 25
  fourTerminal: boolean
}

/** One operation at the winding machine, from the former outward. */
export type SequenceStep = WindingStep | TapeStep | MarginStep | ShieldStep | SleeveStep | CoreTapeStep | VarnishStep

interface StepBase extends StatedRow {
  remark: string
}

/** Turns of one winding. A split winding has several of these steps in series. */
export interface WindingStep extends StepBase {
  kind: 'winding'
  windingId: string
  startTerminal: string
  finishTerminal: string
  turns: number
  /** Section of the former, counted from 1 at the pin-1 end. */
  section: number
  direction: 'clockwise' | 'counter-clockwise'
  /** Where in the layer a winding that does not fill it lies. */
  lay: 'close-wound' | 'spread' | 'centred' | 'close-wound-left' | 'close-wound-right'
  /** Layers that the specification asks for; null lets the width decide. */
  layers: number | null
  marginLeftMm: number
  marginRightMm: number
  /** Tape between the layers of this step. */
  interlayerTape: LibraryReference | null
  leadExitStart: 'left' | 'right'
  leadExitFinish: 'left' | 'right'
  startSleeve: LeadSleeve | null
  finishSleeve: LeadSleeve | null
  /** Wound together with the winding step before it, turn beside turn (bifilar, n-filar). Absent: by itself. */
  withPrevious?: boolean
}

export interface LeadSleeve {
  sleeve: LibraryReference
  lengthMm: number
  /** How far the sleeve reaches into the winding, past the margin. */
  intoWindingMm: number
}

export interface TapeStep extends StepBase {
  kind: 'tape'
  tape: LibraryReference
  layers: number
  /** Null: the full width of the former. */
  widthMm: number | null
  purpose: 'interlayer' | 'interwinding' | 'outer' | 'base'
}

export interface MarginStep extends StepBase {
  kind: 'margin'
  tape: LibraryReference
  leftMm: number
  rightMm: number
  /** Built up to the height of the winding beside it when null. */
  heightMm: number | null
}

export interface ShieldStep extends StepBase {
  kind: 'shield'
  windingId: string
  form: 'foil' | 'wire'
  thicknessMm: number
  widthMm: number
  /** Length by which the ends overlap, insulated so that no shorted turn is formed. */
  overlapMm: number
  overlapInsulation: string
  connectedTerminal: string
}

export interface SleeveStep extends StepBase {
  kind: 'sleeve'
  sleeve: LibraryReference
  lead: string
  lengthMm: number
}

export interface CoreTapeStep extends StepBase {
  kind: 'core-tape'
  tape: LibraryReference
  layers: number
  purpose: 'insulation' | 'banding' | 'flux-band'
}

export interface VarnishStep extends StepBase {
  kind: 'varnish'
  extent: 'coil-only' | 'coil-and-core'
}

// ---------------------------------------------------------------------------------------------
// F  Impregnation and encapsulation

export interface Impregnation {
  process: Stated<'none' | 'dip' | 'vacuum' | 'potting'>
  resin: Stated<string>
  thermalClassC: Stated<number>
  compatibility: Stated<string>
  pressureCycle: Stated<string>
  bake: Stated<{ temperatureC: number; durationS: number }>
  extent: Stated<'coil-only' | 'coil-and-core'>
  pinsMasked: Stated<boolean>
  fillLevelMm: Stated<number>
}

// ---------------------------------------------------------------------------------------------
// G  Insulation and safety

export type MaterialGroup = 'I' | 'II' | 'IIIa' | 'IIIb'
export type OvervoltageCategory = 'I' | 'II' | 'III' | 'IV'
export type PollutionDegree = 1 | 2 | 3
export type InsulationType = 'functional' | 'basic' | 'supplementary' | 'double' | 'reinforced'
/** Means of operator protection, means of patient protection: IEC 60601-1. */
export type MeansOfProtection = 'MOOP' | 'MOPP'
export type ProductStandard = 'IEC 62368-1' | 'IEC 61558-1' | 'IEC 60335-1' | 'IEC 60601-1' | 'IEC 60664-1'

export interface InsulationSpecification {
  productStandard: Stated<ProductStandard>
  /** As printed on the copy in use, e.g. `2018`. */
  standardEdition: Stated<string>
  /** Nominal mains voltage, line to neutral, rms; null for parts without a mains side. */
  mainsVoltageV: Stated<number>
  overvoltageCategory: Stated<OvervoltageCategory>
  pollutionDegree: Stated<PollutionDegree>
  altitudeM: Stated<number>
  materialGroup: Stated<MaterialGroup>
  boundaries: InsulationBoundary[]
  /** Class of the insulation system, IEC 60085, °C. */
  systemThermalClassC: Stated<number>
  systemFileNumber: Stated<string>
  maximumAmbientC: Stated<number>
  maximumWindingC: Stated<{ temperatureC: number; method: 'resistance' | 'thermocouple' }>
  polymers: PolymerRow[]
  /** For the safety laboratory. Absent in documents from before there was such a list, whose bytes stay what they are. */
  criticalMaterials?: CriticalMaterial[]
  partialDischarge: Stated<{ required: boolean; extinctionVPeak: number | null; limitC: number | null; method: string }>
  impulse: Stated<{ voltageV: number; shots: number; polarity: 'both' | 'positive' | 'negative'; where: string }>
  cautions: Stated<string[]>
}

/** A boundary lies between two sides, or between a side and the core. */
export type BoundaryEnd = { kind: 'side'; side: Side } | { kind: 'winding'; windingId: string } | { kind: 'core' }

export interface InsulationBoundary extends StatedRow {
  name: string
  between: [BoundaryEnd, BoundaryEnd]
  insulation: InsulationType
  /** IEC 60601-1 only: whether the boundary protects operators or patients. Absent in documents that never asked. */
  meansOfProtection?: MeansOfProtection | null
  workingVoltageVRms: number | null
  recurringPeakV: number | null
  frequencyHz: number | null
  /** Specified distances; the engine's requirement stands in the evaluation. */
  clearanceMm: number | null
  creepageMm: number | null
  distanceThroughInsulationMm: number | null
  insulationLayers: number | null
  test: WithstandTest | null
}

export interface WithstandTest {
  voltageV: number
  kind: 'ac-rms' | 'dc'
  frequencyHz: number
  rampS: number
  dwellS: number
  tripA: number
  /** Shorter dwell used on every part. */
  routineDwellS: number
  routineVoltageV: number
}

/** A part or material on which safety depends, as the report of a safety laboratory lists it. */
export interface CriticalMaterial extends StatedRow {
  /** What it is in this part, e.g. `Coil former`, `Interwinding tape`. */
  part: string
  maker: string
  type: string
  /** E.g. `155 °C, V-0, CTI 175`. */
  rating: string
  standard: string
  certificate: string
  /** ISO 8601 date; null where the certificate has no end. */
  expiresOn: string | null
}

export interface PolymerRow extends StatedRow {
  use: string
  material: string
  flammability: string
  fileNumber: string
}

// ---------------------------------------------------------------------------------------------
// H  Marking, packing, compliance

export interface Marking {
  content: Stated<string[]>
  position: Stated<string>
  dateCode: Stated<'YYWW' | 'IEC 60062'>
  revisionOnPart: Stated<boolean>
  safetyMark: Stated<string>
  machineReadable: Stated<'none' | 'ISO/IEC 16022' | 'ISO/IEC 18004'>
  legibleAfter: Stated<string>
}

export interface Packing {
  form: Stated<'tray' | 'tube' | 'tape-and-reel' | 'box'>
  piecesPerPack: Stated<number>
  piecesPerCarton: Stated<number>
  pinProtection: Stated<string>
  orientation: Stated<string>
  cartonLabel: Stated<string>
  moistureLevel: Stated<string>
  storage: Stated<string>
  solderability: Stated<string>
  solderProfile: Stated<'wave' | 'reflow' | 'hand'>
  washable: Stated<boolean>
}

export interface Compliance {
  rohs: Stated<string>
  rohsExemption: Stated<{ exemption: string; expiresOn: string }>
  reachListDate: Stated<string>
  halogenFree: Stated<boolean>
  conflictMinerals: Stated<string>
  pfas: Stated<string>
  packagingMarks: Stated<string>
  traceability: Stated<string>
  retentionYears: Stated<number>
}

// ---------------------------------------------------------------------------------------------
// I  Test table, J notes, K tolerances, L revision block

export type Characteristic =
  | 'inductance'
  | 'inductance-at-bias'
  | 'leakage'
  | 'dc-resistance'
  | 'turns-ratio'
  | 'polarity'
  | 'self-resonance'
  | 'interwinding-capacitance'
  | 'hipot'
  | 'insulation-resistance'
  | 'surge'
  | 'impulse'
  | 'partial-discharge'
  | 'dimension'
  | 'visual'

export interface TestRow extends StatedRow {
  number: number
  characteristic: Characteristic
  /** As it appears in reports, e.g. `Lp`, `Rdc S1`, `P:S1`, `HV P–S`. Unique in the table. */
  symbol: string
  windingId: string | null
  boundaryId: string | null
  drivenTerminals: string[]
  shortedTerminals: string[][]
  openTerminals: string[]
  /** Standard and clause, or a named method. */
  method: string
  instrumentClass: string
  frequencyHz: number | null
  levelV: number | null
  biasA: number | null
  temperatureC: number | null
  minimum: number | null
  nominal: number | null
  maximum: number | null
  /** SI unit of the limits: `H`, `Ω`, `V`, `Hz`, `F`, `1` for ratios. Pass/fail rows have null limits. */
  unit: 'H' | 'Ω' | 'V' | 'A' | 'Hz' | 'F' | 'mm' | '1'
  extent: 'every-part' | 'sample' | 'type-test' | 'reference'
  /** Acceptable quality limit for a sample, %. */
  acceptableQualityLimit: number | null
  criticalToQuality: boolean
  reaction: string
  record: 'reading' | 'pass-fail'
}

export interface Note extends StatedRow {
  number: number
  text: string
  /** Fields that the note belongs to, as dotted paths. */
  fields: string[]
}

export interface ToleranceBlock {
  general: Stated<string>
  angular: Stated<string>
  pins: Stated<string>
  electrical: Stated<string>
}

export interface RevisionEntry {
  revision: string
  date: string
  zones: string
  changes: RevisionChange[]
  reason: string
  effect: string
  by: string
  checkedBy: string
  approvedBy: string
}

export interface RevisionChange {
  field: string
  before: string
  after: string
}

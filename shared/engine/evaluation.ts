/**
 * What the engine answers about one specification: predicted values, never specified ones.
 * SI units unless a suffix says otherwise; no rounding. `null` means not checkable, and a finding says why.
 */

import type { Finding } from './findings'
import type { InsulationType, Side, TestRow } from './specification'
import type { CircuitFigure, CircuitMode, PointName } from './topologies/topology'

export interface Evaluation {
  /** Version of the engine that made it. */
  engine: string
  corners: CornerResult[]
  magnetics: MagneticsResult
  windings: WindingResult[]
  leakages: LeakageResult[]
  capacitances: CapacitanceResult[]
  commonModeCapacitances: CommonModeCapacitance[]
  boundaryCapacitances: BoundaryCapacitance[]
  selfResonance: SelfResonanceResult[]
  layout: Layout
  /** In the full-load corner that heats most. */
  losses: LossResult
  /** The same at the same temperature in every corner, in the order of `corners`. */
  lossesByCorner: LossResult[]
  thermal: ThermalResult
  faults: FaultCase[]
  boundaries: BoundaryResult[]
  mass: MassResult
  findings: Finding[]
  checks: CheckResult[]
  /** Filled only when asked for: how each figure came about, by the dotted path of the figure here. */
  working: Record<string, Working>
}

/** One working point: an input voltage with a load. */
export interface CornerResult {
  name: PointName
  inputV: number
  mode: CircuitMode
  /** Conduction of one switch over the period. */
  dutyRatio: number
  frequencyHz: number
  windings: CornerWinding[]
  /** Volt-seconds of the primary winding that swing the flux from one end to the other. */
  voltSecondsVs: number
  /** Peak-to-peak of the flux density on the effective area; null without a core. */
  fluxSwingT: number | null
  /** Greatest magnitude of the flux density on the effective area. */
  fluxPeakT: number | null
  /** One period of the flux density on the effective area: [time s, T]. Left out without a core, and in evaluations that were sealed before it was kept. */
  fluxWaveform?: readonly (readonly [number, number])[]
  inputPowerW: number
  /** Clamp spike included; null without a switch. */
  switchPeakV: number | null
  /** Reverse voltage without spike. */
  rectifiers: { outputId: string; reversePeakV: number }[]
  outputs: CornerOutput[]
  /** Time that the current takes to pass between windings at an edge; null where edges are taken as ideal. */
  commutationS: number | null
  /** Figures of this topology alone. */
  figures: CircuitFigure[]
}

/** What one output gets, and what its capacitor takes. */
export interface CornerOutput {
  outputId: string
  /** At the load, with its sign. */
  voltageV: number
  mode: CircuitMode
  /** Peak-to-peak of the current behind rectifier and filter inductor. */
  rippleA: number
  /** Rms current of the output capacitor. */
  capacitorRmsA: number
  /** Charge that goes into the capacitor and out again in a period: the voltage ripple is ΔQ/C + ESR·ΔI. */
  rippleChargeC: number
}

export interface CornerWinding {
  windingId: string
  /** Magnitude of the mean. */
  dcA: number
  rmsA: number
  acRmsA: number
  peakA: number
  /** Peak voltage across the winding over a period, both signs. */
  positivePeakV: number
  negativePeakV: number
  rmsV: number
  /** One period, piecewise linear: [time s, current A]. */
  currentWaveform: readonly (readonly [number, number])[]
}

export interface MagneticsResult {
  inductanceH: number | null
  inductanceMinimumH: number | null
  inductanceMaximumH: number | null
  alH: number | null
  /** Gap length that gives the inductance, with the named fringing model. */
  gapMm: number | null
  fringingFactor: number | null
  gapModel: string
  /** The same by the field of the window, with the coil as it lies; null where the window or the coil is not known. */
  gapFieldMm: number | null
  /** At full load and minimum input, nominal inductance. */
  fluxPeakT: number | null
  /** Largest inductance, current limit at its upper tolerance with delay, on the minimum area. */
  fluxWorstT: number | null
  worstCurrentA: number | null
  saturationT: number | null
  saturationTemperatureC: number | null
  /** fluxWorstT / saturationT. */
  fluxUtilisation: number | null
  boundaryInductanceH: number | null
  /** Core with a distributed gap: field at the full-load peak, A/m, and the inductance left there; null for other cores. */
  biasFieldAPerM: number | null
  inductanceUnderBiasH: number | null
  /** Volt-seconds at the primary that swing the flux from one end to the other, greatest of the corners. */
  voltSecondsVs: number | null
  /** Greatest swing of all corners, on the least area. */
  fluxSwingT: number | null
  /** Converters that drive the flux both ways: the peak of the first pulse after start or a step, on the least area. */
  fluxTransientT: number | null
}

export interface WindingResult {
  windingId: string
  /** Copper area of all parallel wires, mm². */
  copperAreaMm2: number
  wireLengthM: number | null
  meanTurnLengthMm: number | null
  dcResistance20Ohm: number | null
  dcResistanceHotOhm: number | null
  /** Loss by the alternating currents of all windings over what its own alternating current loses in the dc resistance; the model is named in the working. */
  acFactor: number | null
  /** The same in the one-dimensional field, for comparison; null where that is the only one, or does not apply. */
  acFactorOneDimensional: number | null
  rmsA: number | null
  peakA: number | null
  dcA: number | null
  currentDensityAPerMm2: number | null
  layers: number
  turnsPerLayer: number[]
  /** Sum of the next three. */
  copperLossW: number | null
  dcLossW: number | null
  /** By its own alternating current: in the dc resistance, by skin effect, and by the nearest wires of its layer. */
  skinLossW: number | null
  /** By the field of all windings and the gap in its conductors. */
  proximityLossW: number | null
  /** What the other windings alone would lose in it. */
  idleLossW: number | null
  copperMassG: number | null
  skinDepthMm: number | null
}

export interface LeakageResult {
  windingId: string
  shortedWindingIds: string[]
  /** From the two-dimensional field of the window. */
  inductanceH: number | null
  /** By the field along the axis alone, for comparison. */
  oneDimensionalH: number | null
  model: string
}

export interface CapacitanceResult {
  /** One winding: across its own terminals. Two: between them, each shorted on itself. All others open and floating. */
  windingIds: string[]
  capacitanceF: number | null
  model: string
}

/** Charge that a volt across one winding drives into another, with one end of both at rest; negative in the other sense. */
export interface CommonModeCapacitance {
  windingId: string
  ontoWindingId: string
  startsRestingF: number | null
  finishesRestingF: number | null
  model: string
}

/** Between everything on one side of a boundary and everything on the other, as an electric-strength test sees it. */
export interface BoundaryCapacitance {
  boundaryId: string
  capacitanceF: number | null
  model: string
}

export interface SelfResonanceResult {
  windingId: string
  /** With all other windings open. */
  frequencyHz: number | null
  model: string
}

// ---------------------------------------------------------------------------------------------
// The coil to scale

/**
 * Cross-section of one side of the winding window, in mm. x runs along the former from the inside of
 * the left flange (pin-1 end), y outward from the winding tube.
 */
export interface Layout {
  /** Absent in evaluations made before rings were laid out: a window. */
  form?: 'window' | 'ring'
  /** The ring and its wires as seen along the axis; `items` is empty then, and width and height are those of the hole unrolled. */
  ring?: RingLayout
  windowWidthMm: number
  windowHeightMm: number
  items: LayoutItem[]
  /** What crosses or stands beside the turns: leads on their way out, ends of shields, walls between sections. Absent in older evaluations. */
  outlines?: LayoutOutline[]
  /** Build in use, bulge of the outer layers included. */
  buildMm: number
  buildRatio: number
  /** Bare copper over window area. */
  copperFill: number
  /** Sum of squares of overall diameters over window area. */
  windowFill: number
}

/** A rectangle of the cross-section that is no turn, tape or margin. */
export interface LayoutOutline {
  kind: 'lead-crossing' | 'lead-sleeve' | 'shield-overlap' | 'section-wall'
  /** Null for walls of the former. */
  stepId: string | null
  xMm: number
  yMm: number
  widthMm: number
  heightMm: number
}

/** Seen along the axis of a ring core, origin in its middle, in mm; angles counter-clockwise from the right. */
export interface RingLayout {
  /** Core with its coating and core tape, before any winding. */
  outsideMm: number
  holeMm: number
  heightMm: number
  passes: RingPass[]
  sectors: { stepId: string; windingId: string; section: number; fromRad: number; toRad: number }[]
  /** Tape round the ring: radial thickness before the next winding. */
  tapes: { stepId: string; holeMm: number; outsideMm: number; thicknessMm: number }[]
  /** Free diameter of the hole, and the size over all, when everything is wound. */
  remainingHoleMm: number
  overallOutsideMm: number
  overallHeightMm: number
  /** Least clear distance of two windings in different sectors, along the hole; null with a single sector. */
  sectorGapMm: number | null
}

/** One wire of one turn: where it runs through the hole, and where outside. */
export interface RingPass {
  stepId: string
  windingId: string
  turn: number
  strand: number
  layer: number
  overallMm: number
  conductorMm: number
  innerXMm: number
  innerYMm: number
  outerXMm: number
  outerYMm: number
}

export type LayoutItem =
  | { kind: 'turn'; stepId: string; windingId: string; turn: number; strand: number; layer: number; xMm: number; yMm: number; overallMm: number; conductorMm: number }
  | { kind: 'foil'; stepId: string; windingId: string; turn: number; xMm: number; yMm: number; widthMm: number; thicknessMm: number }
  | { kind: 'tape'; stepId: string; layer: number; xMm: number; yMm: number; widthMm: number; thicknessMm: number }
  | { kind: 'margin'; stepId: string; xMm: number; yMm: number; widthMm: number; heightMm: number }

// ---------------------------------------------------------------------------------------------

export interface LossResult {
  corner: CornerResult['name']
  copperW: number | null
  coreW: number | null
  totalW: number | null
  coreDensityWPerM3: number | null
  model: string
  /** Copper loss in the one-dimensional field, for comparison; null where that is the only one, or does not apply. */
  copperOneDimensionalW: number | null
  /** Harmonics summed in the copper loss, and the share of the ac loss beyond them that is estimated. */
  harmonics: number | null
  harmonicTailShare: number | null
}

export interface ThermalResult {
  riseK: number | null
  ambientC: number | null
  windingC: number | null
  /** Allowance for the hottest place over the mean of the winding. */
  hotSpotC: number | null
  /** The same loss by the volume law of ferrite cores, for comparison: the models differ by a quarter. */
  riseByVolumeK: number | null
  /** The limit of the insulation system for the method stated. */
  limitC: number | null
  marginK: number | null
  surfaceMm2: number | null
  model: string
}

/** The part under a fault that its supply lets last. */
export interface FaultCase {
  /** All outputs loaded to just below the current limit, or one shorted. */
  kind: 'overload' | 'shorted-output'
  outputId: string | null
  output: string | null
  lossW: number | null
  windingC: number | null
  /** It does not settle below the temperature to which the laws of loss hold. */
  runaway: boolean
  /** What the thermal class allows under overload, by resistance. */
  limitC: number | null
  state: CheckState
  model: string
}

export interface BoundaryResult {
  boundaryId: string
  name: string
  insulation: InsulationType
  workingVoltageVRms: number | null
  recurringPeakV: number | null
  required: {
    clearanceMm: SourcedValue
    creepageMm: SourcedValue
    distanceThroughInsulationMm: SourcedValue
    layers: SourcedValue
    testVoltageVRms: SourcedValue
  }
  /** What the build gives along its shortest path; null when it cannot be told. */
  provided: {
    clearanceMm: number | null
    creepageMm: number | null
    distanceThroughInsulationMm: number | null
    layers: number | null
    testVoltageVRms: number | null
    how: string
    /** The weakest ways as they would be drawn; none where the coil is not laid. */
    paths?: readonly InsulationPath[]
  }
  state: CheckState
}

/** In the winding window the coordinates of `Layout`, y above the window's height lying in the core; among the pins those of `Pin`; on a ring those of `RingLayout`. */
export type PathPoint = readonly [xMm: number, yMm: number]

/** The shortest way across one boundary, as a line from one conductor to the other. */
export interface InsulationPath {
  kind: 'clearance' | 'creepage' | 'through-insulation'
  /** The winding window's cross-section, the pins seen from above the board, or a ring core seen along its axis. */
  plane: 'window' | 'pins' | 'ring'
  /** What counts as its length; a part that conducts counts as no distance though the line runs along it. */
  lengthMm: number
  how: string
  points: readonly PathPoint[]
}

export interface SourcedValue {
  value: number | null
  source: string
  /** From memory or a secondary copy: the standard in force decides. */
  fromMemory: boolean
  /** Which of the two; absent for common practice. */
  basis?: 'secondary-copy' | 'memory'
  reason: string | null
}

export interface MassResult {
  copperG: number | null
  coreG: number | null
  totalG: number | null
}

export type CheckState = 'met' | 'not-met' | 'not-checkable'

/** One release check. Codes are permanent (`E01` … `Q18`). */
export interface CheckResult {
  code: string
  /** `S` stops release, `M` must be answered, `N` is a note. */
  severity: 'S' | 'M' | 'N'
  state: CheckState
  value: number | null
  limit: number | null
  unit: string
  /** Relative to the limit, positive when met. */
  margin: number | null
  source: string
  /** Dotted path of the field that the check leads to. */
  path: string
  /** Numbers and names for the sentence, unit in the key. */
  values: Readonly<Record<string, number | string>>
}

/** How one figure came about. */
export interface Working {
  symbol: string
  value: number | null
  unit: string
  formula: string
  inputs: { name: string; value: number | string; unit: string; origin: string }[]
  source: string
}

/** Proposed rows carry no number of their own; the caller keeps those a person changed. */
export type ProposedTest = TestRow

export type { Finding, Side }

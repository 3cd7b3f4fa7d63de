import type { Finding } from '../findings'
import type { FormerRow, SleeveRow, TapeRow } from '../library'
import type { Layout } from '../evaluation'
import type { LibraryReference, SequenceStep, Winding } from '../specification'

/** What the layout needs to know of a winding's wire. */
export interface BuildWire {
  form: 'round' | 'litz' | 'foil'
  /** Largest overall diameter; thickness of a foil. */
  overallMm: number
  conductorMm: number
  /** Of one wire. */
  copperAreaMm2: number
  /** Foil only. */
  widthMm: number | null
}

export interface CoilInput {
  former: FormerRow
  windings: readonly Winding[]
  sequence: readonly SequenceStep[]
  /** Null when the library holds no such wire or no overall diameter for its insulation. */
  wireOf: (winding: Winding) => BuildWire | null
  tapeOf: (reference: LibraryReference) => TapeRow | null
  /** Left out: leads cross in their own insulation. */
  sleeveOf?: (reference: LibraryReference) => SleeveRow | null
}

/** One layer of a winding step: wire side by side, or one turn of foil. */
export interface LayerPlacement {
  /** Turns laid in it; 1 for foil. */
  turns: number
  /** Turns of the same winding laid before it, over all steps. */
  turnsBefore: number
  bottomMm: number
  topMm: number
  /** Wires between these, from the inside of the left flange of the section. */
  leftMm: number
  rightMm: number
  /** From the centre of one turn to that of the next; the width of a single turn. */
  pitchMm: number
  /** Wound from the left to the right. */
  rightward: boolean
  /** Length of a turn. */
  turnLengthMm: number
}

/** One winding step as it lies in the window. */
export interface StepPlacement {
  stepId: string
  /** Index in the sequence. */
  index: number
  windingId: string
  section: number
  bottomMm: number
  topMm: number
  /** Wires between these, from the inside of the left flange of the section. */
  leftMm: number
  rightMm: number
  marginLeftMm: number
  marginRightMm: number
  turns: number
  turnsPerLayer: number[]
  /** Length of a turn in each layer. */
  turnLengthsMm: number[]
  mostTurnsPerLayer: number
  bundleWidthMm: number
  availableMm: number
  /** Steps that are wound together with this one, turn beside turn. */
  togetherWith: string[]
  /** Height of one layer of wire without its interlayer tape. */
  layerHeightMm: number
  /** Layer by layer, from the tube outward. */
  layers: LayerPlacement[]
}

/** One tape step as it lies in the window; the same in every section. */
export interface TapePlacement {
  stepId: string
  index: number
  section: number
  bottomMm: number
  topMm: number
  layers: number
  leftMm: number
  rightMm: number
  fullWidth: boolean
}

/** One turn of shielding foil as it lies in the window. */
export interface ShieldPlacement {
  stepId: string
  index: number
  windingId: string
  section: number
  bottomMm: number
  /** Top of the foil where it lies once; its overlap stands above. */
  topMm: number
  leftMm: number
  rightMm: number
  turnLengthMm: number
}

export interface MarginPlacement {
  stepId: string
  index: number
  section: number
  bottomMm: number
  topMm: number
  leftMm: number
  rightMm: number
  /** Top of the winding beside it, for comparison. */
  windingTopMm: number
}

/** A winding over all its steps. */
export interface WindingBuild {
  windingId: string
  turns: number
  layers: number
  turnsPerLayer: number[]
  meanTurnLengthMm: number
  /** Turns only, of one of the parallel wires. */
  turnsLengthM: number
}

export interface Coil {
  layout: Layout
  /** Left end of each section from the left end of the window. */
  sectionLeftsMm: number[]
  placements: StepPlacement[]
  tapes: TapePlacement[]
  margins: MarginPlacement[]
  shields: ShieldPlacement[]
  windings: ReadonlyMap<string, WindingBuild>
  /** Geometric build without bulge. */
  plainBuildMm: number
  bulge: number
  findings: Finding[]
}

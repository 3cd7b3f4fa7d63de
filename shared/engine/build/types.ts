import type { Finding } from '../findings'
import type { FormerRow, TapeRow } from '../library'
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
  /** Height of one layer of wire without its interlayer tape. */
  layerHeightMm: number
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
  placements: StepPlacement[]
  tapes: TapePlacement[]
  margins: MarginPlacement[]
  windings: ReadonlyMap<string, WindingBuild>
  /** Geometric build without bulge. */
  plainBuildMm: number
  bulge: number
  findings: Finding[]
}

import type { CoreRow, FormerRow, MaterialRow } from '../library'
import type { InsulationMethod, Side, Winding, WireUse } from '../specification'

/** One winding before it has pins. */
export interface PlannedWinding {
  id: string
  name: string
  role: Winding['role']
  side: Side
  outputId: string | null
  turns: number
  wire: WireUse
  /** The winding of the equal and opposite output, beside which this one belongs; null without one. */
  partnerId: string | null
  /** Strands of one wire: 1 unless it is litz. */
  strands: number
  /** The library holds no wire that suits; this one only carries the current. */
  makeshift: boolean
  /** Decides the order in the coil: the strongest secondary lies nearest to the primary. */
  powerW: number
}

/** Everything a proposal has decided before it is written out as a document. */
export interface Design {
  core: CoreRow
  former: FormerRow
  material: MaterialRow
  windings: PlannedWinding[]
  inductanceH: number
  /** The core has no gap: the inductance follows from its permeability and has a lower limit only. */
  ungapped: boolean
  method: InsulationMethod
  /** Primary and secondaries are kept apart to protect people. */
  protective: boolean
  onMains: boolean
  interleaved: boolean
  marginMm: number
}

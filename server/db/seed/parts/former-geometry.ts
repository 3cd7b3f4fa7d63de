import type { CoreRow, FormerRow } from '#shared/engine/library'
import { rounded } from './table'

/** Walls and clearances that leave room for the winding, by width of the core's window (dimension E). All in mm. */
interface Allowance {
  upToMm: number
  wallMm: number
  flangeMm: number
  legClearanceMm: number
  endClearanceMm: number
  outerClearanceMm: number
  pinMm: number
}

/** Chosen so that the formers whose width and height are known are met; see the test for how closely. */
const ALLOWANCES: readonly Allowance[] = [
  { upToMm: 9, wallMm: 0.45, flangeMm: 0.45, legClearanceMm: 0.1, endClearanceMm: 0.1, outerClearanceMm: 0.2, pinMm: 0.5 },
  { upToMm: 13, wallMm: 0.5, flangeMm: 0.6, legClearanceMm: 0.1, endClearanceMm: 0.1, outerClearanceMm: 0.25, pinMm: 0.5 },
  { upToMm: 18, wallMm: 0.8, flangeMm: 0.9, legClearanceMm: 0.15, endClearanceMm: 0.15, outerClearanceMm: 0.3, pinMm: 0.6 },
  { upToMm: 24, wallMm: 1, flangeMm: 1, legClearanceMm: 0.2, endClearanceMm: 0.2, outerClearanceMm: 0.3, pinMm: 0.8 },
  { upToMm: 31, wallMm: 1.25, flangeMm: 1.4, legClearanceMm: 0.25, endClearanceMm: 0.2, outerClearanceMm: 0.35, pinMm: 0.8 },
  { upToMm: Infinity, wallMm: 1.45, flangeMm: 1.5, legClearanceMm: 0.25, endClearanceMm: 0.25, outerClearanceMm: 0.4, pinMm: 1 },
]

const PITCHES_MM = [5.08, 3.81, 2.54] as const
const GRID_MM = 2.54
const RAIL_MM = 2.5
const STANDOFF_MM = 0.6
const PIN_LENGTH_MM = 3.5

/** What a coil former must look like to fit a core: everything here is derived, nothing is a maker's figure. */
export type DerivedFormer = Pick<
  FormerRow,
  | 'windingWidthMm'
  | 'windingHeightMm'
  | 'tube'
  | 'tubeWallMm'
  | 'flangeThicknessMm'
  | 'pins'
  | 'pinRowSpacingMm'
  | 'pinPitchMm'
  | 'pinSection'
  | 'pinLengthMm'
  | 'standoffMm'
  | 'mounting'
  | 'envelopeMm'
>

/** Null for a core without centre leg or without a published window. */
export function deriveFormer(core: CoreRow, pinCount: number | null): DerivedFormer | null {
  const { a, b, d, e, f } = core.dimensionsMm
  if (!core.centreLeg || a === null || b === null || d === null || e === null || f === null) return null

  const allowance = ALLOWANCES.find((entry) => e <= entry.upToMm)!
  const mounting = MOUNTING_BY_SHAPE[core.shape] ?? 'horizontal'
  const windingWidthMm = rounded(2 * d - 2 * (allowance.flangeMm + allowance.endClearanceMm))
  const windingHeightMm = rounded((e - f) / 2 - allowance.wallMm - allowance.legClearanceMm - allowance.outerClearanceMm)
  const pinsPerRow = pinCount === null ? genericPinsPerRow(a) : Math.ceil(pinCount / 2)
  const pinPitchMm = PITCHES_MM.find((pitch) => (pinsPerRow - 1) * pitch <= a + 2) ?? GRID_MM
  const pinRowSpacingMm = onGrid(mounting === 'horizontal' ? windingWidthMm + 2 * allowance.flangeMm + 3 : e)
  return {
    windingWidthMm,
    windingHeightMm,
    tube: tube(core.centreLeg, allowance),
    tubeWallMm: allowance.wallMm,
    flangeThicknessMm: allowance.flangeMm,
    pins: pinField(pinsPerRow, pinPitchMm, pinRowSpacingMm),
    pinRowSpacingMm,
    pinPitchMm,
    pinSection: { shape: 'round', sizeMm: allowance.pinMm },
    pinLengthMm: PIN_LENGTH_MM,
    standoffMm: STANDOFF_MM,
    mounting,
    envelopeMm: envelope(core, mounting, pinRowSpacingMm, (pinsPerRow - 1) * pinPitchMm, allowance.pinMm),
  }
}

/** Axis of the coil to the board: square and round cores stand on it, the others lie. */
const MOUNTING_BY_SHAPE: Partial<Record<CoreRow['shape'], FormerRow['mounting']>> = { PQ: 'vertical', RM: 'vertical', P: 'vertical' }

const onGrid = (lengthMm: number) => rounded(Math.ceil(lengthMm / GRID_MM - 1e-9) * GRID_MM)

const genericPinsPerRow = (coreWidthMm: number) => Math.min(8, Math.max(3, Math.floor(coreWidthMm / PITCHES_MM[0]) + 1))

function tube(leg: NonNullable<CoreRow['centreLeg']>, { wallMm, legClearanceMm }: Allowance): FormerRow['tube'] {
  const growthMm = 2 * (wallMm + legClearanceMm)
  if (leg.shape === 'round') return { shape: 'round', diameterMm: rounded(leg.diameterMm + growthMm) }
  return { shape: 'rectangular', widthMm: rounded(leg.widthMm + growthMm), depthMm: rounded(leg.depthMm + growthMm), cornerRadiusMm: wallMm }
}

/** Two rows, numbered from the upper left counter-clockwise as seen from above the board. */
function pinField(perRow: number, pitchMm: number, spacingMm: number): FormerRow['pins'] {
  const place = (index: number) => rounded(((perRow - 1) / 2 - index) * pitchMm)
  const left = Array.from({ length: perRow }, (_, index) => ({ number: String(index + 1), xMm: -spacingMm / 2, yMm: place(index) }))
  const right = Array.from({ length: perRow }, (_, index) => ({
    number: String(perRow + index + 1),
    xMm: spacingMm / 2,
    yMm: place(perRow - 1 - index),
  }))
  return [...left, ...right]
}

function envelope(core: CoreRow, mounting: FormerRow['mounting'], rowSpacingMm: number, rowMm: number, pinMm: number): FormerRow['envelopeMm'] {
  const { a, b, c, e, f } = core.dimensionsMm
  const overPinsMm = rowSpacingMm + pinMm + 2
  const width = rounded(Math.max(a!, rowMm + pinMm + 2))
  const under = RAIL_MM + STANDOFF_MM
  if (mounting === 'vertical') return { length: rounded(Math.max(c ?? e!, e!, overPinsMm)), width, height: rounded(2 * b! + under) }

  const legDepthMm = core.centreLeg?.shape === 'rectangular' ? core.centreLeg.depthMm : (f ?? 0)
  const coilDepthMm = legDepthMm + (e! - f!)
  return { length: rounded(Math.max(2 * b!, overPinsMm)), width, height: rounded(Math.max(c ?? 0, coilDepthMm) + under) }
}

import type { Layout } from '../evaluation'
import type { CoreRow, FormerRow } from '../library'
import { turnLengthMm } from '../build'
import { requireNotNegative, requirePositive } from '../require'

/**
 * The winding window as the field sees it: a rectangle whose four walls are highly permeable (no tangential field), in mm.
 * Places are counted `axial` from one yoke and `radial` from the face of the centre leg.
 */
export interface FieldWindow {
  /** Between the yokes. */
  breadthMm: number
  /** From the centre leg to the outer leg. */
  heightMm: number
  /** How the window goes round the leg. */
  depth: WindowDepth
}

/**
 * - `round`: round the axis of a leg of this radius; solved in cylindrical coordinates.
 * - `straight`: a plane field along turns whose length at the leg is given and grows outward by `growthPerMm` (2π where
 *   corners are rounded, 0 in a plane problem).
 */
export type WindowDepth = { kind: 'round'; legRadiusMm: number } | { kind: 'straight'; turnAtLegMm: number; growthPerMm: number }

/** Length of a turn at a radial place, mm. Source: geometry. @throws RangeError when the place is negative */
export function turnLengthAtMm(depth: WindowDepth, radialMm: number): number {
  requireNotNegative('radialMm', radialMm)
  return depth.kind === 'round' ? 2 * Math.PI * (depth.legRadiusMm + radialMm) : depth.turnAtLegMm + depth.growthPerMm * radialMm
}

/** @throws RangeError naming the dimension that is not positive */
export function requireWindow({ breadthMm, heightMm, depth }: FieldWindow): void {
  requirePositive('breadthMm', breadthMm)
  requirePositive('heightMm', heightMm)
  if (depth.kind === 'round') requirePositive('legRadiusMm', depth.legRadiusMm)
  else {
    requirePositive('turnAtLegMm', depth.turnAtLegMm)
    requireNotNegative('growthPerMm', depth.growthPerMm)
  }
}

/** A share of the magnetomotive force of the core path that lies on a stretch of a wall. */
export interface WallMmf {
  wall: 'leg' | 'outer'
  fromMm: number
  toMm: number
  share: number
}

/**
 * Where the magnetomotive force of a net ampere-turn is taken up: on stretches of the walls (air gaps), or evenly round
 * the whole window (distributed gap, ungapped core).
 */
export type GapMmf = { kind: 'walls'; strips: readonly WallMmf[] } | { kind: 'all-round' }

export interface GapPlace {
  position: 'centre-leg' | 'all-legs-spacer' | 'distributed' | 'none' | null
  /** Of the centre leg, or the thickness of the spacer; null or 0: none. */
  lengthMm: number | null
  grinding: 'one-half' | 'both-halves' | null
  /** Where the halves of the core meet: in the middle of the window, or at its end (EI). */
  joint: 'middle' | 'end'
}

/**
 * The air gap as its magnetomotive force on the walls. A spacer lies in the centre leg and in the outer ones, half of the
 * force in each; a gap ground into one half lies beside the middle (in the half at the start of the axis).
 *
 * Source: Ampère's law; equal areas of centre leg and outer legs together (IEC 63093 cores).
 */
export function gapMmf({ breadthMm }: FieldWindow, { position, lengthMm, grinding, joint }: GapPlace): GapMmf {
  const length = lengthMm ?? 0
  if (!(length > 0) || length >= breadthMm || position === 'distributed' || position === 'none') return { kind: 'all-round' }
  const middle = joint === 'end' ? breadthMm - length / 2 : breadthMm / 2
  const strip = (wall: WallMmf['wall'], centre: number, share: number): WallMmf => ({ wall, fromMm: centre - length / 2, toMm: centre + length / 2, share })
  if (position === 'all-legs-spacer') return { kind: 'walls', strips: [strip('leg', middle, 0.5), strip('outer', middle, 0.5)] }
  const centre = grinding === 'one-half' && joint === 'middle' ? Math.max(length / 2, middle - length / 2) : middle
  return { kind: 'walls', strips: [strip('leg', centre, 1)] }
}

/** How the layout lies in the window: the layout counts from the inside of the left flange and from the winding tube. */
export interface PlacedWindow {
  window: FieldWindow
  axialOffsetMm: number
  radialOffsetMm: number
  /** True when the window is the core's own, false when it is guessed from the coil former. */
  fromCore: boolean
}

/** A build beyond this many window heights is no coil whose field could be told. */
const GREATEST_OVERFILL = 3

/** Between flange and yoke, or tube and leg, where the core's dimensions are not known. */
const CLEARANCE_MM = 0.2

/**
 * Window of a core with the coil former in it; null for shapes without a rectangular window (ring cores, pot cores with
 * unknown window) and for a layout that overfills it threefold; one that overfills it less stretches it. Where the core's dimensions are not published the former with its walls stands for the window.
 *
 * Source: geometry; dimensions D (half window) and E, F of IEC 63093.
 */
export function placedWindow({ core, former, layout }: { core: CoreRow | null; former: FormerRow; layout: Layout }): PlacedWindow | null {
  if (core?.shape === 'toroid' || !(layout.windowWidthMm > 0) || !(former.windingHeightMm > 0)) return null
  const tubeHalfMm = former.tube.shape === 'round' ? former.tube.diameterMm / 2 : former.tube.widthMm / 2
  const outline = coreOutline(core, tubeHalfMm)
  const radialOffsetMm = outline ? tubeHalfMm - outline.legHalfMm : former.tubeWallMm + CLEARANCE_MM
  const aroundMm = former.flangeThicknessMm + CLEARANCE_MM
  const breadthMm = Math.max(outline?.breadthMm ?? 0, outline ? layout.windowWidthMm : layout.windowWidthMm + 2 * aroundMm)
  const builtMm = layout.items.reduce((top, item) => Math.max(top, topOf(item)), 0)
  const windowMm = outline?.heightMm ?? former.windingHeightMm + radialOffsetMm + CLEARANCE_MM
  const heightMm = Math.max(windowMm, radialOffsetMm + builtMm)
  if (heightMm > GREATEST_OVERFILL * windowMm) return null
  return {
    window: { breadthMm, heightMm, depth: depthOf(former, radialOffsetMm) },
    axialOffsetMm: (breadthMm - layout.windowWidthMm) / 2,
    radialOffsetMm,
    fromCore: outline !== null,
  }
}

function topOf(item: Layout['items'][number]): number {
  if (item.kind === 'turn') return item.yMm + item.overallMm / 2
  return item.kind === 'margin' ? item.yMm + item.heightMm : item.yMm + item.thicknessMm
}

function coreOutline(core: CoreRow | null, tubeHalfMm: number): { legHalfMm: number; breadthMm: number; heightMm: number } | null {
  const leg = core?.centreLeg
  const { d, e } = core?.dimensionsMm ?? { d: null, e: null }
  if (!leg || !(d !== null && d > 0) || e === null) return null
  const legHalfMm = (leg.shape === 'round' ? leg.diameterMm : leg.widthMm) / 2
  const heightMm = e / 2 - legHalfMm
  // An EI has its whole window in the E.
  return legHalfMm < tubeHalfMm && heightMm > 0 ? { legHalfMm, breadthMm: core?.shape === 'EI' ? d : 2 * d, heightMm } : null
}

/** Turns grow by 2π per millimetre on either tube; at the leg they are shorter than on the tube by 2π times the offset. */
function depthOf({ tube }: FormerRow, radialOffsetMm: number): WindowDepth {
  if (tube.shape === 'round') return { kind: 'round', legRadiusMm: Math.max(tube.diameterMm / 2 - radialOffsetMm, 1e-3) }
  return { kind: 'straight', turnAtLegMm: Math.max(turnLengthMm(tube, 0) - 2 * Math.PI * radialOffsetMm, 1e-3), growthPerMm: 2 * Math.PI }
}

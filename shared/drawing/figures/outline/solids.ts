import type { Layout } from '../../../engine/evaluation'
import type { CoreRow, FormerRow, Library } from '../../../engine/library'
import type { WindingSpecification } from '../../../engine/specification'
import { findRow } from '../../sheets/input'

export type Point3 = readonly [xMm: number, yMm: number, zMm: number]

/** A body of the part, in mm; x and y as the pins have them, z upwards from the seating plane. */
export type Solid = BoxSolid | PrismSolid | PinSolid | RingSolid

interface SolidBase {
  part: 'core' | 'former' | 'coil' | 'pin'
  tag: string
}

export interface BoxSolid extends SolidBase {
  shape: 'box'
  low: Point3
  high: Point3
}

/** A profile in two of the axes, drawn out along the third. */
export interface PrismSolid extends SolidBase {
  shape: 'prism'
  along: 0 | 1 | 2
  from: number
  to: number
  /** Points in the two other axes, in the order x, y, z. */
  profile: readonly (readonly [number, number])[]
}

export interface PinSolid extends SolidBase {
  shape: 'pin'
  round: boolean
  sizeMm: number
  center: readonly [xMm: number, yMm: number]
  low: number
  high: number
}

/** A ring with its axis along z. */
export interface RingSolid extends SolidBase {
  shape: 'ring'
  outsideMm: number
  insideMm: number
  low: number
  high: number
}

export interface PartSolids {
  solids: Solid[]
  /** What is drawn of the coil and the core, and what is not and why. */
  notes: string[]
}

/**
 * Core, coil former, coil and pins as simple bodies from the dimensions of the library rows. What the library does not
 * hold is not drawn, and said.
 */
export function partSolids(specification: WindingSpecification, library: Library, layout: Layout | null): PartSolids {
  const core = findRow(library, 'core', specification.core.core.value)
  const former = findRow(library, 'former', specification.former.former.value)
  const pins = pinSolids(specification)
  if (core?.shape === 'toroid') return ring(core, pins, layout)
  if (!core || !former) return { solids: pins, notes: [`${core ? 'The coil former' : 'The core'} is not in the library: only the stated envelope and pins are drawn.`] }
  const axis = former.mounting === 'vertical' ? 'z' : 'x'
  const sizes = coilSizes(core, former, layout)
  const place: Placing = { axis, centreMm: centreHeightMm(core, former, sizes) }
  const coreSolids = halves(core, place)
  const rails = railSolids(former, specification, place, sizes)
  return { solids: [...pins, ...rails, ...coil(former, place, sizes), ...coreSolids], notes: notesFor(coreSolids.length > 0, rails.length > 0) }
}

function notesFor(coreDrawn: boolean, rails: boolean): string[] {
  return [
    ...(coreDrawn ? ['Core and coil former simplified, from the dimensions of their library rows.'] : ['The library has no dimensions of the core: only coil former, pins and the stated envelope are drawn.']),
    ...(rails ? ['The library has no dimensions of the former’s pin rails: they are drawn around the pins.'] : []),
  ]
}

const PIN_SHOULDER_MM = 1

function pinSolids({ former }: WindingSpecification): PinSolid[] {
  const section = former.pinSection.value
  return former.pins
    .filter(({ state }) => state !== 'missing')
    .map((pin) => ({
      part: 'pin',
      tag: `pin:${pin.number}`,
      shape: 'pin',
      round: section?.shape !== 'square',
      sizeMm: section?.sizeMm ?? 0.6,
      center: [pin.xMm, pin.yMm],
      low: -(former.pinLengthMm.value ?? 0),
      high: former.standoffMm.value ?? 0,
    }))
}

interface Placing {
  /** Axis of the coil. */
  axis: 'x' | 'z'
  /** Height of the coil's centre over the seating plane. */
  centreMm: number
}

interface CoilSizes {
  /** Half of the flange's and of the coil's outside, along the core's width and along its depth. */
  flange: readonly [number, number]
  coil: readonly [number, number] | null
}

function coilSizes(core: CoreRow, former: FormerRow, layout: Layout | null): CoilSizes {
  const { tube } = former
  const half = tube.shape === 'round' ? [tube.diameterMm / 2, tube.diameterMm / 2] : [tube.widthMm / 2, tube.depthMm / 2]
  const grown = (by: number): [number, number] => [half[0]! + by, half[1]! + by]
  return { flange: grown(former.windingHeightMm), coil: layout && layout.buildMm > 0 ? grown(layout.buildMm) : null }
}

/** The library row's height is that of core or coil over the seating plane, whichever is higher. */
function centreHeightMm(core: CoreRow, former: FormerRow, { flange }: CoilSizes): number {
  const { height } = former.envelopeMm
  if (former.mounting === 'vertical') return height - (core.dimensionsMm.b ?? former.windingWidthMm / 2 + former.flangeThicknessMm)
  return height - Math.max((core.dimensionsMm.c ?? 0) / 2, flange[1])
}

/** Both halves with their outer legs and backs; the centre leg lies inside the coil. */
function halves({ dimensionsMm: { a, b, c, d, e } }: CoreRow, { axis, centreMm }: Placing): PrismSolid[] {
  if (a === null || b === null || c === null || d === null || e === null) return []
  const profile = (hand: 1 | -1): (readonly [number, number])[] =>
    ([[0, a / 2], [b, a / 2], [b, -a / 2], [0, -a / 2], [0, -e / 2], [d, -e / 2], [d, e / 2], [0, e / 2]] as const).map(([along, across]) =>
      axis === 'x' ? [hand * along, across] : [across, centreMm + hand * along],
    )
  const base = { part: 'core', tag: 'core', shape: 'prism' } as const
  return ([1, -1] as const).map((hand) =>
    axis === 'x' ? { ...base, along: 2, from: centreMm - c / 2, to: centreMm + c / 2, profile: profile(hand) } : { ...base, along: 0, from: -c / 2, to: c / 2, profile: profile(hand) },
  )
}

/** A box around the coil's axis: from and to along it, half sizes along the core's width and depth. */
function around({ axis, centreMm }: Placing, from: number, to: number, [width, depth]: readonly [number, number], part: 'former' | 'coil'): BoxSolid {
  const base = { part, tag: part, shape: 'box' } as const
  return axis === 'x'
    ? { ...base, low: [from, -width, centreMm - depth], high: [to, width, centreMm + depth] }
    : { ...base, low: [-depth, -width, centreMm + from], high: [depth, width, centreMm + to] }
}

function coil(former: FormerRow, place: Placing, { flange, coil: build }: CoilSizes): BoxSolid[] {
  const half = former.windingWidthMm / 2
  return [
    ...(build ? [around(place, -half, half, build, 'coil')] : []),
    around(place, half, half + former.flangeThicknessMm, flange, 'former'),
    around(place, -half - former.flangeThicknessMm, -half, flange, 'former'),
  ]
}

/** The body that carries each row of pins, from the standoff up to the flange. */
function railSolids(former: FormerRow, { former: stated }: WindingSpecification, { axis, centreMm }: Placing, { flange }: CoilSizes): BoxSolid[] {
  const pins = stated.pins
  if (pins.length === 0) return []
  const low = stated.standoffMm.value ?? former.standoffMm
  const top = axis === 'x' ? centreMm - flange[1] : centreMm - former.windingWidthMm / 2
  const inner = axis === 'x' ? former.windingWidthMm / 2 : flange[1]
  const ys = pins.map(({ yMm }) => yMm)
  const reach = former.pinSection.sizeMm / 2 + PIN_SHOULDER_MM
  return [1, -1].flatMap((hand): BoxSolid[] => {
    const xs = pins.map(({ xMm }) => xMm).filter((x) => Math.sign(x) === hand)
    if (xs.length === 0 || top <= low) return []
    const ends = [hand * Math.min(inner, ...xs.map((x) => Math.abs(x) - reach)), hand * (Math.max(...xs.map(Math.abs)) + reach)].sort((p, q) => p - q)
    return [{ part: 'former', tag: 'former', shape: 'box', low: [ends[0]!, Math.min(...ys) - reach, low], high: [ends[1]!, Math.max(...ys) + reach, top] }]
  })
}

function ring({ dimensionsMm: { a, b, c } }: CoreRow, pins: PinSolid[], layout: Layout | null): PartSolids {
  if (a === null || b === null || c === null) return { solids: pins, notes: ['The library has no dimensions of the ring core.'] }
  const standoff = Math.max(0, ...pins.map(({ high }) => high))
  const wound = layout?.ring
  if (!wound) return { solids: [...pins, { part: 'core', tag: 'core', shape: 'ring', outsideMm: a, insideMm: b, low: standoff, high: standoff + c }], notes: ['Ring core uncoated, from its library row; the coil adds to its size up to the stated envelope.'] }
  const coil: RingSolid = { part: 'coil', tag: 'coil', shape: 'ring', outsideMm: wound.overallOutsideMm, insideMm: wound.remainingHoleMm, low: standoff, high: standoff + wound.overallHeightMm }
  return { solids: [...pins, coil], notes: ['Wound ring as calculated from core and wire; leads are not drawn.'] }
}

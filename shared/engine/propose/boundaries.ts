import type { BoundaryEnd, InsulationBoundary, InsulationType, Side } from '../specification'
import type { Design, PlannedWinding } from './design'
import { PROPOSED } from './stated'

const SIDE_NAMES: Readonly<Record<Side, string>> = { primary: 'PRI', secondary: 'SEC', 'secondary-2': 'SEC2', 'secondary-3': 'SEC3', floating: 'FLT' }

/**
 * The whole list of boundaries: each pair of sides, each pair of windings of one side, each side with the core. The core
 * belongs to the primary's side, so that a protective boundary lies between it and every other side.
 */
export function planBoundaries({ windings, protective }: Design): InsulationBoundary[] {
  const sides = [...new Set(windings.map(({ side }) => side))]
  const between = pairs(sides).map(([one, other]) => boundary(`${SIDE_NAMES[one]}–${SIDE_NAMES[other]}`, [sideEnd(one), sideEnd(other)], protection(protective, one, other)))
  const within = sides.flatMap((side) => pairs(windings.filter((winding) => winding.side === side)).map(([one, other]) => boundary(`${one.name}–${other.name}`, [windingEnd(one), windingEnd(other)], 'functional')))
  const core = sides.map((side) => boundary(`${SIDE_NAMES[side]}–CORE`, [sideEnd(side), { kind: 'core' }], protective && side !== 'primary' ? 'reinforced' : 'functional'))
  return [...between, ...within, ...core].map((one, index) => ({ ...one, id: `b${index + 1}` }))
}

/** Reinforced against the primary; basic between secondaries that are parted on purpose. */
const protection = (protective: boolean, one: Side, other: Side): InsulationType => {
  if (!protective) return 'functional'
  return one === 'primary' || other === 'primary' ? 'reinforced' : 'basic'
}

const pairs = <T>(list: readonly T[]): [T, T][] => list.flatMap((one, index) => list.slice(index + 1).map((other): [T, T] => [one, other]))
const sideEnd = (side: Side): BoundaryEnd => ({ kind: 'side', side })
const windingEnd = ({ id }: PlannedWinding): BoundaryEnd => ({ kind: 'winding', windingId: id })

const boundary = (name: string, between: [BoundaryEnd, BoundaryEnd], insulation: InsulationType): InsulationBoundary => ({
  id: '',
  status: 'mandatory',
  origin: PROPOSED,
  name,
  between,
  insulation,
  workingVoltageVRms: null,
  recurringPeakV: null,
  frequencyHz: null,
  clearanceMm: null,
  creepageMm: null,
  distanceThroughInsulationMm: null,
  insulationLayers: null,
  test: null,
})

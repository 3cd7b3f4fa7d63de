import type { PathPoint, RingLayout } from '../evaluation'
import type { Winding } from '../specification'
import type { Path } from './path-geometry'

type Sector = RingLayout['sectors'][number]

/** Free arc from the end of one sector to the beginning of the other, going round once at most, rad. */
const arcRad = (one: Sector, other: Sector) => (((other.fromRad - one.toRad) % TURN) + TURN) % TURN
const TURN = 2 * Math.PI

/** The shortest way between two windings in sectors of their own, along the hole of a ring core; null where they share one. */
export function alongHole({ sectors, holeMm, sectorGapMm }: RingLayout, a: Winding, b: Winding): Path | null {
  const of = ({ id }: Winding) => sectors.filter(({ windingId }) => windingId === id)
  const pairs = of(a).flatMap((one) => of(b).map((other) => [one, other] as const))
  if (pairs.length === 0 || sectorGapMm === null || pairs.some(([one, other]) => one.section === other.section)) return null
  const ways = pairs.flatMap(([one, other]) => [{ fromRad: one.toRad, arc: arcRad(one, other) }, { fromRad: other.toRad, arc: arcRad(other, one) }])
  const nearest = ways.reduce((least, way) => (way.arc < least.arc ? way : least))
  const radiusMm = holeMm / 2
  const at = (angle: number): PathPoint => [radiusMm * Math.cos(angle), radiusMm * Math.sin(angle)]
  return { lengthMm: Math.max(0, sectorGapMm), layers: 0, thicknessMm: 0, how: 'along the hole of the ring from sector to sector', plane: 'ring', points: [at(nearest.fromRad), at(nearest.fromRad + nearest.arc)], through: [] }
}

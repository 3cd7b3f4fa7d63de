import { COPPER_DENSITY_KG_PER_M3 } from '../constants'
import type { Coil, StepPlacement } from '../build'
import type { FormerRow, WireRow } from '../library'
import type { Conductor } from '../losses/conductor'
import type { Winding, WindingSpecification } from '../specification'
import { positive } from './context'
import type { Context } from './context'

const GRAMS_PER_MM3 = COPPER_DENSITY_KG_PER_M3 * 1e-6

/** What a winding is made of, before any current. */
export interface WindingCopper {
  winding: Winding
  index: number
  wire: WireRow
  conductor: Conductor
  copperAreaMm2: number
  wireLengthM: number
  /** Both free ends together. */
  leadsMm: number
  meanTurnLengthMm: number
  resistance20Ohm: number
  massG: number
}

/**
 * Length of both leads from the winding to the terminals, mm: half the winding width on the way to the flange, the
 * flange, the standoff and two wraps round the pin, at each end. Source: geometry of a former with pins; common practice.
 */
export function leadLengthMm(former: FormerRow): number {
  const wraps = former.pinSection.shape === 'round' ? 2 * Math.PI * former.pinSection.sizeMm : 8 * former.pinSection.sizeMm
  return 2 * (former.windingWidthMm / 2 + former.flangeThicknessMm + former.standoffMm + wraps)
}

/** Free ends of a winding on a ring, each. Source: common practice. */
const RING_LEAD_MM = 20

const leadsMm = ({ former }: Pick<Context, 'former'>, coil: Coil): number => (former ? leadLengthMm(former) : coil.layout.ring ? 2 * RING_LEAD_MM : 0)

/** Copper of every winding that is laid and whose wire is known. */
export function windingCoppers(context: Context, coil: Coil | null): WindingCopper[] {
  const { specification } = context
  if (!coil) return []
  return specification.windings.flatMap((winding, index) => {
    const build = coil.windings.get(winding.id)
    const wire = context.index.find('wire', winding.wire.wire)
    if (!build || !wire || !positive(build.turnsLengthM)) return []
    const placement = coil.placements.find(({ windingId }) => windingId === winding.id)!
    const parallel = Math.max(1, Math.floor(winding.wire.parallel))
    const areaMm2 = wire.form === 'foil' && wire.widthMm === null ? wire.conductorMm * (placement.rightMm - placement.leftMm) : wire.copperAreaMm2
    const wireLengthM = build.turnsLengthM + leadsMm(context, coil) / 1000
    const copper: WindingCopper = {
      winding,
      index,
      wire,
      conductor: conductorOf(wire, placement, parallel),
      copperAreaMm2: areaMm2 * parallel,
      wireLengthM,
      leadsMm: leadsMm(context, coil),
      meanTurnLengthMm: build.meanTurnLengthMm,
      // The wires in parallel lie side by side in the same layers, so they are of one length.
      resistance20Ohm: (wire.resistance20.nominalOhmPerM * wireLengthM) / parallel,
      massG: areaMm2 * parallel * wireLengthM * 1000 * GRAMS_PER_MM3,
    }
    return [copper]
  })
}

/** Copper of a foil shield with the overlap of its ends, all sections, g; null where it is not laid or is wound of wire. */
export function shieldMassG({ sequence }: Pick<WindingSpecification, 'sequence'>, coil: Coil | null, windingId: string): number | null {
  const own = coil?.shields.filter((shield) => shield.windingId === windingId) ?? []
  const masses = own.map(({ index, bottomMm, topMm, leftMm, rightMm, turnLengthMm }) => {
    const step = sequence[index]
    return step?.kind === 'shield' && step.form === 'foil' ? (topMm - bottomMm) * (rightMm - leftMm) * (turnLengthMm + step.overlapMm) * GRAMS_PER_MM3 : null
  })
  return masses.length > 0 && masses.every((massG) => massG !== null) ? masses.reduce((sum, massG) => sum + massG, 0) : null
}

/** Strands of litz fill their bundle to about this where the library gives no overall diameter. Source: square packing, π/4, and enamel. */
const LITZ_FILL = 0.5

/** Foils in parallel lie on each other and are joined at both ends, so the field sees one thick foil. */
function conductorOf(wire: WireRow, { rightMm, leftMm }: StepPlacement, parallel: number): Conductor {
  if (wire.form === 'foil') return { kind: 'foil', thicknessMm: wire.conductorMm * parallel, breadthMm: rightMm - leftMm }
  if (wire.form === 'round') return { kind: 'round', diameterMm: wire.conductorMm }
  const overall = Object.values(wire.overallMm).filter((diameterMm) => diameterMm !== null && diameterMm > 0) as number[]
  const filled = wire.conductorMm * Math.sqrt(wire.strands / LITZ_FILL)
  return { kind: 'litz', strandDiameterMm: wire.conductorMm, strands: Math.max(1, Math.round(wire.strands)), bundleDiameterMm: overall.length > 0 ? Math.min(...overall) : filled }
}

import type { Coil } from '../build'
import { TURN_FIELD_MODEL, turnFieldInput, turnFields } from '../field'
import type { CopperModel } from '../losses/copper-loss'
import { inConductorFields, inFlatField } from '../losses/layers'
import type { LaidLayer } from '../losses/layers'
import { attempt } from './context'
import type { Context } from './context'
import type { WindingCopper } from './copper'
import { laidLayers, layerOfConductors } from './copper-layers'
import { laidCoil } from './field'

export const FLAT_FIELD_MODEL = 'one-dimensional: along the layers over the whole window, gap spread along the leg (Dowell 1966, Vandelac and Ziogas 1988)'

/** The copper loss in both fields; null where one of them does not apply. */
export interface CopperModels {
  /** In the field of single wires between the walls, with the gap where it is. */
  local: CopperModel | null
  /** In the field along the layers; not where windings lie beside each other in sections. */
  flat: CopperModel | null
}

/** Wires beyond which the local field is not worth its time; such layers are long and nearly alike. */
const MOST_CONDUCTORS = 3000

export function copperModels(context: Context, coil: Coil | null, { coppers, gapMm }: { coppers: readonly WindingCopper[]; gapMm: number | null }): CopperModels {
  if (!coil || coppers.length === 0) return { local: null, flat: null }
  const windings = context.specification.windings.length
  const resistance20Ohm = Array.from({ length: windings }, (_, index) => coppers.find((copper) => copper.index === index)?.resistance20Ohm ?? 0)
  const layers = attempt(context, 'sequence', () => laidLayers(context, coil, coppers))
  if (!layers) return { local: null, flat: null }
  const local = attempt(context, 'sequence', () => localLayers(context, coil, { layers, gapMm }))
  const flat = attempt(context, 'sequence', () => inFlatField(layers, windings, { breadthMm: windowBreadthMm(context, coil), innerShare: innerShare(context) }))
  return {
    local: local && { resistance20Ohm, layers: local, field: TURN_FIELD_MODEL },
    flat: flat && (!local || new Set(layers.map(({ section }) => section)).size === 1) ? { resistance20Ohm, layers: flat, field: FLAT_FIELD_MODEL } : null,
  }
}

function localLayers(context: Context, coil: Coil, { layers, gapMm }: { layers: readonly LaidLayer[]; gapMm: number | null }) {
  const layerOf = layerOfConductors(layers, coil.layout.items)
  const laid = laidCoil(context, coil, gapMm)
  if (!layerOf || !laid || layerOf.length > MOST_CONDUCTORS) return null
  const { windingIds, hx, hy } = turnFields(turnFieldInput(laid))
  return inConductorFields(layers, context.specification.windings.length, { layerOf, stride: windingIds.length, along: hx, across: hy })
}

/** Between the yokes: twice dimension D of the core, else the coil former with its flanges. */
function windowBreadthMm({ core, former }: Context, { layout }: Coil): number {
  const coreMm = 2 * (core?.dimensionsMm.d ?? 0)
  return coreMm >= layout.windowWidthMm ? coreMm : layout.windowWidthMm + 2 * (former?.flangeThicknessMm ?? 0)
}

const innerShare = ({ specification }: Context) => (specification.core.gap.position.value === 'all-legs-spacer' ? 0.5 : 1)

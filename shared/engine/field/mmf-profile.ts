import type { CurrentLayer } from './layers'
import { currentLayers } from './layers'
import type { LaidCoil } from './layout-turns'
import { gapMmf } from './window'
import type { GapMmf } from './window'

/** A layer with the magnetomotive force on either side of it, ampere per ampere of each winding (order of `windingIds`). */
export interface LayerMmf extends CurrentLayer {
  inner: Float64Array
  outer: Float64Array
}

export interface MmfProfile {
  windingIds: readonly string[]
  layers: readonly LayerMmf[]
  /** Breadth of the window, over which the one-dimensional field lies: H = mmf/breadth, in the sense of `hx` of `turnFields`. */
  breadthMm: number
  model: string
}

export const PROFILE_MODEL = 'one-dimensional: magnetomotive force across the real layers, field along the axis over the breadth of the window'

/**
 * The quasi-static one-dimensional field: the magnetomotive force inside and outside every layer, from the leg outward. The
 * gap takes up the net ampere-turns: of the centre leg, the field outside the coil is nil; of a spacer, half lies on each side;
 * of the even kind, each wall has its share of the window's circumference.
 *
 * Source: Ampère's law; the field diagram of P. Dowell, Proc. IEE 113 (1966) 1387.
 */
export function mmfProfile(coil: LaidCoil): MmfProfile {
  const layers = currentLayers(coil)
  const windingIds = [...new Set([...coil.windings.map(({ id }) => id), ...layers.map(({ windingId }) => windingId)])]
  const outerShare = outerShareOf(gapMmf(coil.placed.window, coil.gap))
  const at = (radialMm: number) => {
    const mmf = new Float64Array(windingIds.length)
    for (const layer of layers) {
      const beyond = Math.min(1, Math.max(0, (layer.toMm - radialMm) / (layer.toMm - layer.fromMm)))
      mmf[windingIds.indexOf(layer.windingId)]! += layer.turns * (outerShare - beyond)
    }
    return mmf
  }
  return { windingIds, layers: layers.map((layer) => ({ ...layer, inner: at(layer.fromMm), outer: at(layer.toMm) })), breadthMm: coil.placed.window.breadthMm, model: PROFILE_MODEL }
}

/** Share of the net magnetomotive force on the outer wall. Evenly round the window the yokes carry some too; the profile sees half on each side. */
export function outerShareOf(gap: GapMmf): number {
  if (gap.kind === 'all-round') return 0.5
  return gap.strips.filter(({ wall }) => wall === 'outer').reduce((sum, { share }) => sum + share, 0)
}

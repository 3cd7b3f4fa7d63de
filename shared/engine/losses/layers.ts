import { requirePositive } from '../require'
import type { Conductor } from './conductor'
import type { LayerInField } from './copper-loss'
import { pairCount } from './spectrum'

/** One layer of a winding where it lies, before any field. */
export interface LaidLayer {
  winding: number
  stepId: string
  /** Counted from 1 within its step. */
  layer: number
  /** Section of the coil former, counted from 1. */
  section: number
  /** Middle of its height above the winding tube. */
  middleMm: number
  turns: number
  /** Conductors of each turn that lie side by side and carry the same current each. */
  parallel: number
  turnLengthM: number
  conductor: Conductor
  inverseSquaresPerMm2: number
  /** False for a shield, whose turn is open. */
  carries: boolean
}

export interface FlatWindow {
  /** Breadth of the core's window, in which the field lies. */
  breadthMm: number
  /** Share of the net ampere-turns that the centre leg takes up: 1 for its gap, ½ for a spacer under all legs. */
  innerShare: number
}

/**
 * The layers in a field that lies along them everywhere, by Ampère's law from the centre leg outward: at a layer's middle
 * H = (−g·N + Σ turns below + ½·own turns)/b for each ampere of a winding of N turns. What gap or core take up of the net
 * ampere-turns is spread along the leg. Sections of a former are taken each for itself.
 *
 * Source: P. Dowell, Proc. IEE 113 (1966) 1387; J.-P. Vandelac and P. Ziogas, IEEE Trans. Power Electron. 3 (1988) 334.
 *
 * @throws RangeError unless the window has a breadth
 */
export function inFlatField(layers: readonly LaidLayer[], windings: number, { breadthMm, innerShare }: FlatWindow): LayerInField[] {
  requirePositive('breadthMm', breadthMm)
  const perM = 1000 / breadthMm
  const lengths = windingLengths(layers, windings)
  const inField = new Map<LaidLayer, LayerInField>()
  for (const section of new Set(layers.map((layer) => layer.section))) {
    const own = layers.filter((layer) => layer.section === section).sort((a, b) => a.middleMm - b.middleMm)
    const fieldA = new Float64Array(windings)
    for (const { winding, turns, carries } of own) if (carries) fieldA[winding]! -= innerShare * turns * perM
    for (const layer of own) {
      const half = layer.carries ? (layer.turns * perM) / 2 : 0
      fieldA[layer.winding]! += half
      const field = emptyLayer(layer, windings, lengths)
      addSquares(field.along, fieldA, 0, windings, layer.turns * layer.parallel * layer.turnLengthM)
      inField.set(layer, field)
      fieldA[layer.winding]! += half
    }
  }
  return byWinding(layers).map((layer) => inField.get(layer)!)
}

/** The fields at the conductors in the order of the layout: `along[t · W + w]` in A/m per A of winding w, the own wire left out. */
export interface ConductorFields {
  /** Index in the list of layers that each conductor belongs to; −1 for one that belongs to none. */
  layerOf: Int32Array
  /** Windings that the fields are listed for, W; at least as many as are asked for. */
  stride: number
  along: Float64Array
  across: Float64Array
}

/** The layers in a field known at each of their conductors. */
export function inConductorFields(layers: readonly LaidLayer[], windings: number, { layerOf, stride, along, across }: ConductorFields): LayerInField[] {
  const lengths = windingLengths(layers, windings)
  const inField = layers.map((layer) => emptyLayer(layer, windings, lengths))
  layerOf.forEach((index, conductor) => {
    const layer = layers[index]
    if (!layer) return
    addSquares(inField[index]!.along, along, conductor * stride, windings, layer.turnLengthM)
    addSquares(inField[index]!.across, across, conductor * stride, windings, layer.turnLengthM)
  })
  return byWinding(layers).map((layer) => inField[layers.indexOf(layer)]!)
}

/** Layers of one winding behind each other, so that what they share is computed once. */
const byWinding = (layers: readonly LaidLayer[]) => [...layers].sort((a, b) => a.winding - b.winding)

const windingLengths = (layers: readonly LaidLayer[], windings: number) => {
  const lengths = new Float64Array(windings)
  for (const { winding, turns, turnLengthM } of layers) lengths[winding]! += turns * turnLengthM
  return lengths
}

const emptyLayer = ({ winding, conductor, inverseSquaresPerMm2, turns, turnLengthM }: LaidLayer, windings: number, lengths: Float64Array): LayerInField => ({
  winding,
  conductor,
  inverseSquaresPerMm2,
  share: lengths[winding]! > 0 ? (turns * turnLengthM) / lengths[winding]! : 0,
  along: new Float64Array(pairCount(windings)),
  across: new Float64Array(pairCount(windings)),
})

function addSquares(into: Float64Array, fieldA: Float64Array, from: number, windings: number, weight: number): void {
  for (let i = 0, at = 0; i < windings; i++) {
    for (let k = i; k < windings; k++, at++) into[at]! += weight * fieldA[from + i]! * fieldA[from + k]!
  }
}

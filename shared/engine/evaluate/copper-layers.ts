import type { Coil, StepPlacement } from '../build'
import type { LayoutItem } from '../evaluation'
import { rowInverseSquares } from '../losses/conductor'
import type { LaidLayer } from '../losses/layers'
import type { Context } from './context'
import type { WindingCopper } from './copper'

/** Every layer of wire, foil and shield with what the field needs of it. */
export function laidLayers({ specification }: Context, coil: Coil, coppers: readonly WindingCopper[]): LaidLayer[] {
  const rows = rowsOf(coil.layout.items)
  const wound = coil.placements.flatMap((placement) => {
    const copper = coppers.find(({ winding }) => winding.id === placement.windingId)
    return copper ? layersOf(placement, copper, rows) : []
  })
  const indexOf = new Map(specification.windings.map(({ id }, index) => [id, index]))
  return [...wound, ...shieldLayers(coil, indexOf)]
}

/** Name of a layer for the items that belong to it. */
const layerKey = (stepId: string, layer: number) => `${layer} ${stepId}`

/** Places along the former of the wires of each layer. */
function rowsOf(items: readonly LayoutItem[]): Map<string, number[]> {
  const rows = new Map<string, number[]>()
  for (const item of items) {
    if (item.kind !== 'turn') continue
    const key = layerKey(item.stepId, item.layer)
    const row = rows.get(key)
    if (row) row.push(item.xMm)
    else rows.set(key, [item.xMm])
  }
  return rows
}

function layersOf(placement: StepPlacement, { index, conductor, winding }: WindingCopper, rows: ReadonlyMap<string, number[]>): LaidLayer[] {
  const parallel = conductor.kind === 'foil' ? 1 : Math.max(1, Math.floor(winding.wire.parallel))
  return placement.layers.map(({ turns, bottomMm, topMm, turnLengthMm, pitchMm }, layer) => {
    const row = rows.get(layerKey(placement.stepId, layer + 1)) ?? evenRow(turns * parallel, pitchMm / parallel)
    return {
      winding: index,
      stepId: placement.stepId,
      layer: layer + 1,
      section: placement.section,
      middleMm: (bottomMm + topMm) / 2,
      turns,
      parallel,
      turnLengthM: turnLengthMm / 1000,
      conductor,
      inverseSquaresPerMm2: conductor.kind === 'foil' ? 0 : rowInverseSquares(row),
      carries: true,
    }
  })
}

/** Where the turns are too many to be listed they are taken at an even pitch. */
const evenRow = (wires: number, pitchMm: number) => Array.from({ length: Math.min(wires, 201) }, (_, wire) => wire * pitchMm)

/** A shield is an open turn of foil: it carries no current and loses by the field it lies in. */
function shieldLayers({ shields }: Coil, indexOf: ReadonlyMap<string, number>): LaidLayer[] {
  return shields.flatMap(({ stepId, windingId, section, bottomMm, topMm, leftMm, rightMm, turnLengthMm }): LaidLayer[] => {
    const winding = indexOf.get(windingId)
    if (winding === undefined || !(topMm > bottomMm) || !(rightMm > leftMm)) return []
    const conductor = { kind: 'foil' as const, thicknessMm: topMm - bottomMm, breadthMm: rightMm - leftMm }
    return [{ winding, stepId, layer: 1, section, middleMm: (bottomMm + topMm) / 2, turns: 1, parallel: 1, turnLengthM: turnLengthMm / 1000, conductor, inverseSquaresPerMm2: 0, carries: false }]
  })
}

/**
 * The layer that each wire and foil of the layout belongs to, in the order of the layout; null where the layout does not list
 * every one of them.
 */
export function layerOfConductors(layers: readonly LaidLayer[], items: readonly LayoutItem[]): Int32Array | null {
  const indexOf = new Map(layers.map(({ stepId, layer }, index) => [layerKey(stepId, layer), index]))
  const shields = new Map<string, number[]>()
  layers.forEach(({ stepId, carries }, index) => {
    if (!carries) shields.set(stepId, [...(shields.get(stepId) ?? []), index])
  })
  const foils = new Map<string, number>()
  const list = items.filter(({ kind }) => kind === 'turn' || kind === 'foil').map((item) => {
    if (item.kind === 'turn') return indexOf.get(layerKey(item.stepId, item.layer)) ?? -1
    // Foils of one step are its layers one after another, shields of one step lie in the sections.
    const place = foils.get(item.stepId) ?? 0
    foils.set(item.stepId, place + 1)
    return shields.get(item.stepId)?.[place] ?? indexOf.get(layerKey(item.stepId, place + 1)) ?? -1
  })
  const wanted = layers.reduce((sum, { turns, parallel }) => sum + turns * parallel, 0)
  return list.filter((index) => index >= 0).length === wanted ? Int32Array.from(list) : null
}

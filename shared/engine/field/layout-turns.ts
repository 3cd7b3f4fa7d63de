import type { Layout, LayoutItem } from '../evaluation'
import type { Winding } from '../specification'
import type { FieldTurn, TurnFieldInput } from './turn-fields'
import { gapMmf } from './window'
import type { GapPlace, PlacedWindow } from './window'

export interface LaidCoil {
  layout: Layout
  windings: readonly (Pick<Winding, 'id'> & { wire: Pick<Winding['wire'], 'parallel'> })[]
  placed: PlacedWindow
  gap: GapPlace
}

type Conductor = Extract<LayoutItem, { kind: 'turn' | 'foil' }>

export const isConductor = (item: LayoutItem): item is Conductor => item.kind === 'turn' || item.kind === 'foil'

/**
 * The laid coil as the field takes it, one turn for each layout item of kind `turn` or `foil`, in the order of the layout.
 * What a layout that does not fit lays outside the window is moved to its edge.
 */
export function turnFieldInput({ layout, windings, placed, gap }: LaidCoil): TurnFieldInput {
  const parallel = new Map(windings.map(({ id, wire }) => [id, Math.max(1, Math.floor(wire.parallel))]))
  const conductors = layout.items.filter(isConductor)
  const windingIds = [...new Set([...windings.map(({ id }) => id), ...conductors.map(({ windingId }) => windingId)])]
  const indexOf = new Map(windingIds.map((id, index) => [id, index]))
  return {
    window: placed.window,
    gap: gapMmf(placed.window, gap),
    windingIds,
    turns: conductors.map((item) => fieldTurn(item, placed, indexOf.get(item.windingId)!, parallel.get(item.windingId) ?? 1)),
  }
}

function fieldTurn(item: Conductor, { window, axialOffsetMm, radialOffsetMm }: PlacedWindow, winding: number, parallel: number): FieldTurn {
  const radial = (mm: number) => between(mm + radialOffsetMm, 0, window.heightMm)
  if (item.kind === 'turn') {
    return { winding, turn: item.turn, strand: item.strand, share: 1 / parallel, foilBreadthMm: null, axialMm: between(item.xMm + axialOffsetMm, 0, window.breadthMm), radialMm: radial(item.yMm) }
  }
  const foilBreadthMm = Math.min(item.widthMm, window.breadthMm)
  const axialMm = between(item.xMm + item.widthMm / 2 + axialOffsetMm, foilBreadthMm / 2, window.breadthMm - foilBreadthMm / 2)
  return { winding, turn: item.turn, strand: 1, share: 1, foilBreadthMm, axialMm, radialMm: radial(item.yMm + item.thicknessMm / 2) }
}

const between = (value: number, least: number, most: number): number => Math.min(most, Math.max(least, value))

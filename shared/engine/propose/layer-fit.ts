import { mostTurnsPerLayer } from '../build'
import type { WireRow } from '../library'
import { GREATEST_DENSITY_SHARE, greatestDiameterMm, MOST_PARALLEL, useOf } from './wire'
import type { ChosenWire, WireNeed } from './wire'

/** A last layer emptier than this is a bump in the coil and a step in the field. Source: common practice. */
export const LEAST_LAST_LAYER = 0.3

/** Below this a last layer is better shared out evenly among all of them. */
const EVEN_BELOW = 0.5

/** Thinner wire breaks at pins that are thick against it; where it costs no layer, this is taken. Source: common practice. */
const STURDY_DIAMETER_MM = 0.2

export interface LayerRoom {
  availableMm: number
  /** Turns of each step that the winding is laid in. */
  parts: readonly number[]
}

interface Bundle {
  row: WireRow
  parallel: number
}

const overallOf = ({ row, parallel }: Bundle, { insulation }: WireNeed) => row.overallMm[insulation]! * parallel

/** Layers of one step, and how full the last one is when the others are filled first. */
export function layersOf(turns: number, availableMm: number, bundleMm: number): { layers: number; most: number; lastFill: number } {
  const most = Math.max(1, mostTurnsPerLayer(availableMm, bundleMm))
  const layers = Math.max(1, Math.ceil(turns / most))
  return { layers, most, lastFill: (turns - (layers - 1) * most) / most }
}

/** Layers that a step should be shared among evenly; null where filling one after the other leaves no nearly empty one. */
export function evenLayers(turns: number, availableMm: number, bundleMm: number): number | null {
  const { layers, lastFill } = layersOf(turns, availableMm, bundleMm)
  return layers > 1 && lastFill < EVEN_BELOW ? layers : null
}

/**
 * The wire chosen by current, fitted to the width of the former: sturdier where thicker wire takes no more layers, and thinner
 * or with another number in parallel where this saves a last layer of a few turns.
 */
export function fitToLayers(chosen: ChosenWire, need: WireNeed, { room, stock }: { room: LayerRoom; stock: readonly WireRow[] }): ChosenWire {
  if (chosen.row.form !== 'round' || chosen.makeshift) return chosen
  const bundle = { row: chosen.row, parallel: chosen.use.parallel }
  const fitted = sturdier(bundle, need, { room, stock }) ?? withoutRest(bundle, need, { room, stock }) ?? bundle
  return { ...chosen, row: fitted.row, use: useOf(fitted, need) }
}

interface Options {
  room: LayerRoom
  stock: readonly WireRow[]
}

const layersIn = (bundle: Bundle, need: WireNeed, { availableMm, parts }: LayerRoom) =>
  parts.reduce((sum, turns) => sum + layersOf(turns, availableMm, overallOf(bundle, need)).layers, 0)

function sturdier(bundle: Bundle, need: WireNeed, { room, stock }: Options): Bundle | null {
  if (bundle.parallel > 1 || bundle.row.conductorMm >= STURDY_DIAMETER_MM) return null
  const layers = layersIn(bundle, need, room)
  const thicker = stock
    .filter(({ conductorMm }) => conductorMm > bundle.row.conductorMm && conductorMm <= STURDY_DIAMETER_MM * 1.02 && conductorMm <= greatestDiameterMm(need))
    .sort((a, b) => b.conductorMm - a.conductorMm)
  const row = thicker.find((wire) => layersIn({ row: wire, parallel: 1 }, need, room) <= layers)
  return row ? { row, parallel: 1 } : null
}

/** Among the wires that need fewer layers and none nearly empty, the one with the most copper. */
function withoutRest(bundle: Bundle, need: WireNeed, { room, stock }: Options): Bundle | null {
  const emptyIn = (one: Bundle) => room.parts.some((turns) => {
    const { layers, lastFill } = layersOf(turns, room.availableMm, overallOf(one, need))
    return layers > 1 && lastFill < LEAST_LAST_LAYER
  })
  if (!emptyIn(bundle)) return null
  const layers = layersIn(bundle, need, room)
  const areaMm2 = ({ row, parallel }: Bundle) => row.copperAreaMm2 * parallel
  const leastMm2 = need.rmsA / (need.currentDensityAPerMm2 * GREATEST_DENSITY_SHARE)
  const options = stock
    .filter(({ conductorMm }) => conductorMm <= greatestDiameterMm(need))
    .flatMap((row) => Array.from({ length: MOST_PARALLEL }, (_, index): Bundle => ({ row, parallel: index + 1 })))
    .filter((one) => areaMm2(one) >= leastMm2 && layersIn(one, need, room) < layers && !emptyIn(one))
    .sort((a, b) => areaMm2(b) - areaMm2(a) || a.parallel - b.parallel)
  return options[0] ?? null
}

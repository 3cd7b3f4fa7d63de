import { tailGrowth } from '../waveforms/fourier'
import { resistanceFactor } from '../wires/resistance'
import { conductorResponse, inLayer } from './conductor'
import type { Conductor, ConductorLoss, ConductorResponse, LossPoint } from './conductor'
import { pairIndex } from './spectrum'
import type { CurrentSpectrum } from './spectrum'

/** One layer of a winding in the field of all windings. */
export interface LayerInField {
  /** Index of the winding it belongs to. */
  winding: number
  conductor: Conductor
  /** Σ 1/x² to the other conductors of the layer, mean, 1/mm². */
  inverseSquaresPerMm2: number
  /** Share of its winding's length of conductor. */
  share: number
  /** Σ length·H_i·H_k over the conductors, in m·(A/m)² per A², for each pair of windings: the component along the layer, the own wire left out. */
  along: Float64Array
  /** The same for the component across the layer. */
  across: Float64Array
}

/** All that decides the copper loss but for currents, frequency and temperature. */
export interface CopperModel {
  /** At 20 °C, with leads, all conductors in parallel; 0 for a shield, which carries no current. */
  resistance20Ohm: readonly number[]
  layers: readonly LayerInField[]
  /** Name of the field that the layers lie in. */
  field: string
}

export interface WindingCopperLoss {
  dcW: number
  /** By the winding's own alternating current as if it were alone: what it loses in the dc resistance, and skin effect. */
  skinW: number
  /** By the field of all windings and the gap in its conductors. */
  proximityW: number
  /** What the field of the other windings alone would lose in it. */
  idleW: number
  /** Ac loss over what the ac rms current loses in the dc resistance; null without alternating current. */
  acFactor: number | null
}

export interface CopperLoss {
  windings: WindingCopperLoss[]
  totalW: number
  /** Orders summed; beyond them the loss is estimated and contained in the figures. */
  orders: number
  /** That estimate over the ac loss. */
  tailShare: number
}

/** Orders are summed until what is left makes less of the ac loss than this. */
export const TAIL_SHARE = 0.01

/** No more orders than this are summed: a current with ideal jumps would take thousands. */
export const MOST_ORDERS = 256

/** Greatest factor that the estimate of the rest may have over its value at the last order. */
const GREATEST_TAIL_GROWTH = 4

/** Sums of one working point, per winding. */
interface Sums {
  skin: Float64Array
  proximity: Float64Array
  idle: Float64Array
}

const emptySums = (windings: number): Sums => ({ skin: new Float64Array(windings), proximity: new Float64Array(windings), idle: new Float64Array(windings) })

/**
 * Copper loss of all windings in watt, sum over the orders n of
 *
 *     R·F(n)·|I_n|² + Σ_layers [g_along(n)·I_nᴴ·A·I_n + g_across(n)·I_nᴴ·C·I_n]
 *
 * A and C are the layer's sums of field products. The orders are summed until the rest, known exactly in its currents by Parseval and
 * estimated in its factors from the last orders (`tailGrowth`), is at most `TAIL_SHARE` of the ac loss, or to `MOST_ORDERS`; the rest is
 * added to the result.
 *
 * Source: C. Sullivan, Computationally efficient winding loss calculation with multiple windings, arbitrary waveforms and
 * two-dimensional or three-dimensional field geometry, IEEE Trans. Power Electron. 16 (2001) 142 (field products); factors as `inLayer`.
 *
 * @throws RangeError on a value out of its range
 */
export function copperLoss(model: CopperModel, spectrum: CurrentSpectrum, temperatureC: number, { tailShare = TAIL_SHARE, mostOrders = MOST_ORDERS, orders: asked = null }: CopperLossOptions = {}): CopperLoss {
  const sums = emptySums(spectrum.windings)
  const rest = Float64Array.from(spectrum.acProductsA2)
  const last = asked ?? mostOrders
  let tail: Tail = { sums: emptySums(spectrum.windings), lossW: 0, bounded: true }
  let orders = 0
  let nextCheck = asked ?? FIRST_CHECK
  for (let index = 0; orders < last && hasRest(rest, spectrum); index++) {
    const band = spectrum.bandAt(index)
    if (!band) break
    addProducts(sums, model, band.productsA2, { frequencyHz: spectrum.frequencyHz * band.middleOrder, temperatureC })
    for (let at = 0; at < rest.length; at++) rest[at]! -= band.productsA2[at]!
    orders = band.lastOrder
    if (orders < nextCheck && orders < last) continue
    nextCheck = orders * CHECK_GROWTH
    tail = tailOf(model, { spectrum, rest, orders, temperatureC })
    if (tail.bounded && tail.lossW <= tailShare * (tail.lossW + acLossW(sums))) break
  }
  return result(model, spectrum, { sums, tail, orders, temperatureC })
}

export interface CopperLossOptions {
  tailShare?: number
  mostOrders?: number
  /** Sums so many orders and asks no more; null: until the rest is small. */
  orders?: number | null
}

const FIRST_CHECK = 6
const CHECK_GROWTH = 1.4

/** Rounding leaves about 10⁻¹⁶ of the mean square. */
const hasRest = (rest: Float64Array, { acProductsA2, windings }: CurrentSpectrum) => {
  for (let w = 0; w < windings; w++) {
    const at = pairIndex(w, w, windings)
    if (rest[at]! > 1e-12 * acProductsA2[at]!) return true
  }
  return false
}

const sum = (values: Float64Array) => values.reduce((total, value) => total + value, 0)
const acLossW = ({ skin, proximity }: Sums) => sum(skin) + sum(proximity)

function addProducts(sums: Sums, { layers, resistance20Ohm }: CopperModel, products: Float64Array, point: LossPoint): void {
  const windings = resistance20Ohm.length
  const hot = resistanceFactor(point.temperatureC)
  let response: ConductorResponse | null = null
  for (const layer of layers) {
    const w = layer.winding
    // Layers of one winding follow each other and are of one conductor.
    if (response?.conductor !== layer.conductor) response = conductorResponse(layer.conductor, point)
    const loss = inLayer(response, layer.inverseSquaresPerMm2)
    sums.skin[w]! += resistance20Ohm[w]! * hot * layer.share * loss.ownFactor * products[pairIndex(w, w, windings)]!
    addProximity(sums, layer, { loss, products, windings })
  }
}

function addProximity(sums: Sums, { winding, along, across }: LayerInField, { loss, products, windings }: { loss: ConductorLoss; products: Float64Array; windings: number }): void {
  let own = 0
  let others = 0
  for (let i = 0, at = 0; i < windings; i++) {
    for (let k = i; k < windings; k++, at++) {
      const part = (i === k ? 1 : 2) * products[at]! * (loss.alongWPerM * along[at]! + loss.acrossWPerM * across[at]!)
      if (i === winding || k === winding) own += part
      else others += part
    }
  }
  sums.proximity[winding]! += own + others
  sums.idle[winding]! += others
}

// ---------------------------------------------------------------------------------------------

interface Tail {
  sums: Sums
  lossW: number
  /** Whether the estimate has an end. */
  bounded: boolean
}

/** Loss of the orders that were not summed: their currents by Parseval, their factors grown from those of the last order. */
function tailOf(model: CopperModel, { spectrum, rest, orders, temperatureC }: { spectrum: CurrentSpectrum; rest: Float64Array; orders: number; temperatureC: number }): Tail {
  const clean = withoutRounding(rest, spectrum.windings)
  const [last, octave] = [orders, 2 * orders].map((order) => {
    const sums = emptySums(spectrum.windings)
    addProducts(sums, model, clean, { frequencyHz: spectrum.frequencyHz * order, temperatureC })
    return sums
  }) as [Sums, Sums]
  const lossW = acLossW(last)
  const power = lossW > 0 ? Math.log2(acLossW(octave) / lossW) : 0
  const growth = tailGrowth({ lastOrder: orders, edge: spectrum.edge, power })
  const factor = Math.min(growth, GREATEST_TAIL_GROWTH)
  const grown = (values: Float64Array) => values.map((value) => value * factor)
  return { sums: { skin: grown(last.skin), proximity: grown(last.proximity), idle: grown(last.idle) }, lossW: lossW * factor, bounded: growth <= GREATEST_TAIL_GROWTH }
}

/** What is left of the products, without what rounding makes impossible: no negative square, no product beyond its squares. */
function withoutRounding(rest: Float64Array, windings: number): Float64Array {
  const clean = new Float64Array(rest.length)
  const square = (w: number) => Math.max(0, rest[pairIndex(w, w, windings)]!)
  for (let i = 0, at = 0; i < windings; i++) {
    for (let k = i; k < windings; k++, at++) {
      const most = Math.sqrt(square(i) * square(k))
      clean[at] = Math.min(most, Math.max(-most, rest[at]!))
    }
  }
  return clean
}

function result({ resistance20Ohm }: CopperModel, { dcA, acProductsA2, windings }: CurrentSpectrum, input: { sums: Sums; tail: Tail; orders: number; temperatureC: number }): CopperLoss {
  const { sums, tail, orders, temperatureC } = input
  const hot = resistanceFactor(temperatureC)
  const list = Array.from({ length: windings }, (_, w): WindingCopperLoss => {
    const resistanceOhm = resistance20Ohm[w]! * hot
    const skinW = sums.skin[w]! + tail.sums.skin[w]!
    const proximityW = Math.max(0, sums.proximity[w]! + tail.sums.proximity[w]!)
    const plainW = resistanceOhm * acProductsA2[pairIndex(w, w, windings)]!
    return { dcW: resistanceOhm * dcA[w]! ** 2, skinW, proximityW, idleW: Math.max(0, sums.idle[w]! + tail.sums.idle[w]!), acFactor: plainW > 0 ? (skinW + proximityW) / plainW : null }
  })
  const acW = list.reduce((total, { skinW, proximityW }) => total + skinW + proximityW, 0)
  return { windings: list, totalW: list.reduce((total, { dcW }) => total + dcW, acW), orders, tailShare: acW > 0 ? tail.lossW / acW : 0 }
}

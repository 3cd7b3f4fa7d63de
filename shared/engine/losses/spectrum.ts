import { requireCount } from '../require'
import { meanProduct, offsetWaveform } from '../waveforms/combine'
import { edgeOrder, fourierSeries } from '../waveforms/fourier'
import type { FourierSeries } from '../waveforms/fourier'
import { mean } from '../waveforms/statistics'
import type { Waveform } from '../waveforms/waveform'
import type { Complex } from './round-wire'

/** Some neighbouring orders whose products are added, since the loss factors hardly differ between them. */
export interface SpectrumBand {
  firstOrder: number
  lastOrder: number
  /** Order at which the band's factors are taken. */
  middleOrder: number
  /** Σ Re(I_i·I_k*) of the rms phasors of every pair of windings, in A², pairs as `pairIndex`. */
  productsA2: Float64Array
}

/** The currents of all windings in one working point as the loss stage takes them. */
export interface CurrentSpectrum {
  frequencyHz: number
  windings: number
  dcA: Float64Array
  /** Mean of the product of the alternating parts over the period, exact: what the products of all orders add up to. */
  acProductsA2: Float64Array
  /** Order from which the amplitudes of all currents fall as 1/n². */
  edge: number
  /** Band counted from 0; computed when asked for. Null where no more alternating current is left. */
  bandAt: (index: number) => SpectrumBand | null
}

export const pairCount = (windings: number) => (windings * (windings + 1)) / 2

/** Place of the pair (i, k) in a list of pairs, i ≤ k: row by row of the upper triangle. */
export const pairIndex = (i: number, k: number, windings: number) => i * windings - (i * (i - 1)) / 2 + (k - i)

/**
 * Orders are taken one by one up to the eighth, then in bands of an eighth of their first order: a loss that grows as n² is met
 * within 2·10⁻³ there, and by the geometric mean of the band's ends less than that in the sum.
 */
const SINGLE_ORDERS = 8
const BAND_SHARE = 1 / 8

/**
 * Spectrum of the currents of all windings, null where a winding carries none.
 *
 * @throws RangeError when there is no winding or the periods differ
 */
export function currentSpectrum(currentsA: readonly (Waveform | null)[], periodS: number): CurrentSpectrum {
  requireCount('windings', currentsA.length)
  const windings = currentsA.length
  for (const wave of currentsA) if (wave && wave.periodS !== periodS) throw new RangeError(`currents must have the period ${periodS}: ${wave.periodS}`)
  const dcA = Float64Array.from(currentsA, (wave) => (wave ? mean(wave) : 0))
  const ac = currentsA.map((wave, index) => wave && offsetWaveform(wave, -dcA[index]!))
  const bands: SpectrumBand[] = []
  return {
    frequencyHz: 1 / periodS,
    windings,
    dcA,
    acProductsA2: pairs(windings, (i, k) => (ac[i] && ac[k] ? meanProduct(ac[i], ac[k]) : 0)),
    edge: Math.max(0, ...currentsA.map((wave) => (wave ? edgeOrder(wave) : 0))),
    bandAt: (index) => {
      while (bands.length <= index) bands.push(bandAfter(bands.at(-1)?.lastOrder ?? 0, currentsA))
      return bands[index]!
    },
  }
}

function pairs(windings: number, of: (i: number, k: number) => number): Float64Array {
  const list = new Float64Array(pairCount(windings))
  for (let i = 0, at = 0; i < windings; i++) for (let k = i; k < windings; k++, at++) list[at] = of(i, k)
  return list
}

function bandAfter(order: number, currentsA: readonly (Waveform | null)[]): SpectrumBand {
  const firstOrder = order + 1
  const count = order < SINGLE_ORDERS ? 1 : Math.ceil(firstOrder * BAND_SHARE)
  const series = currentsA.map((wave) => wave && fourierSeries(wave, count, firstOrder))
  const lastOrder = order + count
  return { firstOrder, lastOrder, middleOrder: Math.sqrt(firstOrder * lastOrder), productsA2: pairs(currentsA.length, (i, k) => productOf(series[i], series[k])) }
}

function productOf(a: FourierSeries | null | undefined, b: FourierSeries | null | undefined): number {
  if (!a || !b) return 0
  let sum = 0
  for (let index = 0; index < a.re.length; index++) sum += a.re[index]! * b.re[index]! + a.im[index]! * b.im[index]!
  // Peak values in the series, so half their product.
  return sum / 2
}

/**
 * Spectrum of sine currents at one frequency by their rms phasors, e.g. of stated values without waveforms.
 *
 * @throws RangeError when there is no winding
 */
export function phasorSpectrum(rmsA: readonly Complex[], frequencyHz: number, dcA: readonly number[] = []): CurrentSpectrum {
  requireCount('windings', rmsA.length)
  const productsA2 = pairs(rmsA.length, (i, k) => rmsA[i]!.re * rmsA[k]!.re + rmsA[i]!.im * rmsA[k]!.im)
  return {
    frequencyHz,
    windings: rmsA.length,
    dcA: Float64Array.from(rmsA, (_, index) => dcA[index] ?? 0),
    acProductsA2: productsA2,
    edge: 0,
    bandAt: (index) => (index === 0 ? { firstOrder: 1, lastOrder: 1, middleOrder: 1, productsA2 } : null),
  }
}

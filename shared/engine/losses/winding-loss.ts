import { requireCount, requirePositive } from '../require'
import { harmonics } from '../waveforms/fourier'
import { acRms, mean } from '../waveforms/statistics'
import type { Waveform } from '../waveforms/waveform'
import { skinDepthMm } from '../wires/skin-depth'
import type { ConductorMetal } from '../wires/resistance'
import { dowellFactor, heightInSkinDepths } from './dowell'
import type { EquivalentLayer } from './dowell'

export interface WindingLossInput {
  currentA: Waveform
  /** At the conductor's temperature. */
  dcResistanceOhm: number
  layer: EquivalentLayer
  /** Layers from the place of no field to that of the full field; ½ is allowed. */
  layers: number
  temperatureC: number
  metal?: ConductorMetal
  harmonicsCount: number
}

export interface WindingLoss {
  model: 'one-dimensional'
  dcLossW: number
  acLossW: number
  totalLossW: number
  /** Ac loss over what the ac rms current would lose in the dc resistance; 1 without ac. */
  acResistanceFactor: number
  /** Ratio of ac to dc resistance at the fundamental. */
  fundamentalFactor: number
  /** Share of the ac mean square beyond the last harmonic; it is charged with that harmonic's factor. */
  restFraction: number
}

/**
 * Copper loss of a winding in watt, R_dc·(I_dc² + Σ F(n)·I_n²), F by Dowell at each harmonic.
 *
 * One-dimensional field: what the windings beside carry at the same time is in the number of layers only. Where windings
 * conduct in turn (flyback), the true loss lies between this and the local field's.
 * Source: P. Dowell, Proc. IEE 113 (1966) 1387; L. Dixon, SLUP127.
 *
 * @throws RangeError on a value out of its range
 */
export function windingLoss(input: WindingLossInput): WindingLoss {
  const { currentA, dcResistanceOhm, layer, layers, temperatureC, metal, harmonicsCount } = input
  requirePositive('dcResistanceOhm', dcResistanceOhm)
  requireCount('harmonicsCount', harmonicsCount)
  const depthMm = skinDepthMm({ frequencyHz: 1 / currentA.periodS, temperatureC, metal })
  const x1 = heightInSkinDepths(layer, depthMm)
  const factorOf = (order: number) => dowellFactor({ heightInSkinDepths: x1 * Math.sqrt(order), layers })
  const acMeanSquareA2 = acRms(currentA) ** 2
  let weightedA2 = 0
  let countedA2 = 0
  for (const { order, rms } of harmonics(currentA, harmonicsCount)) {
    weightedA2 += factorOf(order) * rms ** 2
    countedA2 += rms ** 2
  }
  const restA2 = Math.max(0, acMeanSquareA2 - countedA2)
  const acLossW = dcResistanceOhm * (weightedA2 + restA2 * factorOf(harmonicsCount))
  const dcLossW = dcResistanceOhm * mean(currentA) ** 2
  return {
    model: 'one-dimensional',
    dcLossW,
    acLossW,
    totalLossW: dcLossW + acLossW,
    acResistanceFactor: acMeanSquareA2 > 0 ? acLossW / (dcResistanceOhm * acMeanSquareA2) : 1,
    fundamentalFactor: factorOf(1),
    restFraction: acMeanSquareA2 > 0 ? restA2 / acMeanSquareA2 : 0,
  }
}

import { requirePositive } from '../require'

export interface FixedPointInput {
  ambientC: number
  /** Loss in watt at a temperature of the part in °C. */
  lossW: (temperatureC: number) => number
  /** Rise in kelvin under a loss in watt. */
  riseK: (lossW: number) => number
  /** Search no hotter than this; the laws must hold up to it. */
  ceilingC: number
}

export type FixedPoint =
  | {
      state: 'settled'
      temperatureC: number
      lossW: number
      /** d(rise)/dT there: 1 is the edge of thermal runaway, negative where loss falls with temperature. */
      loopGain: number
    }
  /** The part is hotter than the ceiling, or never settles. */
  | { state: 'runaway'; temperatureC: number; lossW: number }

const STEP_K = 1
const TOLERANCE_K = 1e-6

/**
 * The coolest temperature at which the rise of its own loss carries the part: T = T_amb + rise(loss(T)).
 * Searched upwards in steps of 1 K from ambient, then by bisection, so a loss that grows too fast is told as runaway.
 *
 * Source: heat balance.
 *
 * @throws RangeError unless the ceiling lies above ambient
 */
export function settleTemperature({ ambientC, lossW, riseK, ceilingC }: FixedPointInput): FixedPoint {
  requirePositive('ceilingC - ambientC', ceilingC - ambientC)
  const missingK = (temperatureC: number) => ambientC + riseK(lossW(temperatureC)) - temperatureC
  let lowC = ambientC
  let highC = ambientC
  while (missingK(highC) > 0) {
    if (highC >= ceilingC) return { state: 'runaway', temperatureC: ceilingC, lossW: lossW(ceilingC) }
    lowC = highC
    highC = Math.min(ceilingC, highC + STEP_K)
  }
  while (highC - lowC > TOLERANCE_K) {
    const middleC = (lowC + highC) / 2
    if (missingK(middleC) > 0) lowC = middleC
    else highC = middleC
  }
  return { state: 'settled', temperatureC: highC, lossW: lossW(highC), loopGain: loopGainAt(highC, lossW, riseK) }
}

function loopGainAt(temperatureC: number, lossW: FixedPointInput['lossW'], riseK: FixedPointInput['riseK']): number {
  const halfStepK = 0.05
  return (riseK(lossW(temperatureC + halfStepK)) - riseK(lossW(temperatureC - halfStepK))) / (2 * halfStepK)
}

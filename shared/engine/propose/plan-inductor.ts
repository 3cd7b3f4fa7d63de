import type { InductorDuty } from '../duties/inductor'
import { boostInductorState, buckInductorState, lineBoostState } from '../topologies/inductor'
import type { InductorState } from '../topologies/inductor'
import type { Plan, WindingNeed } from './plan'
import { greatestLoad } from './sizing'

/** Current limit over the greatest peak where none is stated. Source: common practice. */
const ASSUMED_LIMIT_SHARE = 1.25

/**
 * An inductor solved for its inductance, L = V_on·D/(f·ΔI), at the input where the ripple is greatest: a buck's maximum, a
 * boost's nearest to half the output; on the line at its crest or where the line passes half the output.
 *
 * Source: R. Erickson and D. Maksimović, Fundamentals of Power Electronics, ch. 2 and 18.
 *
 * @throws RangeError when the duty cannot be solved
 */
export function planInductor(duty: InductorDuty): Plan {
  const { supply, switchingFrequencyHz: frequencyHz, currentLimit } = duty
  const inputs = [supply.minimumV, supply.nominalV, supply.maximumV]
  const unit = inputs.map((inputV) => stateAt(duty, inputV, 1))
  // A ripple falls as the inductance rises: that of one henry, over the ripple asked, is the inductance.
  const inductanceH = Math.max(...unit.map(({ rippleA, meanA }) => rippleA / (duty.rippleRatio * meanA)))
  const states = inputs.map((inputV) => stateAt(duty, inputV, inductanceH))
  const load = greatestLoad(states.map(({ state }) => state.currentA))
  const peakA = Math.max(...states.map((one) => one.peakA))
  const greatestV = supply.maximumV * (supply.kind === 'line' ? Math.SQRT2 : 1)
  const powerW = duty.outputVoltageV * duty.outputCurrentA
  const limit = currentLimit
  return {
    frequencyHz,
    inductanceH,
    powerW,
    onMains: supply.kind === 'line',
    worstCurrentA: (ofH) => (limit ? Math.max(limit.nominalA * (1 + limit.tolerance) + (greatestV * limit.delayS) / ofH, peakA) : ASSUMED_LIMIT_SHARE * peakA),
    windings: (least): WindingNeed[] => [{ id: 'w1', name: 'L', role: 'primary', side: 'primary', outputId: null, partnerId: null, turns: Math.max(1, Math.ceil(least - 1e-9)), ...load, powerW }],
    findings: limit ? [] : [{ code: 'current-limit-assumed', severity: 'warning', path: 'requirement.duty.currentLimit', values: { assumedA: ASSUMED_LIMIT_SHARE * peakA } }],
    reasons: [{ code: 'inductance-from-ripple', path: 'electrical.inductance', values: { inductanceH, rippleA: Math.max(...states.map(({ rippleA }) => rippleA)), meanA: states[0]!.meanA, frequencyHz } }],
  }
}

interface Point {
  state: InductorState
  rippleA: number
  meanA: number
  peakA: number
}

function stateAt(duty: InductorDuty, inputV: number, inductanceH: number): Point {
  const { outputVoltageV, outputCurrentA, efficiency, switchingFrequencyHz: frequencyHz } = duty
  if (duty.use === 'line-boost') {
    const line = lineBoostState({ lineVoltageV: inputV, outputVoltageV, rectifierDropV: duty.outputDropV, inputPowerW: (outputVoltageV * outputCurrentA) / efficiency, frequencyHz, inductanceH })
    return { state: line.equivalent, rippleA: line.greatestRippleA, meanA: (Math.SQRT2 * outputVoltageV * outputCurrentA) / (efficiency * inputV), peakA: line.greatestPeakA }
  }
  const of = { inputVoltageV: inputV, switchDropV: duty.switchDropV, outputVoltageV, rectifierDropV: Math.max(duty.outputDropV, outputVoltageV * (1 / efficiency - 1)), outputCurrentA, frequencyHz, inductanceH }
  const state = duty.use === 'buck' ? buckInductorState(of) : boostInductorState(of)
  return { state, rippleA: state.rippleA, meanA: (state.peakCurrentA + state.minimumCurrentA) / 2, peakA: state.peakCurrentA }
}

import { currentSlopesAPerS, seriesCapacitorInductorState } from '../topologies/coupled-inductor'
import { maximum, mean } from '../waveforms/statistics'
import { sumWaveforms } from '../waveforms/combine'
import type { CoupledInductorDuty } from '../specification'
import type { Plan, WindingNeed } from './plan'
import { greatestLoad } from './sizing'
import type { CurrentLoad } from './sizing'

const ASSUMED_LIMIT_SHARE = 1.25

/** Coupling of a part with unequal turns before it is laid out. Source: common practice, 0.95 to 0.99. */
const ASSUMED_COUPLING = 0.97

/**
 * A coupled inductor solved for its inductance: both windings see the same volts per turn, so the ripple divides and each
 * has half of what it would have alone, L = V·D/(2·f·ΔI). With unequal turns the leakage steers the ripple, by the inductance
 * matrix with an assumed coupling; a finding says so.
 *
 * Source: R. Severns and G. Bloom, Modern DC-to-DC Switchmode Power Converter Circuits.
 *
 * @throws RangeError when the duty cannot be solved
 */
export function planCoupled(duty: CoupledInductorDuty): Plan {
  const { supply, switchingFrequencyHz: frequencyHz } = duty
  const inputV = supply.minimumV - duty.switchDropV
  const offV = Math.max(duty.outputVoltageV + duty.outputDropV, duty.outputVoltageV / duty.efficiency)
  if (!(inputV > 0)) throw new RangeError(`switchDropV must be below the minimum input: ${duty.switchDropV}`)
  const dutyRatio = offV / (inputV + offV)
  const rippleA = (duty.rippleRatio * duty.outputCurrentA * offV) / inputV
  const inductanceH = ((duty.ratio === 1 ? inputV / 2 : steeredSlope(duty.ratio, inputV)) * dutyRatio) / (frequencyHz * rippleA)
  const stateAt = (voltageV: number) =>
    seriesCapacitorInductorState({ pair: { turns: [1, duty.ratio], inductanceH, coupling: duty.ratio === 1 ? 1 : ASSUMED_COUPLING }, inputVoltageV: voltageV - duty.switchDropV, outputVoltageV: duty.outputVoltageV, rectifierDropV: offV - duty.outputVoltageV, outputCurrentA: duty.outputCurrentA, frequencyHz })
  const states = [supply.minimumV, supply.nominalV, supply.maximumV].map(stateAt)
  const loads = ([0, 1] as const).map((index) => greatestLoad(states.map(({ windings }) => windings[index].currentA)))
  const peakA = maximum(sumWaveforms(states[0]!.windings.map(({ currentA }) => currentA)))
  const limit = duty.currentLimit
  const weight = Math.max(1, duty.ratio)
  const powerW = duty.outputVoltageV * duty.outputCurrentA
  const windings = (least: number): WindingNeed[] => {
    const turns = Math.max(1, Math.ceil(least - 1e-9))
    // A 1:1 part is wound with one wire, so that its windings may be exchanged.
    const [one, other] = loads as [CurrentLoad, CurrentLoad]
    const greater = one.rmsA >= other.rmsA ? one : other
    const [first, second] = duty.ratio === 1 ? [greater, greater] : [one, other]
    return [
      { id: 'w1', name: 'L1', role: 'primary', side: 'primary', outputId: null, partnerId: null, turns, ...first, powerW },
      { id: 'w2', name: 'L2', role: 'secondary', side: 'secondary', outputId: null, partnerId: null, turns: Math.max(1, Math.round(turns * duty.ratio)), ...second, powerW },
    ]
  }
  return {
    frequencyHz,
    inductanceH,
    powerW,
    onMains: false,
    worstCurrentA: (ofH) => (limit ? limit.nominalA * (1 + limit.tolerance) * weight + (supply.maximumV * limit.delayS) / ofH : ASSUMED_LIMIT_SHARE * peakA * weight),
    windings,
    findings: [
      ...(limit ? [] : [{ code: 'current-limit-assumed' as const, severity: 'warning' as const, path: 'requirement.duty.currentLimit', values: { assumedA: ASSUMED_LIMIT_SHARE * peakA } }]),
      ...(duty.ratio === 1 ? [] : [{ code: 'ratio-steers-ripple' as const, severity: 'warning' as const, path: 'requirement.duty.ratio', values: { ratio: duty.ratio, coupling: ASSUMED_COUPLING } }]),
    ],
    reasons: [{ code: 'inductance-from-ripple', path: 'electrical.inductance', values: { inductanceH, rippleA, meanA: mean(states[0]!.windings[0].currentA), frequencyHz } }],
  }
}

/** Rate of the first winding's current at one henry, V/H; at least a quarter of both windings' together, where it is steered to nothing. */
function steeredSlope(ratio: number, inputV: number): number {
  const [first, second] = currentSlopesAPerS({ turns: [1, ratio], inductanceH: 1, coupling: ASSUMED_COUPLING }, [inputV, inputV])
  return Math.max(Math.abs(first), Math.abs(first + second) / 4)
}

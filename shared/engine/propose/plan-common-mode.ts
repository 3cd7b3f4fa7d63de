import type { CommonModeChokeDuty } from '../duties/common-mode-choke'
import { commonModeChokeState } from '../topologies/common-mode-choke'
import type { Plan, WindingNeed } from './plan'
import { greatestLoad } from './sizing'

/** Leakage over inductance of two windings beside each other on one former or ring. Source: common practice, 0.5 to 2 %. */
const ASSUMED_LEAKAGE_SHARE = 0.02

/**
 * A common-mode choke solved for the inductance that its impedance asks for at the lowest stated frequencies, L = Z/(2π·f),
 * without a gap; the line current magnetises the core by its leakage alone.
 *
 * Source: M. Nave, Power Line Filter Design for Switched-Mode Power Supplies.
 *
 * @throws RangeError when no impedance is asked, or on a value out of its range
 */
export function planCommonMode(duty: CommonModeChokeDuty): Plan {
  const { impedance, lineCurrentA, linePeakA, lineFrequencyHz } = duty
  const lowest = [...impedance].sort((a, b) => a.frequencyHz - b.frequencyHz)[0]
  if (!lowest) throw new RangeError('impedance must have a point')
  const inductanceH = lowest.minimumOhm / (2 * Math.PI * lowest.frequencyHz)
  const state = commonModeChokeState({ turns: 1, inductanceH, differentialLeakageH: 0, lineRmsA: lineCurrentA, linePeakA, lineFrequencyHz })
  const load = greatestLoad([state.windings[0].currentA])
  const powerW = duty.ratedVoltageV * lineCurrentA
  const windings = (least: number): WindingNeed[] => {
    const turns = Math.max(1, Math.ceil(least - 1e-9))
    return (['L', 'N'] as const).map((name, index): WindingNeed => ({ id: `w${index + 1}`, name, role: index === 0 ? 'primary' : 'secondary', side: 'primary', outputId: null, partnerId: null, turns, ...load, powerW }))
  }
  return {
    // The wire carries the line's frequency; noise is too small to heat it.
    frequencyHz: Math.max(lineFrequencyHz, 1),
    materialUse: 'common-mode',
    inductanceH,
    // The volt-seconds of noise are small: permeability alone sets the turns.
    transformer: { worstVs: 0, steadyVs: 0, steadySwingT: 0.2, gapped: false, leastInductance: true, waveform: 'sine' },
    powerW,
    onMains: false,
    worstCurrentA: () => ASSUMED_LEAKAGE_SHARE * linePeakA,
    windings,
    findings: [],
    reasons: [{ code: 'inductance-for-impedance', path: 'electrical.inductance', values: { inductanceH, impedanceOhm: lowest.minimumOhm, frequencyHz: lowest.frequencyHz } }],
  }
}

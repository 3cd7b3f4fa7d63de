import type { FullBridgeDuty, HalfBridgeDuty, PushPullDuty } from '../duties/bridges'
import type { ForwardDuty } from '../duties/forward'
import type { Finding } from '../findings'
import type { Plan } from './plan'
import { lossFactor, planFrom, planRange } from './plan-transformer'

/** Share of the longest pulse that the least input uses at full load: the rest is for regulation. Source: common practice. */
const PULSE_SHARE = 0.95

/** Steady swings that a transformer's core begins with; hot cores get more turns. Source: common practice for power ferrite. */
const FORWARD_SWING_T = 0.2
const BRIDGE_SWING_T = 0.4

/** Magnetising over reflected load current that the first waveforms assume; an ungapped core takes less. */
const MAGNETISING_SHARE = 0.1

/**
 * A forward converter or a bridge solved for its ratio: at least input and the longest pulse the outputs still have their voltage,
 * n = U_s·D/(U_o + U_F). The core has no gap; turns follow from the volt-seconds.
 *
 * Source: Erickson and Maksimović, Fundamentals of Power Electronics, ch. 6 and 15.
 *
 * @throws RangeError when the duty cannot be solved
 */
export function planForced(duty: ForwardDuty | HalfBridgeDuty | FullBridgeDuty | PushPullDuty): Plan {
  const findings: Finding[] = []
  const range = planRange(duty, findings)
  const isForward = duty.topology === 'forward'
  const sourceShare = duty.topology === 'half-bridge' ? 0.5 : 1
  const pulses = isForward ? 1 : 2
  const main = duty.outputs.find(({ role }) => role === 'main') ?? duty.outputs[0]!
  const pulseV = range.minimumV * sourceShare - duty.switchDropV
  if (!(pulseV > 0)) throw new RangeError(`switchDropV must be below the least primary voltage: ${duty.switchDropV}`)
  const longest = isForward ? longestForward(duty) : Math.min(0.5, duty.maximumDutyRatio)
  const pulseShare = PULSE_SHARE * pulses * longest
  const ratio = (pulseV * pulseShare) / ((Math.abs(main.voltageV) + main.rectifierDropV) * lossFactor(duty))
  const worstVs = ((range.maximumV * sourceShare - duty.switchDropV) * longest) / duty.switchingFrequencyHz
  const steadyVs = (pulseV * PULSE_SHARE * longest) / duty.switchingFrequencyHz
  const reflectedA = duty.outputs.reduce((sum, { fullLoadCurrentA, voltageV }) => sum + fullLoadCurrentA * Math.abs(voltageV), 0) / (Math.abs(main.voltageV) * ratio)
  return planFrom({
    duty,
    range,
    ratio,
    isLimit: true,
    resetShare: isForward && duty.reset === 'reset-winding' ? (1 - longest) / longest : null,
    inductanceH: steadyVs / (MAGNETISING_SHARE * reflectedA),
    transformer: { worstVs, steadyVs, steadySwingT: isForward ? FORWARD_SWING_T : BRIDGE_SWING_T, gapped: false, waveform: isForward ? 'unipolar-pulse' : 'bipolar-pulse' },
    findings,
    reasons: [{ code: 'ratio-from-duty', path: 'windings', values: { ratio, dutyRatio: pulseShare / pulses, minimumV: range.minimumV } }],
  })
}

/** With two switches the core resets at the input voltage: neither conduction nor reset may take more than half the period. */
const longestForward = ({ reset, maximumDutyRatio }: ForwardDuty): number => (reset === 'two-switch' ? Math.min(0.5, maximumDutyRatio) : maximumDutyRatio)

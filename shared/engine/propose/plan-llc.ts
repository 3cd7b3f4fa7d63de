import type { LlcDuty } from '../duties/llc'
import type { Finding } from '../findings'
import { llcForOutput } from '../topologies/llc'
import type { LlcTank } from '../topologies/llc'
import type { Plan } from './plan'
import { lossFactor, planFrom, planRange } from './plan-transformer'

/** Magnetising over resonant inductance, greatest first: the less current circulates, the less it costs. Source: common practice, 3 to 10. */
const RATIOS = [10, 8, 7, 6, 5, 4.5, 4, 3.5, 3, 2.5]

/** Charge for switching at zero voltage over what the switched node needs. Source: common practice. */
const CHARGE_MARGIN = 1.2

const STEADY_SWING_T = 0.4

/**
 * A resonant half bridge solved for its ratio and magnetising inductance: the gain is 1 at nominal input, and the greatest inductance is
 * taken with which full load at the least input is reached within the controller's range and the switches close at zero voltage.
 *
 * Source: time-domain steady state of `llcForOutput`; ratio of inductances by common practice.
 *
 * @throws RangeError when the duty cannot be solved
 */
export function planLlc(duty: LlcDuty): Plan {
  const findings: Finding[] = []
  const range = planRange(duty, findings)
  const main = duty.outputs.find(({ role }) => role === 'main') ?? duty.outputs[0]!
  const windingV = Math.abs(main.voltageV) + main.rectifierDropV
  const ratio = (range.nominalV - duty.switchDropV) / 2 / windingV
  if (!(ratio > 0)) throw new RangeError(`switchDropV must be below the input: ${duty.switchDropV}`)
  const outputV = ratio * windingV
  const currentA = (lossFactor(duty) * duty.outputs.reduce((sum, { voltageV, rectifierDropV, fullLoadCurrentA }) => sum + (Math.abs(voltageV) + rectifierDropV) * fullLoadCurrentA, 0)) / outputV
  const tank = (inputV: number, share: number): LlcTank => ({ sourceV: (inputV - duty.switchDropV) / 2, resonantInductanceH: duty.resonantInductanceH, resonantCapacitanceF: duty.resonantCapacitanceF, magnetisingInductanceH: share * duty.resonantInductanceH })
  const suits = (share: number) => reaches(duty, tank(range.minimumV, share), { outputV, outputA: currentA }) && switchesAtZero(duty, tank(range.maximumV, share), { outputV, inputV: range.maximumV })
  const share = RATIOS.find(suits)
  if (share === undefined) findings.push({ code: 'gain-not-reachable', severity: 'error', path: 'requirement.duty.resonantInductanceH', values: { inputV: range.minimumV, gain: bestGain(tank(range.minimumV, RATIOS[RATIOS.length - 1]!), { outputV, outputA: currentA }), needed: outputV / tank(range.minimumV, 1).sourceV } })
  const inductanceH = (share ?? RATIOS[RATIOS.length - 1]!) * duty.resonantInductanceH
  const steadyVs = outputV / (2 * duty.minimumFrequencyHz)
  return planFrom({
    duty,
    range,
    ratio,
    isLimit: false,
    resetShare: null,
    inductanceH,
    transformer: { worstVs: steadyVs / 2, steadyVs, steadySwingT: STEADY_SWING_T, gapped: true, waveform: 'sine' },
    findings,
    reasons: [
      { code: 'ratio-from-gain', path: 'windings', values: { ratio, nominalV: range.nominalV } },
      { code: 'inductance-from-gain', path: 'electrical.inductance', values: { inductanceH, share: inductanceH / duty.resonantInductanceH, minimumV: range.minimumV } },
    ],
  })
}

type Load = { outputV: number; outputA: number }

function reaches({ minimumFrequencyHz }: LlcDuty, tank: LlcTank, load: Load): boolean {
  const answer = llcForOutput(tank, load)
  return answer.state === 'found' && answer.llc.frequencyHz >= minimumFrequencyHz
}

function bestGain(tank: LlcTank, load: Load): number {
  const answer = llcForOutput(tank, load)
  return answer.state === 'found' ? answer.llc.outputV / tank.sourceV : answer.nearestGain
}

/** At the greatest frequency the magnetising current is least: U_o'/(4·f·L_m)·t_dead against C·U_in. */
function switchesAtZero({ maximumFrequencyHz, deadTimeS, bridgeCapacitanceF }: LlcDuty, { magnetisingInductanceH }: LlcTank, { outputV, inputV }: { outputV: number; inputV: number }): boolean {
  if (deadTimeS === null || bridgeCapacitanceF === null) return true
  return (outputV / (4 * maximumFrequencyHz * magnetisingInductanceH)) * deadTimeS >= CHARGE_MARGIN * bridgeCapacitanceF * inputV
}

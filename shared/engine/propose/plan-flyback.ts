import { outputPowerW } from '../topologies/outputs'
import { requirePositive } from '../require'
import type { FlybackDuty, FlybackOutputDuty } from '../specification'
import type { Finding } from '../findings'
import type { Plan, WindingNeed } from './plan'
import type { ProposalReason } from './reasons'
import { chooseTurns, largestLoads, sizeFlyback } from './sizing'

/** Above this the secondaries' peak currents and the voltage of the switch rise steeply. Source: common practice. */
const HIGH_DUTY_RATIO = 0.7

function dutyRatioFindings({ reflectedVoltageV }: FlybackDuty, dutyRatio: number): Finding[] {
  if (dutyRatio <= HIGH_DUTY_RATIO) return []
  const path = `requirement.duty.${reflectedVoltageV === null ? 'maximumDutyRatio' : 'reflectedVoltageV'}`
  return [{ code: 'duty-ratio-high', severity: 'warning', path, values: { dutyRatio, usual: HIGH_DUTY_RATIO } }]
}

/** Error of an output's voltage by whole turns that is worth saying. */
const WORTH_SAYING = { main: 0.01, auxiliary: 0.08 }

/** A flyback solved for ratio and inductance; turns and currents follow for each core. @throws RangeError when the duty cannot be solved */
export function planFlyback(stated: FlybackDuty): Plan {
  const duty = standingAlone(stated)
  const sizing = sizeFlyback(duty)
  return {
    frequencyHz: duty.switchingFrequencyHz,
    inductanceH: sizing.inductanceH,
    powerW: outputPowerW(duty),
    onMains: duty.supply.kind === 'mains',
    worstCurrentA: sizing.worstCurrent,
    windings: (least) => windingNeeds(duty, sizing, least),
    findings: [...sizing.findings, ...dutyRatioFindings(duty, sizing.dutyRatio)],
    reasons: sizingReasons(duty, sizing),
  }
}

function windingNeeds(duty: FlybackDuty, sizing: ReturnType<typeof sizeFlyback>, least: number): WindingNeed[] {
  const turns = chooseTurns(duty, sizing.ratio, least)
  const loads = largestLoads(duty, turns, sizing)
  const names = outputNames(duty)
  return [
    { id: 'w1', name: 'P', role: 'primary', side: 'primary', outputId: null, partnerId: null, turns: turns.primary, ...loads[0]!, powerW: outputPowerW(duty) },
    ...duty.outputs.map((output, index): WindingNeed => ({
      id: outputWindingId(index),
      name: names[index]!,
      role: output.role === 'auxiliary' ? 'auxiliary' : 'secondary',
      side: output.side,
      outputId: output.id,
      partnerId: partnerId(duty, index),
      turns: turns.outputs.get(output.id)!,
      ...loads[index + 1]!,
      powerW: Math.abs(output.voltageV) * output.fullLoadCurrentA,
    })),
  ]
}

const outputWindingId = (index: number) => `w${index + 2}`

function partnerId({ outputs }: FlybackDuty, index: number): string | null {
  const own = outputs[index]!
  const partner = outputs.findIndex(({ voltageV, side }) => voltageV === -own.voltageV && side === own.side)
  return partner < 0 ? null : outputWindingId(partner)
}

/** `S1`, `S2` … for the outputs and `AUX` for a single auxiliary one. */
function outputNames({ outputs }: FlybackDuty): string[] {
  const auxiliaries = outputs.filter(({ role }) => role === 'auxiliary').length
  let secondary = 0
  let auxiliary = 0
  return outputs.map(({ role }) => {
    if (role !== 'auxiliary') return `S${++secondary}`
    return auxiliaries > 1 ? `AUX${++auxiliary}` : 'AUX'
  })
}

function sizingReasons(duty: FlybackDuty, sizing: ReturnType<typeof sizeFlyback>): ProposalReason[] {
  const { ratio, dutyRatio, reflectedV, inductanceH } = sizing
  const values = { ratio, dutyRatio, reflectedV, minimumV: sizing.range.minimumV }
  const inductance = { discontinuous: 'inductance-for-idle-share', boundary: 'inductance-for-boundary', continuous: 'inductance-from-ripple', 'quasi-resonant': 'inductance-for-boundary' } as const
  return [
    { code: duty.reflectedVoltageV === null ? 'ratio-from-duty' : 'ratio-from-reflected-voltage', path: 'windings', values },
    { code: inductance[duty.conduction.kind], path: 'electrical.inductance', values: { inductanceH, peakA: sizing.peakA, frequencyHz: duty.switchingFrequencyHz } },
  ]
}

/** Outputs whose voltage whole turns miss, once the turns are chosen. */
export function ratioFindings(stated: FlybackDuty, turnsOf: (outputId: string) => number): Finding[] {
  const duty = standingAlone(stated)
  const main = duty.outputs.find(({ role }) => role === 'main') ?? duty.outputs[0]!
  const perTurnV = (Math.abs(main.voltageV) + main.rectifierDropV) / turnsOf(main.id)
  return duty.outputs.flatMap((output, index): Finding[] => {
    const error = (perTurnV * turnsOf(output.id)) / (Math.abs(output.voltageV) + output.rectifierDropV) - 1
    if (Math.abs(error) <= WORTH_SAYING[output.role]) return []
    return [{ code: 'ratio-compromise', severity: output.role === 'main' ? 'warning' : 'note', path: `requirement.duty.outputs.${index}`, values: { output: output.name, error } }]
  })
}

/**
 * The duty with each stacked output as one on its own return that its winding is the same for: the voltage that is left above
 * the lower output, and on the lower one the current of what stands on it.
 *
 * @throws RangeError when an output does not exceed the one it stands on
 */
export function standingAlone(duty: FlybackDuty): FlybackDuty {
  const { outputs } = duty
  const lower = (output: FlybackOutputDuty) => outputs.find(({ id }) => id !== output.id && id === output.stackedOn?.outputId) ?? null
  if (!outputs.some(lower)) return duty
  const carried = (output: FlybackOutputDuty, of: 'fullLoadCurrentA' | 'lightLoadCurrentA', depth = 0): number =>
    output[of] + (depth > outputs.length ? 0 : outputs.filter((other) => lower(other)?.id === output.id).reduce((sum, other) => sum + carried(other, of, depth + 1), 0))
  return {
    ...duty,
    outputs: outputs.map((output) => {
      const base = lower(output)
      const dropsV = base && output.stackedOn!.at === 'winding' ? base.rectifierDropV : 0
      const ownV = Math.abs(output.voltageV) - (base ? Math.abs(base.voltageV) + dropsV : 0)
      requirePositive(`voltage of ${output.name} above the output it stands on`, ownV)
      return { ...output, stackedOn: null, voltageV: Math.sign(output.voltageV) * ownV, fullLoadCurrentA: carried(output, 'fullLoadCurrentA'), lightLoadCurrentA: carried(output, 'lightLoadCurrentA') }
    }),
  }
}

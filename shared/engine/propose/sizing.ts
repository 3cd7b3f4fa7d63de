import { flybackState } from '../topologies/flyback'
import type { FlybackState } from '../topologies/flyback'
import { acRms, rms } from '../waveforms/statistics'
import type { Waveform } from '../waveforms/waveform'
import { supplyRange } from '../evaluate/supply'
import { outputPowerW } from '../topologies/outputs'
import type { SupplyRange } from '../evaluate/supply'
import type { FlybackDuty } from '../specification'
import type { Finding } from '../findings'

/** The converter's side of a flyback before any core is chosen. */
export interface FlybackSizing {
  range: SupplyRange
  dutyRatio: number
  reflectedV: number
  /** Primary turns for each turn of the first main output. */
  ratio: number
  inductanceH: number
  /** Peak current at minimum input and full load. */
  peakA: number
  /** Greatest current of the switch, by the limit or assumed. */
  worstCurrent: (inductanceH: number) => number
  findings: Finding[]
}

/** Without a current limit the proposal leaves this over the peak current. */
const ASSUMED_LIMIT_SHARE = 1.25

export const windingVoltageV = ({ voltageV, rectifierDropV }: FlybackDuty['outputs'][number]): number => Math.abs(voltageV) + rectifierDropV

/** The output whose voltage the ratio is made for: the first main one. */
export const regulatedOutput = ({ outputs }: FlybackDuty): FlybackDuty['outputs'][number] => outputs.find(({ role }) => role === 'main') ?? outputs[0]!

/**
 * Ratio, duty and inductance from the duty sheet.
 *
 * Source: L. Dixon, SLUP127; Fairchild AN-4137.
 *
 * @throws RangeError when the sheet cannot be solved, e.g. a switch drop above the input voltage
 */
export function sizeFlyback(duty: FlybackDuty): FlybackSizing {
  const findings: Finding[] = []
  const range = workingRange(duty, findings)
  const primaryV = range.minimumV - duty.switchDropV
  if (!(primaryV > 0)) throw new RangeError(`switchDropV must be below the minimum input: ${duty.switchDropV}`)
  const { reflectedV, dutyRatio } = reflect(duty, primaryV)
  const powerW = powerThroughCoreW(duty)
  const { inductanceH, peakA } = inductanceFor(duty, { primaryV, dutyRatio, powerW })
  const limit = duty.currentLimit
  if (!limit) findings.push({ code: 'current-limit-assumed', severity: 'warning', path: 'requirement.duty.currentLimit', values: { assumedA: ASSUMED_LIMIT_SHARE * peakA } })
  return {
    range,
    dutyRatio,
    reflectedV,
    ratio: reflectedV / windingVoltageV(regulatedOutput(duty)),
    inductanceH,
    peakA,
    worstCurrent: (ofH) => (limit ? limit.nominalA * (1 + limit.tolerance) + (range.maximumV * limit.delayS) / ofH : ASSUMED_LIMIT_SHARE * peakA),
    findings,
  }
}

function workingRange(duty: FlybackDuty, findings: Finding[]): SupplyRange {
  const answer = supplyRange(duty.supply, outputPowerW(duty) / duty.efficiency)
  if (answer.state === 'known') return answer.range
  findings.push({ code: 'bulk-capacitor-too-small', severity: 'error', path: 'requirement.duty.supply.bulkCapacitanceF', values: { missingEnergyJ: answer.missingEnergyJ } })
  const peak = (mainsV: number) => Math.SQRT2 * mainsV
  return { minimumV: peak(duty.supply.minimumV) * 0.7, nominalV: peak(duty.supply.nominalV), maximumV: peak(duty.supply.maximumV) }
}

/** Share of the period in which current flows at minimum input and full load. */
const conductingShare = ({ conduction }: FlybackDuty) => (conduction.kind === 'discontinuous' ? 1 - conduction.idleShare : 1)

/** Volt-second balance: V_p·D = V_R·D₂ with D + D₂ the conducting share. */
function reflect(duty: FlybackDuty, primaryV: number): { reflectedV: number; dutyRatio: number } {
  const conducting = conductingShare(duty)
  if (duty.reflectedVoltageV !== null) {
    return { reflectedV: duty.reflectedVoltageV, dutyRatio: (conducting * duty.reflectedVoltageV) / (primaryV + duty.reflectedVoltageV) }
  }
  // A conducting share below the duty ratio leaves the secondary no time; nine tenths of it is the most that makes sense.
  const dutyRatio = Math.min(duty.maximumDutyRatio, 0.9 * conducting)
  return { reflectedV: (primaryV * dutyRatio) / (conducting - dutyRatio), dutyRatio }
}

/** The drops carry their own power; where the efficiency says more is lost, it counts. */
function powerThroughCoreW(duty: FlybackDuty): number {
  const withDropsW = duty.outputs.reduce((sum, output) => sum + windingVoltageV(output) * output.fullLoadCurrentA, 0)
  return Math.max(withDropsW, outputPowerW(duty) / duty.efficiency)
}

function inductanceFor(duty: FlybackDuty, { primaryV, dutyRatio, powerW }: { primaryV: number; dutyRatio: number; powerW: number }): { inductanceH: number; peakA: number } {
  const meanOnA = powerW / (primaryV * dutyRatio)
  const ripple = duty.conduction.kind === 'continuous' ? duty.conduction.rippleRatio : 2
  const rippleA = ripple * meanOnA
  return { inductanceH: (primaryV * dutyRatio) / (duty.switchingFrequencyHz * rippleA), peakA: meanOnA + rippleA / 2 }
}

// ---------------------------------------------------------------------------------------------

export interface TurnsChoice {
  primary: number
  /** By output id. */
  outputs: ReadonlyMap<string, number>
  /** Largest relative error of a main output's voltage, the first one being exact. */
  mainError: number
  auxiliaryError: number
}

/** Errors of voltage that cost nothing in the choice of turns. */
const FREE_ERROR = { main: 0.01, auxiliary: 0.05 }

/** How far the ratio of primary to first output may leave the sized one. */
const RATIO_SLACK = 0.04

/**
 * Whole turns for all windings: at least `leastPrimary`, with the outputs' ratios as near as can be. A few more turns
 * are taken when they bring the outputs nearer.
 */
export function chooseTurns(duty: FlybackDuty, ratio: number, leastPrimary: number): TurnsChoice {
  const main = regulatedOutput(duty)
  const least = Math.max(1, Math.ceil(leastPrimary - 1e-9))
  const first = Math.max(1, Math.floor((least / ratio) * (1 - RATIO_SLACK)))
  // Growth counts from the smallest choice there is, which on a large core lies far above what flux asks for.
  const base = Math.max(least, Math.round(ratio * first))
  let best: { choice: TurnsChoice; cost: number } | null = null
  for (let more = 0; more <= 12; more++) {
    const mainTurns = first + more
    const primary = Math.max(least, Math.round(ratio * mainTurns))
    const ratioError = Math.abs(primary / mainTurns / ratio - 1)
    const choice = turnsFor(duty, main, { mainTurns, primary })
    const cost = 0.5 * (primary / base - 1) + 3 * Math.max(0, ratioError - RATIO_SLACK) + choice.mainError + 10 * Math.max(0, choice.mainError - FREE_ERROR.main) + 2 * Math.max(0, choice.auxiliaryError - FREE_ERROR.auxiliary)
    if (!best || cost < best.cost - 1e-12) best = { choice, cost }
  }
  return best!.choice
}

function turnsFor(duty: FlybackDuty, main: FlybackDuty['outputs'][number], { mainTurns, primary }: { mainTurns: number; primary: number }): TurnsChoice {
  const perTurnV = windingVoltageV(main) / mainTurns
  const outputs = new Map(duty.outputs.map((output) => [output.id, output === main ? mainTurns : Math.max(1, Math.round(windingVoltageV(output) / perTurnV))]))
  const errorOf = (role: 'main' | 'auxiliary') =>
    Math.max(0, ...duty.outputs.filter((output) => output.role === role).map((output) => Math.abs((perTurnV * outputs.get(output.id)!) / windingVoltageV(output) - 1)))
  return { primary, outputs, mainError: errorOf('main'), auxiliaryError: errorOf('auxiliary') }
}

/** State at one input with the chosen turns; for the currents that wires are chosen by. */
export function flybackAt(duty: FlybackDuty, turns: TurnsChoice, { inputV, inductanceH }: { inputV: number; inductanceH: number }): FlybackState {
  return flybackState({
    inputVoltageV: inputV,
    switchDropV: duty.switchDropV,
    frequencyHz: duty.switchingFrequencyHz,
    primaryTurns: turns.primary,
    primaryInductanceH: inductanceH,
    outputs: duty.outputs.map((output) => ({ turns: turns.outputs.get(output.id)!, voltageV: output.voltageV, rectifierDropV: output.rectifierDropV, currentA: output.fullLoadCurrentA })),
    regulatedOutput: duty.outputs.indexOf(regulatedOutput(duty)),
    losses: { kind: 'losses-transferred', efficiency: duty.efficiency },
  })
}

export interface CurrentLoad {
  rmsA: number
  /** Alternating over total rms. */
  acShare: number
}

/** The greatest rms current of a winding over several states, with its alternating share. */
export function greatestLoad(currents: readonly Waveform[]): CurrentLoad {
  const greatest = currents.reduce((most, current) => (rms(current) > rms(most) ? current : most))
  const rmsA = rms(greatest)
  return { rmsA, acShare: rmsA > 0 ? acRms(greatest) / rmsA : 0 }
}

/** Largest currents over the input range, primary first, then the outputs in their order. */
export function largestLoads(duty: FlybackDuty, turns: TurnsChoice, sizing: FlybackSizing): CurrentLoad[] {
  const states = [sizing.range.minimumV, sizing.range.nominalV, sizing.range.maximumV].map((inputV) => flybackAt(duty, turns, { inputV, inductanceH: sizing.inductanceH }))
  return [greatestLoad(states.map(({ primary }) => primary.currentA)), ...duty.outputs.map((_, index) => greatestLoad(states.map(({ outputs }) => outputs[index]!.currentA)))]
}

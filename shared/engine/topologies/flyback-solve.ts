import type { FlybackDuty } from '../specification'
import { scaleWaveform, sumWaveforms } from '../waveforms/combine'
import { integralOverPeriod } from '../waveforms/statistics'
import { flybackState } from './flyback'
import type { FlybackState } from './flyback'
import { branchCurrentsA } from './flyback-branches'
import type { FlybackBranch } from './flyback-branches'
import { leakageFlybackState, leakageMatrixH } from './flyback-leakage'
import type { LeakageFlybackState, UnitLeakage } from './flyback-leakage'
import { quietEnd, ringing, ringingVoltage, valleyPoint } from './flyback-valley'
import type { ValleyDuty, ValleyPoint } from './flyback-valley'
import type { CircuitFinding, CircuitMode, OperatingPoint, WindingWaveforms } from './topology'

/** How the secondaries share the current, and whether edges take time. */
export type SharingModel = 'in-proportion-to-load' | 'in-proportion-to-load, with commutation' | 'from-leakages'

export interface FlybackParts {
  duty: FlybackDuty
  primaryTurns: number
  inductanceH: number
  branches: readonly FlybackBranch[]
  regulated: number
  /** Leakage at the primary with all secondaries shorted, H; null where not known. */
  commonLeakageH: number | null
  /** Leakage of each pair of windings at unit turns, the primary being 0; null where the sharing does not ask for it. */
  unitLeakageH: UnitLeakage | null
  /** Set once a point was not found with leakage: the points after it are not tried again, which would take long. */
  unsolvable?: boolean
}

export interface SolvedFlyback {
  mode: CircuitMode
  model: SharingModel
  frequencyHz: number
  dutyCycle: number
  peakCurrentA: number
  minimumCurrentA: number
  reflectedVoltageV: number
  /** Through the core without what the clamp takes. */
  transferredPowerW: number
  clampPowerW: number | null
  inputPowerW: number
  commutationS: number | null
  valley: ValleyPoint | null
  primary: WindingWaveforms
  /** Currents and voltages of the branches' windings in series. */
  branches: readonly WindingWaveforms[]
  branchVoltagesV: readonly number[]
  findings: CircuitFinding[]
}

/** One operating point. @throws RangeError on a value out of its range */
export function solveFlyback(parts: FlybackParts, point: OperatingPoint): SolvedFlyback {
  const { conduction } = parts.duty
  if (conduction.kind !== 'quasi-resonant') return solveAt(parts, point, parts.duty.switchingFrequencyHz)
  const ideal = idealState(parts, point, parts.duty.switchingFrequencyHz)
  const valleyDuty: ValleyDuty = {
    primaryVoltageV: point.inputV - parts.duty.switchDropV, reflectedVoltageV: ideal.reflectedVoltageV, transferredPowerW: ideal.transferredPowerW,
    primaryInductanceH: parts.inductanceH, nodeCapacitanceF: conduction.nodeCapacitanceF, maximumFrequencyHz: conduction.maximumFrequencyHz,
  }
  return withRinging(parts, point, valleyDuty)
}

/** The period is set so that what is left after the currents is the time to the valley. */
function withRinging(parts: FlybackParts, point: OperatingPoint, valleyDuty: ValleyDuty): SolvedFlyback {
  const valley = valleyPoint(valleyDuty)
  let periodS = 1 / valley.frequencyHz
  let solved = solveAt(parts, point, 1 / periodS)
  for (let round = 0; round < 12; round++) {
    const activeS = periodS - idleOf(solved)
    const missS = activeS + valley.deadS - periodS
    if (Math.abs(missS) < 1e-10 * periodS) break
    // At constant power the currents last as √T: the miss falls by 1 − ½·active/T for each second.
    periodS = Math.max(periodS / 2, periodS + missS / (1 - activeS / (2 * periodS)))
    solved = solveAt(parts, point, 1 / periodS)
  }
  const ring = { idleS: valley.deadS, valley: valley.valley, reflectedVoltageV: valleyDuty.reflectedVoltageV, primaryInductanceH: parts.inductanceH, nodeCapacitanceF: valleyDuty.nodeCapacitanceF }
  return {
    ...solved,
    mode: valley.valley === 1 ? 'boundary' : 'discontinuous',
    valley: { ...valley, frequencyHz: solved.frequencyHz },
    primary: ringing(solved.primary, ring),
    branches: solved.branches.map(({ currentA, voltageV }, index) => ({
      currentA: quietEnd(currentA, ring),
      voltageV: ringingVoltage(voltageV, { ...ring, reflectedVoltageV: (ring.reflectedVoltageV * parts.branches[index]!.turns) / parts.primaryTurns }),
    })),
  }
}

/** Time at the end of the period in which no winding has a voltage. */
function idleOf({ primary: { voltageV } }: SolvedFlyback): number {
  const { points, periodS } = voltageV
  const last = points[points.length - 1]!
  const before = points[points.length - 2]!
  return last[1] === 0 && before[1] === 0 ? periodS - before[0] : 0
}

function solveAt(parts: FlybackParts, point: OperatingPoint, frequencyHz: number): SolvedFlyback {
  const ideal = idealState(parts, point, frequencyHz)
  const clampV = clampVoltage(parts, ideal)
  const matrix = clampV === null ? null : leakageOf(parts)
  const ideally = fromIdeal(parts, point, ideal, frequencyHz)
  if (clampV === null || !matrix || parts.unsolvable) return ideally
  try {
    return matrix.each ? fromLeakages(parts, point, { ideal, frequencyHz, clampV, inductanceH: matrix.inductanceH }) : fromCommon(parts, point, { ideal, frequencyHz, clampV, inductanceH: matrix.inductanceH })
  } catch (error) {
    if (!(error instanceof RangeError)) throw error
    parts.unsolvable = true
    return { ...ideally, findings: [{ code: 'leakage-state-not-found', severity: 'warning', path: 'requirement.duty.clampSpikeV', values: { inputV: point.inputV, reason: error.message } }] }
  }
}

function idealState({ duty, primaryTurns, inductanceH, branches, regulated }: FlybackParts, point: OperatingPoint, frequencyHz: number): FlybackState {
  const currents = branchCurrentsA(branches, point)
  return flybackState({
    inputVoltageV: point.inputV,
    switchDropV: duty.switchDropV,
    frequencyHz,
    primaryTurns,
    primaryInductanceH: inductanceH,
    outputs: branches.map(({ turns, voltageV, fed }, index) => ({ turns, voltageV: voltageV - fed.output.rectifierDropV, rectifierDropV: fed.output.rectifierDropV, currentA: currents[index]! })),
    regulatedOutput: regulated,
    losses: { kind: 'losses-transferred', efficiency: duty.efficiency },
  })
}

const clampVoltage = ({ duty }: FlybackParts, { reflectedVoltageV }: FlybackState): number | null => (duty.clampSpikeV !== null && duty.clampSpikeV > 0 ? reflectedVoltageV + duty.clampSpikeV : null)

/** Inductance matrix of primary and branches by each leakage, or of primary and the regulated branch by the common one. */
function leakageOf({ primaryTurns, inductanceH, branches, regulated, commonLeakageH, unitLeakageH }: FlybackParts): { each: boolean; inductanceH: number[][] } | null {
  if (unitLeakageH) {
    const windings = leakageMatrixH({ turns: [primaryTurns, ...branches.map(({ winding }) => winding.turns)], inductanceH, unitLeakageH })
    const through = [[0], ...branches.map((branch) => branch.through.map((index) => index + 1))]
    return { each: true, inductanceH: through.map((one) => through.map((other) => one.reduce((sum, i) => sum + other.reduce((part, j) => part + windings[i]![j]!, 0), 0))) }
  }
  if (commonLeakageH === null || !(commonLeakageH > 0) || commonLeakageH >= inductanceH) return null
  return { each: false, inductanceH: leakageMatrixH({ turns: [primaryTurns, branches[regulated]!.turns], inductanceH, unitLeakageH: () => commonLeakageH / primaryTurns ** 2 }) }
}

function fromIdeal(parts: FlybackParts, { inputV }: OperatingPoint, ideal: FlybackState, frequencyHz: number): SolvedFlyback {
  return {
    mode: ideal.mode, model: 'in-proportion-to-load', frequencyHz, dutyCycle: ideal.dutyCycle, peakCurrentA: ideal.peakCurrentA, minimumCurrentA: ideal.minimumCurrentA,
    reflectedVoltageV: ideal.reflectedVoltageV, transferredPowerW: ideal.transferredPowerW, clampPowerW: null,
    inputPowerW: inputV * integralOverPeriod(ideal.primary.currentA) * frequencyHz, commutationS: null, valley: null, primary: ideal.primary, branches: ideal.outputs,
    branchVoltagesV: parts.branches.map(({ turns }) => (ideal.reflectedVoltageV * turns) / parts.primaryTurns),
    findings: [],
  }
}

interface LeakageInput {
  ideal: FlybackState
  frequencyHz: number
  clampV: number
  inductanceH: readonly (readonly number[])[]
}

/** The losses that the efficiency states are the clamp's first; what is left of them passes through the secondaries. */
function loadFactor(parts: FlybackParts, point: OperatingPoint, ideal: FlybackState): (clampPowerW: number) => number {
  const currents = branchCurrentsA(parts.branches, point)
  const perTurnV = ideal.reflectedVoltageV / parts.primaryTurns
  const withDropsW = parts.branches.reduce((sum, { turns }, index) => sum + perTurnV * turns * currents[index]!, 0)
  return (clampPowerW) => Math.max(1, (ideal.transferredPowerW - clampPowerW) / withDropsW)
}

/** Each branch by its own leakages. Branches without load take no part. */
function fromLeakages(parts: FlybackParts, point: OperatingPoint, input: LeakageInput): SolvedFlyback {
  const { branches, regulated } = parts
  const currents = branchCurrentsA(branches, point)
  const loaded = branches.map((_, index) => index).filter((index) => currents[index]! > 0)
  const rows = [0, ...loaded.map((index) => index + 1)]
  const held = loaded.includes(regulated) ? regulated : loaded[0]!
  const perTurnV = input.ideal.reflectedVoltageV / parts.primaryTurns
  const state = leakageFlybackState({
    ...common(parts, point, input),
    inductanceH: rows.map((row) => rows.map((column) => input.inductanceH[row]![column]!)),
    branches: loaded.map((index) => ({ turns: branches[index]!.turns, voltageV: perTurnV * branches[index]!.turns, currentA: currents[index]! })),
    regulatedBranch: loaded.indexOf(held),
  })
  const wave = (index: number): WindingWaveforms => {
    const position = loaded.indexOf(index)
    if (position >= 0) return { currentA: state.currentsA[position + 1]!, voltageV: state.voltagesV[position + 1]! }
    const ratio = branches[index]!.turns / parts.primaryTurns
    return { currentA: scaleWaveform(state.currentsA[0]!, 0), voltageV: scaleWaveform(state.voltagesV[0]!, ratio) }
  }
  return {
    ...fromState(parts, point, input, state),
    model: 'from-leakages',
    branches: branches.map((_, index) => wave(index)),
    branchVoltagesV: branches.map(({ turns }, index) => (loaded.includes(index) ? state.branchVoltagesV[loaded.indexOf(index)]! : perTurnV * turns)),
  }
}

/** One branch stands for all of them, and its ampere-turns are shared in proportion to load. */
function fromCommon(parts: FlybackParts, point: OperatingPoint, input: LeakageInput): SolvedFlyback {
  const { branches, regulated, primaryTurns } = parts
  const { ideal } = input
  const turns = branches[regulated]!.turns
  const currents = branchCurrentsA(branches, point)
  const ampereTurns = branches.reduce((sum, branch, index) => sum + branch.turns * currents[index]!, 0)
  const voltageV = (ideal.reflectedVoltageV * turns) / primaryTurns
  const state = leakageFlybackState({ ...common(parts, point, input), inductanceH: input.inductanceH, branches: [{ turns, voltageV, currentA: ampereTurns / turns }], regulatedBranch: 0 })
  const [, currentA, oneV] = [state.currentsA[0], state.currentsA[1]!, state.voltagesV[1]!]
  return {
    ...fromState(parts, point, input, state),
    model: 'in-proportion-to-load, with commutation',
    branches: branches.map((branch, index) => ({
      currentA: scaleWaveform(currentA, (currents[index]! * turns) / ampereTurns),
      voltageV: scaleWaveform(oneV, branch.turns / turns),
    })),
    branchVoltagesV: branches.map((branch) => (ideal.reflectedVoltageV * branch.turns) / primaryTurns),
  }
}

const common = (parts: FlybackParts, point: OperatingPoint, { ideal, frequencyHz, clampV }: LeakageInput) => ({
  inputVoltageV: point.inputV,
  switchDropV: parts.duty.switchDropV,
  frequencyHz,
  primaryTurns: parts.primaryTurns,
  clampVoltageV: clampV,
  start: { peakCurrentA: ideal.peakCurrentA, dutyCycle: ideal.dutyCycle },
  loadFactor: loadFactor(parts, point, ideal),
})

function fromState(parts: FlybackParts, { inputV }: OperatingPoint, { ideal, frequencyHz, clampV }: LeakageInput, state: LeakageFlybackState) {
  const primary: WindingWaveforms = { currentA: state.currentsA[0]!, voltageV: state.voltagesV[0]! }
  const inputW = inputV * (integralOverPeriod(primary.currentA) * frequencyHz - state.clampPowerW / clampV)
  return {
    mode: state.idleS > 0 ? ('discontinuous' as const) : state.minimumCurrentA <= 1e-6 * state.peakCurrentA ? ('boundary' as const) : ('continuous' as const),
    frequencyHz, dutyCycle: state.dutyCycle, peakCurrentA: state.peakCurrentA, minimumCurrentA: state.minimumCurrentA, reflectedVoltageV: ideal.reflectedVoltageV,
    transferredPowerW: inputW - state.clampPowerW, clampPowerW: state.clampPowerW,
    // The clamp's current flows back to the input rail: what the supply gives flows while the switch conducts.
    inputPowerW: inputW, commutationS: state.turnOffS, valley: null, primary, findings: [] as CircuitFinding[],
  }
}

/** Ampere-turns of all windings over those of the primary: the magnetising current. */
export function magnetisingCurrentA({ primary, branches }: Pick<SolvedFlyback, 'primary' | 'branches'>, { branches: parts, primaryTurns }: FlybackParts) {
  return sumWaveforms([primary.currentA, ...branches.map(({ currentA }, index) => scaleWaveform(currentA, parts[index]!.turns / primaryTurns))])
}


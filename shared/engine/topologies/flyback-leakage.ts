import { requireBetween, requireNotNegative, requirePositive } from '../require'
import { createWaveform } from '../waveforms/waveform'
import type { Waveform, WaveformPoint } from '../waveforms/waveform'
import { solveSymmetric, stepNetwork } from './diode-network'
import type { NetworkSegment } from './diode-network'

/** One rectified branch: a winding, or windings in series. */
export interface LeakageBranch {
  turns: number
  /** Output voltage and drops; only that of the regulated branch is held, the others begin there. */
  voltageV: number
  /** Mean current asked. */
  currentA: number
}

export interface LeakageFlybackDuty {
  inputVoltageV: number
  switchDropV: number
  frequencyHz: number
  primaryTurns: number
  /** Inductance matrix, the primary first and then the branches in their order; from `leakageMatrixH`. */
  inductanceH: readonly (readonly number[])[]
  branches: readonly LeakageBranch[]
  regulatedBranch: number
  /** At which the primary is held while its current dies away, over the input voltage. */
  clampVoltageV: number
  /** Where the search begins; the state without leakage. */
  start: { peakCurrentA: number; dutyCycle: number }
  /** Factor on all branch currents, by the power that the clamp takes; 1 where left out. */
  loadFactor?: (clampPowerW: number) => number
}

export interface LeakageFlybackState {
  dutyCycle: number
  peakCurrentA: number
  /** Share of the period in which current flows in a branch while the switch is open. */
  secondaryFraction: number
  /** Idle time at the end of the open interval. */
  idleS: number
  /** From the opening of the switch to the primary's current zero, and from its closing to the last branch's. */
  turnOffS: number
  turnOnS: number
  clampPowerW: number
  /** Sum of ampere-turns at the least, over the primary's turns. */
  minimumCurrentA: number
  branchVoltagesV: readonly number[]
  /** Primary first; currents into the dotted ends. */
  currentsA: readonly Waveform[]
  voltagesV: readonly Waveform[]
}

/** Leakage inductance between two windings at unit turns, H per turn squared. */
export type UnitLeakage = (one: number, other: number) => number

/**
 * Inductance matrix of several windings from the inductance of the first one and the leakages between pairs, in henry:
 *
 *     L_jk = N_j·N_k·(P + Λ_jk), Λ_jk = ½·(ℓ_0j + ℓ_0k − ℓ_jk), Λ_0k = 0
 *
 * so that the first winding shows L with the others open, and with one of them shorted the leakage between both.
 *
 * Source: energy of currents whose ampere-turns cancel, by pairs; E. Snelling, Soft Ferrites, 2nd ed., ch. 11; leakage over
 * magnetising inductance brought to the terminals, ℓ' = ℓ·P/(P − ℓ).
 *
 * @throws RangeError on a value out of its range, or a leakage not below the inductance
 */
export function leakageMatrixH({ turns, inductanceH, unitLeakageH }: { turns: readonly number[]; inductanceH: number; unitLeakageH: UnitLeakage }): number[][] {
  turns.forEach((value, index) => requirePositive(`turns.${index}`, value))
  requirePositive('inductanceH', inductanceH)
  const permeance = inductanceH / turns[0]! ** 2
  const leakage = (one: number, other: number): number => {
    if (one === other) return 0
    const value = unitLeakageH(Math.min(one, other), Math.max(one, other))
    requireBetween(`leakage between windings ${one} and ${other}`, value, 0, permeance * (1 - 1e-9))
    return (value * permeance) / (permeance - value)
  }
  return turns.map((own, j) => turns.map((far, k) => own * far * (permeance + (leakage(0, j) + leakage(0, k) - leakage(j, k)) / 2)))
}

/**
 * Steady state of a flyback with leakage: the primary's current passes to the branches against the clamp voltage, the
 * branches share by their leakages, and each output settles at the voltage at which it takes its load. Output capacitors are
 * large, rectifiers ideal but for their drops; nothing rings.
 *
 * Unknown are the peak current, the duty ratio and the voltages of the outputs that are not regulated; Newton's method finds
 * them from the state without leakage.
 *
 * Source: inductance matrix with ideal rectifiers.
 *
 * @throws RangeError on a value out of its range, or where no steady state is found
 */
export function leakageFlybackState(duty: LeakageFlybackDuty): LeakageFlybackState {
  check(duty)
  const solution = settle(duty)
  return stateOf(duty, solution, periodOf(duty, solution))
}

function check({ inputVoltageV, switchDropV, frequencyHz, branches, regulatedBranch, clampVoltageV, start }: LeakageFlybackDuty): void {
  requireNotNegative('switchDropV', switchDropV)
  requirePositive('inputVoltageV - switchDropV', inputVoltageV - switchDropV)
  requirePositive('frequencyHz', frequencyHz)
  requirePositive('clampVoltageV', clampVoltageV)
  requirePositive('start.peakCurrentA', start.peakCurrentA)
  if (!branches[regulatedBranch]) throw new RangeError(`regulatedBranch must be an index of branches: ${regulatedBranch}`)
  branches.forEach(({ turns, voltageV, currentA }, index) => {
    requirePositive(`branches.${index}.turns`, turns)
    requirePositive(`branches.${index}.voltageV`, voltageV)
    requirePositive(`branches.${index}.currentA`, currentA)
  })
}

interface Unknowns {
  peakA: number
  dutyCycle: number
  voltagesV: readonly number[]
}

interface Period {
  off: readonly NetworkSegment[]
  on: readonly NetworkSegment[]
}

/** One period from the opening of the switch, when all of the current is in the primary. */
function periodOf({ inductanceH, inputVoltageV, switchDropV, frequencyHz, clampVoltageV }: LeakageFlybackDuty, { peakA, dutyCycle, voltagesV }: Unknowns): Period {
  const none = voltagesV.map(() => 0)
  const blocked = voltagesV.map(() => false)
  const back = voltagesV.map((value) => -value)
  const off = stepNetwork({ inductanceH }, { durationS: (1 - dutyCycle) / frequencyHz, sourceV: [-clampVoltageV, ...back], closed: [false, ...blocked] }, [peakA, ...none])
  const on = stepNetwork({ inductanceH }, { durationS: dutyCycle / frequencyHz, sourceV: [inputVoltageV - switchDropV, ...back], closed: [true, ...blocked] }, off[off.length - 1]!.toA)
  return { off, on }
}

const charge = (segments: readonly NetworkSegment[], branch: number): number =>
  segments.reduce((sum, { durationS, fromA, toA }) => sum + (durationS * (fromA[branch]! + toA[branch]!)) / 2, 0)

const clampPowerW = ({ off }: Period, { clampVoltageV, frequencyHz }: LeakageFlybackDuty): number => charge(off, 0) * clampVoltageV * frequencyHz

/** How far a period is from repeating itself with its loads, each part relative. */
function residual(duty: LeakageFlybackDuty, unknowns: Unknowns): number[] {
  const period = periodOf(duty, unknowns)
  const end = period.on[period.on.length - 1]!.toA
  const factor = duty.loadFactor?.(clampPowerW(period, duty)) ?? 1
  return [
    end[0]! / unknowns.peakA - 1,
    ...duty.branches.map(({ currentA }, index) => ((charge(period.off, index + 1) + charge(period.on, index + 1)) * duty.frequencyHz) / (currentA * factor) - 1),
  ]
}

const SETTLED = 1e-9
const MOST_ROUNDS = 25

/** Newton's method on relative unknowns, each step shortened until the residual falls. */
function settle(duty: LeakageFlybackDuty): Unknowns {
  const free = duty.branches.map((_, index) => index).filter((index) => index !== duty.regulatedBranch)
  const regulated = duty.branches[duty.regulatedBranch]!
  const perTurnV = regulated.voltageV / regulated.turns
  const beginV = duty.branches.map(({ turns }, index) => (index === duty.regulatedBranch ? regulated.voltageV : perTurnV * turns))
  const unknownsOf = (x: readonly number[]): Unknowns => ({
    peakA: duty.start.peakCurrentA * Math.exp(x[0]!),
    dutyCycle: logistic(Math.log(duty.start.dutyCycle / (1 - duty.start.dutyCycle)) + x[1]!),
    voltagesV: beginV.map((value, index) => (index === duty.regulatedBranch ? value : value * Math.exp(x[2 + free.indexOf(index)]!))),
  })
  const at = (x: readonly number[]) => residual(duty, unknownsOf(x))
  let x = new Array<number>(2 + free.length).fill(0)
  let rest = at(x)
  for (let round = 0; round < MOST_ROUNDS && size(rest) > SETTLED; round++) {
    const step = newtonStep(at, x, rest)
    let share = Math.min(1, 0.5 / Math.max(...step.map(Math.abs)))
    let next = x
    let nextRest = rest
    for (; share > 1e-4; share /= 2) {
      next = x.map((value, index) => value + share * step[index]!)
      nextRest = at(next)
      if (size(nextRest) < size(rest) * (1 - 0.1 * share)) break
    }
    if (!(share > 1e-4)) break
    x = next
    rest = nextRest
  }
  if (!(size(rest) < 1e-7)) throw new RangeError(`no steady state with these leakages is found: ${size(rest)} of the loads remain`)
  return unknownsOf(x)
}

const logistic = (value: number) => 1 / (1 + Math.exp(-value))
const size = (values: readonly number[]) => Math.hypot(...values)

/** −J⁻¹·r with differences for J, by its normal equations, which stay solvable where a load moves nothing. */
function newtonStep(at: (x: readonly number[]) => number[], x: readonly number[], rest: readonly number[]): number[] {
  const by = 1e-6
  const columns = x.map((_, index) => at(x.map((value, other) => (other === index ? value + by : value))).map((value, row) => (value - rest[row]!) / by))
  const normal = columns.map((one, i) => columns.map((other, j) => one.reduce((sum, value, row) => sum + value * other[row]!, 0) + (i === j ? 1e-12 : 0)))
  const right = columns.map((column) => -column.reduce((sum, value, row) => sum + value * rest[row]!, 0))
  return solveSymmetric(normal, right)
}

// ---------------------------------------------------------------------------------------------

function stateOf(duty: LeakageFlybackDuty, { peakA, dutyCycle, voltagesV }: Unknowns, period: Period): LeakageFlybackState {
  const periodS = 1 / duty.frequencyHz
  const segments = [...period.on, ...period.off]
  const branches = duty.inductanceH.map((_, index) => index)
  const last = period.off[period.off.length - 1]!
  const isIdle = last.toA.every((value) => value === 0) && last.fromA.every((value) => value === 0)
  const idleS = isIdle ? last.durationS : 0
  const weights = [duty.primaryTurns, ...duty.branches.map(({ turns }) => turns)]
  const sum = (currents: readonly number[]) => currents.reduce((total, value, index) => total + (value * weights[index]!) / duty.primaryTurns, 0)
  return {
    dutyCycle,
    peakCurrentA: peakA,
    secondaryFraction: 1 - dutyCycle - idleS * duty.frequencyHz,
    idleS,
    turnOffS: spanWhile(period.off, ({ fromA }) => fromA[0]! > 0),
    turnOnS: spanWhile(period.on, ({ fromA }) => fromA.slice(1).some((value) => value > 0)),
    clampPowerW: clampPowerW(period, duty),
    minimumCurrentA: sum(last.toA),
    branchVoltagesV: voltagesV,
    currentsA: branches.map((index) => waveform(periodS, segments, ({ fromA, toA }) => [fromA[index]!, toA[index]!])),
    voltagesV: branches.map((index) => waveform(periodS, segments, ({ voltageV }) => [voltageV[index]!, voltageV[index]!])),
  }
}

function spanWhile(segments: readonly NetworkSegment[], holds: (segment: NetworkSegment) => boolean): number {
  let span = 0
  for (const segment of segments) {
    if (!holds(segment)) break
    span += segment.durationS
  }
  return span
}

function waveform(periodS: number, segments: readonly NetworkSegment[], of: (segment: NetworkSegment) => readonly [number, number]): Waveform {
  let tS = 0
  const points = segments.flatMap((segment, index): WaveformPoint[] => {
    const [from, to] = of(segment)
    const startS = tS
    tS = index === segments.length - 1 ? periodS : Math.min(periodS, tS + segment.durationS)
    return [[startS, from], [tS, to]]
  })
  return createWaveform(periodS, points)
}

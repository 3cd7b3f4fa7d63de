import type { Coil } from '../build'
import type { CurrentLimit, Duty } from '../specification'
import { dutyTraits, topologyOf } from '../topologies'
import type { Circuit, CircuitInput, CircuitWinding, NamedPoint, OperatingPoint } from '../topologies/topology'
import { UnreachablePoint } from '../topologies/unreachable'
import { attempt, positive, report } from './context'
import type { Context } from './context'
import { atFullLoad, cornerState } from './corner-result'
import type { CornerState } from './corner-result'
import type { InductanceBasis } from './inductance'
import { leakageBetweenH } from './leakage'
import { supplyRange } from './supply'
import type { SupplyRange } from './supply'

/** The duty's circuit, ready to be asked at any operating point. */
export interface SolvedCircuit {
  duty: Duty
  circuit: Circuit
  primary: CircuitWinding
  areaMm2: number | null
}

/** The circuit of the duty with the windings of the document; null without duty or primary. `inductanceH` is that at the primary. */
export function circuitOf(context: Context, { inductanceH, coil }: { inductanceH: number; coil: Coil | null }): SolvedCircuit | null {
  const duty = context.requirement?.duty
  const { specification, core, sets } = context
  const windings = specification.windings.filter(({ role, turns }) => role !== 'shield' && positive(turns))
  const primary = windings.find(({ id }) => id === context.primary?.id)
  if (!duty || !primary) return null
  const input: CircuitInput<Duty> = { duty, primary, windings, inductanceH, leakageH: leakageIn(context, coil) }
  const circuit = attempt(context, 'requirement.duty', () => topologyOf(duty).circuit(input))
  return circuit && { duty, circuit, primary, areaMm2: core ? core.effectiveAreaMm2 * sets : null }
}

function leakageIn(context: Context, coil: Coil | null): CircuitInput<Duty>['leakageH'] {
  const { specification } = context
  return (windingId, shortedIds) => {
    const driven = specification.windings.find(({ id }) => id === windingId)
    const shorted = specification.windings.filter(({ id }) => shortedIds.includes(id))
    return coil && driven && shorted.length > 0 ? leakageBetweenH(context, coil, driven, shorted) : null
  }
}

/** All corners that the duty asks: the input range with full and light load, and the overload of the current limit. */
export function cornersOf(context: Context, basis: InductanceBasis, coil: Coil | null): CornerState[] {
  const solved = circuitOf(context, { inductanceH: basis.nominalH, coil })
  if (!solved) return []
  context.findings.push(...solved.circuit.findings)
  if (!solved.circuit.solve) return []
  const topology = topologyOf(solved.duty)
  const points = topology.points?.(solved.duty) ?? converterPoints(context, solved.duty)
  const limited = limitPoint(context, solved, points)
  const corners = [...points, ...(limited ? [limited] : [])].flatMap((point) => cornerOf(context, solved, point) ?? [])
  reportModeChanges(context, corners)
  return corners
}

/** Light load that changes the way a converter conducts, at each input voltage where it does. */
function reportModeChanges(context: Context, corners: readonly CornerState[]): void {
  for (const { result: light } of corners.filter(({ result }) => result.name.startsWith('light-load'))) {
    const full = corners.find(({ result }) => result.inputV === light.inputV && atFullLoad(result))?.result
    if (full && full.mode !== light.mode) report(context, 'light-load-changes-mode', 'note', 'requirement.duty', { inputV: light.inputV, full: full.mode, light: light.mode })
  }
}

/** The overload of the current limit alone; null where no limit acts or it is not reached. */
export function limitCorner(context: Context, basis: InductanceBasis, coil: Coil | null): CornerState | null {
  const solved = circuitOf(context, { inductanceH: basis.nominalH, coil })
  if (!solved?.circuit.solve) return null
  const limited = limitPoint(context, solved, topologyOf(solved.duty).points?.(solved.duty) ?? converterPoints(context, solved.duty))
  return limited && cornerOf(context, solved, limited)
}

function cornerOf(context: Context, { circuit, primary, areaMm2 }: SolvedCircuit, point: NamedPoint): CornerState | null {
  return reached(context, 'requirement.duty', () => {
    const state = circuit.solve!(point)
    context.findings.push(...state.findings)
    return cornerState(state, { ...point, primary, areaMm2 })
  })
}

/** A point that the circuit cannot reach is told with the numbers it knows. */
function reached<T>(context: Context, path: string, solve: () => T): T | null {
  return attempt(context, path, () => {
    try {
      return solve()
    } catch (error) {
      if (!(error instanceof UnreachablePoint)) throw error
      context.findings.push(error.finding)
      return null
    }
  })
}

/** Full load at one input voltage, without findings: for the working voltage at the rated mains, or with another inductance. */
export function cornerAt(context: Context, { inductanceH, coil, inputV }: { inductanceH: number; coil: Coil | null; inputV: number }): CornerState | null {
  const quiet = { ...context, findings: [], working: null }
  const solved = circuitOf(quiet, { inductanceH, coil })
  return solved?.circuit.solve ? cornerOf(quiet, solved, { name: 'nominal-input', inputV, load: 'full', loadFactor: 1 }) : null
}

// ---------------------------------------------------------------------------------------------

/** The working range of voltages; without a valley of the bulk capacitor there is no minimum. Null where nothing is supplied. */
export function dutySupply(context: Context, duty: Duty): SupplyRange | null {
  const { supply, inputPowerW } = dutyTraits(duty)
  if (!supply) return null
  const answer = attempt(context, 'requirement.duty.supply', () => supplyRange(supply, inputPowerW ?? 0))
  if (answer?.state === 'known') return answer.range
  if (answer) report(context, 'bulk-capacitor-too-small', 'error', 'requirement.duty.supply.bulkCapacitanceF', { missingEnergyJ: answer.missingEnergyJ })
  return { minimumV: Number.NaN, nominalV: supply.nominalV * Math.SQRT2, maximumV: supply.maximumV * Math.SQRT2 }
}

/** Minimum, nominal and maximum input, each at full load and, where a load is left, at light load. */
function converterPoints(context: Context, duty: Duty): NamedPoint[] {
  const range = dutySupply(context, duty)
  if (!range) return []
  const inputs = [
    ['minimum-input', 'light-load-minimum-input', range.minimumV],
    ['nominal-input', 'light-load', range.nominalV],
    ['maximum-input', 'light-load-maximum-input', range.maximumV],
  ] as const
  const known = inputs.filter(([, , inputV]) => positive(inputV))
  const isLoaded = dutyTraits(duty).outputs.some(({ lightLoadCurrentA }) => lightLoadCurrentA > 0)
  return [
    ...known.map(([name, , inputV]): NamedPoint => ({ name, inputV, load: 'full', loadFactor: 1 })),
    ...(isLoaded ? known.map(([, name, inputV]): NamedPoint => ({ name, inputV, load: 'light', loadFactor: 1 })) : []),
  ]
}

/**
 * The overload at which the switch just reaches its greatest peak current, at the least input: there the windings carry
 * most. The loads are raised alike.
 */
function limitPoint(context: Context, { duty, circuit }: SolvedCircuit, points: readonly NamedPoint[]): NamedPoint | null {
  const limit = dutyTraits(duty).currentLimit
  const least = points.find(({ load }) => load === 'full')
  if (!limit || !least) return null
  const loadFactor = reached(context, 'requirement.duty.currentLimit', () => factorAtLimit(limit, (factor) => excessA(circuit, limit, { ...least, loadFactor: factor })))
  if (loadFactor === null) return null
  if (!positive(loadFactor)) {
    report(context, 'current-limit-not-reached', 'warning', 'requirement.duty.currentLimit', { limitA: limit.nominalA })
    return null
  }
  return { ...least, name: 'current-limit', loadFactor }
}

/** Peak current of the switch over what its limit lets through: I − I_lim·(1 + tol) − (di/dt)·t_d. Null without a switch. */
function excessA({ solve }: Circuit, { nominalA, tolerance, delayS }: CurrentLimit, point: OperatingPoint): number | null {
  const { switchPeakA, switchSlopeAPerS } = solve!(point)
  return switchPeakA === null ? null : switchPeakA - nominalA * (1 + tolerance) - (switchSlopeAPerS ?? 0) * delayS
}

/** The least and the greatest load, relative to full load, in which the limit is looked for. */
const LEAST_FACTOR = 1e-3
const GREATEST_FACTOR = 1e3
const FACTOR_PRECISION = 1e-13

/** The load factor at which the excess is zero, by the Illinois form of regula falsi between brackets; 0 where no load gets there. */
function factorAtLimit(limit: CurrentLimit, excess: (factor: number) => number | null): number | null {
  const atFull = excess(1)
  if (atFull === null) return null
  const step = atFull > 0 ? 1 / 4 : 4
  let [near, nearExcess] = [1, atFull]
  let [far, farExcess] = [1, atFull]
  while (Math.sign(farExcess) === Math.sign(atFull)) {
    ;[near, nearExcess] = [far, farExcess]
    far *= step
    if (far < LEAST_FACTOR || far > GREATEST_FACTOR) return 0
    farExcess = excessOrUnreachable(limit, excess, far)
  }
  for (let round = 0; round < 80 && Math.abs(far - near) > FACTOR_PRECISION * far && farExcess !== 0; round++) {
    const factor = (near * farExcess - far * nearExcess) / (farExcess - nearExcess)
    const value = excessOrUnreachable(limit, excess, factor)
    if (Math.abs(value) <= FACTOR_PRECISION * limit.nominalA) return factor
    if (Math.sign(value) === Math.sign(farExcess)) nearExcess /= 2
    else [near, nearExcess] = [far, farExcess]
    ;[far, farExcess] = [factor, value]
  }
  return far
}

/** A load that the circuit cannot carry counts as past the limit: the true limit lies below it. */
function excessOrUnreachable({ nominalA }: CurrentLimit, excess: (factor: number) => number | null, factor: number): number {
  try {
    return excess(factor) ?? 0
  } catch (error) {
    if (error instanceof RangeError) return 10 * nominalA
    throw error
  }
}

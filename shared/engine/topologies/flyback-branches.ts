import type { FlybackOutputDuty } from '../specification'
import type { FedOutput } from './outputs'
import { loadOf } from './outputs'
import type { CircuitFinding, CircuitWinding, OperatingPoint } from './topology'

export type Fed = FedOutput<FlybackOutputDuty>

/** The rectified way of one output: its own winding, and those below that it is joined to in series. */
export interface FlybackBranch {
  fed: Fed
  winding: CircuitWinding
  /** Indices of the branches whose own windings lie in series here, this one included. */
  through: readonly number[]
  /** Branch whose output's voltage this one stands on; −1 on its own return. */
  standsOn: number
  turns: number
  /** Magnitude of the voltage at the windings in series, drop included. */
  voltageV: number
}

/** Branches in the order of the outputs; an output whose lower one is not there stands on its own return, and a finding says so. */
export function flybackBranches(fed: readonly Fed[]): { branches: FlybackBranch[]; findings: CircuitFinding[] } {
  const findings: CircuitFinding[] = []
  const lower = fed.map(({ output, index }, own): number => {
    if (!output.stackedOn) return -1
    const found = fed.findIndex((other) => other.output.id === output.stackedOn!.outputId)
    if (found >= 0 && found !== own && !standsOn(fed, found, own)) return found
    findings.push({ code: 'stacked-output-not-found', severity: 'error', path: `requirement.duty.outputs.${index}.stackedOn`, values: { output: output.name } })
    return -1
  })
  const branches = fed.map((one, own): FlybackBranch => {
    const { output } = one
    const inSeries = output.stackedOn?.at === 'winding'
    const through = throughOf(fed, lower, own)
    const base = lower[own]! >= 0 && !inSeries ? Math.abs(fed[lower[own]!]!.output.voltageV) : 0
    return {
      fed: one,
      winding: one.windings[0]!,
      through,
      standsOn: inSeries ? -1 : lower[own]!,
      turns: through.reduce((sum, index) => sum + fed[index]!.windings[0]!.turns, 0),
      voltageV: Math.abs(Math.abs(output.voltageV) - base) + output.rectifierDropV,
    }
  })
  return { branches, findings }
}

/** Whether one output stands, by way of others, on another. */
function standsOn(fed: readonly Fed[], one: number, other: number): boolean {
  let at = one
  for (let step = 0; step <= fed.length; step++) {
    if (at === other) return true
    const next = fed[at]?.output.stackedOn?.outputId
    at = next === undefined ? -1 : fed.findIndex(({ output }) => output.id === next)
    if (at < 0) return false
  }
  return true
}

function throughOf(fed: readonly Fed[], lower: readonly number[], own: number): number[] {
  const below = lower[own]!
  return below >= 0 && fed[own]!.output.stackedOn?.at === 'winding' ? [own, ...throughOf(fed, lower, below)] : [own]
}

/** Mean current of each branch: its own load, and that of the outputs which stand on its voltage. */
export function branchCurrentsA(branches: readonly FlybackBranch[], point: OperatingPoint): number[] {
  const own = branches.map(({ fed }) => loadOf(fed.output, point))
  const total = (index: number): number => own[index]! + branches.reduce((sum, { standsOn: on }, other) => (on === index ? sum + total(other) : sum), 0)
  return branches.map((_, index) => total(index))
}

/** Output voltages with their signs from the magnitudes at the branches. */
export function outputVoltagesV(branches: readonly FlybackBranch[], atBranchesV: readonly number[]): number[] {
  const magnitude = (index: number): number => {
    const { fed, standsOn: on } = branches[index]!
    return atBranchesV[index]! - fed.output.rectifierDropV + (on >= 0 ? magnitude(on) : 0)
  }
  return branches.map(({ fed }, index) => (fed.output.voltageV < 0 ? -magnitude(index) : magnitude(index)))
}

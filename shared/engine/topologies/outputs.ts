import type { ConverterOutput } from '../specification'
import type { CircuitFinding, CircuitWinding } from './topology'

export interface FedOutput<O extends ConverterOutput> {
  output: O
  index: number
  windings: readonly CircuitWinding[]
}

/**
 * Each output with the windings that feed it, and what is wrong with them; outputs without their windings are left out.
 *
 * `needed` windings are asked for per output: one, or two half windings of a centre-tapped rectifier.
 */
export function fedOutputs<O extends ConverterOutput>(outputs: readonly O[], windings: readonly CircuitWinding[], primaryId: string, needed: (output: O) => number = () => 1) {
  const findings: CircuitFinding[] = []
  const fed = outputs.flatMap((output, index): FedOutput<O>[] => {
    const feeding = windings.filter(({ id, outputId }) => outputId === output.id && id !== primaryId)
    const count = needed(output)
    const path = `requirement.duty.outputs.${index}`
    if (feeding.length === 0) findings.push({ code: 'output-without-winding', severity: 'error', path, values: { output: output.name } })
    else if (feeding.length < count) findings.push({ code: 'output-lacks-half-winding', severity: 'error', path, values: { output: output.name, winding: feeding[0]!.name } })
    if (feeding.length > count) findings.push({ code: 'output-has-several-windings', severity: 'warning', path, values: { output: output.name, windings: feeding.map(({ name }) => name).join(', ') } })
    return feeding.length < count ? [] : [{ output, index, windings: feeding.slice(0, count) }]
  })
  return { fed, findings }
}

/** Power that all outputs take at full load, W. */
export const outputPowerW = (duty: { outputs: readonly ConverterOutput[] }): number =>
  duty.outputs.reduce((sum, { voltageV, fullLoadCurrentA }) => sum + Math.abs(voltageV) * fullLoadCurrentA, 0)

/** The regulated output: the first main one. */
export const regulatedIndex = (fed: readonly FedOutput<ConverterOutput>[]): number => Math.max(0, fed.findIndex(({ output }) => output.role === 'main'))

/** Load current at an operating point, A. */
export const loadOf = ({ fullLoadCurrentA, lightLoadCurrentA }: ConverterOutput, { load, loadFactor }: { load: 'full' | 'light'; loadFactor: number }): number =>
  (load === 'full' ? fullLoadCurrentA : lightLoadCurrentA) * loadFactor

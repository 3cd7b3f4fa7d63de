import type { Coil } from '../build'
import type { FaultCase } from '../evaluation'
import type { ConverterOutput, Duty } from '../specification'
import { THERMAL_CLASSES } from '../thermal/classes'
import { dutyTraits } from '../topologies'
import { explain } from './context'
import type { Context } from './context'
import type { CornerState } from './corner-result'
import { limitCorner } from './corners'
import type { InductanceBasis } from './inductance'
import type { SettledPoint } from './thermal'

export const FAULT_MODEL = 'steady state: the limit holds for good, its blanking time and a shut-down are not in it; rise as in normal operation'

/** What a short leaves of an output's voltage, across wiring and contacts. Source: common practice. */
const SHORT_SHARE = 0.02

interface FaultInput {
  basis: InductanceBasis | null
  coil: Coil | null
  corners: readonly CornerState[]
  settle: (corner: CornerState) => SettledPoint | null
}

/**
 * Temperatures under fault: every output overloaded to just below the current limit, and each output shorted in turn while the
 * limit holds, against the overload limit of the insulation system's class. Without a current limit nothing bounds a fault, and
 * the answer is not checkable.
 *
 * Source: cases as the product standards ask them (IEC 62368-1 annex G, IEC 61558-1 clause 15); limits see `THERMAL_CLASSES`.
 */
export function faultCases(context: Context, { basis, coil, corners, settle }: FaultInput): FaultCase[] {
  const duty = context.requirement?.duty
  if (!duty || !basis) return []
  const { outputs, currentLimit } = dutyTraits(duty)
  if (outputs.length === 0) return []
  const overload = corners.find(({ result }) => result.name === 'current-limit') ?? null
  const shorts = outputs.map((output, index) => ({ output, corner: currentLimit ? shortedCorner(context, { basis, coil, duty, index }) : null }))
  const cases = [
    caseOf(context, { kind: 'overload', output: null, corner: overload, settle }),
    ...shorts.map(({ output, corner }) => caseOf(context, { kind: 'shorted-output', output, corner, settle })),
  ]
  cases.forEach((one, index) => explainCase(context, one, index))
  return cases
}

function caseOf(context: Context, { kind, output, corner, settle }: { kind: FaultCase['kind']; output: ConverterOutput | null; corner: CornerState | null; settle: FaultInput['settle'] }): FaultCase {
  const limitC = overloadLimitC(context)
  const point = corner && settle(corner)
  const windingC = point && !point.runaway ? point.temperatureC : null
  const state = point === null || limitC === null ? 'not-checkable' : !point.runaway && point.temperatureC <= limitC ? 'met' : 'not-met'
  return { kind, outputId: output?.id ?? null, output: output?.name ?? null, lossW: point?.lossW ?? null, windingC, runaway: point?.runaway ?? false, limitC, state, model: FAULT_MODEL }
}

/** Winding temperature that the class allows under overload, °C, by resistance; null where the table has none. */
function overloadLimitC({ specification }: Context): number | null {
  const classC = specification.insulation.systemThermalClassC.value
  return THERMAL_CLASSES.find((row) => row.classC === classC)?.overloadLimitC ?? null
}

/** The corner of the current limit when one output has nearly no voltage left and the others no load. */
function shortedCorner(context: Context, { basis, coil, duty, index }: { basis: InductanceBasis; coil: Coil | null; duty: Duty; index: number }): CornerState | null {
  const shorted = withShort(duty, index)
  if (!shorted || !context.requirement) return null
  const quiet: Context = { ...context, requirement: { ...context.requirement, duty: shorted }, findings: [], working: null }
  return limitCorner(quiet, basis, coil)
}

/** The duty with one output shorted: that one decides the voltages, the others carry nothing. */
function withShort(duty: Duty, index: number): Duty | null {
  // A gate drive's outputs have no voltage of their own, and its driver no current limit.
  if (!('outputs' in duty) || duty.topology === 'gate-drive') return null
  const outputs = duty.outputs.map((output, place) =>
    place === index
      ? { ...output, role: 'main' as const, voltageV: output.voltageV * SHORT_SHARE, lightLoadCurrentA: 0 }
      : { ...output, role: 'auxiliary' as const, fullLoadCurrentA: 0, lightLoadCurrentA: 0 })
  return { ...duty, outputs } as Duty
}

function explainCase(context: Context, { kind, output, windingC, lossW, limitC }: FaultCase, index: number): void {
  explain(context, `faults.${index}.windingC`, () => ({
    symbol: 'T', value: windingC, unit: '°C', formula: 'T_amb + ΔT(P(T)) at the current limit', source: 'heat balance; limits IEC 60950-1 Table C.1 as taken up in IEC 62368-1 (from memory)',
    inputs: [
      { name: 'case', value: kind === 'overload' ? 'all outputs overloaded' : `${output ?? 'output'} shorted`, unit: '', origin: 'requirement.duty.currentLimit' },
      { name: 'P', value: lossW ?? 'not known', unit: 'W', origin: 'losses at this point' },
      { name: 'limit', value: limitC ?? 'not known', unit: '°C', origin: 'insulation.systemThermalClassC, overload' },
    ],
  }))
}

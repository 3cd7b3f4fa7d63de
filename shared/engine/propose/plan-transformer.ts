import { supplyRange } from '../evaluate/supply'
import type { SupplyRange } from '../evaluate/supply'

import type { RectifierForm } from '../duties/converter'
import type { Finding } from '../findings'
import type { ConverterOutput, Duty } from '../specification'
import { topologyOf } from '../topologies'
import { outputPowerW } from '../topologies/outputs'
import type { CircuitWinding } from '../topologies/topology'
import { UnreachablePoint } from '../topologies/unreachable'
import type { Waveform } from '../waveforms/waveform'
import type { Plan, WindingNeed } from './plan'
import { greatestLoad } from './sizing'
import { transformerTurns } from './transformer-turns'

type TransformerDuty = Extract<Duty, { topology: 'forward' | 'half-bridge' | 'full-bridge' | 'push-pull' | 'llc' }>
type Need = Omit<WindingNeed, 'rmsA' | 'acShare'>

/** The direct voltages of a duty; a bulk capacitor that runs empty is told, and the least voltage assumed. */
export function planRange(duty: TransformerDuty, findings: Finding[]): SupplyRange {
  const answer = supplyRange(duty.supply, outputPowerW(duty) / duty.efficiency)
  if (answer.state === 'known') return answer.range
  findings.push({ code: 'bulk-capacitor-too-small', severity: 'error', path: 'requirement.duty.supply.bulkCapacitanceF', values: { missingEnergyJ: answer.missingEnergyJ } })
  const { minimumV, nominalV, maximumV } = duty.supply
  return { minimumV: Math.SQRT2 * minimumV * 0.7, nominalV: Math.SQRT2 * nominalV, maximumV: Math.SQRT2 * maximumV }
}

/** Factor by which losses beyond the stated drops raise what the outputs need. */
export function lossFactor({ outputs, efficiency }: TransformerDuty): number {
  const withDropsW = outputs.reduce((sum, { voltageV, rectifierDropV, fullLoadCurrentA }) => sum + (Math.abs(voltageV) + rectifierDropV) * fullLoadCurrentA, 0)
  return Math.max(1, outputPowerW({ outputs }) / efficiency / withDropsW)
}

export interface TransformerPlan {
  duty: TransformerDuty
  range: SupplyRange
  /** Primary over regulated secondary, one half each where they are tapped. */
  ratio: number
  /** The ratio is the greatest that the duty ratio allows, not the one wanted. */
  isLimit: boolean
  /** Turns of a reset winding over those of the primary; null without one. */
  resetShare: number | null
  /** Inductance for the waveforms by which wires are chosen, and of a gapped core. */
  inductanceH: number
  transformer: NonNullable<Plan['transformer']>
  findings: Finding[]
  reasons: Plan['reasons']
}

/** Everything of a plan that follows from ratio, inductance and volt-seconds. */
export function planFrom({ duty, range, ratio, isLimit, resetShare, inductanceH, transformer, findings, reasons }: TransformerPlan): Plan {
  const frequencyHz = topologyOf<Duty>(duty).traits(duty).frequencyHz.minimum
  return {
    frequencyHz,
    inductanceH,
    powerW: outputPowerW(duty),
    onMains: duty.supply.kind === 'mains',
    worstCurrentA: (ofH) => transformer.worstVs / ofH,
    windings: (least) => {
      const turns = transformerTurns(duty.outputs, { ratio, least, isLimit })
      const needs = windingsOf(duty, turns, resetShare)
      const currents = currentsOf(duty, needs, { range, inductanceH })
      return needs.map((need): WindingNeed => ({ ...need, ...greatestLoad(currents.get(need.id)!) }))
    },
    transformer,
    findings,
    reasons,
  }
}

const isTapped = (output: ConverterOutput) => (output as ConverterOutput & { rectifier?: RectifierForm }).rectifier === 'centre-tapped'

/** Primary or its halves, the reset winding, then the outputs in their order, halves one after the other. */
function windingsOf(duty: TransformerDuty, turns: ReturnType<typeof transformerTurns>, resetShare: number | null): Need[] {
  const powerW = outputPowerW(duty)
  const primary = (name: string): Omit<Need, 'id'> => ({ name, role: 'primary', side: 'primary', outputId: null, partnerId: null, turns: turns.primary, powerW })
  const own = duty.topology === 'push-pull' ? [primary('P1'), primary('P2')] : [primary('P')]
  const reset = resetShare === null ? [] : [{ ...primary('R'), role: 'reset' as const, turns: Math.max(1, Math.floor(turns.primary * Math.min(1, resetShare))), powerW: 0 }]
  const auxiliaries = duty.outputs.filter(({ role }) => role === 'auxiliary').length
  const counts = { main: 0, auxiliary: 0 }
  const secondaries = duty.outputs.flatMap((output): (Omit<Need, 'id'> & { half: boolean })[] => {
    const number = ++counts[output.role]
    const name = output.role === 'main' ? `S${number}` : auxiliaries > 1 ? `AUX${number}` : 'AUX'
    const need = { role: output.role === 'auxiliary' ? ('auxiliary' as const) : ('secondary' as const), side: output.side, outputId: output.id, partnerId: null, turns: turns.outputs.get(output.id)!, powerW: Math.abs(output.voltageV) * output.fullLoadCurrentA }
    return isTapped(output) ? [{ ...need, name: `${name}A`, half: true }, { ...need, name: `${name}B`, half: true }] : [{ ...need, name, half: false }]
  })
  const all = [...own, ...reset, ...secondaries]
  return all.map((need, index) => {
    const { half, ...plain } = { half: false, ...need }
    const partner = half ? (need.name.endsWith('A') ? index + 2 : index) : null
    return { ...plain, id: `w${index + 1}`, partnerId: partner === null ? null : `w${partner}` }
  })
}

/** Currents of every winding over the input range at full load. @throws RangeError where none of the inputs can be reached */
function currentsOf(duty: TransformerDuty, needs: readonly Need[], { range, inductanceH }: { range: SupplyRange; inductanceH: number }): Map<string, Waveform[]> {
  const windings: CircuitWinding[] = needs.map(({ id, name, role, side, outputId, turns }) => ({ id, name, role, side, outputId, turns }))
  const { solve } = topologyOf<Duty>(duty).circuit({ duty, primary: windings[0]!, windings, inductanceH, leakageH: () => null })
  if (!solve) throw new RangeError('the planned windings must serve the duty')
  const states = [range.minimumV, range.nominalV, range.maximumV].flatMap((inputV) => {
    try {
      return [solve({ inputV, load: 'full', loadFactor: 1 })]
    } catch (error) {
      if (error instanceof UnreachablePoint) return []
      throw error
    }
  })
  if (states.length === 0) throw new RangeError('no input voltage of the range reaches the outputs')
  return new Map(needs.map(({ id, name }) => [id, states.map((state) => {
    const waves = state.windings.get(id)
    // Two outputs of one name, say: the circuit knows only one of them.
    if (!waves) throw new RangeError(`the circuit leaves out the winding ${name}`)
    return waves.currentA
  })]))
}


import type { Evaluation } from '../evaluation'
import { peakFluxDensityT } from '../magnetics/flux'
import { dutyTraits, topologyOf } from '../topologies'
import type { CircuitWinding } from '../topologies/topology'
import { peak } from '../waveforms/statistics'
import { attempt, explain, positive, report } from './context'
import type { Context } from './context'
import { atFullLoad } from './corner-result'
import type { CornerState } from './corner-result'
import { cornerAt } from './corners'
import { originOf } from './inductance'
import type { InductanceBasis } from './inductance'

export interface WorstFlux {
  /** Magnetising current of the worst flux, in terms of the primary. */
  currentA: number
  fluxT: number | null
}

interface Worst {
  currentA: number
  /** Inductance that the flux is counted with. */
  inductanceH: number
  formula: string
  inputs: { name: string; value: number | string; unit: string; origin: string }[]
}

/**
 * The worst flux on the least area: of a part that stores energy, greatest inductance at the greatest current the switch lets
 * through (the delay of the limit adds V·t_d volt-seconds whatever the inductance, so one inductance is used for both parts); of a
 * transformer, the longest pulse at the greatest input, from zero.
 */
export function worstFlux(context: Context, basis: InductanceBasis, corners: readonly CornerState[]): WorstFlux | null {
  const worst = worstCurrent(context, basis, corners)
  if (!worst) return null
  const { core, sets } = context
  const areaMm2 = core ? core.minimumAreaMm2 * sets : null
  const { inductanceH } = worst
  const fluxT = areaMm2 === null ? null : attempt(context, 'core.core', () => peakFluxDensityT({ inductanceH, currentA: worst.currentA, turns: basis.turns, areaMm2 }))
  explain(context, 'magnetics.worstCurrentA', () => ({ symbol: 'Î_max', value: worst.currentA, unit: 'A', formula: worst.formula, source: 'Faraday’s law', inputs: worst.inputs }))
  explain(context, 'magnetics.fluxWorstT', () => ({
    symbol: 'B̂_max', value: fluxT, unit: 'T', formula: 'L·Î_max/(N·A_min)', source: 'Faraday’s law',
    inputs: [
      { name: 'L', value: inductanceH, unit: 'H', origin: inductanceH === basis.maximumH ? 'electrical.inductance, upper tolerance' : 'electrical.inductance, lower tolerance' }, { name: 'Î_max', value: worst.currentA, unit: 'A', origin: 'magnetics.worstCurrentA' },
      { name: 'N', value: basis.turns, unit: '', origin: 'windings.turns' }, { name: 'A_min', value: areaMm2 ?? 'not known', unit: 'mm²', origin: originOf(context, 'core') },
    ],
  }))
  return { currentA: worst.currentA, fluxT }
}

/** Greatest peak current of a winding at full load, A; null where its corners are not known. */
export function fullLoadPeakA({ corners }: Pick<Evaluation, 'corners'>, windingId: string): number | null {
  const peaks = corners.filter(atFullLoad).flatMap(({ windings }) => windings.filter((winding) => winding.windingId === windingId).map(({ peakA }) => peakA))
  return peaks.length > 0 ? Math.max(...peaks) : null
}

function worstCurrent(context: Context, basis: InductanceBasis, corners: readonly CornerState[]): Worst | null {
  const duty = context.requirement?.duty
  if (!duty) return statedWorstCurrent(context, basis)
  if (topologyOf(duty).core !== 'stores-energy') return worstPulse(context, basis)
  const limited = limitedCurrent(context, basis)
  if (!limited) {
    report(context, 'current-limit-not-stated', 'warning', 'requirement.duty.currentLimit')
    return null
  }
  // The greater of limit and full load: a limit below what the load takes limits nothing that is known.
  const loadA = magnetisingPeakA(context, basis, corners)
  if (loadA === null || loadA <= limited.currentA) return limited
  return { ...limited, currentA: loadA, formula: 'Î at full load with L_min, above the current limit', inputs: [{ name: 'L_min', value: basis.minimumH, unit: 'H', origin: 'electrical.inductance, lower tolerance' }, ...limited.inputs] }
}

/** Peak of the magnetising current at full load, A, with the least inductance, where the ripple is greatest. */
function magnetisingPeakA(context: Context, { minimumH, turns }: InductanceBasis, corners: readonly CornerState[]): number | null {
  const peaks = corners.filter(({ result }) => atFullLoad(result)).map(({ result }) => {
    const corner = cornerAt(context, { inductanceH: minimumH, coil: null, inputV: result.inputV })
    return corner ? (peak(corner.fluxWb) * turns) / minimumH : 0
  })
  return peaks.length > 0 ? Math.max(...peaks) : null
}

function limitedCurrent(context: Context, basis: InductanceBasis): Worst | null {
  const duty = context.requirement?.duty
  if (!duty) return null
  const { currentLimit: limit, supply } = dutyTraits(duty)
  if (!limit || !supply) return null
  const maximumV = supply.kind === 'dc' ? supply.maximumV : Math.SQRT2 * supply.maximumV
  const weight = topologyOf(duty).limitWeight?.(duty) ?? 1
  const currentA = limit.nominalA * (1 + limit.tolerance) * weight + (maximumV * limit.delayS) / basis.maximumH
  return {
    currentA,
    inductanceH: basis.maximumH,
    formula: weight === 1 ? 'I_lim·(1 + tol) + V_max·t_d/L_max' : 'I_lim·(1 + tol)·N_2/N_1 + V_max·t_d/L_max',
    inputs: [
      { name: 'I_lim', value: limit.nominalA, unit: 'A', origin: 'requirement.duty.currentLimit' }, { name: 'tol', value: limit.tolerance, unit: '', origin: 'requirement.duty.currentLimit' },
      { name: 't_d', value: limit.delayS, unit: 's', origin: 'requirement.duty.currentLimit' }, { name: 'V_max', value: maximumV, unit: 'V', origin: 'requirement.duty.supply' },
      { name: 'L_max', value: basis.maximumH, unit: 'H', origin: 'electrical.inductance' },
    ],
  }
}

/** The volt-seconds of the longest pulse over the least inductance. */
function worstPulse(context: Context, basis: InductanceBasis): Worst | null {
  const duty = context.requirement!.duty
  const { primary } = context
  if (!primary) return null
  const windings = context.specification.windings.filter(({ turns, role }) => positive(turns) && role !== 'shield') as readonly CircuitWinding[]
  const pulse = attempt(context, 'requirement.duty', () => topologyOf(duty).worstPulse?.({ duty, primary: { ...primary }, windings }) ?? null)
  if (!pulse || !positive(pulse.voltSecondsVs)) return null
  return {
    currentA: pulse.voltSecondsVs / basis.minimumH,
    inductanceH: basis.minimumH,
    formula: `(${pulse.formula})/L_min`,
    inputs: [{ name: 'λ', value: pulse.voltSecondsVs, unit: 'V·s', origin: 'requirement.duty' }, { name: 'L_min', value: basis.minimumH, unit: 'H', origin: 'electrical.inductance, lower tolerance' }],
  }
}

/** Without a requirement sheet the current of the saturation limit is the worst one. */
function statedWorstCurrent({ specification, primary }: Context, { maximumH }: InductanceBasis): Worst | null {
  const stated = specification.electrical.saturation.filter(({ windingId }) => windingId === primary?.id).map(({ currentA }) => currentA)
  const currentA = Math.max(0, ...stated)
  if (!positive(currentA)) return null
  return { currentA, inductanceH: maximumH, formula: 'as stated for the inductance at bias', inputs: [{ name: 'I', value: currentA, unit: 'A', origin: 'electrical.saturation' }] }
}

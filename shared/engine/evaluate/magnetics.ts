import type { Evaluation, MagneticsResult } from '../evaluation'
import { peakFluxDensityT, saturationFluxDensityT } from '../magnetics/flux'
import { flybackBoundaryInductanceH } from '../topologies/flyback-design'
import { maximum } from '../waveforms/statistics'
import { attempt, explain, positive, report } from './context'
import type { Context } from './context'
import type { CornerState } from './corner-result'
import { flybackCornerAt } from './flyback-corners'
import { gapOf, originOf } from './inductance'
import type { InductanceBasis } from './inductance'

/** Saturation is never taken colder than this, °C: power ferrite runs there, and catalogues state it. */
const LEAST_SATURATION_TEMPERATURE_C = 100

interface MagneticsInput {
  basis: InductanceBasis | null
  corners: readonly CornerState[]
  temperatureC: number | null
}

export function magneticsResult(context: Context, { basis, corners, temperatureC }: MagneticsInput): MagneticsResult {
  const gap = gapOf(context, basis)
  const worst = basis ? worstFlux(context, basis, corners) : null
  const hotC = Math.max(LEAST_SATURATION_TEMPERATURE_C, temperatureC ?? 0)
  const saturationT = saturationOf(context, hotC)
  const fluxUtilisation = worst?.fluxT != null && saturationT !== null ? worst.fluxT / saturationT : null
  return {
    inductanceH: basis?.nominalH ?? null,
    inductanceMinimumH: basis?.minimumH ?? null,
    inductanceMaximumH: basis?.maximumH ?? null,
    alH: basis?.alH ?? null,
    gapMm: gap.gapMm,
    fringingFactor: gap.fringingFactor,
    gapModel: gap.model,
    fluxPeakT: peakFlux(context, corners),
    fluxWorstT: worst?.fluxT ?? null,
    worstCurrentA: worst?.currentA ?? null,
    saturationT,
    saturationTemperatureC: saturationT === null ? null : hotC,
    fluxUtilisation,
    boundaryInductanceH: boundaryInductance(context, corners),
  }
}

function peakFlux(context: Context, corners: readonly CornerState[]): number | null {
  const { core } = context
  const corner = corners.find(({ result }) => result.name === 'minimum-input') ?? corners[0]
  const value = corner?.result.fluxPeakT ?? null
  explain(context, 'magnetics.fluxPeakT', () => ({
    symbol: 'B̂', value, unit: 'T', formula: 'L·Î/(N·A_e)', source: 'Faraday’s law',
    inputs: [{ name: 'corner', value: corner?.result.name ?? 'none', unit: '', origin: 'corners' }, { name: 'A_e', value: core?.effectiveAreaMm2 ?? 'not known', unit: 'mm²', origin: originOf(context, 'core') }],
  }))
  return value
}

interface WorstFlux {
  currentA: number
  fluxT: number | null
}

/**
 * The worst flux: greatest inductance at the greatest current the switch lets through, on the least area. The delay of
 * the limit adds V·t_d volt-seconds whatever the inductance, so one inductance is used for both parts.
 */
function worstFlux(context: Context, basis: InductanceBasis, corners: readonly CornerState[]): WorstFlux | null {
  const worst = worstCurrent(context, basis, corners)
  if (!worst) {
    report(context, 'current-limit-not-stated', 'warning', 'requirement.duty.currentLimit')
    return null
  }
  const { core, sets } = context
  const areaMm2 = core ? core.minimumAreaMm2 * sets : null
  const fluxT = areaMm2 === null ? null : attempt(context, 'core.core', () => peakFluxDensityT({ inductanceH: basis.maximumH, currentA: worst.currentA, turns: basis.turns, areaMm2 }))
  explain(context, 'magnetics.worstCurrentA', () => ({ symbol: 'Î_max', value: worst.currentA, unit: 'A', formula: worst.formula, source: 'Faraday’s law over the delay of the current limit', inputs: worst.inputs }))
  explain(context, 'magnetics.fluxWorstT', () => ({
    symbol: 'B̂_max', value: fluxT, unit: 'T', formula: 'L_max·Î_max/(N·A_min)', source: 'Faraday’s law',
    inputs: [
      { name: 'L_max', value: basis.maximumH, unit: 'H', origin: 'electrical.inductance, upper tolerance' }, { name: 'Î_max', value: worst.currentA, unit: 'A', origin: 'magnetics.worstCurrentA' },
      { name: 'N', value: basis.turns, unit: '', origin: 'windings.turns' }, { name: 'A_min', value: areaMm2 ?? 'not known', unit: 'mm²', origin: originOf(context, 'core') },
    ],
  }))
  return { currentA: worst.currentA, fluxT }
}

interface WorstCurrent {
  currentA: number
  formula: string
  inputs: { name: string; value: number | string; unit: string; origin: string }[]
}

/** Corners at full load: neither at light load nor in the overload of the current limit. */
const FULL_LOAD: readonly string[] = ['minimum-input', 'nominal-input', 'maximum-input']

/** Greatest peak current of a winding at full load, A; null where its corners are not known. */
export function fullLoadPeakA({ corners }: Pick<Evaluation, 'corners'>, windingId: string): number | null {
  const peaks = corners.filter(({ name }) => FULL_LOAD.includes(name)).flatMap(({ windings }) => windings.filter((winding) => winding.windingId === windingId).map(({ peakA }) => peakA))
  return peaks.length > 0 ? Math.max(...peaks) : null
}

/** The greater of limit and full load: a limit below what the load takes limits nothing that is known. */
function worstCurrent(context: Context, basis: InductanceBasis, corners: readonly CornerState[]): WorstCurrent | null {
  if (!context.requirement) return statedWorstCurrent(context)
  const limited = limitedCurrent(context, basis)
  const loadA = limited ? magnetisingPeakA(context, basis, corners) : null
  if (!limited || loadA === null || loadA <= limited.currentA) return limited
  return { currentA: loadA, formula: 'Î at full load with L_min, above the current limit', inputs: [{ name: 'L_min', value: basis.minimumH, unit: 'H', origin: 'electrical.inductance, lower tolerance' }, ...limited.inputs] }
}

/** Peak of the magnetising current at full load, A, with the least inductance, where the ripple is greatest. */
function magnetisingPeakA(context: Context, basis: InductanceBasis, corners: readonly CornerState[]): number | null {
  const duty = context.requirement?.duty
  const silent = { ...context, findings: [], working: null }
  const loaded = corners.filter(({ result }) => FULL_LOAD.includes(result.name))
  const flyback = duty?.topology === 'flyback'
  const states = flyback ? loaded.flatMap(({ result }) => flybackCornerAt(silent, duty, { ...basis, nominalH: basis.minimumH }, result.inputV) ?? []) : loaded
  const peaks = states.map(({ waves }) =>
    [...waves].filter(([id]) => !flyback || id === context.primary?.id).reduce((sum, [id, { currentA }]) => sum + maximum(currentA) * turnsShare(context, id), 0))
  return peaks.length > 0 ? Math.max(...peaks) : null
}

/** A winding's turns over those of the first: its current magnetises the core by as much. */
function turnsShare({ specification, primary }: Context, id: string): number {
  const turns = specification.windings.find((winding) => winding.id === id)?.turns ?? 0
  return primary && primary.turns > 0 ? turns / primary.turns : 0
}

function limitedCurrent(context: Context, basis: InductanceBasis): WorstCurrent | null {
  const duty = context.requirement?.duty
  if (!duty) return null
  const limit = duty.currentLimit
  if (!limit) return null
  const maximumV = duty.supply.kind === 'dc' ? duty.supply.maximumV : Math.SQRT2 * duty.supply.maximumV
  // The switch of a coupled inductor carries both windings' currents; with more turns on the second they weigh more.
  const weight = duty.topology === 'coupled-inductor' ? Math.max(1, duty.ratio) : 1
  const currentA = limit.nominalA * (1 + limit.tolerance) * weight + (maximumV * limit.delayS) / basis.maximumH
  return {
    currentA,
    formula: weight === 1 ? 'I_lim·(1 + tol) + V_max·t_d/L_max' : 'I_lim·(1 + tol)·N_2/N_1 + V_max·t_d/L_max',
    inputs: [
      { name: 'I_lim', value: limit.nominalA, unit: 'A', origin: 'requirement.duty.currentLimit' }, { name: 'tol', value: limit.tolerance, unit: '', origin: 'requirement.duty.currentLimit' },
      { name: 't_d', value: limit.delayS, unit: 's', origin: 'requirement.duty.currentLimit' }, { name: 'V_max', value: maximumV, unit: 'V', origin: 'requirement.duty.supply' },
      { name: 'L_max', value: basis.maximumH, unit: 'H', origin: 'electrical.inductance' },
    ],
  }
}

/** Without a requirement sheet the current of the saturation limit is the worst one. */
function statedWorstCurrent({ specification, primary }: Context): WorstCurrent | null {
  const stated = specification.electrical.saturation.filter(({ windingId }) => windingId === primary?.id).map(({ currentA }) => currentA)
  const currentA = Math.max(0, ...stated)
  if (!positive(currentA)) return null
  return { currentA, formula: 'as stated for the inductance at bias', inputs: [{ name: 'I', value: currentA, unit: 'A', origin: 'electrical.saturation' }] }
}

function saturationOf(context: Context, temperatureC: number): number | null {
  const { material } = context
  if (!material || material.saturation.length === 0) {
    if (material) report(context, 'no-saturation-data', 'warning', 'core.material', { material: material.name })
    return null
  }
  const answer = attempt(context, 'core.material', () => saturationFluxDensityT(material.saturation, temperatureC))
  if (answer?.state !== 'known') {
    report(context, 'no-saturation-data', 'warning', 'core.material', { material: material.name, temperatureC })
    return null
  }
  explain(context, 'magnetics.saturationT', () => ({
    symbol: 'B_sat', value: answer.value, unit: 'T', formula: 'straight line between the published points', source: originOf(context, 'material'),
    inputs: [{ name: 'T', value: temperatureC, unit: '°C', origin: 'thermal.windingC, at least 100 °C' }],
  }))
  return answer.value
}

/** Inductance at which conduction is just continuous at minimum input and full load. */
function boundaryInductance(context: Context, corners: readonly CornerState[]): number | null {
  const duty = context.requirement?.duty
  const corner = corners.find(({ result }) => result.name === 'minimum-input')
  const wave = corner?.waves.get(context.primary?.id ?? '')
  if (duty?.topology !== 'flyback' || !corner || !wave) return null
  const inputVoltageV = corner.result.inputV - duty.switchDropV
  const reflectedV = -Math.min(...wave.voltageV.points.map(([, voltageV]) => voltageV))
  const powerW = corner.result.inputPowerW * (inputVoltageV / corner.result.inputV)
  return attempt(context, 'requirement.duty', () =>
    flybackBoundaryInductanceH({ inputVoltageV, dutyCycle: reflectedV / (reflectedV + inputVoltageV), powerW, frequencyHz: duty.switchingFrequencyHz }),
  )
}

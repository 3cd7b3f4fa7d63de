import type { Coil } from '../build'
import type { MagneticsResult } from '../evaluation'
import { saturationFluxDensityT } from '../magnetics/flux'
import { topologyOf } from '../topologies'
import { biasResult } from './bias'
import { attempt, explain, positive, report } from './context'
import type { Context } from './context'
import type { CornerState } from './corner-result'
import { gapByWindowField } from './gap-field'
import { gapOf, originOf } from './inductance'
import type { InductanceBasis } from './inductance'
import { worstFlux } from './worst-flux'

export { fullLoadPeakA } from './worst-flux'

/** Saturation is never taken colder than this, °C: power ferrite runs there, and catalogues state it. */
const LEAST_SATURATION_TEMPERATURE_C = 100

interface MagneticsInput {
  coil: Coil | null
  basis: InductanceBasis | null
  corners: readonly CornerState[]
  temperatureC: number | null
}

export function magneticsResult(context: Context, { coil, basis, corners, temperatureC }: MagneticsInput): MagneticsResult {
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
    gapFieldMm: gap.gapMm ? gapByWindowField(context, coil, basis) : null,
    fluxPeakT: peakFlux(context, corners),
    fluxWorstT: worst?.fluxT ?? null,
    worstCurrentA: worst?.currentA ?? null,
    saturationT,
    saturationTemperatureC: saturationT === null ? null : hotC,
    fluxUtilisation,
    boundaryInductanceH: boundaryInductance(corners),
    ...swingOf(context, corners),
    ...biasResult(context, basis, corners),
    fluxTransientT: firstPulseFlux(context, worst?.fluxT ?? null),
  }
}

const isBipolar = ({ requirement }: Context) => requirement !== null && topologyOf(requirement.duty).core === 'bipolar'

/** A core that is driven both ways stands at zero flux before the first pulse, which then takes it twice as far as any later one. */
function firstPulseFlux(context: Context, fluxT: number | null): number | null {
  if (!isBipolar(context)) return null
  explain(context, 'magnetics.fluxTransientT', () => ({
    symbol: 'B̂_0', value: fluxT, unit: 'T', formula: 'λ_max/(N·A_min), the longest pulse at the greatest input from zero flux', source: 'Faraday’s law',
    inputs: [{ name: 'Î_max', value: fluxT === null ? 'not known' : 'as for the worst flux', unit: '', origin: 'magnetics.worstCurrentA' }],
  }))
  return fluxT
}

function peakFlux(context: Context, corners: readonly CornerState[]): number | null {
  const { core, sets, requirement } = context
  const corner = corners.find(({ result }) => result.name === 'minimum-input') ?? corners[0]
  const value = corner?.result.fluxPeakT ?? null
  explain(context, 'magnetics.fluxPeakT', () => ({
    symbol: 'B̂', value, unit: 'T', formula: requirement ? topologyOf(requirement.duty).words.flux : 'no corner', source: 'Faraday’s law',
    inputs: [{ name: 'corner', value: corner?.result.name ?? 'none', unit: '', origin: 'corners' }, { name: 'A_e', value: core ? core.effectiveAreaMm2 * sets : 'not known', unit: 'mm²', origin: originOf(context, 'core') }],
  }))
  return value
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
const boundaryInductance = (corners: readonly CornerState[]): number | null =>
  corners.find(({ result }) => result.name === 'minimum-input')?.result.figures.find(({ code }) => code === 'boundary-inductance')?.value ?? null

interface Swing {
  voltSecondsVs: number | null
  fluxSwingT: number | null
}

/** Greatest volt-seconds and swing over all corners, on the least area. */
function swingOf(context: Context, corners: readonly CornerState[]): Swing {
  const { core, sets, primary } = context
  const voltSecondsVs = corners.length > 0 ? Math.max(...corners.map(({ result }) => result.voltSecondsVs)) : null
  const areaMm2 = core ? core.minimumAreaMm2 * sets : null
  const fluxSwingT = voltSecondsVs !== null && areaMm2 && positive(primary?.turns) ? (voltSecondsVs * 1e6) / (primary.turns * areaMm2) : null
  explain(context, 'magnetics.voltSecondsVs', () => ({ symbol: 'λ', value: voltSecondsVs, unit: 'V·s', formula: 'max of ∫u dt over the corners', source: 'Faraday’s law', inputs: [{ name: 'corners', value: corners.length, unit: '', origin: 'corners' }] }))
  explain(context, 'magnetics.fluxSwingT', () => ({
    symbol: 'ΔB', value: fluxSwingT, unit: 'T', formula: 'λ/(N·A_min)', source: 'Faraday’s law',
    inputs: [{ name: 'λ', value: voltSecondsVs ?? 'not known', unit: 'V·s', origin: 'magnetics.voltSecondsVs' }, { name: 'N', value: primary?.turns ?? 'not known', unit: '', origin: 'windings.turns' }, { name: 'A_min', value: areaMm2 ?? 'not known', unit: 'mm²', origin: originOf(context, 'core') }],
  }))
  return { voltSecondsVs, fluxSwingT }
}

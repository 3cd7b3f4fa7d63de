import { saturationFluxDensityT } from '../magnetics/flux'
import type { Topology, WindingSpecification } from '../specification'
import { atLeast, atMost, notCheckable, storesEnergy, yesNo } from './outcome'
import type { Check, CheckInput, Outcome } from './outcome'

/** Share of the way to saturation that a transformer's flux may use. Source: common practice. */
const FLUX_SHARE = 0.8

/** Flux density that a bridge's steady state may reach where losses set no lower one, T. Source: common practice. */
const BRIDGE_STEADY_T = 0.2

/** Whether the drawing or the duty names one of these topologies. */
export const isTopology = ({ document }: CheckInput, ...wanted: Topology[]): boolean =>
  [document.specification.electrical.topology.value, document.requirement?.duty.topology].some((topology) => topology != null && wanted.includes(topology))

/** Greatest flux density of the corners, carried from the effective to the least area; null without any. */
function steadyPeakT({ evaluation, context }: CheckInput): number | null {
  const values = evaluation.corners.flatMap(({ fluxPeakT }) => (fluxPeakT === null ? [] : [fluxPeakT]))
  if (values.length === 0 || !context.core || !(context.core.minimumAreaMm2 > 0)) return null
  return (Math.max(...values) * context.core.effectiveAreaMm2) / context.core.minimumAreaMm2
}

/** A forward core starts at its remanence, and has only the rest of the way. */
function forwardSwing(input: CheckInput): Outcome[] {
  if (!isTopology(input, 'forward')) return []
  const { saturationT } = input.evaluation.magnetics
  const remanenceT = input.context.material?.remanenceT ?? null
  const limit = saturationT === null || remanenceT === null ? null : FLUX_SHARE * (saturationT - remanenceT)
  return [atMost({ value: input.evaluation.magnetics.fluxSwingT, limit, unit: 'T', path: 'core.material', values: remanenceT === null ? { missing: 'remanence' } : { remanenceT } })]
}

/** In a bridge the flux swings both ways; at start and at a step of load it may reach twice its steady peak. */
function bridgeFlux(input: CheckInput): Outcome[] {
  if (!isTopology(input, 'half-bridge', 'full-bridge', 'push-pull')) return []
  const { saturationT, fluxTransientT } = input.evaluation.magnetics
  return [
    atMost({ value: fluxTransientT, limit: saturationT === null ? null : FLUX_SHARE * saturationT, unit: 'T', path: 'core.material', values: { missing: fluxTransientT === null ? 'flux' : '' } }),
    { ...atMost({ value: steadyPeakT(input), limit: BRIDGE_STEADY_T, unit: 'T', path: 'core.core' }), severity: 'M' },
  ]
}

/** Flux of a resonant transformer by its voltage and by its magnetising current: L·Î/(N·A) of the winding that states the inductance. */
function resonantFlux(input: CheckInput): Outcome[] {
  if (!isTopology(input, 'llc')) return []
  const { context, evaluation } = input
  const inductanceH = evaluation.magnetics.inductanceH
  const lowest = [...evaluation.corners].sort((a, b) => (b.fluxPeakT ?? 0) - (a.fluxPeakT ?? 0))[0]
  const turns = context.primary?.turns ?? null
  const currentA = lowest ? magnetisingPeakA(input, lowest.windings) : null
  if (!lowest || lowest.fluxPeakT === null || inductanceH === null || currentA === null || !turns || !context.core) return [notCheckable('electrical.inductance')]
  const areaM2 = context.core.effectiveAreaMm2 * context.sets * 1e-6
  const byCurrentT = (inductanceH * currentA) / (turns * areaM2)
  return [atMost({ value: Math.abs(byCurrentT / Math.abs(lowest.fluxPeakT) - 1), limit: 0.05, unit: '1', path: 'electrical.inductance', values: { byVoltageT: lowest.fluxPeakT, byCurrentT } })]
}

/** Greatest sum of ampere-turns over the turns of the primary: the current that magnetises, A. */
function magnetisingPeakA({ document, context }: CheckInput, windings: CheckInput['evaluation']['corners'][number]['windings']): number | null {
  const primary = context.primary
  const first = windings[0]
  if (!primary || !first || primary.turns <= 0) return null
  const turnsOf = (id: string) => document.specification.windings.find((winding) => winding.id === id)?.turns ?? 0
  const sameTimes = windings.every(({ currentWaveform }) => currentWaveform.length === first.currentWaveform.length)
  if (!sameTimes) return null
  const sums = first.currentWaveform.map((_, point) => windings.reduce((sum, { windingId, currentWaveform }) => sum + turnsOf(windingId) * currentWaveform[point]![1], 0))
  return Math.max(...sums.map(Math.abs)) / primary.turns
}

/** Volt-seconds that the part is rated for against the greatest that are applied, both at the winding of the rating. */
function voltSeconds(input: CheckInput): Outcome[] {
  if (!isTopology(input, 'gate-drive', 'current-sense')) return []
  const { context, evaluation, document } = input
  const path = 'electrical.voltSecondProduct'
  const rated = document.specification.electrical.voltSecondProduct.value
  const winding = document.specification.windings.find(({ id }) => id === rated?.windingId)
  const atPrimaryVs = evaluation.magnetics.voltSecondsVs
  if (!rated || !winding || atPrimaryVs === null || !context.primary || context.primary.turns <= 0) return [notCheckable(path, { missing: rated ? 'applied volt-seconds' : 'volt-second product' })]
  // A gate drive's first pulse comes before its capacitor is charged.
  const firstVs = evaluation.corners.flatMap(({ figures }) => figures.flatMap(({ code, value }) => (code === 'first-pulse-volt-seconds' && value !== null ? [value] : [])))
  const appliedVs = (Math.max(atPrimaryVs, ...firstVs) * winding.turns) / context.primary.turns
  return [atLeast({ value: rated.minimumVs, limit: 1.2 * appliedVs, unit: 'Vs', path, values: { winding: winding.name } })]
}

/** Share of saturation up to which the gap alone decides the inductance. Source: common practice. */
const LINEAR_SHARE = 0.9

/** Inductance left at the stated bias: a gapped ferrite keeps it up to its knee; a powder core loses it along its curve. */
function biasLeft(input: CheckInput): Outcome[] {
  if (!storesEnergy(input)) return []
  const { saturation, inductance } = input.document.specification.electrical
  if (saturation.length === 0) return [notCheckable('electrical.saturation')]
  return saturation.map((limit, index) => {
    const path = `electrical.saturation.${index}`
    const areaMm2 = input.context.core ? input.context.core.minimumAreaMm2 * input.context.sets : null
    const turns = input.document.specification.windings.find(({ id }) => id === limit.windingId)?.turns ?? 0
    const greatestH = inductance.value?.windingId === limit.windingId ? inductance.value.nominalH * (1 + (inductance.value.upperTolerance ?? 0)) : null
    const material = input.context.material
    if (!material || material.use === 'powder' || areaMm2 === null || greatestH === null || turns <= 0) return notCheckable(path, { temperatureC: limit.temperatureC, missing: material?.use === 'powder' ? 'bias curve' : '' })
    const knee = material.saturation.length > 0 ? saturationFluxDensityT(material.saturation, limit.temperatureC) : null
    const kneeT = knee?.state === 'known' ? knee.value : null
    const fluxT = (greatestH * limit.currentA) / (turns * areaMm2 * 1e-6)
    return atMost({ value: fluxT, limit: kneeT === null ? null : kneeT * LINEAR_SHARE, unit: 'T', path, values: { temperatureC: limit.temperatureC } })
  })
}

/** A sheet in all legs lies in the path twice, and its field reaches outside: the drawing says which length it means. */
function spacerStated({ document: { specification } }: CheckInput): Outcome[] {
  if (specification.core.gap.position.value !== 'all-legs-spacer') return []
  return [yesNo(hasNoteOn(specification, 'core.gap'), 'core.gap.position', { missing: 'note' })]
}

/** Whether a note belongs to a field, a part of it, or what it is part of. */
export const hasNoteOn = ({ notes }: WindingSpecification, path: string): boolean =>
  notes.some(({ text, fields }) => text.trim() !== '' && fields.some((field) => field === path || field.startsWith(`${path}.`) || path.startsWith(`${field}.`)))

function belowCurie({ context, evaluation }: CheckInput): Outcome[] {
  if (!context.material) return [notCheckable('core.material')]
  const { curieC } = context.material
  return [atMost({ value: evaluation.thermal.windingC, limit: curieC === null ? null : curieC - 50, unit: '°C', path: 'core.material', values: curieC === null ? { missing: 'Curie temperature' } : { curieC } })]
}

export const FLUX_CHECKS: Readonly<Record<string, Check>> = {
  E03: { severity: 'S', source: 'Faraday’s law; 80 % of the way from remanence to saturation: common practice', run: forwardSwing },
  E04: { severity: 'S', source: 'Faraday’s law; twice the flux at start, 80 % of saturation: common practice', run: bridgeFlux },
  E05: { severity: 'M', source: 'flux by voltage and by magnetising current are one: identity', run: resonantFlux },
  E06: { severity: 'S', source: 'IEC 61007: volt-second product; 1.2 times the applied: common practice', run: voltSeconds },
  E13: { severity: 'M', source: 'a spacer lies in the path twice: geometry', run: spacerStated },
  E19: { severity: 'S', source: 'material data; linear up to 90 % of saturation: common practice', run: biasLeft },
  E32: { severity: 'M', source: 'Curie temperature of the material; 50 K: common practice', run: belowCurie },
}

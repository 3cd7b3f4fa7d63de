import type { CapacitanceLimit, LeakageLimit } from '../specification'
import { dutyTraits } from '../topologies'
import { isTopology } from './flux'
import { atLeast, atMost, notCheckable, yesNo } from './outcome'
import type { Check, CheckInput, Outcome } from './outcome'

/** What an estimate may lie below the limit that rests on it. */
const ESTIMATE_ROOM = 1.3

const sameSet = (one: readonly string[], other: readonly string[]) => one.length === other.length && one.every((id) => other.includes(id))

const estimateOf = ({ evaluation }: CheckInput, { windingId, shortedWindingIds }: Pick<LeakageLimit, 'windingId' | 'shortedWindingIds'>): number | null =>
  evaluation.leakages.find((one) => one.windingId === windingId && sameSet(one.shortedWindingIds, shortedWindingIds))?.inductanceH ?? null

/** Capacitance that the laid coil has between windings, F. */
const capacitanceOf = ({ evaluation }: CheckInput, windingIds: readonly string[]): number | null =>
  evaluation.capacitances.find((one) => sameSet(one.windingIds, windingIds))?.capacitanceF ?? null

/** Little leakage asks for interleaving, which doubles the capacitance: where both are limited, both limits must hold at once. */
function leakageAgainstCapacitance(input: CheckInput): Outcome[] {
  const { leakage, interwindingCapacitance } = input.document.specification.electrical
  return interwindingCapacitance.flatMap((capacitance, index) => {
    const rival = leakage.find(({ windingId, shortedWindingIds }) => [windingId, ...shortedWindingIds].every((id) => capacitance.windingIds.includes(id)))
    if (!rival) return []
    const path = `electrical.interwindingCapacitance.${index}`
    const leakageH = estimateOf(input, rival)
    const capacitanceF = capacitanceOf(input, capacitance.windingIds)
    if (leakageH === null || capacitanceF === null) return [notCheckable(path, { missing: leakageH === null ? 'leakage' : 'capacitance' })]
    return [atMost({ value: (leakageH * capacitanceF * ESTIMATE_ROOM ** 2) / (rival.maximumH * capacitance.maximumF), limit: 1, unit: '1', path, values: { leakageH, capacitanceF } })]
  })
}

/** Share of the power that the clamp may turn to heat. Source: common practice. */
const CLAMP_SHARE = 0.05

/** What the leakage stores at turn-off, and what the reflected voltage adds while the clamp takes it over. */
function clampLoss(input: CheckInput): Outcome[] {
  const duty = input.document.requirement?.duty
  const corner = input.evaluation.corners.find(({ name }) => name === 'minimum-input')
  const { primary } = input.context
  if (duty?.topology !== 'flyback' || !corner || !primary) return []
  const path = 'requirement.duty.clampSpikeV'
  const secondaries = input.document.specification.windings.filter(({ role }) => role === 'secondary').map(({ id }) => id)
  const leakageH = estimateOf(input, { windingId: primary.id, shortedWindingIds: secondaries })
  const peakA = corner.windings.find(({ windingId }) => windingId === primary.id)?.peakA ?? null
  const spikeV = duty.clampSpikeV
  if (leakageH === null || peakA === null || corner.switchPeakV === null || spikeV === null || spikeV <= 0) return [notCheckable(path, { missing: leakageH === null ? 'leakage' : 'clamp spike' })]
  const clampV = corner.switchPeakV - corner.inputV
  const lossW = 0.5 * leakageH * peakA ** 2 * duty.switchingFrequencyHz * (clampV / spikeV)
  return [atMost({ value: lossW, limit: CLAMP_SHARE * corner.inputPowerW, unit: 'W', path, values: { leakageH, peakA, clampV } })]
}

/** Times the switching frequency that the winding resonates at the least. Source: common practice. */
const RESONANCE_FACTOR = 5

/** Resonance as specified, or as the build predicts where the drawing asks for none. */
function resonanceAbove(input: CheckInput): Outcome[] {
  const { selfResonance, switchingFrequencyHz } = input.document.specification.electrical
  const frequencyHz = switchingFrequencyHz.value?.maximum ?? null
  const predicted = input.evaluation.selfResonance.find(({ windingId }) => windingId === input.context.primary?.id)?.frequencyHz
  const resonanceHz = selfResonance.value?.minimumHz ?? predicted ?? null
  if (frequencyHz === null) return []
  return [atLeast({ value: resonanceHz, limit: RESONANCE_FACTOR * frequencyHz, unit: 'Hz', path: 'electrical.selfResonance', values: resonanceHz === null ? { missing: 'self-resonance' } : {} })]
}

/** Capacitance between the windings of a gate drive that its immunity usually bears, F. Source: common practice. */
const GATE_DRIVE_F = 10e-12

/** Edges drive current through the capacitance between windings: the limits must be there, and the build must keep them. */
function capacitiveCurrent(input: CheckInput): Outcome[] {
  const { electrical } = input.document.specification
  const kept = electrical.interwindingCapacitance.map((limit: CapacitanceLimit, index) => {
    const path = `electrical.interwindingCapacitance.${index}.maximumF`
    const predictedF = capacitanceOf(input, limit.windingIds)
    return atLeast({ value: limit.maximumF, limit: predictedF === null ? null : ESTIMATE_ROOM * predictedF, unit: 'F', path, values: predictedF === null ? { missing: 'capacitance' } : { predictedF } })
  })
  if (!isTopology(input, 'gate-drive')) return kept
  const drive = electrical.gateDrive.value
  if (!drive) return [...kept, notCheckable('electrical.gateDrive', { missing: 'capacitance' })]
  return [...kept, atMost({ value: drive.isolationCapacitanceF, limit: GATE_DRIVE_F, unit: 'F', path: 'electrical.gateDrive', values: { currentA: drive.isolationCapacitanceF * drive.dvDtImmunityVPerS } })]
}

/** Share of an output's voltage that its own copper may take. Source: common practice. */
const DROP_SHARE = 0.02

/** Outputs that the converter does not regulate follow the others but for the drop in their own copper. */
function outputDrops(input: CheckInput): Outcome[] {
  const { requirement } = input.document
  const slaves = (requirement ? dutyTraits(requirement.duty).outputs : []).filter(({ role }) => role === 'main').slice(1)
  return slaves.flatMap((output) => {
    const index = input.document.specification.windings.findIndex(({ outputId }) => outputId === output.id)
    if (index < 0) return []
    const ohm = input.evaluation.windings[index]?.dcResistanceHotOhm ?? null
    const asked = Math.abs(output.voltageV) + output.rectifierDropV
    return [atMost({ value: ohm === null ? null : (ohm * output.fullLoadCurrentA) / asked, limit: DROP_SHARE, unit: '1', path: `windings.${index}.wire`, values: { output: output.name } })]
  })
}

/** Both windings of a coupled inductor carry current the same way: the limit of saturation counts them together. */
function coupledBias(input: CheckInput): Outcome[] {
  if (!isTopology(input, 'coupled-inductor')) return []
  const { document, evaluation, context } = input
  const { electrical, windings } = document.specification
  const stated = electrical.leakage.length > 0
  const turnsOf = (id: string) => windings.find((winding) => winding.id === id)?.turns ?? 0
  const corner = evaluation.corners.find(({ name }) => name === 'minimum-input')
  const { primary } = context
  const bias = electrical.saturation.filter(({ windingId }) => windingId === primary?.id)
  const togetherA = corner && primary && primary.turns > 0 ? corner.windings.reduce((sum, { windingId, peakA }) => sum + (turnsOf(windingId) * peakA) / primary.turns, 0) : null
  const least = bias.length > 0 ? Math.min(...bias.map(({ currentA }) => currentA)) : null
  return [
    yesNo(stated, 'electrical.leakage', { missing: stated ? '' : 'leakage' }),
    atLeast({ value: least, limit: togetherA, unit: 'A', path: 'electrical.saturation' }),
  ]
}

export const PARASITIC_CHECKS: Readonly<Record<string, Check>> = {
  E21: { severity: 'M', source: 'interleaving lowers leakage and raises capacitance: physics', run: leakageAgainstCapacitance },
  E22: { severity: 'M', source: 'energy of the leakage, ½·L·Î²·f·Vc/(Vc − VR); 5 % of the power: common practice', run: clampLoss },
  E23: { severity: 'M', source: 'five times the switching frequency: common practice', run: resonanceAbove },
  E24: { severity: 'M', source: 'i = C·dv/dt; 30 % over the estimate', run: capacitiveCurrent },
  E30: { severity: 'M', source: 'sum of the ampere-turns of both windings: Ampère’s law', run: coupledBias },
  E34: { severity: 'N', source: 'drop in the copper, 2 % of the voltage: common practice', run: outputDrops },
}

import { gappedCore, alFromGap } from '../evaluate/inductance'
import { fullLoadPeakA } from '../evaluate/magnetics'
import { inductanceSpread } from '../magnetics/gap'
import type { ConverterOutput, SaturationLimit } from '../specification'
import { dutyTraits } from '../topologies'
import { atLeast, atMost, notCheckable, storesEnergy, yesNo } from './outcome'
import type { Check, CheckInput, Outcome } from './outcome'

/** Share of saturation that the worst case may use. Source: common practice. */
export const FLUX_LIMIT_SHARE = 0.8

/** What winding adds to the spread of A_L. Source: common practice. */
const WINDING_SPREAD = 0.01

function worstFlux(input: CheckInput): Outcome[] {
  if (!storesEnergy(input)) return []
  const stated = input.document.specification.electrical.inductance.value
  // Without an upper limit the vendor may deliver any inductance, and no flux is the greatest.
  if (stated && stated.upperTolerance === null) return [notCheckable('electrical.inductance')]
  const { fluxWorstT, saturationT, worstCurrentA, saturationTemperatureC } = input.evaluation.magnetics
  const share = Math.min(FLUX_LIMIT_SHARE, input.document.requirement?.fluxUtilisation ?? FLUX_LIMIT_SHARE)
  const values = { share, ...(worstCurrentA !== null ? { currentA: worstCurrentA } : {}), ...(saturationTemperatureC !== null ? { temperatureC: saturationTemperatureC } : {}) }
  return [atMost({ value: fluxWorstT, limit: saturationT === null ? null : saturationT * share, unit: 'T', path: 'core.material', values })]
}

function hotSaturation({ context, evaluation }: CheckInput): Outcome[] {
  const points = context.material?.saturation ?? []
  const hottestC = points.length > 0 ? Math.max(...points.map(({ temperatureC }) => temperatureC)) : null
  return [atLeast({ value: hottestC, limit: Math.max(100, evaluation.thermal.windingC ?? 100), unit: '°C', path: 'core.material' })]
}

function factorAgrees({ document, context }: CheckInput): Outcome[] {
  const { electrical, core } = document.specification
  const nominalH = electrical.inductance.value?.nominalH
  const alH = core.gap.alH.value
  const turns = context.primary?.turns
  if (nominalH == null || alH === null || turns == null) return [notCheckable('core.gap.alH')]
  return [atMost({ value: Math.abs(alH * turns ** 2 - nominalH) / nominalH, limit: 0.01, unit: '1', path: 'core.gap.alH', values: { turns, inductanceH: nominalH, alH } })]
}

function gapAgrees({ document, context }: CheckInput): Outcome[] {
  const { gap } = document.specification.core
  if (gap.control.value === 'none') return []
  const oneControls = gap.control.value === 'al' ? gap.lengthMm.status !== 'mandatory' : gap.control.value === 'length' ? gap.alH.status !== 'mandatory' : false
  const alH = gap.alH.value
  const fromGapH = alFromGap({ ...context, findings: [] })
  // The vendor grinds to what controls: two controls, or a controlling length that does not give A_L, make another part.
  const control: Outcome = { ...yesNo(oneControls, 'core.gap.control', { control: gap.control.value ?? '' }), severity: 'S' }
  const severity = gap.control.value === 'length' ? ('S' as const) : ('M' as const)
  if (alH === null || fromGapH === null) return [control]
  return [control, atMost({ value: Math.abs(fromGapH - alH) / alH, limit: 0.1, unit: '1', path: 'core.gap.lengthMm', values: { alH, fromGapH }, severity })]
}

/** Spread of A_L that the core brings: as stated, or from the tolerance of the gap where that controls. */
function coreSpread({ document, context }: CheckInput): number | null {
  const { gap } = document.specification.core
  if (gap.control.value === 'none') return gap.alTolerance.value ?? context.material?.permeabilityTolerance ?? null
  if (gap.control.value === 'al') return gap.alTolerance.value
  const core = gappedCore(context)
  const { value: lengthMm } = gap.lengthMm
  const { value: toleranceMm } = gap.lengthToleranceMm
  if (!core || lengthMm === null || toleranceMm === null || lengthMm <= 0) return null
  const spread = inductanceSpread(core, 1, { gapMm: lengthMm, gapToleranceMm: toleranceMm })
  return Math.max(-spread.lowestFraction, spread.highestFraction)
}

function toleranceBelievable(input: CheckInput): Outcome[] {
  const limit = input.document.specification.electrical.inductance.value
  const spread = coreSpread(input)
  const sides = limit ? [limit.lowerTolerance === null ? null : -limit.lowerTolerance, limit.upperTolerance].filter((side) => side !== null) : []
  if (sides.length === 0) return [notCheckable('electrical.inductance')]
  return [atLeast({ value: Math.min(...sides), limit: spread === null ? null : spread + WINDING_SPREAD, unit: '1', path: 'electrical.inductance', values: spread === null ? {} : { coreSpread: spread } })]
}

function ungappedLimit({ document }: CheckInput): Outcome[] {
  const { core, electrical } = document.specification
  const limit = electrical.inductance.value
  if (core.gap.control.value !== 'none' || !limit) return []
  const loose = limit.upperTolerance === null || (limit.upperTolerance >= 0.25 && (limit.lowerTolerance ?? -1) <= -0.25)
  return [yesNo(loose, 'electrical.inductance')]
}

function smallGap({ document, evaluation }: CheckInput): Outcome[] {
  const { alTolerance } = document.specification.core.gap
  const gapMm = evaluation.magnetics.gapMm
  if (gapMm === null || gapMm >= 0.1 || alTolerance.value === null) return []
  return [yesNo(alTolerance.value > 0.05, 'core.gap.alTolerance', { gapMm, tolerance: alTolerance.value })]
}

function largeGap({ evaluation, context }: CheckInput): Outcome[] {
  const { gapMm, fringingFactor } = evaluation.magnetics
  if (gapMm === null || !context.core) return []
  const root = Math.sqrt(context.core.effectiveAreaMm2 * context.sets)
  return [atMost({ value: gapMm / root, limit: 0.15, unit: '1', path: 'core.gap', values: { gapMm, fringingFactor: fringingFactor ?? 1 } })]
}

function wholeTurns({ document }: CheckInput): Outcome[] {
  const { windings, sequence } = document.specification
  const broken = [
    ...windings.flatMap(({ turns, name }, index) => (Number.isInteger(turns) ? [] : [yesNo(false, `windings.${index}.turns`, { winding: name, turns })])),
    ...sequence.flatMap((step, index) => (step.kind !== 'winding' || Number.isInteger(step.turns) ? [] : [yesNo(false, `sequence.${index}.turns`, { step: index + 1, turns: step.turns })])),
  ]
  return broken.length > 0 ? broken : [yesNo(true, 'windings')]
}

/** How far whole turns may take an output from the voltage that was asked for. Source: common practice. */
const TURNS_SHARE = 0.01

/** Outputs beside the regulated one: by the turns where they share one reset time, by the solved circuit elsewhere. */
function outputsByTurns(input: CheckInput): Outcome[] {
  const { requirement, specification } = input.document
  if (!requirement) return []
  const [regulated, ...others] = dutyTraits(requirement.duty).outputs.filter(({ role }) => role === 'main')
  const solved = input.evaluation.corners.find(({ name }) => name === 'nominal-input')?.outputs ?? []
  const windingOf = (id: string) => specification.windings.find(({ outputId }) => outputId === id)
  return others.flatMap((output) => {
    const winding = windingOf(output.id)
    const reference = regulated && windingOf(regulated.id)
    if (!winding || !reference) return []
    const asked = Math.abs(output.voltageV) + output.rectifierDropV
    const { duty } = requirement
    // What stands on another output has no volts per turn of its own.
    const given = duty.topology === 'flyback' && !duty.outputs.some(({ stackedOn }) => stackedOn)
      ? ((Math.abs(regulated!.voltageV) + regulated!.rectifierDropV) / reference.turns) * winding.turns
      : solvedVoltageV(solved, output)
    return [atMost({ value: given === null ? null : Math.abs(given - asked) / asked, limit: TURNS_SHARE, unit: '1', path: `windings.${specification.windings.indexOf(winding)}.turns`, values: { winding: winding.name, output: output.name } })]
  })
}

function solvedVoltageV(solved: CheckInput['evaluation']['corners'][number]['outputs'], { id, rectifierDropV }: ConverterOutput): number | null {
  const output = solved.find(({ outputId }) => outputId === id)
  return output ? Math.abs(output.voltageV) + rectifierDropV : null
}

/** Share of its rated voltage that a switch uses; beyond the whole of it no reason helps. Source: common practice. */
const SWITCH_SHARE = 0.8

function switchStress({ document: { requirement }, evaluation }: CheckInput): Outcome[] {
  const ratingV = requirement ? dutyTraits(requirement.duty).switchRatingV : null
  if (ratingV === null) return []
  const peaks = evaluation.corners.flatMap(({ switchPeakV }) => (switchPeakV === null ? [] : [switchPeakV]))
  const value = peaks.length > 0 ? Math.max(...peaks) : null
  const beyond = value !== null && value > ratingV
  return [atMost({ value, limit: beyond ? ratingV : SWITCH_SHARE * ratingV, unit: 'V', path: 'requirement.duty.switchRatingV', severity: beyond ? 'S' : 'M' })]
}

/** Pins, leads and copper are chosen by the stated currents: they are there, and the rms is no lower than calculated. */
function currentsGiven({ document, evaluation }: CheckInput): Outcome[] {
  return document.specification.windings.flatMap((winding, index) => {
    if (winding.role === 'shield') return []
    const path = `windings.${index}.rmsCurrentA`
    const values = { winding: winding.name }
    const complete = winding.rmsCurrentA !== null && winding.peakCurrentA !== null && winding.dcCurrentA !== null
    const calculatedA = evaluation.windings[index]?.rmsA ?? null
    return [complete && calculatedA !== null ? atLeast({ value: winding.rmsCurrentA, limit: calculatedA, unit: 'A', path, values }) : yesNo(complete, path, values)]
  })
}

function biasSpecified(input: CheckInput): Outcome[] {
  if (!storesEnergy(input)) return []
  const { saturation } = input.document.specification.electrical
  const own = saturation.map((limit, index) => ({ limit, index })).filter(({ limit }) => limit.windingId === input.context.primary?.id)
  const isHot = own.some(({ limit }) => limit.temperatureC > COLD_C)
  return [yesNo(isHot, 'electrical.saturation', { points: saturation.length }), ...own.map(({ limit, index }) => biasCurrent(input, limit, index))]
}

/** Up to here a limit of inductance at bias is the one at room temperature, °C. */
const COLD_C = 40

/** Hot, where saturation is least, the limit holds at the worst current; cold at that of full load at least. */
function biasCurrent({ evaluation }: CheckInput, { temperatureC, currentA, windingId }: SaturationLimit, index: number): Outcome {
  const { worstCurrentA } = evaluation.magnetics
  const limit = temperatureC > COLD_C ? worstCurrentA : (fullLoadPeakA(evaluation, windingId) ?? worstCurrentA)
  return atLeast({ value: currentA, limit, unit: 'A', path: `electrical.saturation.${index}.currentA`, values: { temperatureC } })
}

/** The limit of the switch's current, at its lower tolerance, lets full load through at the least input. */
function limitAboveLoad({ document, evaluation, context }: CheckInput): Outcome[] {
  const duty = document.requirement?.duty
  const corner = evaluation.corners.find(({ name }) => name === 'minimum-input')
  const limit = duty && dutyTraits(duty).currentLimit
  if (!limit || !corner) return []
  const { nominalA, tolerance } = limit
  // The switch of a coupled inductor carries both windings' currents, which peak together.
  const carried = duty.topology === 'coupled-inductor' ? corner.windings : corner.windings.filter(({ windingId }) => windingId === context.primary?.id)
  const peakA = carried.reduce((sum, winding) => sum + winding.peakA, 0)
  return [atLeast({ value: nominalA * (1 - tolerance), limit: peakA, unit: 'A', path: 'requirement.duty.currentLimit' })]
}

function leakageFeasible({ document, evaluation }: CheckInput): Outcome[] {
  return document.specification.electrical.leakage.map((limit, index) => {
    const same = evaluation.leakages.find(({ windingId, shortedWindingIds }) => windingId === limit.windingId && sameSet(shortedWindingIds, limit.shortedWindingIds))
    const estimate = same?.inductanceH ?? null
    return atMost({ value: estimate === null ? null : estimate * 1.3, limit: limit.maximumH, unit: 'H', path: `electrical.leakage.${index}.maximumH`, values: estimate === null ? {} : { estimateH: estimate } })
  })
}

const sameSet = (one: readonly string[], other: readonly string[]) => one.length === other.length && one.every((id) => other.includes(id))

function materialFrequency({ document, context }: CheckInput): Outcome[] {
  const range = context.material?.frequencyRangeHz
  const frequencyHz = document.specification.electrical.switchingFrequencyHz.value?.maximum
  if (!range || frequencyHz === undefined) return [notCheckable('core.material')]
  return [atMost({ value: frequencyHz, limit: range.maximum, unit: 'Hz', path: 'core.material' })]
}

function leastArea({ context }: CheckInput): Outcome[] {
  const { core } = context
  if (!core) return [notCheckable('core.core')]
  return [{ state: 'met', value: core.minimumAreaMm2 / core.effectiveAreaMm2, limit: null, unit: '1', path: 'core.core', values: { minimumAreaMm2: core.minimumAreaMm2, effectiveAreaMm2: core.effectiveAreaMm2 } }]
}

export const ELECTRICAL_CHECKS: Readonly<Record<string, Check>> = {
  E01: { severity: 'S', source: 'Faraday’s law; 80 % of saturation when hot: common practice', run: worstFlux },
  E02: { severity: 'M', source: 'saturation is taken hot: common practice', run: hotSaturation },
  E07: { severity: 'S', source: 'definition of A_L, IEC 62044-2', run: factorAgrees },
  E08: { severity: 'M', source: 'McLyman, fringing of the gap; one of A_L and gap controls: core makers’ practice', run: gapAgrees },
  E09: { severity: 'S', source: 'IEC 62358; core makers’ tolerances of A_L and 1 % of winding', run: toleranceBelievable },
  E10: { severity: 'M', source: 'spread of permeability: common practice', run: ungappedLimit },
  E11: { severity: 'M', source: 'grinding tolerance against the gap: common practice', run: smallGap },
  E12: { severity: 'M', source: 'fringing field at the winding: handbooks', run: largeGap },
  E14: { severity: 'S', source: 'half turns unbalance an E core’s legs: handbooks', run: wholeTurns },
  E15: { severity: 'M', source: 'volts per turn; 1 %: common practice', run: outputsByTurns },
  E16: { severity: 'M', source: '80 % of the rated voltage: common practice', run: switchStress },
  E17: { severity: 'M', source: 'common practice', run: currentsGiven },
  E18: { severity: 'S', source: 'IEC 62024-2; common practice', run: biasSpecified },
  E35: { severity: 'S', source: 'the converter delivers full load before its limit acts: common practice', run: limitAboveLoad },
  E20: { severity: 'M', source: 'Snelling, Soft Ferrites, ch. 11; 30 % over the estimate', run: leakageFeasible },
  E31: { severity: 'M', source: 'range of the material', run: materialFrequency },
  E33: { severity: 'M', source: 'IEC 60205: the least area is used', run: leastArea },
}

import type { Winding } from '../specification'
import { isTopology } from './flux'
import { atLeast, atMost, notCheckable, yesNo } from './outcome'
import type { Check, CheckInput, Outcome } from './outcome'

const wound = ({ document }: CheckInput): Winding[] => document.specification.windings.filter(({ role }) => role !== 'shield')

/** What a current transformer may err by: magnetising current over the measured one, and droop. Source: common practice. */
const SENSE_ERROR = 0.02

/** The burden, the error of the ratio and the droop are stated, and none is larger than usual. */
function senseErrors(input: CheckInput): Outcome[] {
  if (!isTopology(input, 'current-sense')) return []
  const path = 'electrical.currentSense'
  const sense = input.document.specification.electrical.currentSense.value
  const predicted = (['magnetising-error', 'droop'] as const).flatMap((code) => {
    const value = figureOf(input, code)
    return value === null ? [] : [atMost({ value: Math.abs(value), limit: SENSE_ERROR, unit: '1', path, values: { row: code } })]
  })
  if (!sense) return [...predicted, notCheckable(path, { missing: 'burden' })]
  return [
    ...predicted,
    atMost({ value: Math.abs(sense.ratioError), limit: SENSE_ERROR, unit: '1', path, values: { row: 'ratio error' } }),
    atMost({ value: Math.abs(sense.droop), limit: SENSE_ERROR, unit: '1', path, values: { row: 'droop' } }),
    droopPredicted(input, sense.burdenOhm, sense.droop),
  ]
}

/** Droop of a pulse of full duty: R·t/L of the winding across the burden. */
function droopPredicted({ document, evaluation }: CheckInput, burdenOhm: number, droop: number): Outcome {
  const path = 'electrical.currentSense'
  const { switchingFrequencyHz, dutyRatio, inductance } = document.specification.electrical
  const frequencyHz = switchingFrequencyHz.value?.minimum ?? null
  const inductanceH = inductance.value ? evaluation.magnetics.inductanceMinimumH : null
  if (frequencyHz === null || inductanceH === null || inductanceH <= 0) return notCheckable(path, { row: 'droop', missing: 'inductance' })
  const onS = (dutyRatio.value?.maximum ?? 1) / frequencyHz
  return atMost({ value: (burdenOhm * onS) / inductanceH, limit: droop, unit: '1', path, values: { row: 'droop' } })
}

/** Direct current magnetises a current transformer without end: how much there is must be said. */
function senseDirectCurrent(input: CheckInput): Outcome[] {
  if (!isTopology(input, 'current-sense')) return []
  const path = 'electrical.currentSense'
  const sense = input.document.specification.electrical.currentSense.value
  const { core } = input.context
  const { saturationT } = input.evaluation.magnetics
  const primary = wound(input).find(({ role }) => role === 'primary')
  if (!sense) return [notCheckable(path, { missing: 'direct current' })]
  const alH = input.evaluation.magnetics.alH
  if (!core || alH === null || saturationT === null || !primary) return [notCheckable(path, { missing: 'saturation' })]
  const biasT = (alH * primary.turns * sense.maximumDcA) / (core.minimumAreaMm2 * 1e-6)
  return [atMost({ value: biasT, limit: 0.5 * saturationT, unit: 'T', path, values: { currentA: sense.maximumDcA } })]
}

/** Share of saturation that the leakage flux of the working current may use. Source: textbook. */
const LEAKAGE_FLUX_SHARE = 0.7

/** Greatest of a figure of the solved corners; null where no corner has it. */
function figureOf({ evaluation }: CheckInput, code: string): number | null {
  const values = evaluation.corners.flatMap(({ figures }) => figures.flatMap((figure) => (figure.code === code && figure.value !== null ? [figure.value] : [])))
  return values.length > 0 ? Math.max(...values) : null
}

/** The working current's flux cancels in the ring but for the leakage: L_lk·Î/(N·A), as the coil predicts it and as the drawing states the leakage. */
function leakageFlux(input: CheckInput): Outcome[] {
  if (!isTopology(input, 'common-mode-choke')) return []
  const path = 'electrical.commonMode'
  const choke = input.document.specification.electrical.commonMode.value
  const { saturationT } = input.evaluation.magnetics
  const turns = Math.min(...wound(input).map((winding) => winding.turns))
  const areaM2 = input.context.core ? input.context.core.effectiveAreaMm2 * input.context.sets * 1e-6 : null
  const statedVs = choke && choke.differentialLeakageH !== null ? choke.differentialLeakageH * choke.ratedCurrentA * Math.SQRT2 : null
  const linkages = [figureOf(input, 'differential-flux-linkage'), statedVs].filter((linkage) => linkage !== null)
  if (linkages.length === 0 || areaM2 === null || !(areaM2 > 0) || !Number.isFinite(turns) || turns <= 0) return [notCheckable(path, { missing: 'leakage' })]
  return [atMost({ value: Math.max(...linkages) / (turns * areaM2), limit: saturationT === null ? null : LEAKAGE_FLUX_SHARE * saturationT, unit: 'T', path })]
}

/** Both windings have the same turns, and the inductance of each is tested. */
function equalWindings(input: CheckInput): Outcome[] {
  if (!isTopology(input, 'common-mode-choke')) return []
  const { windings, tests } = input.document.specification
  const active = wound(input)
  const turns = active.map((winding) => winding.turns)
  const untested = active.filter(({ id }) => !tests.some((row) => row.characteristic === 'inductance' && row.windingId === id))
  return [
    yesNo(turns.length >= 2 && turns.every((each) => each === turns[0]), 'windings', { missing: turns.length >= 2 ? '' : 'second winding' }),
    ...untested.map((winding) => yesNo(false, `windings.${windings.indexOf(winding)}`, { winding: winding.name, characteristic: 'inductance' })),
  ]
}

function noiseImpedance(input: CheckInput): Outcome[] {
  if (!isTopology(input, 'common-mode-choke')) return []
  const points = input.document.specification.electrical.commonMode.value?.impedance ?? []
  return [atLeast({ value: points.length, limit: 2, unit: '', path: 'electrical.commonMode' })]
}

export const CHOKE_CHECKS: Readonly<Record<string, Check>> = {
  E25: { severity: 'M', source: 'droop R·t/L; 2 %: textbook', run: senseErrors },
  E26: { severity: 'M', source: 'bias of the direct current, half of saturation: common practice', run: senseDirectCurrent },
  E27: { severity: 'S', source: 'leakage flux L·Î/(N·A), 70 % of saturation: textbook', run: leakageFlux },
  E28: { severity: 'M', source: 'IEC 60938; common practice', run: equalWindings },
  E29: { severity: 'N', source: 'common practice', run: noiseImpedance },
}

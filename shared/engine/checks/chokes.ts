import type { Duty, DutyOf, Winding } from '../specification'
import { inductiveImpedanceOhm } from '../topologies/common-mode-choke'
import { isTopology } from './flux'
import { atLeast, atMost, notCheckable, yesNo } from './outcome'
import type { Check, CheckInput, Outcome } from './outcome'

const wound = ({ document }: CheckInput): Winding[] => document.specification.windings.filter(({ role }) => role !== 'shield')

/** What a current transformer may err by where its duty does not say: magnetising current over the measured one, and droop. Source: common practice. */
const SENSE_ERROR = 0.02

const SENSE_PATH = 'electrical.currentSense'

/** The duty of one topology; null where the requirement is for another, or there is none. */
function dutyOf<T extends Duty['topology']>({ document }: CheckInput, topology: T): DutyOf<T> | null {
  const duty = document.requirement?.duty
  return duty?.topology === topology ? (duty as DutyOf<T>) : null
}

/** The burden, the error of the ratio and the droop are stated; neither they nor what the circuit gives are larger than permitted. */
function senseErrors(input: CheckInput): Outcome[] {
  if (!isTopology(input, 'current-sense')) return []
  const sense = input.document.specification.electrical.currentSense.value
  const duty = dutyOf(input, 'current-sense')
  const permitted = { error: duty?.permittedError ?? SENSE_ERROR, droop: duty?.permittedDroop ?? SENSE_ERROR }
  const droop = figureOf(input, 'droop') ?? (sense ? droopOfPulse(input, sense.burdenOhm) : null)
  const within = (row: string, value: number | null, limit: number) => atMost({ value, limit, unit: '1', path: SENSE_PATH, values: { row, ...(value === null ? { missing: 'inductance' } : {}) } })
  const predicted = duty ? [within('magnetising error', figureOf(input, 'magnetising-error'), permitted.error), within('predicted droop', droop, permitted.droop)] : []
  if (!sense) return [...predicted, notCheckable(SENSE_PATH, { missing: 'burden' })]
  return [
    ...predicted,
    within('ratio error', Math.abs(sense.ratioError), permitted.error),
    within('stated droop', Math.abs(sense.droop), permitted.droop),
    within('predicted against stated droop', droop, sense.droop),
  ]
}

/** Without a duty, the droop of the longest pulse: R·t/L of the winding across the burden. */
function droopOfPulse(input: CheckInput, burdenOhm: number): number | null {
  const { document, evaluation, context } = input
  const { switchingFrequencyHz, dutyRatio, inductance } = document.specification.electrical
  const frequencyHz = switchingFrequencyHz.value?.minimum ?? null
  const statedH = inductance.value ? evaluation.magnetics.inductanceMinimumH : null
  const [secondary, stated] = [wound(input).find(({ role }) => role === 'secondary'), context.primary]
  if (frequencyHz === null || statedH === null || !secondary || !stated || !(stated.turns > 0)) return null
  const inductanceH = statedH * (secondary.turns / stated.turns) ** 2
  return inductanceH > 0 ? (burdenOhm * (dutyRatio.value?.maximum ?? 1)) / (frequencyHz * inductanceH) : null
}

/** A current transformer is magnetised without end by direct current, and by pulses that are not reset before the next. */
function senseDirectCurrent(input: CheckInput): Outcome[] {
  if (!isTopology(input, 'current-sense')) return []
  const resetS = figureOf(input, 'reset-time')
  const reset = resetS === null ? [] : [atMost({ value: resetS, limit: figureOf(input, 'reset-time-available'), unit: 's', path: 'requirement.duty.resetVoltageV', values: { row: 'reset' } })]
  return [directFlux(input), ...reset]
}

/** Flux of the direct current, as the circuit has it at the secondary or as the drawing states it at the primary, whichever is more. */
function directFlux(input: CheckInput): Outcome {
  const { core, sets } = input.context
  const { saturationT, alH } = input.evaluation.magnetics
  const [primary, secondary] = (['primary', 'secondary'] as const).map((role) => wound(input).find((winding) => winding.role === role))
  const atSecondaryA = figureOf(input, 'direct-magnetising-current')
  const statedA = input.document.specification.electrical.currentSense.value?.maximumDcA
  // A conductor that passes through the core is no winding of the part, and one turn.
  const ampereTurns = [
    ...(atSecondaryA !== null && secondary ? [atSecondaryA * secondary.turns] : []),
    ...(statedA === undefined ? [] : [statedA * (primary?.turns ?? 1)]),
  ]
  if (ampereTurns.length === 0) return notCheckable(SENSE_PATH, { missing: 'direct current' })
  if (!core || alH === null || saturationT === null) return notCheckable(SENSE_PATH, { missing: 'saturation' })
  const most = Math.max(...ampereTurns)
  return atMost({ value: (alH * most) / (core.minimumAreaMm2 * sets * 1e-6), limit: 0.5 * saturationT, unit: 'T', path: SENSE_PATH, values: { ampereTurns: most } })
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

/** Points of impedance that are stated, and whether the least inductance reaches those that duty and drawing ask for. */
function noiseImpedance(input: CheckInput): Outcome[] {
  if (!isTopology(input, 'common-mode-choke')) return []
  const path = 'electrical.commonMode'
  const stated = input.document.specification.electrical.commonMode.value?.impedance ?? []
  const asked = (dutyOf(input, 'common-mode-choke')?.impedance ?? []).map((point) => ({ ...point, path: 'requirement.duty.impedance' }))
  return [
    atLeast({ value: stated.length, limit: 2, unit: '', path }),
    ...[...asked, ...stated.map((point) => ({ ...point, path }))].map((point) => impedanceReached(input, point)),
  ]
}

/** 2π·f·L of the least inductance, raised towards the self-resonance; permeability falls beyond the material's range, and nobody knows how far. */
function impedanceReached({ evaluation, context }: CheckInput, { frequencyHz, minimumOhm, path }: { frequencyHz: number; minimumOhm: number; path: string }): Outcome {
  const inductanceH = evaluation.magnetics.inductanceMinimumH
  const resonanceHz = evaluation.selfResonance.find(({ windingId }) => windingId === context.primary?.id)?.frequencyHz ?? Infinity
  const values = { row: 'impedance', frequencyHz }
  if (inductanceH === null || inductanceH <= 0 || !(frequencyHz > 0)) return notCheckable(path, { ...values, missing: 'inductance' })
  if (frequencyHz >= resonanceHz) return notCheckable(path, { ...values, missing: 'impedance beyond self-resonance' })
  const value = inductiveImpedanceOhm(inductanceH, frequencyHz) / (1 - (frequencyHz / resonanceHz) ** 2)
  const outcome: Outcome = { ...atLeast({ value, limit: minimumOhm, unit: 'Ω', path, values }), severity: 'M' }
  const known = context.material !== null && frequencyHz <= (context.material.frequencyRangeHz?.maximum ?? 0)
  return outcome.state === 'met' && !known ? { ...outcome, state: 'not-checkable', values: { ...values, missing: 'permeability at this frequency' } } : outcome
}

export const CHOKE_CHECKS: Readonly<Record<string, Check>> = {
  E25: { severity: 'M', source: 'L·di/dt = R·i integrated; 2 % where the duty permits no other: common practice', run: senseErrors },
  E26: { severity: 'M', source: 'A_L·N·I/A, half of saturation: common practice; reset L·Î/U within the pause', run: senseDirectCurrent },
  E27: { severity: 'S', source: 'leakage flux L·Î/(N·A), 70 % of saturation: textbook', run: leakageFlux },
  E28: { severity: 'M', source: 'IEC 60938; common practice', run: equalWindings },
  E29: { severity: 'N', source: '2π·f·L of the least inductance, parallel resonance; two points: common practice', run: noiseImpedance },
}

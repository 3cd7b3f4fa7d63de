import type { CheckResult } from '#shared/engine/evaluation'
import type { Finding, FindingCode } from '#shared/engine/findings'
import type { ProposalReason, ReasonCode } from '#shared/engine/index'
import type { Rejection } from '#shared/engine/propose/reasons'
import { fieldWord } from '@/components/parts/field-words'
import { formatEngineering, formatNumber, formatQuantity } from '#shared/number-format'
import { shownUnit } from '#shared/shown-units'
import { CHECK_TEXTS } from './check-sentences'

type Values = Finding['values']
const named = (values: Values, key: string, otherwise = '') => String(values[key] ?? otherwise)
const amount = (values: Values, key: string, base: string) => formatEngineering(Number(values[key]), base, { significant: 3 })
const percent = (values: Values, key: string) => formatQuantity(Number(values[key]), shownUnit('%'), { significant: 3 })
const millimetres = (values: Values, key: string) => formatQuantity(Number(values[key]), shownUnit('mm'), { significant: 3 })

/** The least change with which a coil fits, as the engine found it by trying. */
function nearestChange(values: Values): string {
  const step = named(values, 'changeStep')
  const [from, to, winding] = [named(values, 'from'), named(values, 'to'), named(values, 'winding')]
  switch (values.change) {
    case 'wire':
      return ` It fits with ${to} for ${winding}.`
    case 'turns':
      return ` It fits with ${to} instead of ${from} turns in step ${step}.`
    case 'tape-layers':
      return ` It fits with ${to} instead of ${from} layers of tape in step ${step}.`
    case 'parallel':
      return ` It fits with ${to} instead of ${from} wires of ${winding} in parallel.`
    default:
      return ' No single change of wire, turns or tape makes it fit.'
  }
}

/** What the engine found about a document or a proposal. */
export const FINDING_TEXTS: Readonly<Record<FindingCode, (values: Values) => string>> = {
  'bulk-capacitor-too-small': () => 'The bulk capacitor runs empty between two peaks of the mains; take a larger one or allow for a lower minimum.',
  'commutation-time-assumed': (v) => `The current's edges are ideal; the copper loss takes them to last ${amount(v, 'edgeS', 's')}.`,
  'core-loss-flux-out-of-range': () => 'The flux density lies outside the range of the loss data.',
  'core-loss-frequency-out-of-range': () => 'The frequency lies outside the range of the loss data.',
  'core-loss-under-bias': (v) => `The flux never falls below ${formatEngineering(Number(v.biasT), 'T', { significant: 3 })}; loss data are measured about zero, and the true core loss is higher.`,
  'core-loss-temperature-out-of-range': () => 'The temperature lies outside the range of the loss data.',
  'harmonic-sum-capped': (v) => `The copper loss sums ${named(v, 'harmonics')} harmonics; ${percent(v, 'tailShare')} of the loss by alternating current lies beyond and is estimated.`,
  'no-core-loss-data': (v) => `The library has no loss data for ${named(v, 'material', 'the material')}.`,
  'temperature-out-of-range': () => 'The temperature lies outside the range of the data.',
  'thermal-runaway': () => 'More heat feeds itself: no temperature is found at which the part settles.',
  'thermal-model-out-of-range': () => 'The part lies outside the range of the thermal model.',
  'window-overfilled': (v) => `The coil is ${millimetres(v, 'overMm')} higher than the window.${nearestChange(v)}`,
  'wire-not-in-library': (v) => `The wire of ${named(v, 'winding', 'this winding')} is not in the library.`,
  'margin-lower-than-winding': () => 'The margin tape is lower than the winding beside it; the outer wires fall over its edge.',
  'tape-not-in-library': () => 'This tape is not in the library.',
  'tape-wider-than-former': () => 'The tape is wider than the former.',
  'foil-wider-than-former': () => 'The foil is wider than the former.',
  'sequence-names-unknown-winding': () => 'This step names a winding that does not exist.',
  'section-not-on-former': () => 'The former has no such section.',
  'turn-wider-than-layer': (v) => `One turn of ${named(v, 'winding', 'this winding')} and its return are ${millimetres(v, 'overMm')} wider than the layer. ${Number(v.fittingParallel) >= 1 ? `${named(v, 'fittingParallel')} in parallel would fit.` : `Wire of at most ${millimetres(v, 'fittingOverallMm')} would fit.`}`,
  'layers-too-few': (v) => `${named(v, 'winding', 'The winding')} needs ${named(v, 'neededLayers', 'more')} layers instead of ${named(v, 'layers', 'those asked for')}. It fits with ${named(v, 'fittingTurns', 'fewer')} turns or with wire of at most ${millimetres(v, 'fittingOverallMm')} over its insulation.`,
  'ring-hole-full': (v) => `The hole of the ring is full: ${named(v, 'overTurns')} of ${named(v, 'turns')} turns do not fit.`,
  'step-not-for-a-ring': () => 'Margins, shields and foil are not laid on a ring core, and windings wound together are laid one over the other.',
  'cannot-be-wound-together': (v) => `${named(v, 'winding', 'This winding')} cannot be wound together with ${named(v, 'other', 'another')}: both need round wire or litz, the same section and the same turns.`,
  'lead-crossing-too-high': (v) => `Where the sleeved lead of ${named(v, 'winding')} crosses, the coil is ${millimetres(v, 'overMm')} higher than the window.`,
  'too-many-turns-to-draw': () => 'There are too many turns to draw each of them.',
  'field-not-calculable': () => 'The field of the winding window is not calculated, and no leakage is told: the window is no rectangle between core legs, or the coil overfills it by far.',
  'leakage-wound-together': (v) => `${named(v, 'winding', 'A winding')} and ${named(v, 'shorted', 'another')} are wound together, turn beside turn: their leakage lies outside the model; state a measured value.`,
  'core-not-in-library': (v) => `The core ${named(v, 'id')} is not in the library.`,
  'former-not-in-library': (v) => `The coil former ${named(v, 'id')} is not in the library.`,
  'material-not-in-library': (v) => `The material ${named(v, 'id')} is not in the library.`,
  'former-belongs-to-another-core': (v) => `The former ${named(v, 'former')} is not made for the core ${named(v, 'core')}.`,
  'wire-overall-diameter-unknown': (v) => `The library does not say the overall diameter of ${named(v, 'wire', 'this wire')} with this insulation.`,
  'generic-row-used': (v) => `${named(v, 'row', 'A row')} ${v.unverified ? `has figures that nobody has verified: ${unverifiedWords(v.unverified)}` : 'is generic and unverified: replace it by the maker’s figures before release'}.`,
  'capacitance-not-calculable': (v) => `The capacitance of the coil is not calculated: ${named(v, 'reason', 'its geometry has no solution')}.`,
  'no-bias-data': (v) => `How ${named(v, 'material', 'the material')} behaves under its direct field is not known: the inductance at full load is not told.`,
  'no-saturation-data': (v) => `The saturation of ${named(v, 'material', 'the material')} is not known at this temperature.`,
  'no-primary-winding': () => 'There is no primary winding.',
  'several-primary-windings': (v) => `Several windings are primary: ${named(v, 'windings')}. The one of the inductance counts.`,
  'output-without-winding': (v) => `No winding feeds ${named(v, 'output', 'this output')}.`,
  'output-has-several-windings': (v) => `Several windings feed ${named(v, 'output', 'this output')}: ${named(v, 'windings')}.`,
  'output-lacks-half-winding': (v) => `${named(v, 'output', 'An output')} has a centre-tapped rectifier, but only ${named(v, 'winding', 'one winding')} feeds it.`,
  'primary-lacks-half-winding': () => 'A push-pull converter has two primary windings; one is missing.',
  'half-windings-differ': (v) => `The halves ${named(v, 'winding')} and ${named(v, 'other')} have different turns: the core drifts into saturation.`,
  'reset-winding-missing': () => 'No winding has the role “reset”, which this way of demagnetising needs.',
  'duty-ratio-not-reachable': (v) => `The output needs a duty ratio of ${percent(v, 'dutyRatio')}, above the ${percent(v, 'limit')} that can be reached: take fewer primary or more secondary turns.`,
  'reset-not-complete': (v) => `Conduction and reset together take ${percent(v, 'share')} of the period: the flux walks up. At the largest duty ratio the reset needs a ratio of primary to reset winding of at least ${formatNumber(Number(v.leastRatio), { significant: 3 })}.`,
  'slope-compensation-needed': (v) => `The duty ratio reaches ${percent(v, 'dutyRatio')} in continuous conduction: peak-current control above 50 % needs slope compensation${v.leastAPerS === undefined ? '' : ` of at least ${amount(v, 'leastAPerS', 'A/s')} at the switch, usually half the falling slope, ${amount(v, 'usualAPerS', 'A/s')}`}.`,
  'gain-not-reachable': (v) => `No frequency of the range gives the output voltage at ${amount(v, 'inputV', 'V')}: the nearest gain is ${formatNumber(Number(v.gain), { significant: 3 })} where ${formatNumber(Number(v.needed), { significant: 3 })} is needed.`,
  'frequency-out-of-range': (v) => `The output needs ${amount(v, 'frequencyHz', 'Hz')}, outside the controller’s range of ${amount(v, 'minimumHz', 'Hz')} to ${amount(v, 'maximumHz', 'Hz')}.`,
  'current-limit-not-reached': (v) => `No load makes the switch current reach its limit of ${amount(v, 'limitA', 'A')}.`,
  'coupling-capacitor-missing': () => 'A unipolar drive needs a capacitor in series with the primary, which takes the mean of the pulses.',
  'coupling-capacitor-small': (v) => `The ripple of the coupling capacitor is ${amount(v, 'rippleV', 'V')}; up to ${amount(v, 'usualV', 'V')} is usual.`,
  'sense-ratio-differs': (v) => `The turns give a ratio of ${formatNumber(Number(v.ratio), { significant: 4 })}, the duty asks for ${formatNumber(Number(v.asked), { significant: 4 })}.`,
  'sense-reset-too-slow': (v) => `The reset takes ${amount(v, 'neededS', 's')}, but between the longest pulses there are ${amount(v, 'availableS', 's')}: the flux walks up.`,
  'choke-turns-differ': (v) => `The windings have different turns (${named(v, 'winding', 'one')} ${named(v, 'turns', 'n')}, ${named(v, 'other', 'the other')} ${named(v, 'otherTurns', 'n')}): the line current magnetises the core.`,
  'differential-leakage-not-known': () => 'The leakage between the two windings is not known, and with it the flux of the line current.',
  'light-load-changes-mode': (v) => `At ${amount(v, 'inputV', 'V')} light load changes the conduction: ${named(v, 'full')} at full load, ${named(v, 'light')} at light load.`,
  'sharing-not-known': (v) => `The outputs are taken to share the current in proportion to load: ${v.reason === 'clamp' ? 'without the clamp’s voltage' : 'without the leakage between each pair of windings'} their shares by the leakages cannot be told.`,
  'leakage-state-not-found': (v) => `With these leakages no steady state was found at ${amount(v, 'inputV', 'V')}; edges are taken as ideal there and the shares in proportion to load.`,
  'ratio-steers-ripple': (v) => `Both windings see the same voltage; with a ratio of ${formatNumber(Number(v.ratio), { significant: 3 })} the leakage decides how the ripple divides. The proposal takes a coupling of ${formatNumber(Number(v.coupling), { significant: 2 })}.`,
  'stacked-output-not-found': (v) => `${named(v, 'output', 'An output')} stands on an output that does not exist, has no winding or stands on this one.`,
  'no-output-takes-current': () => 'No output takes current.',
  'duty-not-solvable': (v) => `The duty has no solution: ${named(v, 'reason')}.`,
  'value-out-of-range': (v) => `A value is out of range: ${named(v, 'reason')}.`,
  'inductance-not-stated': () => 'Without an inductance, or AL and turns, flux and currents cannot be told.',
  'current-limit-not-stated': () => 'Without a current limit the worst flux cannot be told.',
  'coupling-not-known': () => 'The coupling of the two windings is not known; state a leakage limit.',
  'currents-from-stated-values': () => 'There is no duty: currents are those of the winding table.',
  'output-voltage-off': (v) => `The turns give ${named(v, 'output', 'this output')} another voltage than asked for.`,
  'winding-not-in-sequence': (v) => `${named(v, 'winding', 'A winding')} is not in the sequence.`,
  'sequence-turns-differ': (v) => `${named(v, 'winding', 'A winding')} has ${named(v, 'turns')} turns, but the sequence lays ${named(v, 'sequenceTurns')}.`,
  'terminal-does-not-exist': (v) => `${named(v, 'winding', 'A winding')} ends on ${named(v, 'terminal')}, which is no terminal of the former.`,
  'gap-and-al-both-control': () => 'AL and gap length are both mandatory; one controls, the other is for reference.',
  'working-voltage-not-known': (v) => `The working voltage of ${named(v, 'boundary', 'a boundary')} is not known; state it.`,
  'insulation-value-from-memory': () => 'A value of the standard comes from a secondary source: look it up in the edition in force.',
  'boundary-missing': () => 'A boundary is missing.',
  'no-core-fits': (v) => `No core of the library fits${v.reason ? `; the nearest fails by ${rejectionWord(v.reason)}` : ''}. Allow more height, more loss or another insulation.`,
  'duty-without-proposal': (v) => `No part is proposed for this topology${v.topology ? ` (${named(v, 'topology')})` : ''}: enter core, windings and sequence; figures and checks follow as you type.`,
  'ratio-compromise': (v) => `Whole turns are a compromise${v.output ? ` for ${named(v, 'output')}` : ''}.`,
  'too-few-pins': (v) => tooFewPins(v),
  'current-limit-assumed': (v) => `No current limit is stated; ${amount(v, 'assumedA', 'A')} is assumed.`,
  'no-suitable-wire': (v) => `The library has no suitable wire${v.winding ? ` for ${named(v, 'winding')}` : ''}${v.wire ? `; ${named(v, 'parallel')} × ${named(v, 'wire')} only carries the current` : ''}.`,
  'mains-without-protection': () => 'The supply is the mains, and functional insulation protects nobody: choose margin tape or triple-insulated wire, unless no output can be touched.',
  'duty-ratio-high': (v) => `A duty ratio of ${percent(v, 'dutyRatio')} is high: above ${percent(v, 'usual')} peak currents and the voltage of the switch rise steeply.`,
  'material-fit-out-of-range': () => 'The frequency lies outside the material’s loss data; another material may suit better.',
}

function tooFewPins(v: Finding['values']): string {
  if (v.currentA !== undefined) return `${named(v, 'winding', 'A winding')} carries ${amount(v, 'currentA', 'A')}, and a pin of this former ${amount(v, 'limitA', 'A')}: share its ends between two pins, or take flying leads.`
  if (v.wires !== undefined) return `${named(v, 'winding', 'A winding')} brings ${named(v, 'wires')} wires to one pin, where ${named(v, 'usual')} are usual.`
  return 'The former has too few pins.'
}

const REJECTION_WORDS: Readonly<Record<Rejection, string>> = {
  window: 'the window', build: 'the build', pins: 'the pins', flux: 'the flux', temperature: 'the temperature', resistance: 'the resistance', wire: 'the wire', height: 'the height', insulation: 'the insulation', 'layer-width': 'the width of a layer',
}
const rejectionWord = (reason: unknown) => REJECTION_WORDS[reason as Rejection] ?? String(reason)

/** Why a proposal is as it is. */
export const REASON_TEXTS: Readonly<Record<ReasonCode, (values: ProposalReason['values']) => string>> = {
  'ratio-from-duty': (v) => `The ratio follows from the largest duty ratio${v.ratio === undefined ? '' : `: ${formatNumber(Number(v.ratio), { significant: 3 })}`}.`,
  'ratio-from-reflected-voltage': (v) => `The ratio follows from the reflected voltage${v.ratio === undefined ? '' : `: ${formatNumber(Number(v.ratio), { significant: 3 })}`}.`,
  'ratio-from-gain': (v) => `The ratio gives the output voltage at nominal input without gain of the tank${v.ratio === undefined ? '' : `: ${formatNumber(Number(v.ratio), { significant: 3 })}`}.`,
  'inductance-from-gain': (v) => `The magnetising inductance is the greatest with which full load at the least input is reached and the switches close at zero voltage${v.inductanceH === undefined ? '' : `: ${amount(v, 'inductanceH', 'H')}`}.`,
  'inductance-from-ripple': (v) => `The inductance follows from the ripple${v.inductanceH === undefined ? '' : `: ${amount(v, 'inductanceH', 'H')}`}.`,
  'inductance-for-boundary': (v) => `The inductance puts full load at minimum input on the boundary of continuous conduction${v.inductanceH === undefined ? '' : `: ${amount(v, 'inductanceH', 'H')}`}.`,
  'inductance-for-idle-share': (v) => `The inductance leaves the asked share of the period without current${v.inductanceH === undefined ? '' : `: ${amount(v, 'inductanceH', 'H')}`}.`,
  'material-least-loss': (v) => `${named(v, 'material', 'The material')} loses least at this frequency.`,
  'material-preferred': (v) => `${named(v, 'material', 'The material')} is preferred.`,
  'inductance-for-magnetising-current': (v) => `The inductance keeps the magnetising current at ${amount(v, 'currentA', 'A')} with ${amount(v, 'voltSecondsVs', 'Vs')}: at least ${amount(v, 'inductanceH', 'H')}.`,
  'inductance-for-impedance': (v) => `The inductance gives ${amount(v, 'impedanceOhm', 'Ω')} at ${amount(v, 'frequencyHz', 'Hz')}: at least ${amount(v, 'inductanceH', 'H')}.`,
  'smallest-core-that-fits': (v) => `${named(v, 'core')} on ${named(v, 'former')} is the smallest that fits, of ${named(v, 'tried')} tried.`,
  'core-rejected': (v) => `${named(v, 'core')} falls out by ${rejectionWord(v.reason)}.`,
  'turns-from-flux': (v) => `${named(v, 'turns')} primary turns keep the worst flux density at ${amount(v, 'fluxWorstT', 'T')}, with saturation at ${amount(v, 'saturationT', 'T')}.`,
  'wire-from-density-and-skin-depth': (v) => `${named(v, 'winding')}: ${named(v, 'parallel')} × ${named(v, 'wire')} from current density and skin depth, ${formatNumber(Number(v.currentDensityAPerMm2), { significant: 3 })} A/mm².`,
  'primary-in-two-halves': () => 'The primary is wound in two halves around the secondaries, to cut the leakage.',
  'margins-from-creepage': (v) => `Margins of ${millimetres(v, 'marginMm')} on both sides give the creepage distance.`,
  'insulated-wire': () => 'Triple-insulated wire keeps the secondaries apart; no margins are needed.',
}

export const findingText = ({ code, values }: Finding): string => FINDING_TEXTS[code](values)
export const reasonText = ({ code, values }: ProposalReason): string => REASON_TEXTS[code](values)
export const checkText = ({ code }: Pick<CheckResult, 'code'>): string => CHECK_TEXTS[code] ?? code

/** Shares that people read in per cent. */
const IN_PERCENT = new Set(['E05', 'E07', 'E08', 'E09', 'E11', 'E15', 'E25', 'E34', 'T05', 'T14', 'Q08', 'W03', 'W04', 'W07', 'Q03', 'Q06'])

/** A check's value or limit with its unit. */
export function checkFigure({ code, unit }: Pick<CheckResult, 'code' | 'unit'>, value: number | null): string {
  if (value === null) return '–'
  if (unit === '1') return IN_PERCENT.has(code) ? formatQuantity(value, shownUnit('%'), { significant: 3 }) : formatNumber(value, { significant: 3 })
  if (unit === 'W/m³') return formatQuantity(value, shownUnit('kW/m³'), { significant: 3 })
  if (unit === 'A/mm²') return `${formatNumber(value, { significant: 3 })}\u00a0A/mm²`
  if (['T', 'H', 'A', 'V', 'Hz'].includes(unit)) return formatEngineering(value, unit, { significant: 3 })
  return unit === '' ? formatNumber(value) : formatQuantity(value, shownUnit(unit), { significant: 3 })
}

const SUBJECTS = ['winding', 'boundary', 'output', 'row', 'unverified', 'characteristic', 'missing', 'terminal', 'weakest', 'reason'] as const

/** Fields of a row, as a check and a finding list them. */
const unverifiedWords = (fields: string | number | undefined): string => [...new Set(String(fields ?? '').split(', ').map((path) => fieldWord(path) ?? path))].join(', ')

/** What a result is about: the winding, boundary or row, and the other place of a contradiction. */
export function checkSubject({ values }: Pick<CheckResult, 'values'>): string {
  const about = SUBJECTS.map((key) => (key === 'unverified' && values[key] !== undefined ? unverifiedWords(values[key]) : values[key])).filter((value) => value !== undefined && value !== '')
  return [...new Set(about.map((value) => String(value).replaceAll('-', ' ')))].join(', ')
}

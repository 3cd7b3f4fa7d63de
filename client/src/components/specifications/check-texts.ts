import type { CheckResult } from '#shared/engine/evaluation'
import type { Finding, FindingCode } from '#shared/engine/findings'
import type { ProposalReason, ReasonCode } from '#shared/engine/index'
import type { Rejection } from '#shared/engine/propose/reasons'
import { formatEngineering, formatNumber, formatQuantity } from '#shared/number-format'
import { shownUnit } from '#shared/shown-units'

/** What each release check asks, as a sentence about a part that meets it. */
export const CHECK_TEXTS: Readonly<Record<string, string>> = {
  E01: 'Worst-case flux density stays below the permitted share of saturation.',
  E02: 'Saturation is known at the temperature of use, not only cold.',
  E07: 'Inductance, turns and AL agree.',
  E08: 'Gap length and AL agree with fringing, and exactly one of them controls.',
  E09: 'The tolerance of the inductance is no tighter than that of the core and 1 % of winding.',
  E10: 'An ungapped part has a lower limit only, or at least ±25 %.',
  E11: 'A gap below 0.10 mm is not asked for with an AL tolerance of ±5 % or less.',
  E12: 'The gap is small against the centre leg, so that its fringing spares the winding.',
  E14: 'Turns are whole numbers.',
  E15: 'Whole turns give each output’s voltage within 1 %.',
  E16: 'The switch keeps below 80 % of its rated voltage.',
  E17: 'Rms, peak and direct current of each winding are stated, and the rms is no lower than calculated.',
  E18: 'A part that stores energy has its inductance at bias specified: hot at the worst current, cold at that of full load.',
  E20: 'The leakage limit can be kept: 30 % above the estimate.',
  E31: 'The switching frequency lies within the material’s range.',
  E33: 'The least area of the core is used for the flux.',
  E35: 'The current limit, at its lower tolerance, lets full load through.',
  T01: 'Current density of the winding.',
  T02: 'The wire is thin enough for the skin depth.',
  T03: 'AC resistance factor of the winding.',
  T07: 'Core loss density suits natural convection.',
  T08: 'The core settles thermally: more heat does not feed itself.',
  T11: 'The winding stays 5 K below the limit of its class, and within the permitted rise.',
  T12: 'The class of the insulation system is no higher than that of its weakest member.',
  T16: 'The ambient temperature is stated.',
  I01: 'Product standard and edition are named.',
  I02: 'Every pair of windings, and each winding with the core, has a boundary.',
  I03: 'Rms and recurring peak working voltage are known for each boundary, and none is stated below the calculated one.',
  I04: 'Creepage distance.',
  I05: 'Clearance.',
  I06: 'Above 30 kHz the high-frequency tables are applied.',
  I07: 'The altitude is taken into account by a factor on the clearances.',
  I08: 'Margins of margin tape give the creepage distance.',
  I09: 'Solid insulation is thick enough, or has enough layers.',
  I10: 'Tape between reinforced windings has three layers.',
  I11: 'The wire’s certificate covers the voltage and the frequency.',
  I13: 'Leads that cross a margin run in a sleeve from inside the winding, with a wall thick enough.',
  I14: 'The core is assigned to a side, and tied to a terminal of that side where it is tied.',
  I15: 'Pins and stripped ends keep their distance from the core; somebody measures it on the part.',
  I16: 'The test voltage is no lower than the standard’s.',
  I17: 'The hipot row tests every part between all terminals of both ends, high and long enough.',
  I18: 'The trip current of the hipot test is 5 mA at most.',
  I26: 'A shield covers its winding, is tied to a terminal, and its ends overlap insulated.',
  I27: 'Former and polymers are of flammability class V-0.',
  I28: 'The material group is no better than the former’s, or its evidence is named.',
  I31: 'On the mains, double or reinforced insulation parts every other side from the primary’s.',
  I32: 'The mains voltage is stated, and no lower than that of the duty.',
  I33: 'Pollution degree 1 and overvoltage category I have their reason.',
  W01: 'The turns of a layer fit between the margins.',
  W02: 'The overall diameter of the wire is known.',
  W03: 'The coil, its bulge included, fits the height of the window.',
  W04: 'The copper fill can be wound by machine.',
  W05: 'The lead of an odd number of layers returns in a sleeve, or leaves at the far end.',
  W06: 'A partly filled last layer says how it lies.',
  W07: 'Layers are filled to at least 85 %.',
  W08: 'One to four wires are wound in parallel.',
  W16: 'Margin tape is built up to the height of its winding.',
  W25: 'The part is no higher than its place.',
  L01: 'Every figure in use of the library has a source.',
  L02: 'The sources of the library rows in use are sure.',
  P01: 'There are enough terminals.',
  P02: 'Every start and finish ends on a terminal that exists.',
  P03: 'The pins carry their current.',
  P11: 'Pins of protected sides lie in opposite rows.',
  P22: 'Each winding is one conductor from start to finish, and no two are joined into a loop.',
  P14: 'Dots, start terminals and winding directions agree.',
  D01: 'The mandatory fields of the title block are filled.',
  D02: 'Who made the revision neither checks nor approves it.',
  D03: 'Projection and general tolerances are stated, and none is withdrawn.',
  D04: 'Each row says whether it is mandatory, reference or the vendor’s choice, and no winding is for reference only.',
  D05: 'A rule says what counts as an equivalent material.',
  D07: 'Schematic, winding table, sequence, pins, tests and duty name the same things.',
  D08: 'No value stands without a tolerance.',
  D11: 'Label, packing and pack quantity are filled.',
  D14: 'The calculation finds no error in the document.',
  Q01: 'Every electrical requirement has a test row.',
  Q02: 'Every winding has rows for resistance and ratio, and polarity is tested.',
  Q03: 'The ratio limit finds one turn too many or too few.',
  Q05: 'Every boundary has a hipot row.',
  Q06: 'The test frequency lies far below self-resonance.',
  Q11: 'The resistance limit is 10 to 25 % above the calculated nominal.',
  Q12: 'The limits of the test rows are in order, and no looser than those of the drawing.',
  Q13: 'Resistance and inductance rows state their temperature.',
  Q14: 'Inductance, resistance or ratio, polarity and hipot are tested on every part.',
  Q16: 'A part that stores energy has a row for inductance at bias.',
}

type Values = Finding['values']
const named = (values: Values, key: string, otherwise = '') => String(values[key] ?? otherwise)
const amount = (values: Values, key: string, base: string) => formatEngineering(Number(values[key]), base, { significant: 3 })
const percent = (values: Values, key: string) => formatQuantity(Number(values[key]), shownUnit('%'), { significant: 3 })
const millimetres = (values: Values, key: string) => formatQuantity(Number(values[key]), shownUnit('mm'), { significant: 3 })

/** What the engine found about a document or a proposal. */
export const FINDING_TEXTS: Readonly<Record<FindingCode, (values: Values) => string>> = {
  'bulk-capacitor-too-small': () => 'The bulk capacitor runs empty between two peaks of the mains; take a larger one or allow for a lower minimum.',
  'core-loss-flux-out-of-range': () => 'The flux density lies outside the range of the loss data.',
  'core-loss-frequency-out-of-range': () => 'The frequency lies outside the range of the loss data.',
  'core-loss-temperature-out-of-range': () => 'The temperature lies outside the range of the loss data.',
  'no-core-loss-data': (v) => `The library has no loss data for ${named(v, 'material', 'the material')}.`,
  'temperature-out-of-range': () => 'The temperature lies outside the range of the data.',
  'thermal-runaway': () => 'More heat feeds itself: no temperature is found at which the part settles.',
  'thermal-model-out-of-range': () => 'The part lies outside the range of the thermal model.',
  'window-overfilled': () => 'The coil does not fit the window.',
  'wire-not-in-library': (v) => `The wire of ${named(v, 'winding', 'this winding')} is not in the library.`,
  'margin-lower-than-winding': () => 'The margin tape is lower than the winding beside it; the outer wires fall over its edge.',
  'tape-not-in-library': () => 'This tape is not in the library.',
  'tape-wider-than-former': () => 'The tape is wider than the former.',
  'foil-wider-than-former': () => 'The foil is wider than the former.',
  'sequence-names-unknown-winding': () => 'This step names a winding that does not exist.',
  'section-not-on-former': () => 'The former has no such section.',
  'turn-wider-than-layer': () => 'One turn is wider than the layer.',
  'layers-too-few': () => 'The turns need more layers than are asked for.',
  'too-many-turns-to-draw': () => 'There are too many turns to draw each of them.',
  'leakage-wound-together': (v) => `${named(v, 'winding', 'A winding')} and ${named(v, 'shorted', 'another')} are wound together, turn beside turn: their leakage lies outside the model; state a measured value.`,
  'core-not-in-library': (v) => `The core ${named(v, 'id')} is not in the library.`,
  'former-not-in-library': (v) => `The coil former ${named(v, 'id')} is not in the library.`,
  'material-not-in-library': (v) => `The material ${named(v, 'id')} is not in the library.`,
  'former-belongs-to-another-core': (v) => `The former ${named(v, 'former')} is not made for the core ${named(v, 'core')}.`,
  'wire-overall-diameter-unknown': (v) => `The library does not say the overall diameter of ${named(v, 'wire', 'this wire')} with this insulation.`,
  'generic-row-used': (v) => `${named(v, 'row', 'A row')} ${v.unverified ? `has figures that nobody has verified: ${named(v, 'unverified')}` : 'is generic and unverified: replace it by the maker’s figures before release'}.`,
  'capacitance-not-calculable': (v) => `The capacitance of the coil is not calculated: ${named(v, 'reason', 'its geometry has no solution')}`,
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
  'slope-compensation-needed': (v) => `The duty ratio reaches ${percent(v, 'dutyRatio')} in continuous conduction: peak-current control above 50 % needs slope compensation.`,
  'gain-not-reachable': (v) => `No frequency of the range gives the output voltage at ${amount(v, 'inputV', 'V')}: the nearest gain is ${formatNumber(Number(v.gain), { significant: 3 })} where ${formatNumber(Number(v.needed), { significant: 3 })} is needed.`,
  'frequency-out-of-range': (v) => `The output needs ${amount(v, 'frequencyHz', 'Hz')}, outside the controller’s range of ${amount(v, 'minimumHz', 'Hz')} to ${amount(v, 'maximumHz', 'Hz')}.`,
  'current-limit-not-reached': (v) => `No load makes the switch current reach its limit of ${amount(v, 'limitA', 'A')}.`,
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
  'inductance-from-ripple': (v) => `The inductance follows from the ripple${v.inductanceH === undefined ? '' : `: ${amount(v, 'inductanceH', 'H')}`}.`,
  'inductance-for-boundary': (v) => `The inductance puts full load at minimum input on the boundary of continuous conduction${v.inductanceH === undefined ? '' : `: ${amount(v, 'inductanceH', 'H')}`}.`,
  'inductance-for-idle-share': (v) => `The inductance leaves the asked share of the period without current${v.inductanceH === undefined ? '' : `: ${amount(v, 'inductanceH', 'H')}`}.`,
  'material-least-loss': (v) => `${named(v, 'material', 'The material')} loses least at this frequency.`,
  'material-preferred': (v) => `${named(v, 'material', 'The material')} is preferred.`,
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
const IN_PERCENT = new Set(['E07', 'E08', 'E09', 'E11', 'E15', 'W03', 'W04', 'W07', 'Q03', 'Q06'])

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

/** What a result is about: the winding, boundary or row, and the other place of a contradiction. */
export function checkSubject({ values }: Pick<CheckResult, 'values'>): string {
  const about = SUBJECTS.map((key) => values[key]).filter((value) => value !== undefined && value !== '')
  return [...new Set(about.map((value) => String(value).replaceAll('-', ' ')))].join(', ')
}

import type { TestRow, WindingSpecification } from '../specification'
import { dutyTraits } from '../topologies'
import { atLeast, atMost, notCheckable, storesEnergy, yesNo } from './outcome'
import type { Check, CheckInput, Outcome } from './outcome'

interface Placed {
  row: TestRow
  index: number
}

const rowsOf = ({ tests }: WindingSpecification, characteristic: TestRow['characteristic']): Placed[] => tests.map((row, index) => ({ row, index })).filter(({ row }) => row.characteristic === characteristic)

/** A terminal that no row touches can be wired wrongly without anybody seeing it. */
function everyTerminal({ document: { specification } }: CheckInput): Outcome[] {
  const touched = new Set(specification.tests.flatMap(({ drivenTerminals, shortedTerminals, openTerminals, characteristic }) => (characteristic === 'hipot' || characteristic === 'insulation-resistance' ? [] : [...drivenTerminals, ...shortedTerminals.flat(), ...openTerminals])))
  return specification.windings.flatMap(({ role, name, startTerminal, finishTerminal }, index) => {
    if (role === 'shield') return []
    const untouched = [startTerminal, finishTerminal].filter((terminal) => terminal !== '' && !touched.has(terminal))
    return [yesNo(untouched.length === 0, `windings.${index}`, { winding: name, terminal: untouched.join(', ') })]
  })
}

/** Reactance over the resistance of the loop that is shorted. Source: IEC 61007, common practice. */
const REACTANCE_RATIO = 5

/** What the short at the pins itself adds, H: some 10 mm of wire. Source: common practice. */
const SHORT_H = 10e-9
const SHORT_SHARE = 0.05

function leakageRows({ document: { specification }, evaluation }: CheckInput): { path: string; frequencyHz: number; leakageH: number | null; ohm: number | null; shortShare: number | null }[] {
  const turnsOf = (id: string) => specification.windings.find((winding) => winding.id === id)?.turns ?? 0
  const ohmOf = (id: string) => evaluation.windings[specification.windings.findIndex((winding) => winding.id === id)]?.dcResistance20Ohm ?? null
  return specification.electrical.leakage.map(({ windingId, shortedWindingIds, frequencyHz }, index) => {
    const same = evaluation.leakages.find((one) => one.windingId === windingId && one.shortedWindingIds.length === shortedWindingIds.length && one.shortedWindingIds.every((id) => shortedWindingIds.includes(id)))
    const leakageH = same?.inductanceH ?? null
    const referred = shortedWindingIds.map((id) => ({ ratio: turnsOf(id) > 0 ? (turnsOf(windingId) / turnsOf(id)) ** 2 : null, ohm: ohmOf(id) }))
    // Shorted windings share the current: the loop has no more resistance than its least one.
    const reflected = referred.flatMap(({ ratio, ohm }) => (ratio === null || ohm === null ? [] : [ratio * ohm]))
    const own = ohmOf(windingId)
    const shorts = referred.flatMap(({ ratio }) => (ratio === null ? [] : [ratio * SHORT_H]))
    return {
      path: `electrical.leakage.${index}`,
      frequencyHz,
      leakageH,
      ohm: own === null || reflected.length === 0 ? null : own + Math.min(...reflected),
      shortShare: leakageH === null || leakageH <= 0 || shorts.length === 0 ? null : Math.min(...shorts) / leakageH,
    }
  })
}

const leakageFrequency = (input: CheckInput): Outcome[] =>
  leakageRows(input).map(({ path, frequencyHz, leakageH, ohm }) =>
    atLeast({ value: leakageH === null || ohm === null || ohm <= 0 ? null : (2 * Math.PI * frequencyHz * leakageH) / ohm, limit: REACTANCE_RATIO, unit: '1', path: `${path}.frequencyHz` }))

const leakageShort = (input: CheckInput): Outcome[] =>
  leakageRows(input).map(({ path, shortShare }) => atMost({ value: shortShare, limit: SHORT_SHARE, unit: '1', path }))

/** Flux that a small-signal reading may make, T. Source: IEC 62044-2. */
const SMALL_SIGNAL_T = 5e-3

/** B = U/(4.44·f·N·A) of a sine wave. */
function testLevel({ document: { specification }, context }: CheckInput): Outcome[] {
  const { core } = context
  const turnsOf = (id: string | null) => specification.windings.find((winding) => winding.id === id)?.turns ?? 0
  return rowsOf(specification, 'inductance').map(({ row, index }) => {
    const turns = turnsOf(row.windingId)
    const known = core !== null && row.levelV !== null && row.frequencyHz !== null && row.frequencyHz > 0 && turns > 0
    const fluxT = known ? (Math.SQRT2 * row.levelV!) / (2 * Math.PI * row.frequencyHz! * turns * core.effectiveAreaMm2 * context.sets * 1e-6) : null
    return atMost({ value: fluxT, limit: SMALL_SIGNAL_T, unit: 'T', path: `tests.${index}.levelV`, values: { row: row.symbol } })
  })
}

/** Tolerance over the instrument's uncertainty. Source: ISO 14253-1. */
const UNCERTAINTY_RATIO = 4

/** The share that an instrument's class names, e.g. 0.005 for “0.5 % or better”. */
const classShare = (text: string): number | null => {
  const found = /(\d+(?:[.,]\d+)?)\s*%/.exec(text)
  return found ? Number(found[1]!.replace(',', '.')) / 100 : null
}

/** Half of what a row lets pass, over its middle; null where one side is open and nothing says where the middle lies. */
function toleranceShare({ minimum, nominal, maximum }: TestRow): number | null {
  if (maximum === null) return null
  const middle = nominal ?? (minimum === null ? null : (minimum + maximum) / 2)
  if (middle === null || middle === 0) return null
  const half = minimum === null ? maximum - middle : (maximum - minimum) / 2
  return half > 0 ? half / Math.abs(middle) : null
}

const instruments = ({ document: { specification } }: CheckInput): Outcome[] =>
  specification.tests.flatMap((row, index) => {
    const tolerance = row.unit === 'mm' ? null : toleranceShare(row)
    if (tolerance === null) return []
    const uncertainty = classShare(row.instrumentClass)
    return [atLeast({ value: uncertainty === null || uncertainty <= 0 ? null : tolerance / uncertainty, limit: UNCERTAINTY_RATIO, unit: '1', path: `tests.${index}.instrumentClass`, values: { row: row.symbol } })]
  })

/** A characteristic that is critical is judged by its readings; what only breaks down or not has none. */
const criticalReadings = ({ document: { specification } }: CheckInput): Outcome[] =>
  specification.tests.flatMap((row, index) => {
    const hasLimits = row.characteristic !== 'hipot' && (row.minimum !== null || row.maximum !== null)
    return row.criticalToQuality && hasLimits ? [yesNo(row.record === 'reading', `tests.${index}.record`, { row: row.symbol })] : []
  })

/** The bias at which the part is tested is that which the converter's limit lets through. */
function biasMatchesLimit(input: CheckInput): Outcome[] {
  const { document: { specification, requirement }, context } = input
  if (!storesEnergy(input)) return []
  const limit = requirement && dutyTraits(requirement.duty).currentLimit
  if (!limit) return []
  const own = specification.electrical.saturation.map((row, index) => ({ row, index })).filter(({ row }) => row.windingId === context.primary?.id)
  const greatestA = limit.nominalA * (1 + limit.tolerance)
  if (own.length === 0) return [notCheckable('electrical.saturation', { missing: 'inductance at bias' })]
  return own.map(({ row, index }) => atLeast({ value: row.currentA, limit: greatestA, unit: 'A', path: `electrical.saturation.${index}.currentA`, values: { temperatureC: row.temperatureC } }))
}

const typeTests = ({ document }: CheckInput): Outcome[] => [yesNo(document.specification.tests.some(({ extent }) => extent === 'type-test'), 'tests')]

export const READING_CHECKS: Readonly<Record<string, Check>> = {
  Q04: { severity: 'M', source: 'common practice', run: everyTerminal },
  Q07: { severity: 'M', source: 'reactance five times the loop’s resistance: IEC 61007', run: leakageFrequency },
  Q08: { severity: 'M', source: '10 nH of a short at the pins, 5 % of the leakage: common practice', run: leakageShort },
  Q09: { severity: 'N', source: 'IEC 62044-2: a few millitesla', run: testLevel },
  Q10: { severity: 'M', source: 'ISO 14253-1: a quarter of the tolerance', run: instruments },
  Q15: { severity: 'M', source: 'common practice', run: criticalReadings },
  Q17: { severity: 'M', source: 'limit of the converter’s current: common practice', run: biasMatchesLimit },
  Q18: { severity: 'N', source: 'common practice', run: typeTests },
}

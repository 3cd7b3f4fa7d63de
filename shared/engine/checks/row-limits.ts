import type { TestRow, TurnsRatio, Winding, WindingSpecification } from '../specification'
import { atMost, notCheckable, yesNo } from './outcome'
import type { Check, CheckInput, Outcome } from './outcome'

const SLACK = 1e-9

interface Placed {
  row: TestRow
  index: number
}

const rowsOf = ({ tests }: WindingSpecification, characteristic: TestRow['characteristic']): Placed[] =>
  tests.map((row, index) => ({ row, index })).filter(({ row }) => row.characteristic === characteristic)

/** Windings that a row drives or reads. */
const touched = ({ windings }: WindingSpecification, { windingId, drivenTerminals, openTerminals }: TestRow): Winding[] => {
  const terminals = [...drivenTerminals, ...openTerminals]
  return windings.filter(({ id, startTerminal, finishTerminal }) => id === windingId || (terminals.includes(startTerminal) && terminals.includes(finishTerminal)))
}

// ---------------------------------------------------------------------------------------------

/** Relative spread that a row lets pass about its middle; endless where a side has no limit. */
function spreadOf({ minimum, maximum }: TestRow): number {
  if (minimum === null || maximum === null || !(minimum > 0) || maximum < minimum) return Number.MAX_VALUE
  return (maximum - minimum) / (maximum + minimum)
}

/** One turn more or less in the winding with the most turns moves the ratio by 1/N; 60 % of that leaves room for the instrument. */
function ratioFindsTurn({ document: { specification } }: CheckInput): Outcome[] {
  const judge = (tolerance: number, windings: readonly Winding[], path: string, values: Outcome['values']): Outcome => {
    const most = windings.length > 1 ? Math.max(...windings.map(({ turns }) => turns)) : null
    const blind = most !== null && tolerance >= 1 / most
    return { ...atMost({ value: tolerance, limit: most === null ? null : 0.6 / most, unit: '1', path, values }), severity: blind ? 'S' : 'M' }
  }
  const stated = specification.electrical.turnsRatios.map(({ numeratorWindingId, denominatorWindingId, tolerance }, index) =>
    judge(tolerance, specification.windings.filter(({ id }) => id === numeratorWindingId || id === denominatorWindingId), `electrical.turnsRatios.${index}.tolerance`, {}))
  const tested = rowsOf(specification, 'turns-ratio').map(({ row, index }) => judge(spreadOf(row), touched(specification, row), `tests.${index}`, { row: row.symbol }))
  return [...stated, ...tested]
}

/** Error of an inductance reading below self-resonance, (f/f₀)²/(1 − (f/f₀)²), at most 2 %; the resonance as specified, else as predicted. */
function testFrequency({ document: { specification }, evaluation, context }: CheckInput): Outcome[] {
  const { inductance, selfResonance } = specification.electrical
  const resonanceHz = selfResonance.value?.minimumHz ?? evaluation.selfResonance.find(({ windingId }) => windingId === context.primary?.id)?.frequencyHz ?? null
  const frequencies = [
    ...(inductance.value ? [{ frequencyHz: inductance.value.frequencyHz, path: 'electrical.inductance' }] : []),
    ...rowsOf(specification, 'inductance').flatMap(({ row, index }) => (row.frequencyHz === null ? [] : [{ frequencyHz: row.frequencyHz, path: `tests.${index}.frequencyHz` }])),
  ]
  if (frequencies.length === 0) return []
  if (resonanceHz === null) return [notCheckable('electrical.selfResonance')]
  return frequencies.map(({ frequencyHz, path }) => {
    if (frequencyHz >= resonanceHz) return yesNo(false, path)
    const square = (frequencyHz / resonanceHz) ** 2
    return atMost({ value: square / (1 - square), limit: 0.02, unit: '1', path })
  })
}

// ---------------------------------------------------------------------------------------------

/** Whether the limits of a row lie within a range; a side without a bound asks for none. */
const within = ({ minimum, maximum }: TestRow, lowest: number | null, highest: number | null): boolean =>
  (lowest === null || (minimum !== null && minimum >= lowest - SLACK * Math.abs(lowest))) && (highest === null || (maximum !== null && maximum <= highest + SLACK * Math.abs(highest)))

/** Limits in their order: the least below the nominal below the greatest. */
function inOrder({ minimum, nominal, maximum }: TestRow): boolean {
  const limits = [minimum, nominal, maximum].filter((value) => value !== null)
  return limits.every((value, index) => index === 0 || limits[index - 1]! <= value) && (minimum === null || maximum === null || minimum < maximum)
}

function inductanceRow({ electrical }: WindingSpecification, row: TestRow): boolean {
  const limit = electrical.inductance.value
  if (!limit || row.windingId !== limit.windingId) return true
  const bound = (tolerance: number | null) => (tolerance === null ? null : limit.nominalH * (1 + tolerance))
  return within(row, bound(limit.lowerTolerance), bound(limit.upperTolerance)) && row.frequencyHz === limit.frequencyHz
}

function leakageRow({ electrical }: WindingSpecification, row: TestRow): boolean {
  const limits = electrical.leakage.filter(({ windingId }) => windingId === row.windingId).map(({ maximumH }) => maximumH)
  return limits.length === 0 || within(row, null, Math.max(...limits))
}

function resistanceRow({ windings }: WindingSpecification, row: TestRow): boolean {
  const limit = windings.find(({ id }) => id === row.windingId)?.dcResistance
  return !limit || within(row, limit.minimumOhm, limit.maximumOhm)
}

/** A row may give the ratio either way round; its limits hold the ratio of the turns. */
function ratioRow(specification: WindingSpecification, row: TestRow): boolean {
  const ratios = specification.electrical.turnsRatios.filter((ratio) => concerns(specification, ratio, row))
  if (ratios.length === 0) return true
  return ratios.some(({ numeratorWindingId, denominatorWindingId, tolerance }) => {
    const turns = (id: string) => specification.windings.find((winding) => winding.id === id)?.turns ?? Number.NaN
    const ratio = turns(numeratorWindingId) / turns(denominatorWindingId)
    return [ratio, 1 / ratio].some((value) => within(row, value * (1 - tolerance), value * (1 + tolerance)) && row.minimum! <= value && row.maximum! >= value)
  })
}

const concerns = (specification: WindingSpecification, { numeratorWindingId, denominatorWindingId }: TurnsRatio, row: TestRow): boolean => {
  const ids = touched(specification, row).map(({ id }) => id)
  return ids.includes(numeratorWindingId) && ids.includes(denominatorWindingId)
}

function biasRow({ electrical }: WindingSpecification, row: TestRow): boolean {
  const limits = electrical.saturation.filter(({ windingId, temperatureC }) => windingId === row.windingId && temperatureC === row.temperatureC)
  const inductance = electrical.inductance.value
  const leastH = inductance && inductance.windingId === row.windingId && inductance.lowerTolerance !== null ? inductance.nominalH * (1 + inductance.lowerTolerance) : null
  return limits.length === 0 || limits.some(({ currentA, remainingShare }) => (row.biasA ?? 0) >= currentA * (1 - SLACK) && within(row, leastH === null ? null : leastH * remainingShare, null))
}

const ROW_RULES: Partial<Record<TestRow['characteristic'], (specification: WindingSpecification, row: TestRow) => boolean>> = {
  inductance: inductanceRow,
  leakage: leakageRow,
  'dc-resistance': resistanceRow,
  'turns-ratio': ratioRow,
  'inductance-at-bias': biasRow,
}

/** What the vendor tests by is no looser than what the drawing specifies. */
function rowLimits({ document: { specification } }: CheckInput): Outcome[] {
  const wrong = specification.tests.flatMap((row, index) => {
    const met = inOrder(row) && (ROW_RULES[row.characteristic]?.(specification, row) ?? true)
    return met ? [] : [yesNo(false, `tests.${index}`, { row: row.symbol })]
  })
  return wrong.length > 0 ? wrong : [yesNo(true, 'tests')]
}

export const ROW_CHECKS: Readonly<Record<string, Check>> = {
  Q03: { severity: 'M', source: 'one turn changes the ratio by 1/N: arithmetic', run: ratioFindsTurn },
  Q06: { severity: 'M', source: 'parallel resonance: L/(1 − (f/f₀)²)', run: testFrequency },
  Q12: { severity: 'S', source: 'limits of the test table against those of the drawing: common practice', run: rowLimits },
}

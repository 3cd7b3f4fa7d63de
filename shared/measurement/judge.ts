import { assessCapability, type Capability, type SampleKind } from './capability'
import { failureShareBound } from './failure-bound'
import type { AcceptedReading, ExpectedRow, Reading } from './model'
import { isAttributeRow } from './read-cell'
import { resistanceAt } from './resistance-temperature'
import { summarise, type Summary } from './statistics'

export type Verdict = 'met' | 'not-met' | 'not-evidenced'

export type VerdictReason =
  | 'within-limits'
  | 'below-minimum'
  | 'above-maximum'
  | 'passed'
  | 'failed'
  | 'no-reading'
  | 'no-number'
  | 'beyond-range'
  /** The drawing asks for a reading, the report gives a word. */
  | 'word-for-reading'
  /** Tested at less than the voltage of the drawing. */
  | 'test-voltage-too-low'
  /** The row has no limits to judge a number by. */
  | 'no-limits'

export interface JudgedCell {
  serial: string
  run: number
  rowId: string
  address: string | null
  text: string | null
  reading: Reading | null
  /** The value that was judged: the reading, or a resistance brought to the row's temperature. */
  judged: number | null
  /** Set when the reading was brought from this temperature to the row's, °C. */
  correctedFromC: number | null
  verdict: Verdict
  reason: VerdictReason
  /** A later run of the same part counts instead. */
  superseded: boolean
}

export interface JudgedRow {
  row: ExpectedRow
  cells: JudgedCell[]
  verdict: Verdict
  /** Plain numbers of the runs that count; censored readings and verdicts are left out and counted apart. */
  summary: Summary
  censored: number
  outOfLimits: string[]
  notEvidenced: string[]
  capability: Capability | null
  /** For rows that end in a verdict. */
  attributes: { n: number; failures: number; failureShareBound95: number } | null
  /** Whether the row decides about the set: rows for reference do not. */
  decides: boolean
}

export interface JudgeOptions {
  sampleKind: SampleKind
  /** Temperature of the parts while measured, °C; null when the report does not say. */
  measuredAtC: number | null
}

export interface Judgement {
  rows: JudgedRow[]
  verdict: Verdict
}

/**
 * Judges readings by the limits of their test rows. Missing evidence is never a pass; a reading beyond the
 * instrument's range is judged where it can be and left out of the statistics.
 */
export function judge(expected: readonly ExpectedRow[], readings: readonly AcceptedReading[], options: JudgeOptions): Judgement {
  const serials = [...new Set(readings.map(({ serial }) => serial))]
  const rows = expected.map((row) => judgeRow(row, readings.filter(({ rowId }) => rowId === row.id), serials, options))
  return { rows, verdict: worst(rows.filter(({ decides }) => decides).map(({ verdict }) => verdict)) }
}

/** A failure outweighs a gap, a gap outweighs a pass; nothing at all is a gap. */
function worst(verdicts: readonly Verdict[]): Verdict {
  if (verdicts.includes('not-met')) return 'not-met'
  return verdicts.length === 0 || verdicts.includes('not-evidenced') ? 'not-evidenced' : 'met'
}

function judgeRow(row: ExpectedRow, readings: readonly AcceptedReading[], serials: readonly string[], options: JudgeOptions): JudgedRow {
  const lastRuns = new Map<string, number>()
  for (const { serial, run } of readings) lastRuns.set(serial, Math.max(run, lastRuns.get(serial) ?? 0))
  const cells = readings.map((reading) => judgeCell(row, reading, reading.run < lastRuns.get(reading.serial)!, options))
  if (row.extent === 'every-part') cells.push(...serials.filter((serial) => !lastRuns.has(serial)).map((serial) => missingCell(row, serial)))

  const counting = cells.filter(({ superseded }) => !superseded)
  const numbers = counting.filter(({ reading }) => reading?.kind === 'value').map(({ judged }) => judged!)
  const of = (verdict: Verdict) => counting.filter((cell) => cell.verdict === verdict).map(({ serial }) => serial)
  return {
    row,
    cells,
    verdict: worst(counting.map(({ verdict }) => verdict)),
    summary: summarise(numbers),
    censored: counting.filter(({ reading }) => reading?.kind === 'censored').length,
    outOfLimits: of('not-met'),
    notEvidenced: of('not-evidenced'),
    capability: isAttributeRow(row) || numbers.length === 0 ? null : assessCapability(numbers, row, options.sampleKind),
    attributes: isAttributeRow(row) ? countAttributes(counting) : null,
    decides: row.extent !== 'reference',
  }
}

function countAttributes(cells: readonly JudgedCell[]): JudgedRow['attributes'] {
  const stated = cells.filter(({ reading }) => reading?.kind === 'attribute' || reading?.kind === 'withstand')
  const failures = stated.filter(({ verdict }) => verdict === 'not-met').length
  return stated.length === 0 ? null : { n: stated.length, failures, failureShareBound95: failureShareBound(failures, stated.length) }
}

const missingCell = (row: ExpectedRow, serial: string): JudgedCell => ({
  serial,
  run: 1,
  rowId: row.id,
  address: null,
  text: null,
  reading: null,
  judged: null,
  correctedFromC: null,
  verdict: 'not-evidenced',
  reason: 'no-reading',
  superseded: false,
})

function judgeCell(row: ExpectedRow, { serial, run, address, text, reading }: AcceptedReading, superseded: boolean, { measuredAtC }: JudgeOptions): JudgedCell {
  const corrects = row.characteristic === 'dc-resistance' && measuredAtC !== null && row.temperatureC !== null && measuredAtC !== row.temperatureC
  const judged = reading.kind !== 'value' ? null : corrects ? resistanceAt(reading.value, measuredAtC, row.temperatureC!) : reading.value
  const correctedFromC = judged !== null && corrects ? measuredAtC : null
  return { serial, run, rowId: row.id, address, text, reading, judged, correctedFromC, superseded, ...judgeReading(row, reading, judged) }
}

type Judged = Pick<JudgedCell, 'verdict' | 'reason'>

function judgeReading(row: ExpectedRow, reading: Reading, judged: number | null): Judged {
  switch (reading.kind) {
    case 'value':
      return judgeValue(row, judged!)
    case 'censored':
      return judgeCensored(row, reading)
    case 'no-number':
      return { verdict: 'not-evidenced', reason: 'no-number' }
    case 'attribute':
      if (!reading.passed) return { verdict: 'not-met', reason: 'failed' }
      return isAttributeRow(row) ? { verdict: 'met', reason: 'passed' } : { verdict: 'not-evidenced', reason: 'word-for-reading' }
    case 'withstand':
      if (!reading.passed) return { verdict: 'not-met', reason: 'failed' }
      if (row.levelV !== null && reading.voltageV !== null && reading.voltageV < row.levelV) return { verdict: 'not-evidenced', reason: 'test-voltage-too-low' }
      return { verdict: 'met', reason: 'passed' }
  }
}

/** A value on its limit meets it. The last digit of a product of powers of ten must not decide. */
function judgeValue({ minimum, maximum }: ExpectedRow, value: number): Judged {
  const slack = Math.abs(value) * 1e-12
  if (minimum !== null && value < minimum - slack) return { verdict: 'not-met', reason: 'below-minimum' }
  if (maximum !== null && value > maximum + slack) return { verdict: 'not-met', reason: 'above-maximum' }
  if (minimum === null && maximum === null) return { verdict: 'not-evidenced', reason: 'no-limits' }
  return { verdict: 'met', reason: 'within-limits' }
}

function judgeCensored({ minimum, maximum, characteristic }: ExpectedRow, { side, bound }: Extract<Reading, { kind: 'censored' }>): Judged {
  const unknown: Judged = { verdict: 'not-evidenced', reason: 'beyond-range' }
  if (side === 'above') {
    if (maximum !== null) return bound === null || bound >= maximum ? { verdict: 'not-met', reason: 'above-maximum' } : unknown
    // An insulation tester beyond its range has seen more than any limit it is used for.
    const enough = bound === null ? characteristic === 'insulation-resistance' : minimum !== null && bound >= minimum
    return minimum !== null && enough ? { verdict: 'met', reason: 'within-limits' } : unknown
  }
  if (minimum !== null) return bound !== null && bound <= minimum ? { verdict: 'not-met', reason: 'below-minimum' } : unknown
  return maximum !== null && bound !== null && bound <= maximum ? { verdict: 'met', reason: 'within-limits' } : unknown
}

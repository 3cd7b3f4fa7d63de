import { readFigure } from '#shared/number-text'
import type { ShownUnit } from '#shared/shown-units'
import { readMantissa, splitMantissa } from './decimal-sign'
import type { DecimalSign, ExpectedRow, QuestionCode, QuestionOption, Reading } from './model'
import { readWithstand } from './read-withstand'
import { readUnit, unitOf } from './units-in-files'
import { isDashedOut, isEmptyWord, isFailWord, isFormulaError, isOverRangeWord, isPassWord, isUnsureVerdict, looksLikeDate } from './words'

export interface CellContext {
  row: Pick<ExpectedRow, 'unit' | 'characteristic' | 'record'>
  /** Unit of bare numbers. Null when the column has none: then only cells with a unit of their own are read. */
  unit: ShownUnit | null
  decimalSign: DecimalSign
}

export type CellReading =
  | { kind: 'empty' }
  | { kind: 'reading'; reading: Reading; /** Unit written in the cell itself. */ ownUnit: string | null }
  | { kind: 'question'; code: QuestionCode; options: QuestionOption[]; typed: boolean; values: Readonly<Record<string, string | number>> }

/** Characteristics that end in a verdict, not in a figure. */
const ATTRIBUTES: ReadonlySet<string> = new Set(['hipot', 'polarity', 'surge', 'impulse', 'visual'])

export const isAttributeRow = (row: Pick<ExpectedRow, 'characteristic' | 'record'>): boolean => row.record === 'pass-fail' || ATTRIBUTES.has(row.characteristic)

const LEAVE_OUT: QuestionOption = { id: 'leave-out', values: {} }
const VERDICTS: QuestionOption[] = [{ id: 'passed', values: {} }, { id: 'failed', values: {} }, LEAVE_OUT]

const ask = (code: QuestionCode, options: QuestionOption[], typed = false, values: Record<string, string | number> = {}): CellReading => ({ kind: 'question', code, options, typed, values })
const read = (reading: Reading, ownUnit: string | null = null): CellReading => ({ kind: 'reading', reading, ownUnit })

/** What instruments send for "beyond range" and "no number". Source: SCPI-1999, 7.2.1. */
const OVERLOAD = 9.9e37
const NOT_A_NUMBER = 9.91e37

/**
 * Reads one cell by the test row it belongs to. What could mean two things, or nothing, is a question; a number
 * is never scaled unless its unit is written in the cell or in the heading.
 */
export function readCell(source: string, context: CellContext): CellReading {
  const text = source.normalize('NFKC').replace(/\s+/g, ' ').trim()
  if (isEmptyWord(text)) return { kind: 'empty' }
  if (isFormulaError(text)) return ask('formula-error', [LEAVE_OUT], true)
  if (isPassWord(text)) return read({ kind: 'attribute', passed: true })
  if (isFailWord(text)) return read({ kind: 'attribute', passed: false })
  if (isOverRangeWord(text) || isDashedOut(text)) return read({ kind: 'censored', side: 'above', bound: null })
  if (isAttributeRow(context.row)) return readVerdict(text)
  if (/^[a-z]$/i.test(text) && isUnsureVerdict(text)) return ask('unsure-verdict', VERDICTS)
  if (looksLikeDate(text)) return ask('date-for-number', [LEAVE_OUT], true)

  const threshold = /^(>=?|<=?|≥|≤|>>|<<)\s*(.+)$/.exec(text)
  return threshold ? readThreshold(threshold[1]!, threshold[2]!, context) : readNumber(text, context)
}

/** A figure alone is no verdict: who has measured says whether the part passed. */
function readVerdict(text: string): CellReading {
  const withstand = readWithstand(text)
  if (withstand) return read({ kind: 'withstand', ...withstand })
  return ask('unsure-verdict', VERDICTS)
}

function readThreshold(mark: string, text: string, context: CellContext): CellReading {
  const bound = readNumber(text, context)
  if (bound.kind !== 'reading' || bound.reading.kind !== 'value') return bound
  const side = mark.startsWith('>') || mark === '≥' ? 'above' : 'below'
  return read({ kind: 'censored', side, bound: bound.reading.value }, bound.ownUnit)
}

function readNumber(text: string, context: CellContext): CellReading {
  const number = splitMantissa(text)
  if (!number) return ask('unreadable-cell', [LEAVE_OUT], true)
  const instrument = readInstrumentCode(text)
  if (instrument) return read(instrument)

  const mantissa = readMantissa(number.mantissa, /^[eE][+\-−]?\d/.test(number.tail) ? 'mixed' : context.decimalSign)
  switch (mantissa.kind) {
    case 'none':
      return ask('unreadable-cell', [LEAVE_OUT], true)
    case 'two':
      return ask('ambiguous-number', [option('decimal', number, mantissa.decimal), option('grouped', number, mantissa.grouped), LEAVE_OUT], true)
    case 'one':
      return readWithUnit(`${number.sign}${mantissa.decimal}${number.tail}`, number.tail, context)
  }
}

const option = (id: string, number: { sign: string; tail: string }, figure: string): QuestionOption => ({ id, values: { figure: `${number.sign}${figure}${number.tail === '' ? '' : ` ${number.tail}`}` } })

function readInstrumentCode(text: string): Reading | null {
  const value = Math.abs(Number(text.replace(',', '.')))
  if (!(value >= OVERLOAD * 0.999)) return null
  if (Math.abs(value / NOT_A_NUMBER - 1) < 1e-4) return { kind: 'no-number' }
  return { kind: 'censored', side: text.startsWith('-') ? 'below' : 'above', bound: null }
}

function readWithUnit(canonical: string, tail: string, context: CellContext): CellReading {
  const base = context.row.unit
  const ownUnit = tail.replace(/^[eE][+\-−]?\d+\s*/, '')
  if (/^M\s*(OHMS?|H|A|V|F)$/.test(ownUnit)) return askUnit(canonical, ownUnit, context)

  const figure = readFigure(canonical, context.unit ?? unitOf(base, base === 'mm' ? 'm' : ''))
  if (figure.kind === 'figure') {
    if (context.unit === null && ownUnit === '' && base !== '1') return ask('unit-unknown', [LEAVE_OUT], true)
    return read({ kind: 'value', value: figure.value }, ownUnit === '' ? null : ownUnit)
  }
  if (figure.kind === 'unreadable' && figure.reason === 'unknown-unit') return ask('unit-unlike', [LEAVE_OUT], true, { unit: ownUnit, expected: base })
  return ask('unreadable-cell', [LEAVE_OUT], true)
}

/** A unit in capitals inside a cell: milli or mega. */
function askUnit(canonical: string, ownUnit: string, { row }: CellContext): CellReading {
  const unit = readUnit(ownUnit, row.unit)
  if (unit.kind !== 'ambiguous') return ask('unit-unlike', [LEAVE_OUT], true, { unit: ownUnit, expected: row.unit })
  const figure = canonical.slice(0, -ownUnit.length).trim()
  return ask('unit-ambiguous', [...unit.units.map((each) => ({ id: each.symbol, values: { figure: `${figure} ${each.symbol}` } })), LEAVE_OUT])
}

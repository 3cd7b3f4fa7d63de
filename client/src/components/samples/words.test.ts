import { describe, expect, it } from 'vitest'
import type { ExpectedRow, Note, Question } from '#shared/measurement/model'
import { noteSentence, optionWords, questionSentence } from './question-words'
import { limitsText, readingText, rowFigure } from './sample-words'

const row: ExpectedRow = { id: 't1', symbol: 'Lp', characteristic: 'inductance', unit: 'H', minimum: 540e-6, nominal: 600e-6, maximum: 660e-6, levelV: null, temperatureC: 25, extent: 'every-part', record: 'reading' }
const question = (values: Partial<Question>): Question => ({ id: '', code: 'unreadable-cell', address: 'B2', text: '', values: {}, options: [], typed: false, ...values })

describe('figures of a test row', () => {
  it.each([
    [row, '540 … 660\u00a0µH'],
    [{ ...row, minimum: null }, '≤ 660\u00a0µH'],
    [{ ...row, maximum: null }, '≥ 540\u00a0µH'],
    [{ ...row, minimum: null, maximum: null, record: 'pass-fail' as const }, 'pass or fail'],
    [{ ...row, unit: '1' as const, minimum: 9.9, nominal: 10, maximum: 10.1 }, '9.9 … 10.1'],
  ])('limits of row %#: %s', (each, text) => {
    expect(limitsText(each)).toBe(text)
  })

  it('are shown in the unit of the limits', () => {
    expect(rowFigure(601.25e-6, row)).toBe('601.25')
    expect(rowFigure(null, row)).toBe('–')
    expect(readingText({ kind: 'censored', side: 'above', bound: 999e-6 }, null, row)).toBe('> 999')
    expect(readingText({ kind: 'censored', side: 'above', bound: null }, null, row)).toBe('over range')
    expect(readingText({ kind: 'withstand', voltageV: 3000, timeS: 2, currentA: 0.12e-3, passed: true }, null, row)).toBe('pass, 3000\u00a0V, 2\u00a0s, 0.12\u00a0mA')
  })
})

describe('questions', () => {
  it('name figures with units', () => {
    expect(questionSentence(question({ code: 'cell-factor', text: '0,61', values: { symbol: 'Lp', value: 0.61e-6, reference: 600e-6, unit: 'H' } }))).toBe('Lp reads 610\u00a0nH here and about 600\u00a0µH elsewhere. Is it written in another prefix?')
    expect(questionSentence(question({ code: 'column-factor', text: 'Lp', values: { median: 0.6, expected: 600e-6, unit: 'mH' } }))).toBe('The numbers of Lp lie near 600\u00a0mH, the drawing asks for 600\u00a0µH. Are they written in another prefix?')
  })

  it.each([
    [{ id: 'scale:-3', values: { factor: 0.001 } }, 'cell-factor', 'Divide by 1000'],
    [{ id: 'scale:3', values: { factor: 1000 } }, 'cell-factor', 'Multiply by 1000'],
    [{ id: 'leave-out', values: {} }, 'serial-missing', 'Leave the line out'],
    [{ id: 'leave-out', values: {} }, 'unreadable-cell', 'Leave the cell out'],
    [{ id: 'row:t1', values: { symbol: 'Lp' } }, 'column-target', 'Lp'],
    [{ id: 'decimal', values: { figure: '1.250' } }, 'ambiguous-number', '1.250'],
    [{ id: 'mΩ', values: { symbol: 'mΩ' } }, 'unit-ambiguous', 'mΩ'],
    [{ id: 'new-run', values: { serial: '12', run: 2 } }, 'serial-duplicate', 'The same part again, test run 2'],
  ] as const)('option %j of %s reads “%s”', (option, code, words) => {
    expect(optionWords(option, code)).toBe(words)
  })
})

it('says that the drawing counts where the file’s limit differs', () => {
  const note: Note = { code: 'limit-differs', address: 'C8', values: { symbol: 'Llk', side: 'maximum', file: 10e-6, drawing: 12e-6, unit: 'H' } }
  expect(noteSentence(note)).toBe('The file states a maximum of 10\u00a0µH for Llk, the drawing 12\u00a0µH. The drawing counts.')
})

import { describe, expect, it } from 'vitest'
import { ROWS, rowOf } from './expected-rows.fixture'
import { judge } from './judge'
import type { AcceptedReading, ExpectedRow, Reading } from './model'

const OPTIONS = { sampleKind: 'hand-made', measuredAtC: null } as const

const of = (row: ExpectedRow, ...readings: Reading[]): AcceptedReading[] =>
  readings.map((reading, index) => ({ serial: String(index + 1), run: 1, rowId: row.id, address: `B${index + 2}`, text: '', reading, scaledBy: null }))
const value = (v: number): Reading => ({ kind: 'value', value: v })
const above = (bound: number | null): Reading => ({ kind: 'censored', side: 'above', bound })
const below = (bound: number | null): Reading => ({ kind: 'censored', side: 'below', bound })

describe('one cell', () => {
  it.each<{ name: string; row: string; reading: Reading; verdict: string; reason: string }>([
    { name: 'on its maximum', row: 'Lp', reading: value(660e-6), verdict: 'met', reason: 'within-limits' },
    { name: 'on its minimum', row: 'Lp', reading: value(540e-6), verdict: 'met', reason: 'within-limits' },
    { name: 'over its maximum', row: 'Lp', reading: value(660.01e-6), verdict: 'not-met', reason: 'above-maximum' },
    { name: 'under its minimum', row: 'Lp', reading: value(539.9e-6), verdict: 'not-met', reason: 'below-minimum' },
    { name: 'over range against a minimum it is known to exceed', row: 'IR', reading: above(999e6), verdict: 'met', reason: 'within-limits' },
    { name: 'over range of an insulation tester', row: 'IR', reading: above(null), verdict: 'met', reason: 'within-limits' },
    { name: 'over a threshold below the minimum', row: 'IR', reading: above(50e6), verdict: 'not-evidenced', reason: 'beyond-range' },
    { name: 'over range against a maximum', row: 'Rdc P', reading: above(null), verdict: 'not-met', reason: 'above-maximum' },
    { name: 'over a threshold below the maximum', row: 'Rdc P', reading: above(0.5), verdict: 'not-evidenced', reason: 'beyond-range' },
    { name: 'under a threshold within the maximum', row: 'Rdc P', reading: below(0.01), verdict: 'met', reason: 'within-limits' },
    { name: 'under a threshold below the minimum', row: 'IR', reading: below(1e6), verdict: 'not-met', reason: 'below-minimum' },
    { name: 'without a number', row: 'Lp', reading: { kind: 'no-number' }, verdict: 'not-evidenced', reason: 'no-number' },
    { name: 'a word where a reading is asked for', row: 'Lp', reading: { kind: 'attribute', passed: true }, verdict: 'not-evidenced', reason: 'word-for-reading' },
    { name: 'a failure by word', row: 'Lp', reading: { kind: 'attribute', passed: false }, verdict: 'not-met', reason: 'failed' },
    { name: 'a hipot pass', row: 'HV P–S', reading: { kind: 'attribute', passed: true }, verdict: 'met', reason: 'passed' },
    { name: 'a hipot at too low a voltage', row: 'HV P–S', reading: { kind: 'withstand', voltageV: 2500, timeS: 2, currentA: null, passed: true }, verdict: 'not-evidenced', reason: 'test-voltage-too-low' },
    { name: 'a hipot at the drawing’s voltage', row: 'HV P–S', reading: { kind: 'withstand', voltageV: 3000, timeS: 2, currentA: null, passed: true }, verdict: 'met', reason: 'passed' },
    { name: 'a hipot that broke down', row: 'HV P–S', reading: { kind: 'withstand', voltageV: 2500, timeS: 2, currentA: null, passed: false }, verdict: 'not-met', reason: 'failed' },
  ])('$name: $verdict', ({ row, reading, verdict, reason }) => {
    const judged = judge([rowOf(row)], of(rowOf(row), reading), OPTIONS)
    expect(judged.rows[0]!.cells[0]).toMatchObject({ verdict, reason })
    expect(judged.verdict).toBe(verdict)
  })
})

describe('a row', () => {
  const row = rowOf('Llk')

  it('names the parts out of limits and keeps them in its figures', () => {
    const judged = judge([row], of(row, value(9e-6), value(13.9e-6), value(11e-6)), OPTIONS).rows[0]!
    expect(judged).toMatchObject({ verdict: 'not-met', outOfLimits: ['2'], summary: { n: 3, minimum: 9e-6, maximum: 13.9e-6 } })
  })

  it('leaves censored readings out of its figures and counts them', () => {
    const judged = judge([row], of(row, value(9e-6), below(1e-6)), OPTIONS).rows[0]!
    expect(judged).toMatchObject({ censored: 1, summary: { n: 1, mean: 9e-6 } })
  })

  it('lacks evidence for a part that was not measured on it', () => {
    const judged = judge([rowOf('Lp'), row], [...of(rowOf('Lp'), value(600e-6), value(601e-6)), ...of(row, value(9e-6))], OPTIONS)
    expect(judged.rows[1]).toMatchObject({ verdict: 'not-evidenced', notEvidenced: ['2'] })
    expect(judged.verdict).toBe('not-evidenced')
  })

  it('asks one part only where the drawing asks for a sample', () => {
    const sample: ExpectedRow = { ...row, extent: 'sample' }
    expect(judge([rowOf('Lp'), sample], [...of(rowOf('Lp'), value(600e-6), value(601e-6)), ...of(sample, value(9e-6))], OPTIONS).verdict).toBe('met')
    expect(judge([rowOf('Lp'), sample], of(rowOf('Lp'), value(600e-6)), OPTIONS).verdict).toBe('not-evidenced')
  })

  it('does not decide when it is for reference', () => {
    const reference: ExpectedRow = { ...row, extent: 'reference' }
    expect(judge([rowOf('Lp'), reference], [...of(rowOf('Lp'), value(600e-6)), ...of(reference, value(99e-6))], OPTIONS).verdict).toBe('met')
  })

  it('counts the last run of a part and keeps the first', () => {
    const [first] = of(row, value(13e-6))
    const judged = judge([row], [first!, { ...first!, run: 2, reading: value(10e-6) }], OPTIONS).rows[0]!
    expect(judged.verdict).toBe('met')
    expect(judged.summary.n).toBe(1)
    expect(judged.cells.map(({ run, superseded, verdict }) => [run, superseded, verdict])).toEqual([[1, true, 'not-met'], [2, false, 'met']])
  })
})

it('judges a resistance at the temperature of its row and keeps the reading', () => {
  const row = rowOf('Rdc P')
  const cell = judge([row], of(row, value(0.97)), { sampleKind: 'hand-made', measuredAtC: 31 }).rows[0]!.cells[0]!
  expect(cell).toMatchObject({ verdict: 'met', correctedFromC: 31, reading: { value: 0.97 } })
  expect(cell.judged).toBeCloseTo(0.97 / 1.04323, 6)
})

it('is not evidenced when nothing was measured', () => {
  expect(judge(ROWS, [], OPTIONS).verdict).toBe('not-evidenced')
})

import { describe, expect, it } from 'vitest'
import { rowOf } from './expected-rows.fixture'
import type { DecimalSign } from './model'
import { readCell } from './read-cell'
import { readWithstand } from './read-withstand'
import { unitOf } from './units-in-files'

const inductance = (text: string, decimalSign: DecimalSign = 'point') => readCell(text, { row: rowOf('Lp'), unit: unitOf('H', 'µ'), decimalSign })
const resistance = (text: string) => readCell(text, { row: rowOf('Rdc P'), unit: unitOf('Ω', ''), decimalSign: 'point' })
const insulation = (text: string) => readCell(text, { row: rowOf('IR'), unit: unitOf('Ω', 'M'), decimalSign: 'point' })
const hipot = (text: string) => readCell(text, { row: rowOf('HV P–S'), unit: null, decimalSign: 'point' })
const valueOf = (cell: ReturnType<typeof readCell>) => (cell.kind === 'reading' && cell.reading.kind === 'value' ? cell.reading.value : cell)

describe('a number', () => {
  it.each([
    ['612', 612e-6],
    ['612uH', 612e-6],
    ['612u', 612e-6],
    ['0.61 mH', 610e-6],
    ['0,61 mH', 610e-6],
    ['6.12E-04H', 612e-6],
    ['１２.５', 12.5e-6],
    ['612\u00a0', 612e-6],
  ])('%s in a µH column', (text, value) => {
    expect(valueOf(inductance(text))).toBeCloseTo(value, 12)
  })

  it.each([
    ['1k2', 1200],
    ['4R7', 4.7],
    ['47m', 0.047],
    ['0.61 Ohm', 0.61],
  ])('%s in an Ω column', (text, value) => {
    expect(valueOf(resistance(text))).toBeCloseTo(value, 12)
  })

  it('with two readings is asked about', () => {
    expect(inductance('1,250', 'undecided')).toMatchObject({ kind: 'question', code: 'ambiguous-number', options: [{ values: { figure: '1.250' } }, { values: { figure: '1250' } }, { id: 'leave-out' }] })
    expect(valueOf(inductance('1,250', 'comma'))).toBeCloseTo(1.25e-6, 12)
    expect(valueOf(inductance('1,250', 'point'))).toBeCloseTo(1250e-6, 12)
  })

  it.each([
    ['612 Ω', 'unit-unlike'],
    ['01-Feb', 'date-for-number'],
    ['2026-02-01', 'date-for-number'],
    ['#REF!', 'formula-error'],
    ['abc', 'unreadable-cell'],
    ['12,34,5', 'unreadable-cell'],
    ['600 MH', 'unit-ambiguous'],
    ['P', 'unsure-verdict'],
  ])('that is none, %s, is asked about: %s', (text, code) => {
    expect(inductance(text)).toMatchObject({ kind: 'question', code })
  })

  it('without a unit in heading or cell is asked about', () => {
    expect(readCell('612', { row: rowOf('Lp'), unit: null, decimalSign: 'point' })).toMatchObject({ kind: 'question', code: 'unit-unknown' })
    expect(valueOf(readCell('612uH', { row: rowOf('Lp'), unit: null, decimalSign: 'point' }))).toBeCloseTo(612e-6, 12)
  })
})

describe('beyond range', () => {
  it.each([
    ['OL', { kind: 'censored', side: 'above', bound: null }],
    ['----', { kind: 'censored', side: 'above', bound: null }],
    ['9.9E37', { kind: 'censored', side: 'above', bound: null }],
    ['+9.90000E+37', { kind: 'censored', side: 'above', bound: null }],
    ['9.91E37', { kind: 'no-number' }],
    ['>999', { kind: 'censored', side: 'above', bound: 999e6 }],
    ['>999M', { kind: 'censored', side: 'above', bound: 999e6 }],
    ['> 2 GΩ', { kind: 'censored', side: 'above', bound: 2e9 }],
    ['<0.01', { kind: 'censored', side: 'below', bound: 1e4 }],
  ])('%s', (text, reading) => {
    expect(insulation(text)).toMatchObject({ kind: 'reading', reading })
  })
})

describe('a word', () => {
  it.each(['PASS', 'ok.', 'GO', '合格', '✔', 'i.O.'])('%s passes', (text) => {
    expect(hipot(text)).toMatchObject({ reading: { kind: 'attribute', passed: true } })
  })

  it.each(['FAIL', 'NG', 'nok', 'no-go', '不合格', 'n.i.O.'])('%s fails', (text) => {
    expect(hipot(text)).toMatchObject({ reading: { kind: 'attribute', passed: false } })
  })

  it.each(['P', '1', '3000', '0.12 mA'])('%s is no verdict until somebody says so', (text) => {
    expect(hipot(text)).toMatchObject({ kind: 'question', code: 'unsure-verdict' })
  })

  it.each(['', '-', 'n/a', ' '])('“%s” is an empty cell, which is not zero', (text) => {
    expect(inductance(text)).toEqual({ kind: 'empty' })
  })
})

describe('a withstand test in one cell', () => {
  it.each([
    ['3000VAC 2s OK 0.12mA', { voltageV: 3000, timeS: 2, currentA: 0.12e-3, passed: true }],
    ['PASS 3,0 kV a.c. 60 s', { voltageV: 3000, timeS: 60, currentA: null, passed: true }],
    ['FAIL, 2.1kV', { voltageV: 2100, timeS: null, currentA: null, passed: false }],
    ['OK 120µA', { voltageV: null, timeS: null, currentA: 120e-6, passed: true }],
  ])('%s', (text, expected) => {
    const read = readWithstand(text)!
    expect(read.passed).toBe(expected.passed)
    for (const key of ['voltageV', 'timeS', 'currentA'] as const) {
      if (expected[key] === null) expect(read[key]).toBeNull()
      else expect(read[key]).toBeCloseTo(expected[key], 9)
    }
  })

  it.each(['3000VAC 2s', '3000VAC 2s OK retest', 'OK not'])('says nothing for %s', (text) => {
    expect(readWithstand(text)).toBeNull()
  })
})

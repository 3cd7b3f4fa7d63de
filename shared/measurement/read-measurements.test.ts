import { describe, expect, it } from 'vitest'
import { applyAnswers } from './apply-answers'
import { ROWS } from './expected-rows.fixture'
import { judge } from './judge'
import type { Answer, MeasurementReading } from './model'
import { readMeasurements } from './read-measurements'
import { matchHeading } from './match-heading'
import { reportTemplate } from './report-template'

const bytes = (text: string) => new TextEncoder().encode(text)

function reading(text: string, answers: Answer[] = []): MeasurementReading {
  const read = readMeasurements(bytes(text), ROWS, answers)
  if (read.kind === 'refused') throw new Error(`refused: ${read.code}`)
  return read
}

const asked = (text: string, answers: Answer[] = []) => reading(text, answers).questions.map(({ id }) => id)
const values = ({ accepted }: MeasurementReading, rowId: string) =>
  accepted.filter((each) => each.rowId === rowId).map((each) => (each.reading.kind === 'value' ? Number(each.reading.value.toPrecision(9)) : each.reading.kind))

const PLAIN = 'Serial;Lp (uH);Llk[µH];Rdc P/Ω;Rdc S1 (mΩ);P:S1;HV P–S;IR (MΩ)\n1;601,2;9,8;0,91;31;10,01;OK;>999\n2;598,4;10,1;0,90;30,5;9,99;3000VAC 2s OK 0.12mA;OL\n'

describe('a plain file', () => {
  const read = reading(PLAIN)

  it('is read without a question', () => {
    expect(read.questions).toEqual([])
    expect(read.rejected).toEqual([])
    expect(read.accepted).toHaveLength(14)
    expect(read.facts).toMatchObject({ separator: ';', decimalSign: 'comma', orientation: 'parts-in-rows', headingAddress: 'A1', encoding: 'UTF-8' })
    expect(read.facts.evidence).toMatchObject({ commaAt: 'B2', point: 0 })
  })

  it('keeps values in the unit of the test row with the cell they came from', () => {
    expect(values(read, 't1')).toEqual([601.2e-6, 598.4e-6])
    expect(values(read, 't4')).toEqual([0.031, 0.0305])
    expect(read.accepted.find(({ rowId, serial }) => rowId === 't3' && serial === '2')).toMatchObject({ address: 'D3', text: '0,90', reading: { kind: 'value', value: 0.9 } })
  })

  it('gives the same again', () => {
    expect(reading(PLAIN)).toEqual(read)
  })
})

it('answers 0.61 mH and 610 µH with the same value', () => {
  const read = reading('Serial;Lp\n1;0,61 mH\n2;610uH\n')
  expect(values(read, 't1')).toEqual([610e-6, 610e-6])
  expect(read.notes).toContainEqual(expect.objectContaining({ code: 'mixed-units' }))
})

describe('the pilot report with everything in it', () => {
  const lines = Array.from({ length: 30 }, (_, index) => {
    const n = index + 1
    const serial = n === 9 ? '' : n === 13 ? '12' : String(n)
    const inductance = (595 + (n % 7) * 1.5).toFixed(1)
    const lp = n > 20 ? (Number(inductance) / 1000).toFixed(4) : inductance
    return [serial, lp.replace('.', ','), `9,${n % 8}1`, '0,9' + (n % 5), `3${n % 4},2`, `10,0${n % 6}`, 'PASS', n === 4 ? 'OL' : n === 5 ? '9.9E37' : '500'].join(';')
  })
  const file = [
    'Test report;;;',
    'Part no.:;T-100;;',
    'Drawing rev: A',
    '',
    'No.;Lp;Llk;DCR P;DCR S1;P:S1;Hipot;IR',
    ';µH;µH;Ω;mΩ;;;MΩ',
    'Min;540;;;;9,9;;100',
    'Max;660;10;0,95;35;10,1;;',
    ...lines.slice(0, 15),
    ';;;;;;;',
    ...lines.slice(15),
    'AVG;598,1;9,1;0,92;31,7;10,02;;',
    'CPK;2,31;1,5;;;;;',
  ].join('\r\n')

  const read = reading(file)

  it('asks by cell and never scales by itself', () => {
    const addresses = (code: string) => read.questions.filter((question) => question.code === code).map(({ address }) => address)
    expect(addresses('cell-factor')).toHaveLength(10)
    expect(addresses('serial-missing')).toEqual(['A17'])
    expect(addresses('serial-duplicate')).toEqual(['A21'])
    expect(read.questions).toHaveLength(12)
    expect(values(read, 't1')).toHaveLength(18)
  })

  it('lists the limit that differs from the drawing and the title block', () => {
    expect(read.notes).toContainEqual({ code: 'limit-differs', address: 'C8', values: expect.objectContaining({ symbol: 'Llk', side: 'maximum' }) })
    expect(read.notes.filter(({ code }) => code === 'limit-differs')).toHaveLength(1)
    expect(read.titleBlock).toEqual([
      { address: 'A1', label: 'Test report', value: '' },
      { address: 'A2', label: 'Part no.', value: 'T-100' },
      { address: 'A3', label: 'Drawing rev', value: 'A' },
    ])
  })

  it('says where the file’s own sums disagree', () => {
    expect(read.notes.some(({ code, values: v }) => code === 'summary-disagrees' && v.figure === 'mean' && v.symbol === 'Llk')).toBe(true)
  })

  it('is complete after the answers, the second run of a part beside the first', () => {
    const more: Answer[] = read.questions.map(({ id, code }) => {
      if (code === 'cell-factor') return { questionId: id, option: 'scale:3' }
      if (code === 'serial-duplicate') return { questionId: id, option: 'new-run' }
      return { questionId: id, option: 'use-line' }
    })
    const answered = applyAnswers(bytes(file), ROWS, [], more)
    if (answered.kind !== 'answered') throw new Error(answered.kind)
    expect(answered.reading.questions).toEqual([])
    const lp = answered.reading.accepted.filter(({ rowId }) => rowId === 't1')
    expect(lp).toHaveLength(30)
    expect(lp.every(({ reading: r }) => r.kind === 'value' && r.value > 590e-6 && r.value < 610e-6)).toBe(true)
    expect(lp.filter(({ serial }) => serial === '12').map(({ run }) => run)).toEqual([1, 2])
    expect(lp.filter(({ scaledBy }) => scaledBy === 1e-3 || scaledBy === 1000)).toHaveLength(10)
    expect(answered.reading.serials.find(({ provisional }) => provisional)?.serial).toBe('line 17')

    const judged = judge(ROWS, answered.reading.accepted, { sampleKind: 'pilot-lot', measuredAtC: 31 })
    const rowOf = (symbol: string) => judged.rows.find(({ row }) => row.symbol === symbol)!
    expect(rowOf('Lp').summary.n).toBe(29)
    expect(rowOf('IR')).toMatchObject({ verdict: 'met', censored: 2, summary: { n: 27 } })
    expect(rowOf('HV P–S').attributes).toMatchObject({ n: 29, failures: 0 })
    expect(rowOf('Rdc P').cells[0]).toMatchObject({ correctedFromC: 31 })
  })
})

describe('asks about', () => {
  it.each([
    { name: 'a heading nobody knows', file: 'Serial;Lp (µH);Mystery\n1;600;5\n', id: 'column-target:C1' },
    { name: 'a column without a unit', file: 'Serial;Lp\n1;600\n2;601\n', id: 'unit-missing:B1' },
    { name: 'a unit in capitals', file: 'Serial;Lp (MH)\n1;0.6\n', id: 'unit-ambiguous:B1' },
    { name: 'a unit of another quantity', file: 'Serial;Lp (mΩ)\n1;600\n', id: 'unit-unlike:B1' },
    { name: 'a number with two readings', file: 'Serial;Rdc P (mΩ)\n1;1,250\n', id: 'ambiguous-number:B2' },
    { name: 'a whole column a thousand times off', file: 'Serial;Lp (mH)\n1;600\n2;601\n', id: 'column-factor:B1' },
    { name: 'a ratio upside down', file: 'Serial;P:S1\n1;0.1001\n2;0.0999\n', id: 'inverted-ratio:B1' },
    { name: 'a reading of nothing', file: 'Serial;Lp (µH)\n1;0\n2;601\n', id: 'zero-or-negative:B2' },
    { name: 'a figure where a verdict belongs', file: 'Serial;Hipot\n1;3000\n', id: 'unsure-verdict:B2' },
    { name: 'a date', file: 'Serial;Llk (µH)\n1;01-Feb\n', id: 'date-for-number:B2' },
    { name: 'a formula error', file: 'Serial;Llk (µH)\n1;#REF!\n', id: 'formula-error:B2' },
    { name: 'a missing serial', file: 'Serial;Llk (µH)\n;9.5\n', id: 'serial-missing:A2' },
    { name: 'a merged serial', file: 'Serial;Llk (µH)\n1-5;9.5\n6;9.4\n', id: 'serial-range:A2' },
    { name: 'a second column of the same row', file: 'Serial;Lp (µH);Lp (µH)\n1;600;601\n', id: 'column-target:C1' },
  ])('$name', ({ file, id }) => {
    expect(asked(file)).toEqual([id])
  })

  it('nothing about serials that hold a dash by themselves', () => {
    expect(asked('Serial;Llk (µH)\n24-001;9.5\n24-002;9.4\nX-7;9.3\n')).toEqual([])
  })
})

describe('answers', () => {
  const file = 'Serial;Lp;Mystery\n1;600;x\n2;0.6;y\n3;602;z\n'

  it('lead to the next questions and are kept together', () => {
    const first = applyAnswers(bytes(file), ROWS, [], [
      { questionId: 'column-target:C1', option: 'ignore' },
      { questionId: 'unit-missing:B1', option: 'µH' },
    ])
    if (first.kind !== 'answered') throw new Error(first.kind)
    expect(first.reading.questions.map(({ id }) => id)).toEqual(['cell-factor:B3'])
    const second = applyAnswers(bytes(file), ROWS, first.answers, [{ questionId: 'cell-factor:B3', option: 'leave-out' }])
    if (second.kind !== 'answered') throw new Error(second.kind)
    expect(second.reading.questions).toEqual([])
    expect(second.reading.rejected).toEqual([{ address: 'B3', text: '0.6', serial: '2', rowId: 't1', reason: 'left-out' }])
    expect(second.answers).toHaveLength(3)
  })

  it('can be changed, and then what hung on the old one is forgotten', () => {
    const given = [{ questionId: 'column-target:C1', option: 'ignore' }, { questionId: 'unit-missing:B1', option: 'µH' }, { questionId: 'cell-factor:B3', option: 'keep' }]
    const changed = applyAnswers(bytes(file), ROWS, given, [{ questionId: 'cell-factor:B3', option: 'scale:3' }])
    expect(changed.kind === 'answered' && values(changed.reading, 't1')).toEqual([600e-6, 600e-6, 602e-6])
  })

  it.each([
    { name: 'to a question nobody asked', answer: { questionId: 'cell-factor:Z9', option: 'keep' } },
    { name: 'with an option that is not offered', answer: { questionId: 'unit-missing:B1', option: 'mΩ' } },
    { name: 'typed where nothing may be typed', answer: { questionId: 'unit-missing:B1', option: 'typed', text: 'µH' } },
  ])('$name are not taken, nor any with them', ({ answer }) => {
    const result = applyAnswers(bytes(file), ROWS, [], [{ questionId: 'column-target:C1', option: 'ignore' }, answer])
    expect(result).toEqual({ kind: 'unfitting', answers: [answer] })
  })

  it('typed for a cell are read like a cell', () => {
    const cell = 'Serial;Llk (µH)\n1;01-Feb\n2;9,5\n'
    const typed = applyAnswers(bytes(cell), ROWS, [], [{ questionId: 'date-for-number:B2', option: 'typed', text: '1,2' }])
    expect(typed.kind === 'answered' && values(typed.reading, 't2')).toEqual([1.2e-6, 9.5e-6])
    expect(applyAnswers(bytes(cell), ROWS, [], [{ questionId: 'date-for-number:B2', option: 'typed', text: 'about one' }]).kind).toBe('unfitting')
  })

  it('choose between two readings of a number', () => {
    const cell = 'Serial;Rdc P (mΩ)\n1;1,250\n2;910\n'
    const grouped = applyAnswers(bytes(cell), ROWS, [], [{ questionId: 'ambiguous-number:B2', option: 'grouped' }])
    expect(grouped.kind === 'answered' && values(grouped.reading, 't3')).toEqual([1.25, 0.91])
  })

  it('name a part whose serial is there twice', () => {
    const cell = 'Serial;Llk (µH)\n1;9.5\n1;9.6\n'
    const renamed = applyAnswers(bytes(cell), ROWS, [], [{ questionId: 'serial-duplicate:A3', option: 'typed', text: '1b' }])
    expect(renamed.kind === 'answered' && renamed.reading.serials.map(({ serial, run }) => [serial, run])).toEqual([['1', 1], ['1b', 1]])
    expect(applyAnswers(bytes(cell), ROWS, [], [{ questionId: 'serial-duplicate:A3', option: 'typed', text: '1' }]).kind).toBe('unfitting')
  })
})

it('reads a table whose parts stand in columns, with addresses of the file', () => {
  const read = reading('Symbol;Unit;Min;Max;SN-1;SN-2\nLp;µH;540;660;600,5;601\nDCR P;Ω;;0,95;0,90;0,91\n')
  expect(read.questions).toEqual([])
  expect(read.facts.orientation).toBe('parts-in-columns')
  expect(read.serials.map(({ serial, address }) => [serial, address])).toEqual([['SN-1', 'E1'], ['SN-2', 'F1']])
  expect(read.accepted.find(({ serial, rowId }) => serial === 'SN-2' && rowId === 't3')).toMatchObject({ address: 'F3', reading: { value: 0.91 } })
})

it('names rows that nobody has measured', () => {
  expect(reading('Serial;Lp (µH)\n1;600\n').notes.filter(({ code }) => code === 'row-without-readings')).toHaveLength(6)
})

it('remarks on readings that are all alike', () => {
  expect(reading('Serial;Lp (µH)\n1;600\n2;600\n3;600\n').notes).toContainEqual({ code: 'identical-readings', address: 'B1', values: { symbol: 'Lp', count: 3 } })
})

describe('refuses', () => {
  it.each([
    { name: 'an empty file', file: new Uint8Array(), code: 'empty-file' },
    { name: 'blanks', file: bytes(' \n \n'), code: 'empty-file' },
    { name: 'what is no text', file: Uint8Array.of(0x50, 0x4b, 3, 4, 0, 0), code: 'not-a-text-table' },
    { name: 'quotes that never close', file: bytes('Serial;Lp\n1;"600\n'), code: 'broken-quotes' },
    { name: 'a letter', file: bytes('Dear Sirs,\nplease find the report attached.\n'), code: 'no-table' },
    { name: 'headings without readings', file: bytes('Serial;Lp (µH)\n'), code: 'no-parts' },
    { name: 'more cells than any lot has', file: bytes(`Serial;Lp (µH)\n${'1;600\n'.repeat(110_000)}`), code: 'too-many-cells' },
  ])('$name', ({ file, code }) => {
    expect(readMeasurements(file, ROWS)).toMatchObject({ kind: 'refused', code })
  })
})

it('reads its own template back once it is filled in', () => {
  const template = reportTemplate(ROWS, ['1', '2'])
  expect(template.split('\r\n').slice(0, 4)).toEqual([
    'Serial;Lp (µH);Llk (µH);Rdc P (mΩ);Rdc S1 (mΩ);P:S1;HV P–S (pass/fail);IR (MΩ)',
    'Min;540;;;;9.9;;100',
    'Nom;600;;;;10;;',
    'Max;660;12;950;35;10.1;;',
  ])
  const filled = template.replace('1;;;;;;;\r\n', '1;600;9.5;910;31;10.01;pass;500\r\n').replace('2;;;;;;;\r\n', '2;602,5;9,7;912;32;9,98;pass;>999\r\n')
  const read = reading(filled)
  expect(read.questions).toEqual([])
  expect(read.notes.filter(({ code }) => code === 'limit-differs')).toEqual([])
  expect(values(read, 't3')).toEqual([0.91, 0.912])
})

it('knows the limits of its own template again when the readings are written with a decimal comma', () => {
  const rows = ROWS.map((row) => (row.symbol === 'Lp' ? { ...row, minimum: 540.125e-6 } : row))
  const [, min] = reportTemplate(rows, []).split('\r\n')
  expect(min).toMatch(/^Min;540\.125;/)
  const filled = reportTemplate(rows, ['1']).replace('1;;;;;;;\r\n', '1;602,5;9,7;912;32;9,98;pass;500\r\n')
  const read = readMeasurements(bytes(filled), rows)
  expect(read.kind === 'read' && read.notes.filter(({ code }) => code === 'limit-differs')).toEqual([])
})

it('gives a heading that begins like a formula as text, and knows it again', () => {
  const rows = [{ ...ROWS[0]!, symbol: "=cmd|'/C calc'!A0" }]
  const [head] = reportTemplate(rows, []).split('\r\n')
  expect(head!.split(';')[1]).toMatch(/^"?'=cmd/)
  expect(matchHeading(head!.split(';')[1]!, rows)).toEqual({ rowId: rows[0]!.id, how: 'symbol' })
})

it('counts the rectangle that a table takes up, so that no small file fills the memory', () => {
  const hostile = `Serial${';Lp'.repeat(20_000)}\n${'1\n'.repeat(20_000)}`
  expect(readMeasurements(bytes(hostile), ROWS)).toMatchObject({ kind: 'refused', code: 'too-many-cells' })
  expect(readMeasurements(bytes('1\n'.repeat(150_000)), ROWS)).toMatchObject({ kind: 'refused', code: 'no-table' })
})

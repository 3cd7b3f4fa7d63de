import { describe, expect, it } from 'vitest'
import { filterRows, toCsv, type SheetColumn } from './sheet-columns'

interface Row {
  name: string
  turns: number | null
}
const rows: Row[] = [
  { name: 'Primary, split', turns: 42 },
  { name: '=cmd()', turns: null },
]
const columns: SheetColumn<Row>[] = [
  { key: 'name', header: 'Winding', value: ({ name }) => name },
  { key: 'turns', header: 'Turns', value: ({ turns }) => turns, text: ({ turns }) => (turns === null ? 'open' : `${turns}`) },
]

describe('toCsv', () => {
  it('quotes by RFC 4180, leaves figures plain and keeps a formula from running', () => {
    expect(toCsv(rows, columns)).toBe('\ufeffWinding,Turns\r\n"Primary, split",42\r\n\'=cmd(),\r\n')
  })
})

describe('filterRows', () => {
  it('looks into what is read in every column', () => {
    expect(filterRows(rows, columns, { text: ' OPEN ', choices: {} })).toEqual([rows[1]])
    expect(filterRows(rows, columns, { text: '42', choices: {} })).toEqual([rows[0]])
  })

  it('asks every choice to fit exactly', () => {
    expect(filterRows(rows, columns, { text: '', choices: { turns: '42', name: null } })).toEqual([rows[0]])
  })
})

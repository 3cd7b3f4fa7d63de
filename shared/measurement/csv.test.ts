import { describe, expect, it } from 'vitest'
import { detectSeparator, parseCsv } from './csv'

describe('parseCsv', () => {
  it.each([
    { name: 'LF, CRLF and CR', text: 'a,b\nc,d\r\ne,f\rg,h', records: [['a', 'b'], ['c', 'd'], ['e', 'f'], ['g', 'h']] },
    { name: 'no record behind the last line end', text: 'a,b\r\n', records: [['a', 'b']] },
    { name: 'empty fields at both ends', text: ',a,\n', records: [['', 'a', '']] },
    { name: 'quotes around separators, line ends and quotes', text: '"a,1","b\nc","say ""go"""\n', records: [['a,1', 'b\nc', 'say "go"']] },
    { name: 'a blank line as one empty field', text: 'a\n\nb', records: [['a'], [''], ['b']] },
    { name: 'inch marks inside a plain field', text: '5" pot,1', records: [['5" pot', '1']] },
  ])('reads $name', ({ text, records }) => {
    expect(parseCsv(text, ',')).toEqual({ kind: 'records', records })
  })

  it.each([
    { name: 'quotes that never close', text: 'a,b\nc,"d\n', line: 2 },
    { name: 'text behind closing quotes', text: '"a"b,c', line: 1 },
  ])('refuses $name and says the line', ({ text, line }) => {
    expect(parseCsv(text, ',')).toEqual({ kind: 'broken-quotes', line })
  })
})

it.each([
  { name: 'semicolons beside decimal commas', text: 'Serial;Lp;R\n1;600,1;0,91\n2;601,5;0,92', separator: ';' },
  { name: 'commas', text: 'Serial,Lp,R\n1,600.1,0.91\n2,601.5,0.92', separator: ',' },
  { name: 'tabs', text: 'Serial\tLp\tR\n1\t600,1\t0,91', separator: '\t' },
  { name: 'commas below a title of one cell', text: 'Report of lot 7; pilot\nSerial,Lp,R\n1,600.1,0.91\n2,601.5,0.92', separator: ',' },
])('detects $name', ({ text, separator }) => {
  expect(detectSeparator(text)).toBe(separator)
})

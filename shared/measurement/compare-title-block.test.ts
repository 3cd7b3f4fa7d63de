import { expect, it } from 'vitest'
import { compareTitleBlock } from './compare-title-block'

const asked = { drawingNumber: 'BPW-1042', revision: 'B' }
const codes = (label: string, value: string) => compareTitleBlock([{ address: 'A2', label, value }], asked).map(({ code }) => code)

it.each([
  ['Drawing rev', 'B', []],
  ['Revision', 'Rev. b', []],
  ['Drawing rev', 'A', ['other-revision']],
  ['Drawing no', 'bpw 1042', []],
  ['Part no.', 'BPW-1042-01', []],
  ['Drawing', 'BPW-1043', ['other-drawing']],
  ['Operator', 'A', []],
  ['Revision', '', []],
])('“%s: %s” gives %j', (label, value, expected) => {
  expect(codes(label, value)).toEqual(expected)
})

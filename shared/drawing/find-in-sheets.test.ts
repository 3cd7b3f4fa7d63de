import { describe, expect, it } from 'vitest'
import { findInSheets } from './find-in-sheets'
import { label } from './shapes'
import { drawTablePart, layoutTable } from './table'
import type { Sheet } from './model'

const table = drawTablePart(
  layoutTable({ title: 'Winding sequence', columns: [{ key: 'step', header: 'Step' }, { key: 'what', header: 'Operation' }], rows: [{ tag: 'step:s7', cells: { step: '5', what: 'Winding P' } }] }, 100),
  0, 10, 90, 10,
)!.block
const pins = { kind: 'figure' as const, title: 'Pin-out', alternative: '', box: table.box, shapes: [label([10, 10], '5', { tag: 'pin:5' }), label([90, 10], '15', { tag: 'pin:15' }), label([20, 10], 'S1', { tag: 'winding:w2 step:s7' })] }
const sheet = (number: number, blocks: Sheet['blocks']): Sheet => ({ number, count: 2, title: '', widthMm: 100, heightMm: 100, blocks })
const sheets = [sheet(1, [pins]), sheet(2, [table])]

describe('findInSheets', () => {
  it('finds a pin where it is drawn, and no pin whose name holds the same digits', () => {
    expect(findInSheets(sheets, 'Pin 5').map(({ sheet, text }) => [sheet, text])).toEqual([[0, 'pin 5 – Pin-out']])
  })

  it('finds a step by the number of its row, in the table and in the figures', () => {
    expect(findInSheets(sheets, 'step 5').map(({ sheet, text }) => [sheet, text])).toEqual([[0, 'winding step – Pin-out'], [1, 'winding step – Winding sequence']])
  })

  it('marks the whole row', () => {
    expect(findInSheets(sheets, 'step 5')[1]!.box).toMatchObject({ leftMm: 10, rightMm: 110 })
  })

  it('finds text in any case, after pins and steps of that name', () => {
    expect(findInSheets(sheets, 'winding p').map(({ text }) => text)).toEqual(['Winding P'])
    expect(findInSheets(sheets, '5').map(({ text }) => text)).toEqual(['pin 5 – Pin-out', 'winding step – Pin-out', 'winding step – Winding sequence', '15'])
  })

  it('finds nothing for nothing', () => {
    expect(findInSheets(sheets, '  ')).toEqual([])
    expect(findInSheets(sheets, 'pin 99')).toEqual([])
  })
})

import type { Dialogue } from './answers'
import { cellAddress, cellText } from './grid'
import type { Layout } from './layout'

/** One line of readings of one part. */
export interface PartLine {
  record: number
  serial: string
  address: string
  /** Whether the serial is the number of the line in the file, for want of a written one. */
  provisional: boolean
  run: number
}

export interface Parts {
  lines: PartLine[]
  /** Lines that a person left out, with the address of their serial. */
  leftOut: { record: number; address: string; text: string }[]
}

const LEAVE_OUT = { id: 'leave-out', values: {} }

/** Gives each line its part: a missing serial, one that occurs twice and a merged one (`1-5`) are asked about. */
export function readParts(layout: Layout, dialogue: Dialogue): Parts {
  const parts: Parts = { lines: [], leftOut: [] }
  const runs = new Map<string, number>()
  const counted = layout.parts.every((record) => /^(\d+|\d+\s*[-–…]\s*\d+|)$/.test(serialText(layout, record)))

  for (const record of layout.parts) {
    const text = serialText(layout, record)
    const address = cellAddress(layout.grid, record, layout.serialField ?? 0)
    const named = nameOf({ text, address, counted, provisional: lineName(layout, record) }, dialogue)
    if (named === 'left-out') parts.leftOut.push({ record, address, text })
    if (named === null || named === 'left-out') continue

    const placed = placeOf(named.serial, { text, address }, runs, dialogue)
    if (placed === 'left-out') parts.leftOut.push({ record, address, text })
    if (placed === null || placed === 'left-out') continue
    runs.set(placed.serial, placed.run)
    parts.lines.push({ record, address, provisional: named.provisional, ...placed })
  }
  return parts
}

const serialText = ({ grid, serialField }: Layout, record: number) => (serialField === null ? '' : cellText(grid, record, serialField).normalize('NFKC'))
const lineName = ({ grid }: Layout, record: number) => (grid.transposed ? `column ${cellAddress(grid, record, 0).replace(/\d/g, '')}` : `line ${record + 1}`)

type Named = { serial: string; provisional: boolean } | 'left-out' | null

function nameOf(line: { text: string; address: string; counted: boolean; provisional: string }, dialogue: Dialogue): Named {
  const { text, address, provisional } = line
  if (text === '') {
    const options = [{ id: 'use-line', values: { serial: provisional } }, LEAVE_OUT]
    const answer = dialogue.ask({ code: 'serial-missing', address, text, values: {}, options, typed: true })
    if (answer === null) return null
    if (answer.option === 'leave-out') return 'left-out'
    return answer.option === 'typed' ? { serial: answer.text!.trim(), provisional: false } : { serial: provisional, provisional: true }
  }
  if (line.counted && isRange(text)) {
    const answer = dialogue.ask({ code: 'serial-range', address, text, values: {}, options: [{ id: 'one-part', values: { serial: text } }, LEAVE_OUT], typed: true })
    if (answer === null) return null
    if (answer.option === 'leave-out') return 'left-out'
    return { serial: answer.option === 'typed' ? answer.text!.trim() : text, provisional: false }
  }
  return { serial: text, provisional: false }
}

function isRange(text: string): boolean {
  const match = /^(\d+)\s*[-–…]\s*(\d+)$/.exec(text)
  return match !== null && Number(match[1]) < Number(match[2]) && Number(match[2]) - Number(match[1]) < 200
}

type Placed = { serial: string; run: number } | 'left-out' | null

function placeOf(serial: string, cell: { text: string; address: string }, runs: ReadonlyMap<string, number>, dialogue: Dialogue): Placed {
  const last = runs.get(serial)
  if (last === undefined) return { serial, run: 1 }
  const options = [{ id: 'new-run', values: { serial, run: last + 1 } }, LEAVE_OUT]
  const answer = dialogue.ask({ code: 'serial-duplicate', ...cell, values: { serial }, options, typed: true })
  if (answer === null) return null
  if (answer.option === 'leave-out') return 'left-out'
  if (answer.option === 'new-run') return { serial, run: last + 1 }
  const typed = answer.text!.trim()
  if (!runs.has(typed)) return { serial: typed, run: 1 }
  dialogue.reopen(`serial-duplicate:${cell.address}`)
  return null
}

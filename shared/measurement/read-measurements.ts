import { plainUnit } from '#shared/shown-units'
import { Dialogue } from './answers'
import { detectSeparator, parseCsv } from './csv'
import { decideDecimalSign, gatherEvidence } from './decimal-sign'
import { decodeBytes } from './decode-bytes'
import { cellAddress, cellText } from './grid'
import { findLayout, type Layout } from './layout'
import type { AcceptedReading, Answer, DecimalSign, ExpectedRow, MeasurementReading, Note, RefusalCode, RefusedFile, RejectedCell } from './model'
import { isAttributeRow, readCell, type CellReading } from './read-cell'
import { readColumns, type ReadingColumn } from './read-columns'
import { limitNotes, mixedUnitNotes, rowNotes, strayNotes, summaryNotes } from './read-notes'
import { readParts, type PartLine, type Parts } from './read-parts'
import { doubtColumn, type ReadNumber } from './suspicions'

/** More than any lot of samples; keeps a hostile file from holding the program. */
export const MOST_CELLS = 200_000

const refused = (code: RefusalCode, values: Record<string, string | number> = {}): RefusedFile => ({ kind: 'refused', code, values })

/**
 * Reads a delimited text file of readings against the rows of a test table. Pure: the same bytes, rows and
 * answers give the same result, so an import can be repeated from the kept file and the kept answers.
 * What could mean two things is a question with the cell's address; nothing is scaled or guessed silently.
 */
export function readMeasurements(bytes: Uint8Array, expected: readonly ExpectedRow[], answers: readonly Answer[] = []): MeasurementReading | RefusedFile {
  return readWith(bytes, expected, new Dialogue(answers))
}

/** The reading with the dialogue kept by the caller, who may ask it which answers did not fit. */
export function readWith(bytes: Uint8Array, expected: readonly ExpectedRow[], dialogue: Dialogue): MeasurementReading | RefusedFile {
  if (bytes.length === 0) return refused('empty-file')
  const decoded = decodeBytes(bytes)
  if (!decoded) return refused('not-a-text-table')
  if (decoded.text.trim() === '') return refused('empty-file')

  const separator = detectSeparator(decoded.text)
  const csv = parseCsv(decoded.text, separator)
  if (csv.kind === 'broken-quotes') return refused('broken-quotes', { line: csv.line })
  // The whole rectangle, since a table on its side is filled up to it: one long line and many short ones are not few cells.
  const cells = csv.records.length * csv.records.reduce((widest, { length }) => Math.max(widest, length), 0)
  if (cells > MOST_CELLS) return refused('too-many-cells', { cells, most: MOST_CELLS })

  const layout = findLayout({ records: csv.records, transposed: false }, expected)
  if (!layout) return refused('no-table', { symbols: expected.map(({ symbol }) => symbol).join(', ') })
  if (layout.parts.length === 0) return refused('no-parts', { heading: cellAddress(layout.grid, layout.heading, 0) })
  return readTable(layout, expected, dialogue, { encoding: decoded.encoding, repaired: decoded.repaired, separator })
}

interface Source {
  encoding: string
  repaired: boolean
  separator: string
}

function readTable(layout: Layout, expected: readonly ExpectedRow[], dialogue: Dialogue, source: Source): MeasurementReading {
  const { grid } = layout
  const columns = readColumns(layout, expected, dialogue)
  const parts = readParts(layout, dialogue)
  const evidence = gatherEvidence(numberCells(layout, columns.readings))
  const decimalSign = decideDecimalSign(evidence, source.separator)
  const reader = new ColumnReader(layout, parts, decimalSign, dialogue)
  for (const column of columns.readings) if (column.ready) reader.read(column)

  const headingAddress = cellAddress(grid, layout.heading, 0)
  const fileNotes: Note[] = [
    ...(source.repaired ? [{ code: 'repaired-characters', address: 'A1', values: {} } as const] : []),
    ...(decimalSign === 'mixed' ? [{ code: 'mixed-decimal-signs', address: evidence.commaAt!, values: { other: evidence.pointAt! } } as const] : []),
  ]
  return {
    kind: 'read',
    facts: { encoding: source.encoding, separator: source.separator, decimalSign, evidence, orientation: grid.transposed ? 'parts-in-columns' : 'parts-in-rows', headingAddress },
    columns: columns.mappings,
    titleBlock: titleBlock(layout),
    serials: parts.lines.map(({ serial, address, provisional, run }) => ({ serial, address, provisional, run })),
    accepted: reader.accepted,
    questions: dialogue.open,
    rejected: reader.rejected,
    notes: [
      ...fileNotes,
      ...limitNotes(layout, columns.readings, decimalSign),
      ...summaryNotes(layout, columns.readings, reader.accepted, decimalSign),
      ...mixedUnitNotes(columns.readings, reader.ownUnits),
      ...rowNotes(expected, columns.readings, reader.accepted, headingAddress),
      ...strayNotes(layout),
    ],
  }
}

function* numberCells({ grid, parts }: Layout, columns: readonly ReadingColumn[]): Generator<{ text: string; address: string }> {
  for (const { field, row } of columns) {
    if (isAttributeRow(row)) continue
    for (const record of parts) yield { text: cellText(grid, record, field).replace(/^[<>≤≥=\s]+/, ''), address: cellAddress(grid, record, field) }
  }
}

/** Pairs of label and value that stand above the table. */
function titleBlock({ grid, heading }: Layout): MeasurementReading['titleBlock'] {
  if (grid.transposed) return []
  return grid.records.slice(0, heading).flatMap((cells, record) => {
    const filled = cells.map((_, field) => ({ field, text: cellText(grid, record, field) })).filter(({ text }) => text !== '')
    if (filled.length === 0) return []
    const [first, ...others] = filled
    const inOne = /^([^:]{1,40}):\s*(.+)$/.exec(first!.text)
    const label = inOne ? inOne[1]! : first!.text.replace(/:$/, '')
    const value = inOne ? inOne[2]! : others.map(({ text }) => text).join(' ')
    return [{ address: cellAddress(grid, record, first!.field), label, value }]
  })
}

type Pending = { line: PartLine; address: string; text: string; cell: Extract<CellReading, { kind: 'reading' }> }

/** Reads columns of cells one after another, collecting what is accepted and what a person left out. */
class ColumnReader {
  readonly accepted: AcceptedReading[] = []
  readonly rejected: RejectedCell[] = []
  readonly ownUnits = new Map<ReadingColumn, Set<string>>()
  readonly #layout: Layout
  readonly #parts: Parts
  readonly #decimalSign: DecimalSign
  readonly #dialogue: Dialogue

  constructor(layout: Layout, parts: Parts, decimalSign: DecimalSign, dialogue: Dialogue) {
    this.#layout = layout
    this.#parts = parts
    this.#decimalSign = decimalSign
    this.#dialogue = dialogue
    for (const { address, text } of parts.leftOut) this.rejected.push({ address, text, serial: null, rowId: null, reason: 'part-left-out' })
  }

  read(column: ReadingColumn): void {
    const pending = this.#parts.lines.flatMap((line) => this.#readCell(column, line) ?? [])
    const numbers = pending.filter(isNumber)
    const doubted = doubtColumn(column, numbers.map(toReadNumber), this.#dialogue)
    const settled = new Map(numbers.map((each, index) => [each, doubted[index]!]))

    for (const each of pending) {
      const outcome = settled.get(each)
      if (outcome === undefined) this.#accept(column, each, each.cell.reading, null)
      else if (outcome === 'left-out') this.#reject(column, each)
      else if (outcome !== 'open') this.#accept(column, each, { kind: 'value', value: outcome.value }, outcome.scaledBy)
    }
  }

  #readCell(column: ReadingColumn, line: PartLine): Pending | null {
    const address = cellAddress(this.#layout.grid, line.record, column.field)
    const text = cellText(this.#layout.grid, line.record, column.field)
    const context = { row: column.row, unit: column.unit, decimalSign: this.#decimalSign }
    const cell = readCell(text, context)
    if (cell.kind === 'empty') return null
    const settled = cell.kind === 'question' ? this.#askCell(column, { line, address, text }, cell) : cell
    if (settled === null) return null
    if (settled.ownUnit !== null) this.#countUnit(column, settled.ownUnit)
    return { line, address, text, cell: settled }
  }

  #askCell(column: ReadingColumn, at: Omit<Pending, 'cell'>, question: Extract<CellReading, { kind: 'question' }>): Pending['cell'] | null {
    const { code, options, typed, values } = question
    const { address, text } = at
    const answer = this.#dialogue.ask({ code, address, text, values: { ...values, symbol: column.row.symbol, serial: at.line.serial, unit: column.unit?.symbol ?? column.row.unit }, options, typed })
    if (answer === null) return null
    if (answer.option === 'leave-out') {
      this.#reject(column, at)
      return null
    }
    if (answer.option === 'passed' || answer.option === 'failed') return { kind: 'reading', reading: { kind: 'attribute', passed: answer.option === 'passed' }, ownUnit: null }

    const figure = answer.option === 'typed' ? answer.text! : String(options.find(({ id }) => id === answer.option)!.values.figure)
    // The chosen figure is written with a point, whatever the file does.
    const reread = readCell(figure, { row: column.row, unit: column.unit, decimalSign: answer.option === 'typed' ? this.#decimalSign : 'point' })
    if (reread.kind === 'reading') return reread
    this.#dialogue.reopen(`${code}:${address}`)
    return null
  }

  #countUnit(column: ReadingColumn, unit: string): void {
    const units = this.ownUnits.get(column) ?? new Set<string>()
    this.ownUnits.set(column, units.add(plainUnit(unit)))
  }

  #accept({ row }: ReadingColumn, { line, address, text }: Pending, reading: AcceptedReading['reading'], scaledBy: number | null): void {
    this.accepted.push({ serial: line.serial, run: line.run, rowId: row.id, address, text, reading, scaledBy })
  }

  #reject({ row }: ReadingColumn, { line, address, text }: Omit<Pending, 'cell'>): void {
    this.rejected.push({ address, text, serial: line.serial, rowId: row.id, reason: 'left-out' })
  }
}

const isNumber = ({ cell }: Pending) => cell.reading.kind === 'value'

const toReadNumber = ({ address, text, cell }: Pending): ReadNumber => ({
  address,
  text,
  value: cell.reading.kind === 'value' ? cell.reading.value : NaN,
  ownUnit: cell.ownUnit !== null,
})

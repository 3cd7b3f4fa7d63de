import type { ShownUnit } from '#shared/shown-units'
import type { Dialogue } from './answers'
import { cellAddress, cellText } from './grid'
import type { Layout } from './layout'
import { matchHeading } from './match-heading'
import type { ColumnMapping, ExpectedRow, QuestionOption } from './model'
import { isAttributeRow } from './read-cell'
import { readUnit, splitHeading, unitOf, usualPrefixes } from './units-in-files'
import { isIgnoredHeading } from './words'

/** A column whose cells are readings of one test row. */
export interface ReadingColumn {
  field: number
  address: string
  row: ExpectedRow
  /** Null while the question about it is open, or when every cell carries its own. */
  unit: ShownUnit | null
  /** Whether cells may be read now. */
  ready: boolean
}

export interface Columns {
  mappings: ColumnMapping[]
  readings: ReadingColumn[]
}

/** Says for each heading what its column holds, asking about what is not plain. */
export function readColumns(layout: Layout, expected: readonly ExpectedRow[], dialogue: Dialogue): Columns {
  const { grid, heading } = layout
  const mappings: ColumnMapping[] = []
  const readings: ReadingColumn[] = []
  const taken = new Set<string>()
  const targets = grid.records[heading]!.map((_, field) => matchHeading(splitHeading(cellText(grid, heading, field)).label, expected))

  grid.records[heading]!.forEach((_, field) => {
    const mapping = mapColumn(layout, field, targets, taken, expected, dialogue)
    if (mapping === null) return
    mappings.push(mapping)
    if (mapping.target.kind !== 'row') return
    const { rowId } = mapping.target
    taken.add(rowId)
    const column = readColumnUnit(layout, field, expected.find(({ id }) => id === rowId)!, dialogue)
    mapping.unit = column.unit?.symbol ?? null
    readings.push(column)
  })
  return { mappings, readings }
}

type Targets = readonly (ReturnType<typeof matchHeading>)[]

function mapColumn(layout: Layout, field: number, targets: Targets, taken: ReadonlySet<string>, expected: readonly ExpectedRow[], dialogue: Dialogue): ColumnMapping | null {
  const { grid, heading: record } = layout
  const heading = cellText(grid, record, field)
  const address = cellAddress(grid, record, field)
  if (field === layout.serialField) return { address, heading, target: { kind: 'serial' }, how: layout.serialHow, unit: null }
  if (heading === '') return null

  const match = targets[field]!
  if (match && !taken.has(match.rowId)) return { address, heading, target: { kind: 'row', rowId: match.rowId }, how: match.how, unit: null }
  const label = splitHeading(heading).label
  if (isIgnoredHeading(label)) return { address, heading, target: { kind: 'ignored' }, how: 'known-word', unit: null }

  const claimed = new Set([...taken, ...targets.filter((_, index) => index > field).map((target) => target?.rowId)])
  const options: QuestionOption[] = expected.filter(({ id }) => !claimed.has(id)).map(({ id, symbol }) => ({ id: `row:${id}`, values: { symbol } }))
  const answer = dialogue.ask({ code: 'column-target', address, text: heading, values: {}, options: [...options, { id: 'ignore', values: {} }], typed: false })
  if (answer === null) return { address, heading, target: { kind: 'open' }, how: 'open', unit: null }
  if (answer.option === 'ignore') return { address, heading, target: { kind: 'ignored' }, how: 'answer', unit: null }
  return { address, heading, target: { kind: 'row', rowId: answer.option.slice('row:'.length) }, how: 'answer', unit: null }
}

function readColumnUnit({ grid, heading, unitRecord, parts }: Layout, field: number, row: ExpectedRow, dialogue: Dialogue): ReadingColumn {
  const address = cellAddress(grid, heading, field)
  const column = { field, address, row }
  const inHeading = splitHeading(cellText(grid, heading, field)).unit
  const below = unitRecord === null ? '' : cellText(grid, unitRecord, field)
  const written = inHeading ?? below
  if (isAttributeRow(row)) return { ...column, unit: null, ready: true }
  if (row.unit === '1' && (written === '' || readUnit(written, '1').kind === 'unit')) return { ...column, unit: unitOf('1', ''), ready: true }

  const unit = readUnit(written, row.unit)
  if (unit.kind === 'unit') return { ...column, unit: unit.unit, ready: true }
  if (unit.kind === 'none' && carriesUnits(parts.map((record) => cellText(grid, record, field)))) return { ...column, unit: null, ready: true }

  const units = unit.kind === 'ambiguous' ? unit.units : usualPrefixes(row.unit).map((prefix) => unitOf(row.unit, prefix))
  const code = unit.kind === 'ambiguous' ? 'unit-ambiguous' : unit.kind === 'unlike' ? 'unit-unlike' : 'unit-missing'
  const options = units.map(({ symbol }) => ({ id: symbol === '' ? '1' : symbol, values: { symbol } }))
  const answer = dialogue.ask({ code, address, text: cellText(grid, heading, field), values: { symbol: row.symbol, unit: written, expected: row.unit }, options, typed: false })
  const chosen = units.find(({ symbol }) => (symbol === '' ? '1' : symbol) === answer?.option)
  return { ...column, unit: chosen ?? null, ready: chosen !== undefined }
}

/** Whether every number of a column has letters behind it, so that a heading without a unit leaves no doubt. */
function carriesUnits(cells: readonly string[]): boolean {
  const numbers = cells.filter((cell) => /\d/.test(cell))
  return numbers.length > 0 && numbers.every((cell) => /\d\s*[\p{L}Ωµμ]+\.?\d*$/u.test(cell) && !/\d[eE][+\-−]?\d+$/.test(cell))
}

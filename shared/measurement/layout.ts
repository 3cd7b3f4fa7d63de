import { cellText, transpose, type Grid } from './grid'
import { matchHeading } from './match-heading'
import type { ExpectedRow } from './model'
import { isUnitLine, splitHeading } from './units-in-files'
import { isCharacteristicHeading, isConditionWord, isSerialHeading, limitSide, summaryFigure, type LimitSide, type SummaryFigure } from './words'

/** Headings stand near the top; a part's number is not looked for a thousand lines down. */
const SEARCHED_RECORDS = 100
const SEARCHED_FIELDS_TRANSPOSED = 6
/** No test table has so many rows; a longer line is not looked through for headings. */
const SEARCHED_HEADINGS = 2000

export interface Layout {
  grid: Grid
  heading: number
  /** Field that holds the serial, or null. */
  serialField: number | null
  serialHow: 'known-word' | 'position'
  unitRecord: number | null
  limits: { record: number; side: LimitSide }[]
  parts: number[]
  summaries: { record: number; figure: SummaryFigure }[]
  /** Lines inside the table that are neither readings nor limits. */
  ignored: number[]
}

function matches(grid: Grid, record: number, expected: readonly ExpectedRow[]): number {
  const fields = grid.records[record]!.slice(0, SEARCHED_HEADINGS).map((_, field) => splitHeading(cellText(grid, record, field)).label)
  const rows = new Set(fields.map((label) => matchHeading(label, expected)?.rowId).filter(Boolean))
  return rows.size === 0 ? 0 : rows.size + (fields.some((label) => label !== '' && isSerialHeading(label)) ? 0.5 : 0)
}

function bestHeading(grid: Grid, expected: readonly ExpectedRow[], searched: number): { record: number; score: number } {
  return grid.records
    .slice(0, searched)
    .map((_, record) => ({ record, score: matches(grid, record, expected) }))
    .reduce((best, next) => (next.score > best.score ? next : best), { record: -1, score: 0 })
}

/**
 * Finds the table in a file by the drawing's test rows: the headings, whether parts stand in rows or in
 * columns, and which lines are units, limits, readings or sums. Null when no heading names a test row.
 */
export function findLayout(source: Grid, expected: readonly ExpectedRow[]): Layout | null {
  const upright = bestHeading(source, expected, SEARCHED_RECORDS)
  const turned = transpose({ ...source, records: source.records.map((record) => record.slice(0, SEARCHED_FIELDS_TRANSPOSED)) })
  const sideways = bestHeading(turned, expected, SEARCHED_FIELDS_TRANSPOSED)
  if (upright.score === 0 && sideways.score === 0) return null
  return sideways.score > upright.score ? sortLines(transpose(source), sideways.record, expected) : sortLines(source, upright.record, expected)
}

function findSerialField(grid: Grid, heading: number, expected: readonly ExpectedRow[]): { field: number; how: Layout['serialHow'] } | null {
  const labels = grid.records[heading]!.map((_, field) => splitHeading(cellText(grid, heading, field)).label)
  const isRow = (label: string) => matchHeading(label, expected) !== null
  const named = labels.findIndex((label) => label !== '' && isSerialHeading(label) && !isRow(label))
  if (named >= 0) return { field: named, how: 'known-word' }
  const first = labels.findIndex(isRow)
  // In a table on its side the serials stand in the line above the first characteristic.
  const beside = labels.findIndex((label, field) => field < first && isCharacteristicHeading(label) && filledBelow(grid, heading, field))
  return beside < 0 ? null : { field: beside, how: 'position' }
}

const filledBelow = (grid: Grid, heading: number, field: number) => grid.records.slice(heading + 1).some((_, index) => cellText(grid, heading + 1 + index, field) !== '')

function sortLines(grid: Grid, heading: number, expected: readonly ExpectedRow[]): Layout {
  const serial = findSerialField(grid, heading, expected)
  const rowFields = grid.records[heading]!.map((_, field) => field).filter((field) => matchHeading(splitHeading(cellText(grid, heading, field)).label, expected) !== null)
  const layout: Layout = { grid, heading, serialField: serial?.field ?? null, serialHow: serial?.how ?? 'position', unitRecord: null, limits: [], parts: [], summaries: [], ignored: [] }
  for (let record = heading + 1; record < grid.records.length; record++) sortLine(layout, record, rowFields)
  return layout
}

function sortLine(layout: Layout, record: number, rowFields: readonly number[]): void {
  const { grid, heading } = layout
  const cells = rowFields.map((field) => cellText(grid, record, field)).filter((cell) => cell !== '')
  const label = lineLabel(layout, record, rowFields)
  const side = limitSide(label)
  const figure = summaryFigure(label)
  const before = layout.parts.length === 0

  if (cells.length === 0) {
    if (label !== '' && side === null) layout.ignored.push(record)
  } else if (before && layout.unitRecord === null && isUnitLine(cells)) layout.unitRecord = record
  else if (before && side !== null) layout.limits.push({ record, side })
  else if (before && label !== '' && isConditionWord(label)) layout.ignored.push(record)
  else if (!before && figure !== null) layout.summaries.push({ record, figure })
  else if (rowFields.every((field) => cellText(grid, record, field) === cellText(grid, heading, field))) layout.ignored.push(record)
  else layout.parts.push(record)
}

/** The word that names a line: in the serial's field, or in the first filled field that is no test row. */
function lineLabel({ grid, serialField }: Layout, record: number, rowFields: readonly number[]): string {
  if (serialField !== null && cellText(grid, record, serialField) !== '') return cellText(grid, record, serialField)
  const field = grid.records[record]!.findIndex((_, index) => !rowFields.includes(index) && cellText(grid, record, index) !== '')
  return field < 0 ? '' : cellText(grid, record, field)
}

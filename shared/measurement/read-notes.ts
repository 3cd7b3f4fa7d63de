import { cellAddress, cellText } from './grid'
import type { Layout } from './layout'
import type { AcceptedReading, ExpectedRow, Note } from './model'
import { readCell } from './read-cell'
import type { ReadingColumn } from './read-columns'
import { summarise } from './statistics'
import type { DecimalSign } from './model'

const RELATIVE_TOLERANCE = 1e-6
/** Sums in a file are rounded for print. */
const PRINTED_TOLERANCE = 5e-3

const differ = (a: number, b: number, tolerance: number) => Math.abs(a - b) > tolerance * Math.max(Math.abs(a), Math.abs(b))

function figureAt({ grid }: Layout, record: number, column: ReadingColumn, decimalSign: DecimalSign): number | null {
  if (!column.ready || column.unit === null) return null
  const cell = readCell(cellText(grid, record, column.field), { row: column.row, unit: column.unit, decimalSign })
  return cell.kind === 'reading' && cell.reading.kind === 'value' ? cell.reading.value : null
}

/**
 * Limits that stand in the file beside those of the drawing. The drawing wins; a difference is said. The empty
 * table writes its limits with a decimal point, and who fills it may write a comma: a limit that is the drawing's
 * by either sign does not differ.
 */
export function limitNotes(layout: Layout, columns: readonly ReadingColumn[], decimalSign: DecimalSign): Note[] {
  return layout.limits.flatMap(({ record, side }) =>
    columns.flatMap((column): Note[] => {
      const inFile = figureAt(layout, record, column, decimalSign)
      const drawn = column.row[side]
      if (inFile === null) return []
      const bySign = [decimalSign, 'point' as const, 'comma' as const].map((sign) => figureAt(layout, record, column, sign))
      if (drawn !== null && bySign.some((figure) => figure !== null && !differ(figure, drawn, RELATIVE_TOLERANCE))) return []
      const address = cellAddress(layout.grid, record, column.field)
      return [{ code: 'limit-differs', address, values: { symbol: column.row.symbol, side, file: inFile, drawing: drawn ?? 'none', unit: column.row.unit } }]
    }),
  )
}

/** Sums that stand in the file beside what its readings give. */
export function summaryNotes(layout: Layout, columns: readonly ReadingColumn[], accepted: readonly AcceptedReading[], decimalSign: DecimalSign): Note[] {
  const summaries = layout.summaries.filter(({ figure }) => figure !== 'other' && figure !== 'capability')
  return columns.flatMap((column) => {
    const own = summarise(valuesOf(accepted, column.row))
    return summaries.flatMap(({ record, figure }): Note[] => {
      const inFile = figureAt(layout, record, column, decimalSign)
      const computed = own[figure as 'mean' | 'minimum' | 'maximum' | 'deviation']
      if (inFile === null || computed === null || !differ(inFile, computed, PRINTED_TOLERANCE)) return []
      const address = cellAddress(layout.grid, record, column.field)
      return [{ code: 'summary-disagrees', address, values: { symbol: column.row.symbol, figure, file: inFile, readings: computed, unit: column.row.unit } }]
    })
  })
}

const valuesOf = (accepted: readonly AcceptedReading[], row: ExpectedRow) =>
  accepted.flatMap(({ rowId, reading }) => (rowId === row.id && reading.kind === 'value' ? [reading.value] : []))

/** Rows that nobody has measured, and rows on which three or more parts read exactly alike. */
export function rowNotes(expected: readonly ExpectedRow[], columns: readonly ReadingColumn[], accepted: readonly AcceptedReading[], headingAddress: string): Note[] {
  return expected.flatMap((row): Note[] => {
    const column = columns.find((each) => each.row.id === row.id)
    const readings = accepted.filter(({ rowId }) => rowId === row.id)
    if (!column || (column.ready && readings.length === 0)) return [{ code: 'row-without-readings', address: column?.address ?? headingAddress, values: { symbol: row.symbol } }]
    const values = valuesOf(accepted, row)
    const alike = values.length >= 3 && new Set(values).size === 1
    return alike ? [{ code: 'identical-readings', address: column.address, values: { symbol: row.symbol, count: values.length } }] : []
  })
}

/** Columns in which some cells carry a unit of their own that is not the column's. */
export function mixedUnitNotes(columns: readonly ReadingColumn[], ownUnits: ReadonlyMap<ReadingColumn, ReadonlySet<string>>): Note[] {
  return columns.flatMap((column): Note[] => {
    const units = new Set([...(ownUnits.get(column) ?? []), ...(column.unit === null ? [] : [column.unit.symbol])])
    return units.size < 2 ? [] : [{ code: 'mixed-units', address: column.address, values: { symbol: column.row.symbol, units: [...units].join(', ') } }]
  })
}

/** Lines of the table that are no readings, and cells beyond its last heading. */
export function strayNotes(layout: Layout): Note[] {
  const { grid, heading } = layout
  const ignored = layout.ignored.map((record): Note => ({ code: 'line-ignored', address: cellAddress(grid, record, 0), values: { text: grid.records[record]!.map((_, field) => cellText(grid, record, field)).filter(Boolean).join(' ') } }))
  const width = grid.records[heading]!.findLastIndex((_, field) => cellText(grid, heading, field) !== '') + 1
  const outside = layout.parts.find((record) => grid.records[record]!.some((_, field) => field >= width && cellText(grid, record, field) !== ''))
  if (outside === undefined) return ignored
  return [...ignored, { code: 'cells-outside-table', address: cellAddress(grid, outside, width), values: {} }]
}

import { enteredText } from '#shared/number-format'
import type { ShownUnit } from '#shared/shown-units'
import type { ExpectedRow } from './model'
import { isAttributeRow } from './read-cell'
import { unitOf, usualPrefixes } from './units-in-files'

/** The unit in which a row's limits are written with the fewest digits before the point. */
export function unitForRow(row: Pick<ExpectedRow, 'unit' | 'minimum' | 'nominal' | 'maximum'>): ShownUnit {
  const size = Math.abs(row.nominal ?? row.maximum ?? row.minimum ?? 1)
  const units = usualPrefixes(row.unit).map((prefix) => unitOf(row.unit, prefix))
  const usual = row.unit === 'mm' ? unitOf('mm', 'm') : units[0]!
  return units.findLast(({ modelExponent }) => size >= 10 ** modelExponent * 0.9999) ?? usual
}

/** A spreadsheet would run a heading that begins like a formula; a leading apostrophe keeps it text. */
const inert = (heading: string) => (/^[=+\-@\t\r]/.test(heading) ? `'${heading}` : heading)

const quoted = (field: string) => (/[;"\r\n]/.test(field) ? `"${field.replace(/"/g, '""')}"` : field)

/**
 * An empty report as delimited text, made from the rows of a released test table: headings with units, limit
 * lines for reading only, and one line per part. Fields are set apart by semicolons and lines end with CRLF
 * (RFC 4180), so that it opens in a spreadsheet whichever decimal sign that uses.
 *
 * @param serials numbers of the parts, or placeholders
 */
export function reportTemplate(rows: readonly ExpectedRow[], serials: readonly string[]): string {
  const columns = rows.map((row) => ({ row, unit: unitForRow(row), attribute: isAttributeRow(row) }))
  const limit = (side: 'minimum' | 'nominal' | 'maximum') =>
    columns.map(({ row, unit, attribute }) => (attribute || row[side] === null ? '' : enteredText(row[side]!, unit)))
  const headings = columns.map(({ row, unit, attribute }) => (attribute ? `${row.symbol} (pass/fail)` : unit.symbol === '' ? row.symbol : `${row.symbol} (${unit.symbol})`))
  const lines = [['Serial', ...headings.map(inert)], ['Min', ...limit('minimum')], ['Nom', ...limit('nominal')], ['Max', ...limit('maximum')], ...serials.map((serial) => [serial, ...columns.map(() => '')])]
  return lines.map((fields) => `${fields.map(quoted).join(';')}\r\n`).join('')
}

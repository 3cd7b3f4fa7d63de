import type { PartDraft } from '#shared/contracts/part-rows'
import type { AnyLibraryRow, LibraryKind } from '#shared/engine/library'
import { detectSeparator, parseCsv } from '#shared/measurement/csv'
import { decideDecimalSign, gatherEvidence } from '#shared/measurement/decimal-sign'
import { decodeBytes } from '#shared/measurement/decode-bytes'
import type { DecimalSign } from '#shared/measurement/model'
import { assembleDraft, type CellProblem, type RowCells, type TableProblem } from './assemble-draft'
import { importColumns, type ImportColumn } from './import-columns'
import { partCell } from './part-cells'
import { readHeadings, type Heading } from './read-headings'

/** More than a maker's whole catalogue of one kind. */
export const MOST_IMPORT_ROWS = 2000

/** What becomes of one line of the file. `draft` is null exactly when the line does not fit. */
export interface PartLine {
  /** Row of the spreadsheet; the headings are row 1. */
  line: number
  id: string
  name: string
  state: 'new' | 'changed' | 'unchanged' | 'unfit'
  /** Headings of the columns that differ from the row for new work. */
  changes: string[]
  problems: CellProblem[]
  draft: PartDraft | null
}

export interface PartTable {
  /** What is wrong with the table itself. */
  problems: TableProblem[]
  lines: PartLine[]
}

/** What the library holds, as far as a table meets it. */
export interface KnownParts {
  /** The rows of the kind for new work, by identifier. */
  rows: ReadonlyMap<string, AnyLibraryRow>
  coreIds: ReadonlySet<string>
}

/**
 * Reads a delimited table of rows of one kind. Pure: the same bytes and the same library give the same answer.
 * A column that is left out keeps what an existing row has there and is empty for a new one.
 */
export function readPartTable(bytes: Uint8Array, kind: LibraryKind, known: KnownParts): PartTable {
  const records = recordsOf(bytes)
  if ('problem' in records) return { problems: [records.problem], lines: [] }
  const columns = importColumns(kind)
  const { headings, problems } = readHeadings(records.records[0] ?? [], columns, records.records.slice(1))
  const body = records.records.map((fields, index) => ({ fields, line: index + 1 })).slice(1).filter(({ fields }) => fields.some((field) => field.trim() !== ''))
  if (problems.length === 0 && body.length === 0) problems.push({ line: 1, column: '', message: 'There are only headings. Enter the rows below them.' })
  if (body.length > MOST_IMPORT_ROWS) problems.push({ line: MOST_IMPORT_ROWS + 2, column: '', message: `The file has more than ${MOST_IMPORT_ROWS} rows. Hand it in in parts.` })
  if (problems.length > 0) return { problems, lines: [] }

  const decimalSign = signOf(headings, body, records.separator)
  const lines = body.map(({ fields, line }) => readLine({ kind, columns, headings, known, decimalSign }, fields, line))
  return { problems, lines: refuseTwice(lines) }
}

type Records = { records: string[][]; separator: string } | { problem: TableProblem }

function recordsOf(bytes: Uint8Array): Records {
  const problem = (line: number, message: string): Records => ({ problem: { line, column: '', message } })
  const decoded = decodeBytes(bytes)
  if (!decoded) return problem(1, 'This is not a text table. Save the sheet as CSV and choose that file.')
  if (decoded.text.trim() === '') return problem(1, 'The file is empty. Take the template and enter rows below its headings.')
  // Headings hold no separators, so that their line alone decides.
  const separator = detectSeparator(/^[^\r\n]*/.exec(decoded.text)![0])
  const csv = parseCsv(decoded.text, separator)
  if (csv.kind === 'broken-quotes') return problem(csv.line, 'A quotation mark opens a cell and does not close it. Close it; double the quotation marks that belong to the text.')
  return { records: csv.records, separator }
}

interface Body {
  fields: readonly string[]
  line: number
}

/** Text as it was before a spreadsheet's formula was kept from running. */
const cellText = (field: string | undefined) => (field ?? '').trim().replace(/^'(?=[=+\-@])/, '')

function signOf(headings: readonly Heading[], body: readonly Body[], separator: string): DecimalSign {
  const figures = headings.filter(({ column }) => column.holds === 'figure')
  const cells = body.flatMap(({ fields, line }) => figures.map(({ index, column }) => ({ text: cellText(fields[index]), address: `${line} ${column.path}` })))
  return decideDecimalSign(gatherEvidence(cells), separator)
}

interface Reading {
  kind: LibraryKind
  columns: readonly ImportColumn[]
  headings: readonly Heading[]
  known: KnownParts
  decimalSign: DecimalSign
}

function readLine(reading: Reading, fields: readonly string[], line: number): PartLine {
  const { kind, columns, headings, known } = reading
  const id = cellText(fields[headings.find(({ column }) => column.path === 'id')?.index ?? -1])
  const existing = known.rows.get(id)
  const cells = cellsOf(reading, fields, existing)
  const { draft, problems } = assembleDraft(kind, columns, cells)
  const place = { line, id, name: cells.get('name')?.text ?? '' }
  const width = Math.max(...headings.map(({ index }) => index)) + 1
  const faults: CellProblem[] = [...problems]
  if (fields.slice(width).some((field) => field.trim() !== '')) faults.push({ column: '', message: 'The row has more cells than there are headings. A cell that holds the separator stands in quotation marks.' })
  if (draft?.kind === 'former' && !known.coreIds.has(draft.coreId)) faults.push({ column: 'coreId', message: `There is no core “${draft.coreId}” in the library. Add the core first or name another.` })
  if (!draft || faults.length > 0) return { ...place, state: 'unfit', changes: [], problems: faults, draft: null }
  const changes = existing ? columns.map(({ path }) => path).filter((path) => partCell(draft, path) !== partCell(existing, path)) : []
  return { ...place, state: !existing ? 'new' : changes.length > 0 ? 'changed' : 'unchanged', changes, problems: [], draft }
}

function cellsOf({ columns, headings, decimalSign }: Reading, fields: readonly string[], existing: AnyLibraryRow | undefined): RowCells {
  const given = new Map(headings.map(({ column, index }) => [column.path, index]))
  return new Map(
    columns.map(({ path }) => {
      const index = given.get(path)
      if (index !== undefined) return [path, { text: cellText(fields[index]), decimalSign }]
      return [path, { text: existing ? String(partCell(existing, path) ?? '') : '', decimalSign: 'point' }]
    }),
  )
}

/** A second line for the same row would make two versions of it at once. */
function refuseTwice(lines: readonly PartLine[]): PartLine[] {
  const first = new Map<string, number>()
  return lines.map((line) => {
    const before = first.get(line.id)
    if (before === undefined || line.id === '') {
      first.set(line.id, line.line)
      return line
    }
    const message = `“${line.id}” stands in line ${before} already. Keep one of the two lines.`
    return { ...line, state: 'unfit', changes: [], draft: null, problems: [...line.problems, { column: 'id', message }] }
  })
}

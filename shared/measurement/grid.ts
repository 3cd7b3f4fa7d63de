/** The cells of a file. In a transposed grid a record is a column of the file. */
export interface Grid {
  records: readonly (readonly string[])[]
  transposed: boolean
}

function columnLetters(index: number): string {
  const last = String.fromCharCode(65 + (index % 26))
  return index < 26 ? last : columnLetters(Math.floor(index / 26) - 1) + last
}

/** Address of a cell as a spreadsheet shows it: `A1` is the first field of the first record of the file. */
export function cellAddress(grid: Grid, record: number, field: number): string {
  const [row, column] = grid.transposed ? [field, record] : [record, field]
  return `${columnLetters(column)}${row + 1}`
}

/** The text of a cell without surrounding blanks; empty outside the grid. */
export const cellText = (grid: Grid, record: number, field: number): string =>
  (grid.records[record]?.[field] ?? '').replace(/[\s\u00a0\u202f]+/g, ' ').trim()

/** The same cells with records and fields exchanged; short records are filled up with empty cells. */
export function transpose(grid: Grid): Grid {
  const width = grid.records.reduce((widest, { length }) => Math.max(widest, length), 0)
  const records = Array.from({ length: width }, (_, field) => grid.records.map((record) => record[field] ?? ''))
  return { records, transposed: !grid.transposed }
}

/**
 * Reads an aligned table: one row a line, cells parted by blanks, `-` for a missing figure.
 *
 * @throws RangeError when a row has another number of cells than there are columns, or a cell is no figure
 */
export function readTable<Column extends string>(text: string, columns: readonly Column[]): { label: string; cells: Record<Column, number | null> }[] {
  return text
    .split('\n')
    .filter((line) => line.trim() !== '')
    .map((line) => {
      const [label, ...figures] = line.trim().split(/\s+/)
      if (figures.length !== columns.length) throw new RangeError(`${label}: ${figures.length} figures for ${columns.length} columns`)
      const pairs = columns.map((column, index) => [column, readFigure(label!, figures[index]!)])
      return { label: label!, cells: Object.fromEntries(pairs) as Record<Column, number | null> }
    })
}

function readFigure(label: string, text: string): number | null {
  if (text === '-') return null
  const value = Number(text)
  if (!Number.isFinite(value)) throw new RangeError(`${label}: not a figure: ${text}`)
  return value
}

/** A figure that the table must have. @throws RangeError when it is missing */
export function figure(label: string, value: number | null | undefined): number {
  if (value == null) throw new RangeError(`${label}: a figure is missing`)
  return value
}

/** Identifier of a row from its name: small letters, figures, points and hyphens. */
export const rowId = (name: string) =>
  name
    .toLowerCase()
    .replace(/[^a-z0-9.]+/g, '-')
    .replace(/^-|-$/g, '')

/** Derived figures are stored with as many places as make sense: a micrometre for lengths. */
export const rounded = (value: number, places = 3) => Number(value.toFixed(places))

import type { ImportColumn } from './import-columns'
import type { TableProblem } from './assemble-draft'

export interface Heading {
  column: ImportColumn
  /** Place in the line. */
  index: number
}

/** Finds the columns by their headings; what is unknown, there twice or missing is said, since a guess would lose data. */
export function readHeadings(fields: readonly string[], columns: readonly ImportColumn[], body: readonly (readonly string[])[]): { headings: Heading[]; problems: TableProblem[] } {
  const headings: Heading[] = []
  const problems: TableProblem[] = []
  const refuse = (column: string, message: string) => problems.push({ line: 1, column, message })
  const byName = new Map(columns.map((column) => [column.path.toLowerCase(), column]))

  fields.forEach((field, index) => {
    const text = field.trim()
    const column = byName.get(text.toLowerCase())
    if (text === '') {
      if (body.some((row) => (row[index] ?? '').trim() !== '')) refuse(`column ${index + 1}`, 'The column has cells and no heading. Give it a heading of the template or empty it.')
    } else if (!column) refuse(text, `“${text}” is no field of this kind of row. Take the heading from the template or take the column away.`)
    else if (headings.some((heading) => heading.column === column)) refuse(text, `The heading “${text}” is there twice. Keep one of the two columns.`)
    else headings.push({ column, index })
  })
  for (const { path } of columns.filter(({ required }) => required)) {
    if (!headings.some(({ column }) => column.path === path)) refuse(path, `The column “${path}” is missing. Add it; every row needs a value there.`)
  }
  return { headings, problems }
}

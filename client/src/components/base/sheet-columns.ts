/** One column of a DataSheet. */
export interface SheetColumn<R> {
  /** Names the slot `cell-<key>` and the sort order. */
  key: string
  header: string
  /** What is sorted, filtered and exported. Figures as numbers in the unit of the header. */
  value: (row: R) => string | number | null
  /** What is read in the cell; the value itself when left out. */
  text?: (row: R) => string
  /** Set in the figure type, aligned at its end. */
  figure?: boolean
  sortable?: boolean
  /** Takes the whole width of a card at phone width: addresses, sentences. */
  wide?: boolean
  /** Offers its distinct texts as a filter. */
  choices?: boolean
}

export const cellText = <R>(column: SheetColumn<R>, row: R): string => column.text?.(row) ?? String(column.value(row) ?? '–')

export interface RowFilter {
  text: string
  /** Column key → chosen text. */
  choices: Readonly<Record<string, string | null>>
}

/** The rows whose cells contain the text, in any column, and equal every choice. */
export function filterRows<R>(rows: readonly R[], columns: readonly SheetColumn<R>[], { text, choices }: RowFilter): R[] {
  const wanted = text.trim().toLowerCase()
  const chosen = columns.filter(({ key }) => choices[key])
  return rows.filter((row) => {
    const fits = chosen.every((column) => cellText(column, row) === choices[column.key])
    return fits && (wanted === '' || columns.some((column) => cellText(column, row).toLowerCase().includes(wanted)))
  })
}

/** A spreadsheet would run text that begins like a formula; a leading apostrophe keeps it text. */
const inert = (text: string) => (/^[=+\-@\t\r]/.test(text) ? `'${text}` : text)

const quoted = (text: string) => (/[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text)

function csvCell(value: string | number | null): string {
  if (value === null) return ''
  return typeof value === 'number' ? String(value) : quoted(inert(value))
}

/** Comma-separated values by RFC 4180, with the byte order mark that spreadsheets need to read UTF-8. */
export function toCsv<R>(rows: readonly R[], columns: readonly SheetColumn<R>[]): string {
  const head = columns.map(({ header }) => quoted(header)).join(',')
  const lines = rows.map((row) => columns.map((column) => csvCell(column.value(row))).join(','))
  return `\ufeff${[head, ...lines].join('\r\n')}\r\n`
}

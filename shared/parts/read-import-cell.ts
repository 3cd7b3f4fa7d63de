import { readMantissa, splitMantissa } from '#shared/measurement/decimal-sign'
import { looksLikeDate } from '#shared/measurement/words'
import type { DecimalSign } from '#shared/measurement/model'

export interface ImportCell {
  text: string
  /** How the table it stands in writes decimals. */
  decimalSign: DecimalSign
}

export type CellValue<T> = { value: T } | { problem: string }

const EXPONENT = /^[eE]([+\-−]?\d{1,3})$/

/** Reads a figure in the unit that the heading's ending names; a cell holds the number alone. */
export function readImportFigure({ text, decimalSign }: ImportCell): CellValue<number> {
  const number = splitMantissa(text)
  if (looksLikeDate(text)) return { problem: `“${text}” is a date. The spreadsheet has probably changed a number; format the column as text and enter the number again.` }
  if (!number) return { problem: `“${text}” is not a number. Write it like 12.5 or 12,5.` }
  const exponent = EXPONENT.exec(number.tail)
  if (number.tail !== '' && !exponent) return { problem: `“${number.tail}” is not expected behind the number. Write the number alone, in the unit that the heading ends with.` }
  const mantissa = readMantissa(number.mantissa, exponent ? 'mixed' : decimalSign)
  if (mantissa.kind === 'none') return { problem: `The separators in “${text}” do not make one number. Write it without thousands separators, like 1250.5.` }
  if (mantissa.kind === 'two' && !exponent) return { problem: `“${text}” can mean ${mantissa.decimal} or ${mantissa.grouped}, and the file does not settle which. Write ${mantissa.decimal.replace(/0+$/, '')} or ${mantissa.grouped}.` }
  return { value: Number(`${number.sign}${mantissa.decimal}e${exponent?.[1]?.replace('−', '-') ?? 0}`) }
}

/** Reads values set apart by blanks or semicolons, or a JSON list. */
export function readImportList(cell: ImportCell, figures: boolean): CellValue<(string | number)[]> {
  if (cell.text.startsWith('[')) return readImportLines(cell, []) as CellValue<(string | number)[]>
  const texts = cell.text.split(/[;\s]+/).filter((text) => text !== '')
  if (!figures) return { value: texts }
  const values = texts.map((text) => readImportFigure({ ...cell, text }))
  const wrong = values.find((value): value is { problem: string } => 'problem' in value)
  return wrong ?? { value: values.map((value) => (value as { value: number }).value) }
}

/** Reads a list of records as JSON. */
export function readImportLines({ text }: ImportCell, keys: readonly string[]): CellValue<unknown[]> {
  try {
    const value: unknown = JSON.parse(text)
    if (Array.isArray(value)) return { value }
  } catch {
    // Said below, with an example.
  }
  const example = keys.length > 0 ? ` Write it like [{${keys.map((key) => `"${key}": …`).join(', ')}}].` : ''
  return { problem: `This is not a list in JSON.${example}` }
}

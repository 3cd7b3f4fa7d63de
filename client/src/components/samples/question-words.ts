import { formatEngineering, formatNumber } from '#shared/number-format'
import type { Note, Question, QuestionCode, QuestionOption } from '#shared/measurement/model'

type Values = Question['values']

const figure = (value: string | number | undefined, unit: string | number | undefined): string => {
  if (typeof value !== 'number') return String(value ?? '')
  const base = String(unit ?? '')
  return base === 'mm' || base === '1' || base === '' ? formatNumber(value, { significant: 5 }) : formatEngineering(value, base, { significant: 5 })
}

/** What is asked, in one sentence. The cell's address and text stand beside it. */
export function questionSentence({ code, text, values }: Question): string {
  switch (code) {
    case 'column-target':
      return `Which test of the drawing does the column “${text}” hold?`
    case 'unit-missing':
      return `The heading of ${values.symbol} states no unit. Which one is it?`
    case 'unit-ambiguous':
      return `“${text}” may be milli or mega. Which one is it?`
    case 'unit-unlike':
      return values.symbol && values.serial === undefined ? `“${values.unit}” is no unit of ${values.symbol}. Which unit do the numbers have?` : `“${values.unit}” is no unit of this test. Type the value with its unit.`
    case 'column-factor':
      return `The numbers of ${text} lie near ${figure(values.median, baseOf(values.unit))}, the drawing asks for ${figure(values.expected, baseOf(values.unit))}. Are they written in another prefix?`
    case 'inverted-ratio':
      return `The ratio ${text} reads about ${figure(values.median, '')}, the drawing asks for ${figure(values.expected, '')}. Does it stand upside down?`
    case 'ambiguous-number':
      return `“${text}” can be read in two ways. Which one is meant?`
    case 'cell-factor':
      return `${values.symbol} reads ${figure(values.value, values.unit)} here and about ${figure(values.reference, values.unit)} elsewhere. Is it written in another prefix?`
    case 'zero-or-negative':
      return `${values.symbol} reads “${text}”, as an open or shorted fixture does. Is it a reading?`
    case 'unsure-verdict':
      return `Does “${text}” say that the part passed ${values.symbol}?`
    case 'date-for-number':
      return `“${text}” looks like a date that a spreadsheet made of a number. Type the number.`
    case 'formula-error':
      return `The cell holds a formula’s error, “${text}”. Type the value.`
    case 'unreadable-cell':
      return `“${text}” cannot be read as ${values.symbol}. Type the value.`
    case 'unit-unknown':
      return `“${text}” has no unit, and neither has the heading. Type the value with its unit.`
    case 'serial-missing':
      return 'This line has no serial number. Which part is it?'
    case 'serial-duplicate':
      return `Serial ${values.serial} stands here a second time. Is it a test of the same part again?`
    case 'serial-range':
      return `“${text}” may be one part or several. A line is one part.`
  }
}

/** The unit of a column question is written with its prefix; figures are in its base. */
const baseOf = (unit: string | number | undefined) => String(unit ?? '').replace(/^[pnµmkMG](?=[HΩVAF]|Hz)/, '')

export function optionWords({ id, values }: QuestionOption, code: QuestionCode): string {
  if (id === 'leave-out') return code === 'serial-missing' || code === 'serial-duplicate' || code === 'serial-range' ? 'Leave the line out' : 'Leave the cell out'
  if (id === 'ignore') return 'Ignore the column'
  if (id === 'keep') return 'Take it as it stands'
  if (id === 'passed') return 'Passed'
  if (id === 'failed') return 'Failed'
  if (id === 'invert') return 'Turn it over'
  if (id === 'use-line') return `Call it “${values.serial}”`
  if (id === 'one-part') return `One part, “${values.serial}”`
  if (id === 'new-run') return `The same part again, test run ${values.run}`
  if (id.startsWith('scale:')) return Number(values.factor) < 1 ? `Divide by ${formatNumber(1 / Number(values.factor))}` : `Multiply by ${formatNumber(Number(values.factor))}`
  if (id.startsWith('row:')) return String(values.symbol)
  return String(values.figure ?? values.symbol ?? id)
}

export function noteSentence({ code, values }: Note): string {
  switch (code) {
    case 'mixed-units':
      return `${values.symbol} is written in several units: ${values.units}. Each cell was read by its own.`
    case 'mixed-decimal-signs':
      return `Decimal commas here and decimal points elsewhere (${values.other}). What could mean two things was asked.`
    case 'repaired-characters':
      return 'Characters that an earlier program had broken (such as Âµ) were put right.'
    case 'limit-differs':
      return `The file states a ${values.side} of ${figure(values.file, values.unit)} for ${values.symbol}, the drawing ${values.drawing === 'none' ? 'none' : figure(values.drawing, values.unit)}. The drawing counts.`
    case 'summary-disagrees':
      return `The file’s ${values.figure} of ${values.symbol} is ${figure(values.file, values.unit)}, its readings give ${figure(values.readings, values.unit)}.`
    case 'identical-readings':
      return `All ${values.count} readings of ${values.symbol} are identical; please make sure that they were measured.`
    case 'line-ignored':
      return `Not read as a part: “${values.text}”.`
    case 'cells-outside-table':
      return 'Cells beyond the last heading were not read.'
    case 'row-without-readings':
      return `${values.symbol} was not measured.`
    case 'other-revision':
      return `The file says revision ${values.file}, samples of revision ${values.asked} were asked for.`
    case 'other-drawing':
      return `The file says “${values.file}”, samples of ${values.asked} were asked for.`
  }
}

export type { Values }

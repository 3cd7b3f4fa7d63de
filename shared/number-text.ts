import { PREFIX_EXPONENTS, plainUnit, type ShownUnit } from './shown-units'

export type UnreadableReason = 'not-a-number' | 'uneven-groups' | 'unknown-unit'

export type DecimalReading =
  | { kind: 'empty' }
  /** `decimal` is exact decimal text with a point: `-1250.50`. */
  | { kind: 'decimal'; decimal: string }
  | { kind: 'ambiguous'; readings: readonly [string, string] }
  | { kind: 'unreadable'; reason: UnreadableReason }

export type FigureReading =
  | { kind: 'empty' }
  | { kind: 'figure'; value: number }
  | { kind: 'ambiguous'; values: readonly [number, number] }
  | { kind: 'unreadable'; reason: UnreadableReason; found?: string }

interface NumberParts {
  sign: '' | '-'
  mantissa: string
  exponent: number
  tail: string
}

const NUMBER = /^([+\-−–]?)\s*(\d[\d.,'’ ]*|[.,]\d+)(?:[eE]([+\-−]?\d+))?(.*)$/

function splitNumber(text: string): NumberParts | null {
  const match = NUMBER.exec(text.normalize('NFKC').trim())
  if (!match) return null
  const [, sign, mantissa, exponent, tail] = match
  return {
    sign: sign === '' || sign === '+' ? '' : '-',
    mantissa: mantissa!.trim(),
    exponent: Number((exponent ?? '0').replace('−', '-')),
    tail: tail!.trim(),
  }
}

const GROUPED = /^\d{1,3}(?:([.,'’ ])\d{3})(?:\1\d{3})*$/
const PLAIN = /^\d*$/

const decimal = (whole: string, fraction: string) => {
  const digits = whole.replace(/^0+(?=\d)/, '') || '0'
  return fraction === '' ? digits : `${digits}.${fraction}`
}

function ungroup(whole: string): string | null {
  if (PLAIN.test(whole)) return whole
  return GROUPED.test(whole) ? whole.replace(/\D/g, '') : null
}

/** All ways to read digits with separators; none when the groups are uneven. */
function mantissaReadings(mantissa: string, askAboutPoint: boolean): string[] {
  const signs = mantissa.replace(/\d/g, '')
  const last = mantissa.search(/[.,][^.,]*$/)
  if (last < 0 || /['’ ]/.test(mantissa.slice(last))) {
    const whole = ungroup(mantissa)
    return whole === null ? [] : [decimal(whole, '')]
  }

  const mark = mantissa[last]!
  const before = mantissa.slice(0, last)
  const after = mantissa.slice(last + 1)
  const repeated = signs.split(mark).length > 2
  const asGroup = ungroup(mantissa)
  if (repeated) return asGroup === null ? [] : [decimal(asGroup, '')]

  const whole = ungroup(before)
  if (whole === null || before.includes(mark)) return []
  const asDecimal = decimal(whole, after)
  const doubtful = asGroup !== null && !before.startsWith('0') && (mark === ',' || askAboutPoint)
  return doubtful ? [asDecimal, decimal(asGroup, '')] : [asDecimal]
}

export interface ReadDecimalOptions {
  /** Also ask about `1.250`. Set it for money, where a misread thousand is not seen by eye. */
  askAboutPoint?: boolean
}

/**
 * Reads a number without unit from what a person typed, exactly, as decimal text.
 * Decimal comma and decimal point are both read; blanks and apostrophes may group thousands.
 * `1,250` has two readings and is asked about; `0,250`, `12,50` and `1.250,00` have one.
 *
 * Source: ISO 80000-1:2009, 7.3.2 (either decimal sign; groups of three set off by a small space).
 */
export function readDecimal(text: string, options: ReadDecimalOptions = {}): DecimalReading {
  if (text.trim() === '') return { kind: 'empty' }
  const parts = splitNumber(text)
  if (!parts || parts.tail !== '' || parts.exponent !== 0) return { kind: 'unreadable', reason: 'not-a-number' }

  const [first, second] = mantissaReadings(parts.mantissa, options.askAboutPoint ?? false)
  if (first === undefined) return { kind: 'unreadable', reason: 'uneven-groups' }
  if (second === undefined) return { kind: 'decimal', decimal: parts.sign + first }
  return { kind: 'ambiguous', readings: [parts.sign + first, parts.sign + second] }
}

const LETTER_CODE = /^([RkKMmuµnp])(\d+)$/
const ALIASES: Readonly<Record<string, string>> = { K: 'k', u: 'µ' }

/** Moves the letter of an IEC 60062 value (`4k7`, `2R2`) behind its digits. */
function unfoldLetterCode(parts: NumberParts, unit: ShownUnit): NumberParts {
  const match = LETTER_CODE.exec(parts.tail.replace('μ', 'µ'))
  if (!match || !unit.letterCode || !/^\d+$/.test(parts.mantissa)) return parts
  const [, letter, fraction] = match
  if (letter === 'R' && unit.base !== 'Ω') return parts
  const prefix = letter === 'R' ? '' : letter
  return { ...parts, mantissa: `${parts.mantissa}.${fraction}`, tail: `${prefix}${unit.base}` }
}

/** Power of ten of a typed unit against the base of the expected one, or null when it is another unit. */
function typedExponent(tail: string, unit: ShownUnit): number | null {
  const typed = plainUnit(tail)
  if (typed === '' || typed === plainUnit(unit.symbol)) return unit.exponent
  if (unit.base === '') return null

  const base = plainUnit(unit.base)
  const aliased = base === 'Ω' ? typed.replace(/R$/, 'Ω') : typed
  const prefix = aliased.endsWith(base) ? aliased.slice(0, -base.length) : unit.letterCode ? typed : undefined
  if (prefix === undefined) return null
  return PREFIX_EXPONENTS[ALIASES[prefix] ?? prefix] ?? null
}

/**
 * Reads a figure in the unit shown beside its field and answers the value to keep
 * (SI; millimetres for lengths, °C for temperatures, a fraction for percentages).
 * The unit may be typed with another prefix (`0.61 mH` in a µH field), as a bare prefix (`610u`) or as a
 * letter code (`4k7`); a different unit is refused, never converted by guess.
 *
 * Source: IEC 60062 for letter codes, ISO 80000-1 for decimal signs and prefixes.
 */
export function readFigure(text: string, unit: ShownUnit): FigureReading {
  if (text.trim() === '') return { kind: 'empty' }
  const split = splitNumber(text)
  if (!split) return { kind: 'unreadable', reason: 'not-a-number' }

  const parts = unfoldLetterCode(split, unit)
  const typed = typedExponent(parts.tail, unit)
  if (typed === null) return { kind: 'unreadable', reason: 'unknown-unit', found: parts.tail }

  const power = parts.exponent + typed - unit.exponent + unit.modelExponent
  const values = mantissaReadings(parts.mantissa, false).map((reading) => Number(`${parts.sign}${reading}e${power}`))
  const [first, second] = split.exponent === 0 ? values : values.slice(0, 1)
  if (first === undefined) return { kind: 'unreadable', reason: 'uneven-groups' }
  return second === undefined ? { kind: 'figure', value: first } : { kind: 'ambiguous', values: [first, second] }
}

/** Says in one sentence why a text could not be read and what to type instead. */
export function explainUnreadable(reason: UnreadableReason, unitSymbol = '', found = ''): string {
  const example = unitSymbol === '' ? '12.5' : `12.5 ${unitSymbol}`
  switch (reason) {
    case 'not-a-number':
      return `This is not a number. Write it like ${example}; decimal comma or point.`
    case 'uneven-groups':
      return `The separators do not make one number. Write it without thousands separators, like ${example}.`
    case 'unknown-unit':
      return unitSymbol === ''
        ? `“${found}” is not expected here. Write the number alone.`
        : `“${found}” is not a unit of this field. Give the value in ${unitSymbol}.`
  }
}

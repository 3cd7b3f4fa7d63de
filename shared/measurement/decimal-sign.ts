import { readDecimal } from '#shared/number-text'
import type { DecimalSign } from './model'

/** Sign, digits with their separators, and what follows. */
const MANTISSA = /^([+\-−–]?)\s*(\d[\d.,'’ ]*|[.,]\d+)(.*)$/

export interface NumberText {
  sign: string
  mantissa: string
  tail: string
}

/** Takes a text apart that begins with a number, or null. Full-width digits count as digits. */
export function splitMantissa(text: string): NumberText | null {
  const match = MANTISSA.exec(text.normalize('NFKC').trim())
  if (!match) return null
  const [, sign, mantissa, tail] = match
  return { sign: sign === '' || sign === '+' ? '' : '-', mantissa: mantissa!.trim(), tail: tail!.trim() }
}

const other = { comma: 'point', point: 'comma' } as const

/** What one number says about the file's decimal sign; null when it says nothing. */
export function evidenceOf(text: string): 'comma' | 'point' | null {
  const number = splitMantissa(text)
  if (!number) return null
  const marks = number.mantissa.replace(/[^.,]/g, '')
  const last = marks.at(-1)
  if (last === undefined) return null
  const sign = last === ',' ? 'comma' : 'point'
  if (marks.includes(',') && marks.includes('.')) return sign
  if (marks.length > 1) return other[sign]

  const [before = '', after = ''] = number.mantissa.split(last)
  const decimal = after.length !== 3 || before.length > 3 || before === '' || before.startsWith('0') || /^[eE][+\-−]?\d/.test(number.tail)
  return decimal ? sign : null
}

export interface Evidence {
  comma: number
  point: number
  commaAt: string | null
  pointAt: string | null
}

/** Counts what the numbers of a file say about its decimal sign. */
export function gatherEvidence(cells: Iterable<{ text: string; address: string }>): Evidence {
  const found: Evidence = { comma: 0, point: 0, commaAt: null, pointAt: null }
  for (const { text, address } of cells) {
    const sign = evidenceOf(text)
    if (sign === null) continue
    found[sign]++
    found[`${sign}At`] ??= address
  }
  return found
}

/**
 * Decides by evidence, never by habit. A file whose fields are set apart by plain commas writes its
 * decimals with points (RFC 4180); without any evidence nothing is decided.
 */
export function decideDecimalSign({ comma, point }: Evidence, separator: string): DecimalSign {
  if (comma > 0 && point > 0) return 'mixed'
  if (comma > 0) return 'comma'
  if (point > 0 || separator === ',') return 'point'
  return 'undecided'
}

export type MantissaReading =
  | { kind: 'one'; decimal: string }
  | { kind: 'two'; decimal: string; grouped: string }
  | { kind: 'none' }

/** Reads the digits of a number by the file's decimal sign; two readings where the file does not settle it. */
export function readMantissa(mantissa: string, decimalSign: DecimalSign): MantissaReading {
  const reading = readDecimal(mantissa, { askAboutPoint: true })
  if (reading.kind === 'decimal') return { kind: 'one', decimal: reading.decimal }
  if (reading.kind !== 'ambiguous') return { kind: 'none' }

  const [decimal, grouped] = reading.readings
  const mark = mantissa.includes(',') ? 'comma' : 'point'
  if (decimalSign === mark) return { kind: 'one', decimal }
  if (decimalSign === other[mark]) return { kind: 'one', decimal: grouped }
  return { kind: 'two', decimal, grouped }
}

import { PREFIX_EXPONENTS, type ShownUnit } from './shown-units'

/** Narrow no-break space: sets off groups of three digits (ISO 80000-1:2009, 7.3.1). */
const GROUP_SPACE = '\u202f'
const MINUS = '\u2212'

/**
 * Moves the decimal point of decimal text, exactly. Exponent notation is read and never written.
 * A positive `places` makes the number larger.
 */
export function shiftDecimal(text: string, places: number): string {
  const match = /^(-?)(\d*)\.?(\d*)(?:e([+-]?\d+))?$/i.exec(text)
  if (!match) throw new RangeError(`not decimal text: ${text}`)
  const [, sign, whole, fraction, exponent] = match
  const digits = `${whole}${fraction}`
  const point = whole!.length + Number(exponent ?? 0) + places

  const padded = point <= 0 ? '0'.repeat(1 - point) + digits : digits.padEnd(point, '0')
  const cut = Math.max(point, 1)
  const left = padded.slice(0, cut).replace(/^0+(?=\d)/, '')
  const right = padded.slice(cut).replace(/0+$/, '')
  return `${sign}${left}${right === '' ? '' : `.${right}`}`
}

/** Exact decimal text of a kept value in the unit shown, for an entry field: 0.00012 H in µH is `120`. */
export function enteredText(value: number, unit: ShownUnit): string {
  return shiftDecimal(String(Number(value.toPrecision(12))), -unit.modelExponent)
}

/** Sets groups of three digits in decimal text and writes a true minus sign. Four digits stay together. */
export function groupDigits(decimal: string): string {
  const [whole = '', fraction] = decimal.replace('-', '').split('.')
  const grouped = whole.length > 4 ? whole.replace(/\B(?=(\d{3})+$)/g, GROUP_SPACE) : whole
  const sign = decimal.startsWith('-') ? MINUS : ''
  return `${sign}${grouped}${fraction === undefined ? '' : `.${fraction}`}`
}

export interface Digits {
  /** Number of significant digits; 4 when nothing is said. */
  significant?: number
  /** Fixed number of decimals; wins over `significant`. */
  decimals?: number
}

function rounded(value: number, { significant = 4, decimals }: Digits): string {
  if (decimals !== undefined) return value.toFixed(decimals)
  return shiftDecimal(String(Number(value.toPrecision(significant))), 0)
}

/** A rounded number for reading, `–` when there is none. Rounding happens here and nowhere before. */
export function formatNumber(value: number | null | undefined, digits: Digits = {}): string {
  if (value === null || value === undefined || Number.isNaN(value)) return '–'
  if (!Number.isFinite(value)) return value > 0 ? '∞' : `${MINUS}∞`
  const text = rounded(value, digits)
  return groupDigits(Number(text) === 0 ? text.replace('-', '') : text)
}

/** The figure of a kept value in the unit shown, without the unit's symbol. */
export function formatFigure(value: number | null | undefined, unit: ShownUnit, digits: Digits = {}): string {
  if (value === null || value === undefined || !Number.isFinite(value)) return formatNumber(value, digits)
  return formatNumber(Number(shiftDecimal(String(value), -unit.modelExponent)), digits)
}

/** Figure and unit in one text, `120 µH`; the figure alone for a plain count. */
export function formatQuantity(value: number | null | undefined, unit: ShownUnit, digits: Digits = {}): string {
  const figure = formatFigure(value, unit, digits)
  if (unit.symbol === '' || figure === '–') return figure
  return `${figure}\u00a0${unit.symbol}`
}

const PREFIXES = Object.entries(PREFIX_EXPONENTS).sort(([, a], [, b]) => a - b)

/**
 * An SI value with the prefix that puts its figure between 1 and 1000: 0.00012, `H` is `120 µH`.
 * Below pico and above giga the last prefix stays.
 */
export function formatEngineering(value: number | null | undefined, base: string, digits: Digits = {}): string {
  if (value === null || value === undefined || !Number.isFinite(value)) return formatNumber(value, digits)
  // Rounding first, so that 999.96 µH reads 1 mH and not 1000 µH.
  const size = Math.abs(Number(value.toPrecision(digits.significant ?? 4)))
  const [prefix, exponent] = PREFIXES.findLast(([, power]) => size >= 10 ** power) ?? (size === 0 ? ['', 0] : PREFIXES[0]!)
  return `${formatNumber(Number(shiftDecimal(String(value), -exponent)), digits)}\u00a0${prefix}${base}`
}

/**
 * Exact money text with its currency, never rounded: at least two decimals, more when the amount has them.
 * `decimal` is decimal text as the contracts carry it.
 */
export function formatMoney(decimal: string, currency: string): string {
  const plain = shiftDecimal(decimal, 0)
  const [whole, fraction = ''] = plain.split('.')
  return `${groupDigits(`${whole}.${fraction.padEnd(2, '0')}`)}\u00a0${currency}`
}

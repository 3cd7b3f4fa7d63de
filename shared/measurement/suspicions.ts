import type { Dialogue } from './answers'
import type { ExpectedRow, QuestionOption } from './model'
import type { ReadingColumn } from './read-columns'

/** A number read from a cell, before anybody has doubted it. */
export interface ReadNumber {
  address: string
  text: string
  value: number
  /** A unit written in the cell leaves no doubt about its power of ten. */
  ownUnit: boolean
}

export type Doubted = { value: number; scaledBy: number | null } | 'left-out' | 'open'

const LEAVE_OUT: QuestionOption = { id: 'leave-out', values: {} }
const KEEP: QuestionOption = { id: 'keep', values: {} }

/** Quantities that cannot be zero or negative on a part that is whole. */
const POSITIVE: ReadonlySet<ExpectedRow['characteristic']> = new Set(['inductance', 'inductance-at-bias', 'leakage', 'dc-resistance', 'turns-ratio', 'self-resonance', 'interwinding-capacitance', 'insulation-resistance', 'dimension'])

/** Within half as much again of a power of a thousand: wider than any tolerance, far from any other power. */
const NEAR = Math.log10(1.5)

/** The power of a thousand that lies between a value and its reference; 0 when they are alike. */
export function powerOfThousand(value: number, reference: number): number {
  if (!(value > 0) || !(reference > 0)) return 0
  const decades = Math.log10(value / reference)
  const power = Math.round(decades / 3) * 3
  return power !== 0 && Math.abs(decades - power) <= NEAR ? power : 0
}

function lowerMedian(values: readonly number[]): number | null {
  const sorted = values.filter((value) => value > 0).sort((a, b) => a - b)
  return sorted[Math.floor((sorted.length - 1) / 2)] ?? null
}

/** What the drawing expects of a row: its nominal, else the middle of its limits, else nothing. */
function expectedValue({ nominal, minimum, maximum }: ExpectedRow): number | null {
  if (nominal !== null) return nominal
  return minimum !== null && maximum !== null ? (minimum + maximum) / 2 : null
}

/**
 * Asks about numbers of one column that look like another power of ten, an inverted ratio, or a reading of
 * nothing. Never changes a value by itself. The answers stand in the order of the numbers.
 */
export function doubtColumn(column: ReadingColumn, numbers: readonly ReadNumber[], dialogue: Dialogue): Doubted[] {
  const bare = numbers.filter(({ ownUnit }) => !ownUnit).map(({ value }) => value)
  const factor = askColumnFactor(column, bare, dialogue)
  if (factor === null) return numbers.map(() => 'open')
  const inverted = column.row.characteristic === 'turns-ratio' ? askInverted(column, bare, dialogue) : false
  if (inverted === null) return numbers.map(() => 'open')

  const settled = numbers.map((number) => {
    const scaled = number.ownUnit ? number.value : number.value * factor
    return { ...number, value: inverted && scaled !== 0 ? 1 / scaled : scaled, scaledBy: number.ownUnit || factor === 1 ? null : factor }
  })
  const reference = expectedValue(column.row) ?? lowerMedian(settled.map(({ value }) => value))
  return settled.map((number) => askNumber(column.row, number, reference, dialogue))
}

const scaleOption = (power: number): QuestionOption => ({ id: `scale:${-power}`, values: { factor: 10 ** -power } })

/** Whole column against the drawing: 1 when plausible or kept, null while open. */
function askColumnFactor({ row, address, unit }: ReadingColumn, values: readonly number[], dialogue: Dialogue): number | null {
  const reference = expectedValue(row)
  const median = lowerMedian(values)
  const power = reference === null || median === null ? 0 : powerOfThousand(median, reference)
  if (power === 0) return 1
  const answer = dialogue.ask({ code: 'column-factor', address, text: row.symbol, values: { median: median!, expected: reference!, unit: unit?.symbol ?? row.unit }, options: [scaleOption(power), KEEP], typed: false })
  if (answer === null) return null
  return answer.option === 'keep' ? 1 : 10 ** -power
}

/** Whether the ratio stands upside down: false when not or kept, null while open. */
function askInverted({ row, address }: ReadingColumn, values: readonly number[], dialogue: Dialogue): boolean | null {
  const reference = expectedValue(row)
  const median = lowerMedian(values)
  if (reference === null || median === null) return false
  const inverse = Math.abs(median * reference - 1) < 0.1
  const alike = Math.abs(median / reference - 1) < 0.2
  if (!inverse || alike) return false
  const answer = dialogue.ask({ code: 'inverted-ratio', address, text: row.symbol, values: { median, expected: reference }, options: [{ id: 'invert', values: {} }, KEEP], typed: false })
  return answer === null ? null : answer.option === 'invert'
}

function askNumber(row: ExpectedRow, number: ReadNumber & { scaledBy: number | null }, reference: number | null, dialogue: Dialogue): Doubted {
  const { address, text, value, scaledBy } = number
  if (value <= 0 && POSITIVE.has(row.characteristic)) {
    const answer = dialogue.ask({ code: 'zero-or-negative', address, text, values: { symbol: row.symbol }, options: [KEEP, LEAVE_OUT], typed: false })
    return answer === null ? 'open' : answer.option === 'keep' ? { value, scaledBy } : 'left-out'
  }
  const power = number.ownUnit || reference === null ? 0 : powerOfThousand(value, reference)
  if (power === 0) return { value, scaledBy }
  const answer = dialogue.ask({ code: 'cell-factor', address, text, values: { symbol: row.symbol, value, reference: reference!, unit: row.unit }, options: [scaleOption(power), KEEP, LEAVE_OUT], typed: false })
  if (answer === null) return 'open'
  if (answer.option === 'leave-out') return 'left-out'
  return answer.option === 'keep' ? { value, scaledBy } : { value: value * 10 ** -power, scaledBy: (scaledBy ?? 1) * 10 ** -power }
}

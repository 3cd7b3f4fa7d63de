import { longestWordMm, textWidthMm } from './text-metrics'
import type { FontRole } from './model'

export interface Column {
  key: string
  header: string
  /** `decimal` puts the decimal signs of a column below each other. */
  align?: 'start' | 'end' | 'middle' | 'decimal'
  /** A heading shared with the neighbours that have the same one. */
  group?: string
  font?: FontRole
  /** Shown although no row has a value. */
  always?: boolean
}

export interface Row {
  cells: Readonly<Record<string, string>>
  tag?: string
}

export const CELL_PADDING_MM = 1

/** Columns of figures like some air, where there is any. */
const AIR_MM = 3

interface Need {
  minimumMm: number
  wantedMm: number
}

/** No column asks for more than this for its text in one line. */
const WANTED_LIMIT_MM = 90
/** Words longer than this may be broken. */
const WORD_LIMIT_MM = 30

export const isFilled = (text: string | undefined) => text !== undefined && text !== '' && text !== '–'

/** The columns that at least one row fills. */
export const filledColumns = (columns: readonly Column[], rows: readonly Row[]): Column[] =>
  columns.filter(({ key, always }) => always === true || rows.some(({ cells }) => isFilled(cells[key])))

/**
 * Widths that fill `widthMm`: each column gets its longest word, then what is left goes to those whose text would
 * wrap, then to the columns of text.
 */
export function columnWidthsMm(columns: readonly Column[], rows: readonly Row[], heightMm: number, widthMm: number): number[] {
  const needs = widenGroups(columns, columns.map((column) => need(column, rows, heightMm)), heightMm)
  const minimum = sum(needs.map((each) => each.minimumMm))
  const wanted = sum(needs.map((each) => each.wantedMm))
  if (minimum >= widthMm) return needs.map((each) => (each.minimumMm * widthMm) / minimum)
  if (wanted <= widthMm) return stretch(columns, needs, widthMm - wanted)
  const share = (widthMm - minimum) / (wanted - minimum)
  return needs.map((each) => each.minimumMm + (each.wantedMm - each.minimumMm) * share)
}

/** Width below which words of a table would be broken, mm. */
export const leastWidthMm = (columns: readonly Column[], rows: readonly Row[], heightMm: number): number =>
  sum(widenGroups(columns, columns.map((column) => need(column, rows, heightMm)), heightMm).map(({ minimumMm }) => minimumMm))

/** A heading over several columns has to fit above them. */
function widenGroups(columns: readonly Column[], needs: readonly Need[], heightMm: number): Need[] {
  return needs.map((each, index) => {
    const group = columns[index]!.group
    if (group === undefined) return each
    const members = needs.filter((_, other) => columns[other]!.group === group)
    const heading = textWidthMm(group, 'sans-bold', heightMm) + 2 * CELL_PADDING_MM
    const lack = Math.max(0, heading - sum(members.map(({ minimumMm }) => minimumMm))) / members.length
    const minimumMm = each.minimumMm + lack
    return { minimumMm, wantedMm: Math.max(each.wantedMm, minimumMm) }
  })
}

/** What is left gives some air to columns of figures and letters, and the rest to columns of text. */
function stretch(columns: readonly Column[], needs: readonly Need[], leftMm: number): number[] {
  const texts = columns.map(({ align = 'start' }) => align === 'start')
  if (!texts.includes(true)) return needs.map((each) => each.wantedMm + leftMm / needs.length)
  const figures = texts.filter((text) => !text).length
  const airMm = figures === 0 ? 0 : Math.min(AIR_MM, leftMm / 2 / figures)
  const base = sum(needs.map((each, index) => (texts[index] ? each.wantedMm : 0)))
  const rest = leftMm - airMm * figures
  return needs.map((each, index) => each.wantedMm + (texts[index] ? (rest * each.wantedMm) / base : airMm))
}

function need(column: Column, rows: readonly Row[], heightMm: number): Need {
  const texts = rows.map(({ cells }) => cells[column.key] ?? '')
  const font = column.font ?? 'sans'
  const body = (measure: typeof textWidthMm) =>
    column.align === 'decimal' ? decimalWidthMm(texts, font, heightMm) : Math.max(0, ...texts.map((text) => measure(text, font, heightMm)))
  const header = longestWordMm(column.header, 'sans-bold', heightMm)
  const padding = 2 * CELL_PADDING_MM + 0.2
  const minimumMm = Math.max(header, Math.min(body(longestWordMm), WORD_LIMIT_MM)) + padding
  const wantedMm = Math.max(minimumMm, Math.min(body(lineWidth), WANTED_LIMIT_MM) + padding)
  return { minimumMm, wantedMm }
}

/** Fraction of a plain figure with its decimal sign; empty for whole numbers and for other text. */
export const fractionOf = (text: string): string => /^[−\d\s]*\d(\.\d+)?$/.exec(text)?.[1] ?? ''

function decimalWidthMm(texts: readonly string[], font: FontRole, heightMm: number): number {
  const widest = (part: (text: string) => string) => Math.max(0, ...texts.map((text) => textWidthMm(part(text), font, heightMm)))
  return widest((text) => text.slice(0, text.length - fractionOf(text).length)) + widest(fractionOf)
}

const lineWidth = (text: string, font: FontRole, heightMm: number) =>
  Math.max(0, ...text.split('\n').map((part) => textWidthMm(part, font, heightMm)))

const sum = (values: readonly number[]) => values.reduce((total, value) => total + value, 0)

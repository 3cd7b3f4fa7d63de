import { formatNumber } from '../../number-format'
import { PREFIX_EXPONENTS } from '../../shown-units'

export interface Axis {
  minimum: number
  maximum: number
  /** Rising, at round values. */
  ticks: readonly number[]
  /** Power of ten that the figures are shown in: −6 for µ. */
  exponent: number
  /** Unit with its prefix; the base unit alone for those that take none. */
  unit: string
}

const STEPS = [1, 2, 2.5, 5, 10]

/** A round step that cuts a span into about so many parts. */
export function roundStep(span: number, parts: number): number {
  const rough = span / parts
  const size = 10 ** Math.floor(Math.log10(rough))
  return (STEPS.find((step) => step * size >= rough * (1 - 1e-9)) ?? 10) * size
}

function prefixOf(largest: number): [string, number] {
  const known = Object.entries(PREFIX_EXPONENTS).sort(([, a], [, b]) => a - b)
  return known.findLast(([, power]) => largest >= 10 ** power) ?? (largest === 0 ? ['', 0] : known[0]!)
}

/**
 * An axis over all values, widened to round ends; zero lies on it when the values begin near it.
 *
 * @param unit SI unit; units that take no prefix, such as °C, with `plain`.
 */
export function axisOver(values: readonly number[], unit: string, { plain = false, parts = 5, fromZero = false }: { plain?: boolean; parts?: number; fromZero?: boolean } = {}): Axis {
  const [low, high] = values.length === 0 ? [0, 1] : [Math.min(...values, ...(fromZero ? [0] : [])), Math.max(...values, ...(fromZero ? [0] : []))]
  const span = high - low > 0 ? high - low : Math.abs(high) || 1
  const step = roundStep(span, parts)
  const minimum = Math.floor(low / step + 1e-9) * step
  const steps = Math.max(1, Math.ceil((high - minimum) / step - 1e-9))
  const ticks = Array.from({ length: steps + 1 }, (_, index) => minimum + index * step)
  const maximum = ticks.at(-1)!
  const [prefix, exponent] = plain ? ['', 0] : prefixOf(Math.max(Math.abs(minimum), Math.abs(maximum)))
  return { minimum, maximum, ticks, exponent, unit: `${prefix}${unit}` }
}

/** A tick's figure in the axis' unit. */
export const tickText = (axis: Axis, value: number): string => formatNumber(value / 10 ** axis.exponent, { significant: 6 })

import { formatEngineering, formatNumber, formatQuantity } from '../../number-format'
import { shownUnit } from '../../shown-units'
import type { FieldStatus } from '../../engine/specification'

/** A drawing states what the record holds, so nothing is rounded away: twelve digits hide only binary noise. */
const EXACT = { significant: 12 }

/** Predicted values carry four digits. */
export const PREDICTED = { significant: 4 }

/** A value with its unit and the prefix that suits it; empty when there is none. */
export const quantity = (value: number | null | undefined, base: string): string =>
  value == null ? '' : formatEngineering(value, base, EXACT)

/** The figure alone in the unit of its column, e.g. `mΩ`. */
export const inUnit = (value: number | null | undefined, symbol: string): string =>
  value == null ? '' : formatQuantity(value, shownUnit(symbol), EXACT).replace(`\u00a0${symbol}`, '')

export const millimetres = (value: number | null | undefined): string => (value == null ? '' : `${plain(value)}\u00a0mm`)

export const plain = (value: number | null | undefined): string => (value == null ? '' : formatNumber(value, EXACT))

export const celsius = (value: number | null | undefined): string => (value == null ? '' : `${plain(value)}\u00a0°C`)

export const percent = (value: number | null | undefined): string => (value == null ? '' : formatQuantity(value, shownUnit('%'), EXACT))

const signed = (value: number) => (value > 0 ? `+${percent(value)}` : percent(value))

/** `±10 %`, or both sides with their signs; an open side is said. */
export function toleranceText(lower: number | null, upper: number | null): string {
  if (lower === null && upper === null) return 'no limit'
  if (lower !== null && upper !== null && lower === -upper) return `±${percent(upper)}`
  return `${lower === null ? 'no lower limit' : signed(lower)} / ${upper === null ? 'no upper limit' : signed(upper)}`
}

/** A value and its tolerance as a range end, without binary noise. */
export const limitFrom = (nominal: number, tolerance: number | null): number | null =>
  tolerance === null ? null : Number((nominal * (1 + tolerance)).toPrecision(12))

/** Time spans as people say them: minutes and hours from a minute on. */
export function duration(seconds: number | null | undefined): string {
  if (seconds == null) return ''
  if (seconds >= 3600 && seconds % 3600 === 0) return `${plain(seconds / 3600)}\u00a0h`
  if (seconds >= 120 && seconds % 60 === 0) return `${plain(seconds / 60)}\u00a0min`
  return quantity(seconds, 's')
}

export const STATUS_LETTERS: Record<FieldStatus, string> = { mandatory: 'M', reference: 'R', 'vendor-choice': 'V' }

export const yesNo = (value: boolean | null | undefined): string => (value == null ? '' : value ? 'yes' : 'no')

export const joined = (parts: readonly (string | null | undefined)[], separator = ', '): string =>
  parts.filter((part) => part != null && part !== '').join(separator)

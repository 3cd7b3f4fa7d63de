/** Which neighbour a figure is rounded to; a lower limit goes `up` and an upper one `down`, so that neither loosens. */
export type Rounding = 'nearest' | 'up' | 'down'

/**
 * Rounds a positive figure that a specification states to a number of significant digits. This chooses a value to specify, it
 * rounds no result. What is not finite or not above zero in size is returned as it is.
 */
export function toDigits(value: number, digits: number, rounding: Rounding = 'nearest'): number {
  if (!(Math.abs(value) > 0) || !Number.isFinite(value)) return value
  const scale = 10 ** (digits - 1 - Math.floor(Math.log10(Math.abs(value))))
  const scaled = value * scale
  // The hair keeps a figure that has these digits already from being moved by its last bit.
  const whole = { nearest: Math.round(scaled), up: Math.ceil(scaled * (1 - 1e-12)), down: Math.floor(scaled * (1 + 1e-12)) }[rounding]
  return Number((whole / scale).toPrecision(Math.max(digits, 1)))
}

/** A figure without the noise of binary fractions: twelve significant digits. */
export const clean = (value: number): number => Number(value.toPrecision(12))

/** Digits of a stated limit; more only where rounding would eat a tenth of the tolerance. */
const LIMIT_DIGITS = 4
const MOST_LIMIT_DIGITS = 8

/**
 * Limits of a figure with relative tolerances (`lower` negative), rounded towards the figure to four significant digits,
 * or as many as keep nine tenths of the tolerance. An open side, null, stays open.
 */
export function limitsAround(value: number, { lower, upper }: { lower: number | null; upper: number | null }): { minimum: number | null; maximum: number | null } {
  return {
    minimum: lower === null ? null : limit(value, lower, 'up'),
    maximum: upper === null ? null : limit(value, upper, 'down'),
  }
}

function limit(value: number, tolerance: number, rounding: Rounding): number {
  const exact = value * (1 + tolerance)
  for (let digits = LIMIT_DIGITS; digits < MOST_LIMIT_DIGITS; digits++) {
    const rounded = toDigits(exact, digits, rounding)
    if (Math.abs(rounded - exact) <= 0.1 * Math.abs(value * tolerance)) return rounded
  }
  return clean(exact)
}

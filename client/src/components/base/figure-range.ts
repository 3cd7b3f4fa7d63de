export interface FigureRange {
  min?: number
  max?: number
  whole?: boolean
}

/** Says which limit a value breaks, or null. `show` writes a limit with its unit. */
export function rangeProblem(value: number, { min, max, whole }: FigureRange, show: (value: number) => string): string | null {
  if (whole && !Number.isInteger(value)) return 'Give a whole number.'
  const tooLow = min !== undefined && value < min
  const tooHigh = max !== undefined && value > max
  if (!tooLow && !tooHigh) return null
  if (min !== undefined && max !== undefined) return `Give a value from ${show(min)} to ${show(max)}.`
  return tooLow ? `Give ${show(min!)} or more.` : `Give ${show(max!)} or less.`
}

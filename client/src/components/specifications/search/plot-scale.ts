/** A logarithmic axis with its marks. */
export interface LogScale {
  at: (value: number) => number
  marks: number[]
}

const STEPS = [1, 2, 5]

/** Marks at 1, 2 and 5 times powers of ten between two values, ascending. */
export function logMarks(lowest: number, highest: number): number[] {
  const marks: number[] = []
  for (let exponent = Math.floor(Math.log10(lowest)); exponent <= Math.ceil(Math.log10(highest)); exponent++) {
    for (const step of STEPS) {
      const value = Number((step * 10 ** exponent).toPrecision(3))
      if (value >= lowest && value <= highest) marks.push(value)
    }
  }
  return marks
}

/** Room around the outermost points, as a factor. */
const ROOM = 1.15

/** Maps values onto a stretch of the picture, with a little room at both ends. */
export function logScale(values: readonly number[], from: number, to: number): LogScale {
  const positive = values.filter((value) => value > 0 && Number.isFinite(value))
  const lowest = (positive.length > 0 ? Math.min(...positive) : 1) / ROOM
  const highest = Math.max((positive.length > 0 ? Math.max(...positive) : 1) * ROOM, lowest * 2)
  const span = Math.log(highest / lowest)
  return { at: (value) => from + ((to - from) * Math.log(value / lowest)) / span, marks: logMarks(lowest, highest) }
}

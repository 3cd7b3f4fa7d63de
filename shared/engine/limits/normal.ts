import { requirePositive } from '../require'

/**
 * Share of a standard normal distribution below z.
 *
 * Source: erfc by its series up to |x| = 1.5 and by its continued fraction beyond (Abramowitz & Stegun 7.1.6 and 7.1.14).
 */
export function normalShareBelow(z: number): number {
  if (Number.isNaN(z)) throw new RangeError(`z must be a number: ${z}`)
  const tail = 0.5 * erfcOfPositive(Math.abs(z) / Math.SQRT2)
  return z < 0 ? tail : 1 - tail
}

function erfcOfPositive(x: number): number {
  if (x > 27) return 0
  return x < 1.5 ? 1 - erfSeries(x) : erfcFraction(x)
}

/** erf x = 2/√π·e^(−x²)·Σ 2ⁿ·x^(2n+1)/(1·3·…·(2n+1)) */
function erfSeries(x: number): number {
  let term = x
  let sum = x
  for (let n = 1; term > sum * 1e-17; n++) {
    term *= (2 * x * x) / (2 * n + 1)
    sum += term
  }
  return (2 / Math.sqrt(Math.PI)) * Math.exp(-x * x) * sum
}

function erfcFraction(x: number): number {
  let fraction = 0
  for (let n = 200; n >= 1; n--) fraction = n / 2 / (x + fraction)
  return Math.exp(-x * x) / (Math.sqrt(Math.PI) * (x + fraction))
}

/** Limits of a reading; a null side is open. */
export interface Bounds {
  minimum: number | null
  maximum: number | null
}

/**
 * Share of normally distributed readings outside limits.
 *
 * @throws RangeError unless the deviation is positive
 */
export function shareOutside(mean: number, deviation: number, { minimum, maximum }: Bounds): number {
  requirePositive('deviation', deviation)
  const below = minimum === null ? 0 : normalShareBelow((minimum - mean) / deviation)
  const above = maximum === null ? 0 : normalShareBelow((mean - maximum) / deviation)
  return Math.min(1, below + above)
}

/**
 * Performance index of a predicted distribution, min(U − x̄, x̄ − L)/(3·σ); null without limits.
 *
 * Source: ISO 22514-2:2017, with the predicted mean and deviation in place of measured ones.
 *
 * @throws RangeError unless the deviation is positive
 */
export function predictedIndex(mean: number, deviation: number, { minimum, maximum }: Bounds): number | null {
  requirePositive('deviation', deviation)
  const sides = [maximum === null ? null : maximum - mean, minimum === null ? null : mean - minimum].filter((side) => side !== null)
  return sides.length === 0 ? null : Math.min(...sides) / (3 * deviation)
}

import { requireCount, requirePositive } from '../require'

/**
 * A smooth function by its values at the `count` Chebyshev points of a range, for asking it many times; the values at the points
 * are computed at once. With 6 points a winding's loss over 200 K is met to 10⁻⁵.
 *
 * Source: barycentric interpolation, J.-P. Berrut and L. Trefethen, SIAM Rev. 46 (2004) 501.
 *
 * @throws RangeError unless the range has a length and the count is a whole number above zero
 */
export function sampled(of: (x: number) => number, { from, to, count = 6 }: { from: number; to: number; count?: number }): (x: number) => number {
  requirePositive('to - from', to - from)
  requireCount('count', count)
  const angles = Array.from({ length: count }, (_, k) => ((2 * k + 1) * Math.PI) / (2 * count))
  const points = angles.map((angle) => (from + to) / 2 + ((to - from) / 2) * Math.cos(angle))
  const weights = angles.map((angle, k) => (k % 2 === 0 ? 1 : -1) * Math.sin(angle))
  const values = points.map(of)
  return (x) => {
    let above = 0
    let below = 0
    for (let k = 0; k < count; k++) {
      const distance = x - points[k]!
      if (distance === 0) return values[k]!
      const part = weights[k]! / distance
      above += part * values[k]!
      below += part
    }
    return above / below
  }
}

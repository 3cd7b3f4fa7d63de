/**
 * Whether one point is at least as good as another in every objective and better in one; smaller is better, and an unknown
 * objective (null) is worse than any known one.
 *
 * Source: definition of Pareto dominance.
 */
export function dominates(one: readonly (number | null)[], other: readonly (number | null)[]): boolean {
  const known = (value: number | null | undefined) => value ?? Infinity
  let better = false
  for (let i = 0; i < one.length; i++) {
    if (known(one[i]) > known(other[i])) return false
    if (known(one[i]) < known(other[i])) better = true
  }
  return better
}

/** Indices of the points that no other point dominates, in their order; equal points are all on the front. */
export function paretoFront(points: readonly (readonly (number | null)[])[]): number[] {
  return points.flatMap((point, index) => (points.some((other) => dominates(other, point)) ? [] : [index]))
}

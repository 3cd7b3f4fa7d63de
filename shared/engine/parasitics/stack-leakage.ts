import { MU_0_H_PER_M } from '../constants'
import { solveLinear } from '../solve-linear'

/** One winding or part of it as a slab of the coil, carrying a share of its winding's ampere-turns. */
export interface Slab {
  bottomMm: number
  topMm: number
  /** Share of the ampere-turns of the whole winding, 0…1. */
  share: number
}

/**
 * Integral over the build of the product of two mmf profiles, in mm. A profile rises by the shares of the first
 * winding's slabs and falls by those of the other; ampere-turns are 1 in both. Exact, since profiles are straight
 * within a slab. With equal profiles it is Σh/3 + Σx of the closed form, divided by the square of the interfaces.
 *
 * Source: energy of the field, E. Snelling, Soft Ferrites, 2nd ed., ch. 11.
 */
export function mmfProductMm(driven: readonly Slab[], first: readonly Slab[], second: readonly Slab[]): number {
  const edges = [...driven, ...first, ...second].flatMap(({ bottomMm, topMm }) => [bottomMm, topMm]).sort((a, b) => a - b)
  const profile = (other: readonly Slab[]) => (yMm: number) => fill(driven, yMm) - fill(other, yMm)
  const f = profile(first)
  const g = profile(second)
  let sum = 0
  for (let i = 1; i < edges.length; i++) {
    const [from, to] = [edges[i - 1]!, edges[i]!]
    if (to <= from) continue
    const middle = (from + to) / 2
    sum += ((to - from) / 6) * (f(from) * g(from) + 4 * f(middle) * g(middle) + f(to) * g(to))
  }
  return sum
}

/** Share of a winding's ampere-turns that lies below a height. */
const fill = (slabs: readonly Slab[], yMm: number) =>
  slabs.reduce((sum, { bottomMm, topMm, share }) => sum + share * Math.min(1, Math.max(0, (yMm - bottomMm) / (topMm - bottomMm))), 0)

export interface StackLeakageInput {
  turns: number
  meanTurnLengthMm: number
  breadthMm: number
  driven: readonly Slab[]
  shorted: readonly (readonly Slab[])[]
}

/**
 * How several shorted windings share the ampere-turns: so that the field energy is least, as windings without resistance
 * do. `heightMm` is the integral that is left, 1/(1ᵀ·M⁻¹·1) with M of `mmfProductMm`.
 *
 * Source: as `mmfProductMm`; energy minimum of shorted windings (Thomson's theorem).
 */
export function shortedShares(driven: readonly Slab[], shorted: readonly (readonly Slab[])[]): { shares: number[]; heightMm: number } | null {
  const matrix = shorted.map((one) => shorted.map((other) => mmfProductMm(driven, one, other)))
  const weights = solveLinear(matrix, shorted.map(() => 1))
  const inverse = weights?.reduce((sum, weight) => sum + weight, 0)
  if (!weights || !inverse || !(inverse > 0)) return null
  return { shares: weights.map((weight) => weight / inverse), heightMm: 1 / inverse }
}

/**
 * Leakage inductance in henry at the driven winding with one or several others shorted, µ₀·N²·MLT/b times the height of
 * `shortedShares`; null where the windings lie in one place.
 *
 * Source: E. Snelling, Soft Ferrites, 2nd ed., ch. 11.
 */
export function stackLeakageH({ turns, meanTurnLengthMm, breadthMm, driven, shorted }: StackLeakageInput): number | null {
  const solution = shortedShares(driven, shorted)
  if (!solution || !(breadthMm > 0)) return null
  return (MU_0_H_PER_M * turns ** 2 * meanTurnLengthMm * 1e-3 * solution.heightMm) / breadthMm
}

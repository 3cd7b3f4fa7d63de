import { MU_0_H_PER_M } from '../constants'
import type { Coil, StepPlacement } from '../build'
import type { LeakageResult } from '../evaluation'
import type { Winding } from '../specification'
import { explain } from './context'
import type { Context } from './context'

export const LEAKAGE_MODEL = 'one-dimensional field energy over the winding build (Snelling); ±40 % where layers do not fill the breadth'

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

/** Gauss elimination with pivots; null for a singular matrix. */
function solveLinear(matrix: readonly (readonly number[])[], right: readonly number[]): number[] | null {
  const size = right.length
  const rows = matrix.map((row, index) => [...row, right[index]!])
  for (let column = 0; column < size; column++) {
    let pivot = column
    for (let row = column + 1; row < size; row++) if (Math.abs(rows[row]![column]!) > Math.abs(rows[pivot]![column]!)) pivot = row
    if (!(Math.abs(rows[pivot]![column]!) > 1e-15)) return null
    ;[rows[column], rows[pivot]] = [rows[pivot]!, rows[column]!]
    for (let row = 0; row < size; row++) {
      if (row === column) continue
      const factor = rows[row]![column]! / rows[column]![column]!
      for (let k = column; k <= size; k++) rows[row]![k]! -= factor * rows[column]![k]!
    }
  }
  return rows.map((row, index) => row[size]! / row[index]!)
}

// ---------------------------------------------------------------------------------------------

/** Leakage at the primary: with each other winding shorted alone, and with all secondaries shorted together. */
export function leakages(context: Context, coil: Coil | null): LeakageResult[] {
  const { primary, specification } = context
  if (!primary || !coil) return []
  const others = specification.windings.filter(({ id, role }) => id !== primary.id && role !== 'shield')
  const secondaries = others.filter(({ role }) => role === 'secondary')
  const groups = [...others.map((winding) => [winding]), ...(secondaries.length > 1 ? [secondaries] : [])]
  return groups.map((shorted, index) => leakage(context, coil, { primary, shorted, index }))
}

/** Leakage at one winding with the listed others shorted; null where the one-dimensional field does not hold. */
export function leakageBetweenH(coil: Coil, driven: Winding, shorted: readonly Winding[]): number | null {
  const own = placementsOf(coil, driven.id)
  const each = shorted.map(({ id }) => placementsOf(coil, id))
  if (own.length === 0 || each.some((placements) => placements.length === 0)) return null
  const all = [own, ...each].flat()
  // Windings beside each other in sections have their field across the coil.
  if (new Set(all.map(({ section }) => section)).size > 1) return null
  const slabs = { driven: slabsOf(own), shorted: each.map(slabsOf) }
  const shares = shortedShares(slabs.driven, slabs.shorted)?.shares.map((share) => Math.max(0, share))
  if (!shares) return null
  // Half by the driven winding, half by the shorted ones as they share the current.
  const mean = (ofDriven: number, ofShorted: readonly number[]) => (ofDriven + weighted(ofShorted, shares)) / 2
  const breadthOf = (placements: readonly StepPlacement[]) => weighted(placements.map(({ leftMm, rightMm }) => rightMm - leftMm), placements.map(() => 1))
  const turnOf = ({ id }: Winding) => coil.windings.get(id)!.meanTurnLengthMm
  return stackLeakageH({
    ...slabs,
    turns: driven.turns,
    meanTurnLengthMm: mean(turnOf(driven), shorted.map(turnOf)),
    breadthMm: mean(breadthOf(own), each.map(breadthOf)),
  })
}

function weighted(values: readonly number[], weights: readonly number[]): number {
  const sum = weights.reduce((total, weight) => total + weight, 0)
  return values.reduce((total, value, index) => total + value * weights[index]!, 0) / sum
}

const placementsOf = (coil: Coil, windingId: string) => coil.placements.filter((placement) => placement.windingId === windingId)

function slabsOf(placements: readonly StepPlacement[]): Slab[] {
  const turns = placements.reduce((sum, placement) => sum + placement.turns, 0)
  return placements.map(({ bottomMm, topMm, turns: own }) => ({ bottomMm, topMm, share: own / turns }))
}

function leakage(context: Context, coil: Coil, { primary, shorted, index }: { primary: Winding; shorted: Winding[]; index: number }): LeakageResult {
  const inductanceH = leakageBetweenH(coil, primary, shorted)
  explain(context, `leakages.${index}.inductanceH`, () => ({
    symbol: 'L_leak', value: inductanceH, unit: 'H', formula: 'µ0·N²·MLT/b·∫(mmf/NI)² dy = µ0·N²·MLT/(b·p²)·(Σh/3 + Σx)', source: 'E. Snelling, Soft Ferrites, 2nd ed., ch. 11',
    inputs: [
      { name: 'N', value: primary.turns, unit: '', origin: `windings ${primary.name}` },
      { name: 'MLT', value: coil.windings.get(primary.id)?.meanTurnLengthMm ?? 'not known', unit: 'mm', origin: 'coil layout' },
      { name: 'shorted', value: shorted.map(({ name }) => name).join(', '), unit: '', origin: 'windings' },
    ],
  }))
  return { windingId: primary.id, shortedWindingIds: shorted.map(({ id }) => id), inductanceH, model: LEAKAGE_MODEL }
}

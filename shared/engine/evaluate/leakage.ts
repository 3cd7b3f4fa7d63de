import type { Coil, StepPlacement } from '../build'
import type { LeakageResult } from '../evaluation'
import { LEAKAGE_MATRIX_MODEL, groupLeakage, leakageAtH, woundTogether } from '../parasitics/leakage-matrix'
import type { GroupLeakage, LeakageMatrix } from '../parasitics/leakage-matrix'
import { shortedShares, stackLeakageH } from '../parasitics/stack-leakage'
import type { Slab } from '../parasitics/stack-leakage'
import type { Winding } from '../specification'
import { explain, positive, report } from './context'
import type { Context } from './context'
import { coilLeakage } from './field'

/** Leakage at the primary: with each other winding shorted alone, and with all secondaries shorted together; then what else the limits ask for. */
export function leakages(context: Context, coil: Coil | null): LeakageResult[] {
  const { primary, specification } = context
  if (!primary || !coil) return []
  const others = specification.windings.filter(({ id, role }) => id !== primary.id && role !== 'shield')
  const secondaries = others.filter(({ role }) => role === 'secondary')
  const groups = [...others.map((winding) => [winding]), ...(secondaries.length > 1 ? [secondaries] : [])]
  if (others.length > 0 && coil.layout.items.length > 0 && coilLeakage(context, coil) === null) report(context, 'field-not-calculable', 'note', 'core.core')
  const pairs = distinctPairs([...groups.map((shorted) => ({ driven: primary, shorted })), ...limitedPairs(context)])
  return pairs.map((pair, index) => leakage(context, coil, { ...pair, index }))
}

interface Pair {
  driven: Winding
  shorted: Winding[]
}

function limitedPairs({ specification: { electrical, windings } }: Context): Pair[] {
  return electrical.leakage.flatMap(({ windingId, shortedWindingIds }) => {
    const driven = windings.find(({ id }) => id === windingId)
    const shorted = windings.filter(({ id }) => id !== windingId && shortedWindingIds.includes(id))
    return driven && shorted.length > 0 ? [{ driven, shorted }] : []
  })
}

function distinctPairs(pairs: readonly Pair[]): Pair[] {
  const key = ({ driven, shorted }: Pair) => [driven.id, ...shorted.map(({ id }) => id).sort()].join(' ')
  return [...new Map(pairs.map((pair) => [key(pair), pair])).values()]
}

/** Leakage at one winding with the listed others shorted, from the two-dimensional field; null where the model does not hold. */
export function leakageBetweenH(context: Context, coil: Coil, driven: Winding, shorted: readonly Winding[]): number | null {
  const matrix = coilLeakage(context, coil)
  return matrix && positive(driven.turns) ? leakageAtH(matrix, { windingId: driven.id, turns: driven.turns }, shorted.map(({ id }) => id)) : null
}

/** The same by the textbook's field along the axis over the windings' own breadth; null where windings lie beside each other in sections. */
export function oneDimensionalLeakageH(coil: Coil, driven: Winding, shorted: readonly Winding[]): number | null {
  const own = placementsOf(coil, driven.id)
  const each = shorted.map(({ id }) => placementsOf(coil, id))
  if (own.length === 0 || each.some((placements) => placements.length === 0)) return null
  const all = [own, ...each].flat()
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

interface Asked extends Pair {
  index: number
}

function leakage(context: Context, coil: Coil, { driven, shorted, index }: Asked): LeakageResult {
  const ids = shorted.map(({ id }) => id)
  const matrix = coilLeakage(context, coil)
  const together = matrix !== null && woundTogether(matrix, [driven.id], ids)
  if (together) report(context, 'leakage-wound-together', 'note', 'sequence', { winding: driven.name, shorted: shorted.map(({ name }) => name).join(', ') })
  const group = matrix && positive(driven.turns) ? groupLeakage(matrix, [driven.id], ids) : null
  const result: LeakageResult = {
    windingId: driven.id,
    shortedWindingIds: ids,
    inductanceH: group && group.perTurnH * driven.turns ** 2,
    oneDimensionalH: together ? null : oneDimensionalLeakageH(coil, driven, shorted),
    model: LEAKAGE_MATRIX_MODEL,
  }
  explainLeakage(context, coil, { driven, shorted, index }, { result, group, matrix })
  return result
}

function explainLeakage(context: Context, coil: Coil, { driven, shorted, index }: Asked, { result, group, matrix }: { result: LeakageResult; group: GroupLeakage | null; matrix: LeakageMatrix | null }): void {
  const turns = { name: 'N', value: driven.turns, unit: '', origin: `windings ${driven.name}` }
  const shortedNames = { name: 'shorted', value: shorted.map(({ name }) => name).join(', '), unit: '', origin: 'windings' }
  const nameOf = (id: string) => shorted.find((winding) => winding.id === id)?.name ?? id
  explain(context, `leakages.${index}.inductanceH`, () => ({
    symbol: 'L_leak', value: result.inductanceH, unit: 'H', formula: 'N²·Σ Θ_j·M_jk·Θ_k, M of the field in the window, Θ shared for least energy', source: 'E. Roth, Rev. Gén. Électr. 23 (1928) 773; round legs: L. Rabins, Trans. AIEE 75 III (1956) 261',
    inputs: [
      turns, shortedNames,
      { name: 'Σ Θ_j·M_jk·Θ_k', value: group?.perTurnH ?? 'not known', unit: 'H', origin: matrix?.model ?? 'no rectangular winding window' },
      ...shorted.map(({ id }) => ({ name: `Θ ${nameOf(id)}`, value: group?.ampereTurns.get(id) ?? 'not known', unit: '', origin: 'share of the ampere-turns' })),
      { name: 'one-dimensional', value: result.oneDimensionalH ?? 'not known', unit: 'H', origin: `leakages.${index}.oneDimensionalH` },
    ],
  }))
  explain(context, `leakages.${index}.oneDimensionalH`, () => ({
    symbol: 'L_leak,1D', value: result.oneDimensionalH, unit: 'H', formula: 'µ0·N²·MLT/b·∫(mmf/NI)² dy = µ0·N²·MLT/(b·p²)·(Σh/3 + Σx)', source: 'E. Snelling, Soft Ferrites, 2nd ed., ch. 11',
    inputs: [turns, shortedNames, { name: 'MLT', value: coil.windings.get(driven.id)?.meanTurnLengthMm ?? 'not known', unit: 'mm', origin: 'coil layout' }],
  }))
}

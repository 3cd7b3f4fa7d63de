import { MU_0_H_PER_M } from '../constants'
import { currentLayers } from '../field/layers'
import type { CurrentLayer } from '../field/layers'
import type { LaidCoil } from '../field/layout-turns'
import { outerShareOf } from '../field/mmf-profile'
import { gapMmf, turnLengthAtMm } from '../field/window'
import type { PlacedWindow } from '../field/window'
import { windowEnergyH } from '../field/window-energy'
import type { CurrentRectangle } from '../field/window-energy'
import { requirePositive } from '../require'
import { solveLinear } from '../solve-linear'

export const LEAKAGE_MATRIX_MODEL = 'two-dimensional energy of the field in the window (Roth 1928; round legs Rabins 1956), layers of wires, walls highly permeable'

/** Leakage of all windings, each referred to one turn. */
export interface LeakageMatrix {
  windingIds: readonly string[]
  /**
   * `perTurnH[i · W + j]` in henry: the energy of the window is ½·Σ M_ij·Θ_i·Θ_j, Θ the ampere-turns. With the permeance P of
   * core and gap the inductance matrix is N_i·N_j·(P + M_ij).
   */
  perTurnH: Float64Array
  /** Pairs of windings wound together, turn beside turn: their leakage is beyond layers of even current. */
  bifilar: readonly (readonly [string, string])[]
  model: string
}

/** Two windings that share more than this of the smaller one's area lie in one place. */
const SHARED_AREA = 0.05

/**
 * Inductance matrix of the winding window, referred to one turn, of all windings that have turns in the layout.
 *
 * Source: see `windowEnergyH`.
 *
 * @throws RangeError on a window out of range
 */
export function leakageMatrix(coil: LaidCoil): LeakageMatrix {
  const layers = currentLayers(coil)
  const windingIds = [...new Set(layers.map(({ windingId }) => windingId))]
  const turns = windingIds.map((id) => layers.reduce((sum, layer) => sum + (layer.windingId === id ? layer.turns : 0), 0))
  const rectangles = layers.map((layer): CurrentRectangle => {
    const group = windingIds.indexOf(layer.windingId)
    return { group, share: layer.turns / turns[group]!, ...placedRectangle(layer, coil.placed) }
  })
  const { window, radialOffsetMm } = coil.placed
  const perTurnH = windowEnergyH({ window, groups: windingIds.length, rectangles, outerShare: outerShareOf(gapMmf(window, coil.gap)) })
  layers.forEach((layer, index) => {
    const { group, share } = rectangles[index]!
    const lengthMm = turnLengthAtMm(window.depth, Math.max(0, (layer.fromMm + layer.toMm) / 2 + radialOffsetMm))
    perTurnH[group * (windingIds.length + 1)]! += (MU_0_H_PER_M * 1e-3 * lengthMm * share ** 2 * wireEnergyShare(layer)) / layer.axialMm.length
  })
  return {
    windingIds,
    perTurnH,
    bifilar: bifilarPairs(windingIds, layers),
    model: LEAKAGE_MATRIX_MODEL,
  }
}

/**
 * What a wire of a layer stores beyond the band of even current that stands for it, over µ0 and its length:
 * (ln(p/(π·d)) + ¼)/(2π) + h/(6p), p the pitch, d the diameter, h = d·√π/2. Near nil for touching wires, some 0.04 at p = 2d.
 *
 * Source: potential of a row of line currents, −ln(2·sin(π·x/p)) at its wires' radius, with the inner inductance µ0/(8π); less
 * that of the band about its own middle.
 */
export function wireEnergyShare({ wire, fromMm, toMm }: CurrentLayer): number {
  if (!wire || !(wire.pitchMm > wire.conductorMm)) return 0
  return (Math.log(wire.pitchMm / (Math.PI * wire.conductorMm)) + 0.25) / (2 * Math.PI) + (toMm - fromMm) / (6 * wire.pitchMm)
}

/** The layers of one winding as rectangles of its ampere-turns, placed in the window. */
export function windingRectangles(coil: LaidCoil, windingId: string): CurrentRectangle[] {
  const layers = currentLayers(coil).filter((layer) => layer.windingId === windingId)
  const turns = layers.reduce((sum, layer) => sum + layer.turns, 0)
  return layers.map((layer) => ({ group: 0, share: layer.turns / turns, ...placedRectangle(layer, coil.placed) }))
}

/** Thinnest band that a layer moved to the edge of the window is left. */
const THINNEST_MM = 1e-3

function placedRectangle({ fromMm, toMm, leftMm, rightMm }: CurrentLayer, { window, axialOffsetMm, radialOffsetMm }: PlacedWindow): Omit<CurrentRectangle, 'group' | 'share'> {
  const [radialFromMm, radialToMm] = inside(fromMm + radialOffsetMm, toMm + radialOffsetMm, window.heightMm)
  const [axialFromMm, axialToMm] = inside(leftMm + axialOffsetMm, rightMm + axialOffsetMm, window.breadthMm)
  return { radialFromMm, radialToMm, axialFromMm, axialToMm }
}

function inside(from: number, to: number, length: number): [number, number] {
  const low = Math.min(Math.max(0, from), length - THINNEST_MM)
  return [low, Math.min(length, Math.max(to, low + THINNEST_MM))]
}

function bifilarPairs(windingIds: readonly string[], layers: readonly CurrentLayer[]): [string, string][] {
  const areas = new Map(windingIds.map((id) => [id, layers.reduce((sum, layer) => sum + (layer.windingId === id ? area(layer) : 0), 0)]))
  return windingIds.flatMap((one, index) => windingIds.slice(index + 1).flatMap((other): [string, string][] => {
    const common = sharedArea(layers.filter(({ windingId }) => windingId === one), layers.filter(({ windingId }) => windingId === other))
    return common > SHARED_AREA * Math.min(areas.get(one)!, areas.get(other)!) ? [[one, other]] : []
  }))
}

const area = ({ fromMm, toMm, leftMm, rightMm }: CurrentLayer) => (toMm - fromMm) * (rightMm - leftMm)

function sharedArea(first: readonly CurrentLayer[], second: readonly CurrentLayer[]): number {
  const common = (a: number, b: number, c: number, d: number) => Math.max(0, Math.min(b, d) - Math.max(a, c))
  return first.reduce((sum, a) => sum + second.reduce((part, b) => part + common(a.fromMm, a.toMm, b.fromMm, b.toMm) * common(a.leftMm, a.rightMm, b.leftMm, b.rightMm), 0), 0)
}

export interface GroupLeakage {
  /** Referred to one turn, H. */
  perTurnH: number
  /** Ampere-turns of each winding of the first group (sum 1) and of the second (sum −1), by id. */
  ampereTurns: ReadonlyMap<string, number>
}

/**
 * Leakage inductance between two groups of windings, referred to one turn, with the windings of each group sharing its
 * ampere-turns so that the energy is least, as windings without resistance do that are shorted (or fed) together; windings of
 * neither group are open. Symmetric in the two groups. Null where a winding is not laid, stands in both groups, or the pair
 * is wound together (beyond the model).
 *
 * Source: reduced inductance matrix; least energy of windings without resistance (Thomson's theorem).
 */
export function groupLeakage(matrix: LeakageMatrix, first: readonly string[], second: readonly string[]): GroupLeakage | null {
  const members = [...first, ...second].map((id) => matrix.windingIds.indexOf(id))
  if (first.length === 0 || second.length === 0 || members.includes(-1) || new Set(members).size < members.length) return null
  if (woundTogether(matrix, first, second)) return null
  const count = matrix.windingIds.length
  const entry = (i: number, j: number) => matrix.perTurnH[members[i]! * count + members[j]!]!
  const size = members.length
  const unit = Math.max(...members.map((_, i) => entry(i, i)))
  // M·Θ is equal within a group (its volts per turn); both groups carry one ampere-turn, against each other.
  const rows = members.map((_, i) => [...members.map((_, j) => entry(i, j) / unit), i < first.length ? -1 : 0, i < first.length ? 0 : -1])
  const sums = [members.map((_, i) => (i < first.length ? 1 : 0)), members.map((_, i) => (i < first.length ? 0 : 1))].map((row) => [...row, 0, 0])
  const solution = solveLinear([...rows, ...sums], [...members.map(() => 0), 1, -1])
  if (!solution) return null
  const shares = solution.slice(0, size)
  const perTurnH = shares.reduce((sum, share, i) => sum + share * shares.reduce((part, other, j) => part + other * entry(i, j), 0), 0)
  if (!(perTurnH > 0)) return null
  return { perTurnH, ampereTurns: new Map(shares.map((share, i) => [matrix.windingIds[members[i]!]!, share])) }
}

/** True where a winding of one group lies turn beside turn with one of the other. */
export function woundTogether({ bifilar }: LeakageMatrix, first: readonly string[], second: readonly string[]): boolean {
  return bifilar.some(([one, other]) => (first.includes(one) && second.includes(other)) || (first.includes(other) && second.includes(one)))
}

/**
 * Leakage inductance in henry at the terminals of one winding with others shorted, each on itself.
 *
 * Source: as `groupLeakage`.
 *
 * @throws RangeError unless the turns are positive
 */
export function leakageAtH(matrix: LeakageMatrix, driven: { windingId: string; turns: number }, shortedIds: readonly string[]): number | null {
  requirePositive('turns', driven.turns)
  const leakage = groupLeakage(matrix, [driven.windingId], shortedIds)
  return leakage && leakage.perTurnH * driven.turns ** 2
}

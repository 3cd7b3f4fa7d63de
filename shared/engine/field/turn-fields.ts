import { requireCount } from '../require'
import { addCurvature } from './curvature'
import { addNearFields } from './near'
import { smoothFields } from './series'
import type { ChannelFields, CurrentPoint, CurrentSheet, CurrentSources, FieldPlace } from './series'
import { requireWindow } from './window'
import type { FieldWindow, GapMmf } from './window'

/** One wire or foil in the window, in mm from the face of the centre leg and from one yoke. */
export interface FieldTurn extends FieldPlace {
  /** Index in `windingIds`. */
  winding: number
  turn: number
  strand: number
  /** Its current per ampere of its winding: 1 over the wires in parallel; 0 for a shield that carries none. */
  share: number
  /** Breadth of a foil, centred on its place; null for a wire. */
  foilBreadthMm: number | null
}

export interface TurnFieldInput {
  window: FieldWindow
  gap: GapMmf
  windingIds: readonly string[]
  turns: readonly FieldTurn[]
}

/** Field at the centre of each laid turn per ampere of each winding (peak or rms alike), A/m per A: real, quasi-static, own wire left out. */
export interface TurnFields {
  windingIds: readonly string[]
  /** One for each wire (each parallel strand) or foil, in the order of the layout. */
  turns: readonly { windingId: string; turn: number; strand: number }[]
  /** Along the former's axis (x of the layout): `hx[t · W + w]`. */
  hx: Float64Array
  /** Outward from the leg (y of the layout): `hy[t · W + w]`. */
  hy: Float64Array
  /**
   * Of each winding the symmetric W × W matrix Σ_turns (hx_i·hx_j + hy_i·hy_j), row by row, (A/m)² per A²: the proximity
   * loss of the winding at one harmonic is G·Iᴴ·Q·I.
   */
  proximity: ReadonlyMap<string, Float64Array>
  model: string
}

export const TURN_FIELD_MODEL = 'two-dimensional: single wires in a rectangular window with highly permeable walls (Roth 1928, summed after Ewald), air gap as its magnetomotive force'

const PER_MM_TO_PER_M = 1000

/**
 * The field of every winding and of the air gap at the place of every turn.
 *
 * Far wires and walls by a smoothed double series, near wires and their images one by one; both together are exact for
 * line currents to 10⁻³ (round legs: 10⁻²). The air gap takes up the net ampere-turns of each winding, evenly over its mouth.
 * Neighbours in eddy reaction are not in the field. Foils count as sheets of even current. The window is taken to go all round
 * the leg; where a core leaves part of each turn outside it, that part sees a weaker field at the outer side.
 *
 * Sources: see `smoothFields` and `addNearFields`.
 *
 * @throws RangeError on a window or a turn out of range
 */
export function turnFields(input: TurnFieldInput): TurnFields {
  const { windingIds, turns } = input
  const { hx, hy } = fieldsOf(input, turns, ownPoints(turns))
  return {
    windingIds,
    turns: turns.map(({ winding, turn, strand }) => ({ windingId: windingIds[winding]!, turn, strand })),
    hx,
    hy,
    proximity: proximityMatrices(input, hx, hy),
    model: TURN_FIELD_MODEL,
  }
}

/**
 * The field at any places of the window per ampere of each winding, A/m: axial `hx[place · W + w]`, outward `hy[…]`.
 *
 * Source: as `turnFields`.
 *
 * @throws RangeError on a window or a turn out of range
 */
export function fieldsAt(input: TurnFieldInput, places: readonly FieldPlace[]): Pick<TurnFields, 'hx' | 'hy'> {
  return fieldsOf(input, places, new Int32Array(places.length).fill(-1))
}

function fieldsOf(input: TurnFieldInput, places: readonly FieldPlace[], ownPoint: Int32Array): Pick<TurnFields, 'hx' | 'hy'> {
  requireWindow(input.window)
  requireTurns(input)
  const sources = sourcesOf(input)
  const smoothMm = smoothingMm(input.window, input.turns.length)
  const fields = smoothFields(sources, places, smoothMm)
  addNearFields(fields, sources, places, ownPoint, smoothMm)
  addCurvature(fields, sources, places, smoothMm)
  if (input.gap.kind === 'all-round') addAllRound(fields, input, places)
  return withGap(fields, input, places.length)
}

/** Turns are the first points of the sources, in their order, foils and those without current left out. */
function ownPoints(turns: readonly FieldTurn[]): Int32Array {
  let next = 0
  return Int32Array.from(turns, (turn) => (isPoint(turn) ? next++ : -1))
}

const isPoint = ({ share, foilBreadthMm }: FieldTurn): boolean => share !== 0 && !(foilBreadthMm !== null && foilBreadthMm > 0)

function requireTurns({ window, windingIds, turns }: TurnFieldInput): void {
  for (const { winding, radialMm, axialMm, foilBreadthMm } of turns) {
    requireCount('winding + 1', winding + 1)
    if (winding >= windingIds.length) throw new RangeError(`winding must be an index of windingIds: ${winding}`)
    const halfMm = (foilBreadthMm ?? 0) / 2
    if (!(radialMm >= 0 && radialMm <= window.heightMm && axialMm - halfMm >= -1e-6 && axialMm + halfMm <= window.breadthMm + 1e-6)) {
      throw new RangeError(`a turn must lie in the window of ${window.breadthMm} × ${window.heightMm} mm: ${axialMm}, ${radialMm}`)
    }
  }
}

/** Spread that balances the near pairs against the waves: some 15 neighbours in reach in a filled window. */
function smoothingMm({ breadthMm, heightMm }: FieldWindow, turns: number): number {
  const smoothMm = 0.4 * Math.sqrt((breadthMm * heightMm) / Math.max(1, turns))
  return Math.min(Math.max(smoothMm, breadthMm / 400), Math.min(breadthMm, heightMm) / 8)
}

/** All currents of the window: a channel for each winding and a last one for one ampere of the gap. */
function sourcesOf(input: TurnFieldInput): CurrentSources {
  const { window, gap, windingIds, turns } = input
  const points: CurrentPoint[] = []
  const sheets: CurrentSheet[] = []
  for (const turn of turns) {
    const { radialMm, axialMm, winding, share, foilBreadthMm } = turn
    if (isPoint(turn)) points.push({ radialMm, axialMm, weight: share, channel: winding })
    else if (share !== 0) sheets.push({ radialMm, fromMm: axialMm - foilBreadthMm! / 2, toMm: axialMm + foilBreadthMm! / 2, weight: share, channel: winding })
  }
  if (gap.kind === 'walls') addStrips(gap, { window, channel: windingIds.length, points, sheets })
  return { window, channels: windingIds.length + 1, points, sheets }
}

/** Points that a gap is made of: enough that a wire as near as half the gap does not see them singly. */
const GAP_POINTS = 9

function addStrips(gap: Extract<GapMmf, { kind: 'walls' }>, into: { window: FieldWindow; channel: number; points: CurrentPoint[]; sheets: CurrentSheet[] }): void {
  const { window, channel, points, sheets } = into
  for (const { wall, fromMm, toMm, share } of gap.strips) {
    const radialMm = wall === 'leg' ? 0 : window.heightMm
    if (toMm - fromMm > window.breadthMm / 2) {
      sheets.push({ radialMm, fromMm, toMm, weight: share, channel })
      continue
    }
    for (let k = 0; k < GAP_POINTS; k++) points.push({ radialMm, axialMm: fromMm + ((k + 0.5) * (toMm - fromMm)) / GAP_POINTS, weight: share / GAP_POINTS, channel })
  }
}

/**
 * One ampere spread evenly round the walls, with the even counter-current that balances it: fields that fall straight from
 * wall to wall. Source: Ampère's law.
 */
function addAllRound({ radial, axial }: ChannelFields, { window, windingIds }: TurnFieldInput, places: readonly FieldPlace[]): void {
  const { breadthMm, heightMm } = window
  const wall = 1 / (2 * (breadthMm + heightMm))
  places.forEach(({ radialMm, axialMm }, place) => {
    const index = place * (windingIds.length + 1) + windingIds.length
    axial[index] = wall * (1 - (2 * radialMm) / heightMm)
    radial[index] = -wall * (1 - (2 * axialMm) / breadthMm)
  })
}

/** Field of each winding with the gap that carries its ampere-turns back, in A/m. */
function withGap({ radial, axial }: ChannelFields, { windingIds, turns }: TurnFieldInput, places: number): Pick<TurnFields, 'hx' | 'hy'> {
  const count = windingIds.length
  const net = new Float64Array(count)
  for (const { winding, share } of turns) net[winding]! += share
  const hx = new Float64Array(places * count)
  const hy = new Float64Array(places * count)
  for (let place = 0; place < places; place++) {
    const from = place * (count + 1)
    for (let winding = 0; winding < count; winding++) {
      hx[place * count + winding] = PER_MM_TO_PER_M * (axial[from + winding]! - net[winding]! * axial[from + count]!)
      hy[place * count + winding] = PER_MM_TO_PER_M * (radial[from + winding]! - net[winding]! * radial[from + count]!)
    }
  }
  return { hx, hy }
}

function proximityMatrices({ windingIds, turns }: TurnFieldInput, hx: Float64Array, hy: Float64Array): Map<string, Float64Array> {
  const count = windingIds.length
  const matrices = windingIds.map(() => new Float64Array(count * count))
  turns.forEach(({ winding }, place) => {
    const matrix = matrices[winding]!
    const from = place * count
    for (let i = 0; i < count; i++) for (let j = 0; j < count; j++) matrix[i * count + j]! += hx[from + i]! * hx[from + j]! + hy[from + i]! * hy[from + j]!
  })
  return new Map(windingIds.map((id, index) => [id, matrices[index]!]))
}

import { besidePairs, CORE_BODY } from './electrodes'
import type { Body, Electrode, Face, Flank } from './electrodes'
import { besideF, facingFPerM2, facingLengthM, flankF, withinLayerF } from './layer-capacitance'
import type { Alignment } from './layer-capacitance'

/** That two points of the coil are joined: a body `turns` turns from its start. */
export interface Tie {
  a: { body: Body; turns: number }
  b: { body: Body; turns: number }
}

/**
 * The electric energy of the coil as a quadratic form: twice the energy is x'·Q·x with x the potential of each body's
 * start and, last, the voltage per turn that all windings share.
 */
export interface CapacitanceNetwork {
  bodies: readonly Body[]
  /** Square, one row more than there are bodies. */
  matrix: readonly (readonly number[])[]
}

/**
 * Network of a coil. The voltage along each winding rises evenly with its turns and no current flows between turns;
 * energy of facing layers by the square of the difference of two straight lines, energy within a layer turn by turn.
 *
 * Source: energy method with linear voltage distribution, e.g. J. Biela and J. Kolar, IEEE Trans. Ind. Appl. 44 (2008) 1597.
 */
export function capacitanceNetwork(input: { electrodes: readonly Electrode[]; faces: readonly Face[]; flanks?: readonly Flank[]; fillPermittivity: number; alignment?: Alignment }): CapacitanceNetwork {
  const { electrodes, faces, fillPermittivity: fill, alignment } = input
  const bodies = [...new Set(electrodes.map(({ body }) => body))]
  const rows = new Map(bodies.map((body, index) => [body, index]))
  const e = bodies.length
  const matrix = Array.from({ length: e + 1 }, () => new Array<number>(e + 1).fill(0))
  for (const face of faces) addFace(matrix, face, { i: rows.get(face.lower.body)!, j: rows.get(face.upper.body)!, e }, areaF(face, fill, alignment))
  for (const flank of input.flanks ?? []) {
    const { left, right } = flank
    couple(matrix, { i: rows.get(left.body)!, j: rows.get(right.body)!, e }, { capacitanceF: flankF(flank, fill), left: left.turnsAtRight - right.turnsAtLeft, right: left.turnsAtRight - right.turnsAtLeft })
  }
  const beside = besidePairs(electrodes)
  for (const [lower, upper] of beside) {
    const common = { leftMm: Math.max(lower.leftMm, upper.leftMm), rightMm: Math.min(lower.rightMm, upper.rightMm) }
    addFace(matrix, { lower, upper, ...common }, { i: rows.get(lower.body)!, j: rows.get(upper.body)!, e }, besideF(lower, upper, fill))
  }
  const interleaved = new Set(beside.flat())
  const facing = new Set(faces.flatMap(({ lower, upper }) => (lower.body === CORE_BODY || upper.body === CORE_BODY ? [] : [lower, upper])))
  for (const electrode of electrodes) {
    if (electrode.kind === 'wire' && !interleaved.has(electrode)) matrix[e]![e]! += withinLayerF(electrode, fill, !facing.has(electrode))
  }
  return { bodies, matrix }
}

const areaF = (face: Face, fill: number, alignment?: Alignment) =>
  facingFPerM2(face, fill, alignment) * (face.rightMm - face.leftMm) * 1e-3 * facingLengthM(face.lower, face.upper)

interface Place {
  /** Rows of the two bodies and of the voltage per turn. */
  i: number
  j: number
  e: number
}

function addFace(matrix: number[][], face: Pick<Face, 'lower' | 'upper' | 'leftMm' | 'rightMm'>, place: Place, capacitanceF: number): void {
  const { lower, upper, leftMm, rightMm } = face
  couple(matrix, place, { capacitanceF, left: turnsAt(lower, leftMm) - turnsAt(upper, leftMm), right: turnsAt(lower, rightMm) - turnsAt(upper, rightMm) })
}

/** A capacitance spread evenly between two bodies, whose turns differ by `left` at one end and by `right` at the other. */
function couple(matrix: number[][], { i, j, e }: Place, { capacitanceF, left, right }: { capacitanceF: number; left: number; right: number }): void {
  if (i !== j) {
    matrix[i]![i]! += capacitanceF
    matrix[j]![j]! += capacitanceF
    matrix[i]![j]! -= capacitanceF
    matrix[j]![i]! -= capacitanceF
    const cross = (capacitanceF * (left + right)) / 2
    matrix[i]![e]! += cross
    matrix[e]![i]! += cross
    matrix[j]![e]! -= cross
    matrix[e]![j]! -= cross
  }
  matrix[e]![e]! += (capacitanceF * (left ** 2 + left * right + right ** 2)) / 3
}

/** Turns passed at a place across the width. */
function turnsAt({ leftMm, rightMm, turnsAtLeft, turnsAtRight }: Electrode, xMm: number): number {
  return rightMm > leftMm ? turnsAtLeft + ((turnsAtRight - turnsAtLeft) * (xMm - leftMm)) / (rightMm - leftMm) : turnsAtLeft
}

// ---------------------------------------------------------------------------------------------

/** The network with points joined; a tie that would close a loop is left out. */
export function joined(network: CapacitanceNetwork, ties: readonly Tie[]): JoinedNetwork {
  const groups = new Map(network.bodies.map((body) => [body, { root: body, turns: 0 }]))
  for (const { a, b } of ties) {
    const [one, other] = [groups.get(a.body), groups.get(b.body)]
    if (!one || !other || one.root === other.root) continue
    // Start of b's root over that of a's root, in turns.
    const offset = one.turns + a.turns - (other.turns + b.turns)
    const moved = other.root
    for (const [body, group] of groups) if (group.root === moved) groups.set(body, { root: one.root, turns: group.turns + offset })
  }
  const roots = [...new Set([...groups.values()].map(({ root }) => root))]
  const size = roots.length + 1
  const matrix = Array.from({ length: size }, () => new Array<number>(size).fill(0))
  const full = network.bodies.map((body) => ({ row: roots.indexOf(groups.get(body)!.root), turns: groups.get(body)!.turns }))
  const e = roots.length
  const terms = [...full.map(({ row, turns }) => [[row, 1], [e, turns]] as const), [[e, 1]] as const]
  network.matrix.forEach((line, i) =>
    line.forEach((value, j) => {
      for (const [row, a] of terms[i]!) for (const [column, b] of terms[j]!) matrix[row]![column]! += a * b * value
    }),
  )
  return { matrix, rootOf: (body) => (groups.has(body) ? roots.indexOf(groups.get(body)!.root) : -1), turnsOf: (body) => groups.get(body)?.turns ?? 0 }
}

export interface JoinedNetwork {
  matrix: readonly (readonly number[])[]
  /** Row of a body, or −1 for one that the coil does not have. */
  rootOf: (body: Body) => number
  /** Potential of a body's start over that of its group, in turns. */
  turnsOf: (body: Body) => number
}

/** Capacitance seen by one volt a turn with everything else floating, F·turn². */
export function perTurnSquaredF({ matrix }: JoinedNetwork): number {
  const e = matrix.length - 1
  return reduced(matrix, [e], 0)[0]![0]!
}

/**
 * Capacitance between two sets of bodies, each shorted on itself and tied together, the rest floating, in F. Null where the
 * sets are joined or one is not in the coil.
 */
export function betweenF(network: JoinedNetwork, one: readonly Body[], other: readonly Body[]): number | null {
  const a = new Set(one.map(network.rootOf))
  const b = new Set(other.map(network.rootOf))
  if (a.size === 0 || b.size === 0 || a.has(-1) || b.has(-1) || [...a].some((row) => b.has(row))) return null
  const e = network.matrix.length - 1
  const tied = merged(network.matrix, [[...a], [...b]], e)
  return reduced(tied, [0], 1)[0]![0]!
}

export interface DrivenInput {
  /** The winding across which one volt stands. */
  driven: { body: Body; turns: number }
  /** The winding into which the charge flows. */
  onto: { body: Body; turns: number }
  /** The end of both windings that stays at rest. */
  resting: 'start' | 'finish'
}

/**
 * Charge that one volt across a winding drives out of another one, per volt, with one end of both at rest and the rest
 * floating, in F: the capacitance that a circuit's common-mode current sees, negative where the sense is turned. Null where
 * the two are joined or one is not in the coil.
 */
export function drivenF(network: JoinedNetwork, { driven, onto, resting }: DrivenInput): number | null {
  const [driver, sink] = [network.rootOf(driven.body), network.rootOf(onto.body)]
  if (driver < 0 || sink < 0 || driver === sink || !(driven.turns > 0)) return null
  const [mutualF, selfF, perTurnF] = reduced(network.matrix, [driver, sink, network.matrix.length - 1], null)[1]!
  const perTurnV = 1 / driven.turns
  const rootV = ({ body, turns }: DrivenInput['driven']) => -(network.turnsOf(body) + (resting === 'finish' ? turns : 0)) * perTurnV
  return -(mutualF! * rootV(driven) + selfF! * rootV(onto) + perTurnF! * perTurnV)
}

/** Rows and columns of each group added up, the groups first; `without` is left out. */
function merged(matrix: readonly (readonly number[])[], groups: readonly (readonly number[])[], without: number): number[][] {
  const used = new Set(groups.flat())
  const lists = [...groups, ...matrix.flatMap((_, index) => (used.has(index) || index === without ? [] : [[index]]))]
  return lists.map((rows) => lists.map((columns) => rows.reduce((sum, row) => sum + columns.reduce((part, column) => part + matrix[row]![column]!, 0), 0)))
}

/** Rest of the form when all but the kept rows take the potential of least energy; `grounded` is held at nought. */
function reduced(matrix: readonly (readonly number[])[], kept: readonly number[], grounded: number | null): number[][] {
  const work = matrix.map((row) => [...row])
  const scale = Math.max(...work.map((row, index) => Math.abs(row[index]!)), Number.MIN_VALUE)
  const free = work.map((_, index) => index).filter((index) => !kept.includes(index) && index !== grounded)
  for (const pivot of free) {
    const value = work[pivot]![pivot]!
    // A body without any capacitance to the rest moves with nothing.
    if (!(Math.abs(value) > 1e-12 * scale)) continue
    work.forEach((row, index) => {
      if (index === pivot || row[pivot] === 0) return
      const factor = row[pivot]! / value
      for (let k = 0; k < row.length; k++) row[k]! -= factor * work[pivot]![k]!
    })
    for (let k = 0; k < work.length; k++) work[pivot]![k] = 0
  }
  return kept.map((row) => kept.map((column) => work[row]![column]!))
}

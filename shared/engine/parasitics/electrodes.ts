/**
 * The coil as electrodes: layers of wire, foils, shields and the core, from the centre leg outward, with the insulation
 * between those that face each other.
 */

/** A winding, a shield or the core: what has one potential when no flux changes. */
export type Body = string

export const CORE_BODY: Body = 'core'

interface ElectrodeBase {
  body: Body
  bottomMm: number
  topMm: number
  leftMm: number
  rightMm: number
  /** Turns of its winding passed at the left and at the right end; equal for what has one potential. */
  turnsAtLeft: number
  turnsAtRight: number
  turnLengthMm: number
}

/** Foil, shield or core. */
export interface PlaneElectrode extends ElectrodeBase {
  kind: 'plane'
  /** Share of the turn's length along which it faces the coil. */
  cover: number
}

/** One layer of wire. */
export interface WireElectrode extends ElectrodeBase {
  kind: 'wire'
  conductorMm: number
  overallMm: number
  /** From wire to wire, parallel ones counted singly. */
  pitchMm: number
  turns: number
  /** From a turn to the next; wider than a wire where several lie in parallel. */
  turnPitchMm: number
  parallel: number
  permittivity: number
}

export type Electrode = PlaneElectrode | WireElectrode

/** A layer of solid insulation. */
export interface Dielectric {
  bottomMm: number
  topMm: number
  leftMm: number
  rightMm: number
  permittivity: number
}

/** Two electrodes over the width on which nothing conducting lies between them. */
export interface Face {
  lower: Electrode
  upper: Electrode
  leftMm: number
  rightMm: number
  /** Solid insulation between them, and its permittivity in series. */
  tapeMm: number
  tapePermittivity: number
  /** What is left of the distance. */
  airMm: number
}

/** Layers of two neighbouring sections that look at each other through the wall between them. */
export interface Flank {
  /** Its right end, and the left end of the other. */
  left: WireElectrode
  right: WireElectrode
  /** Height that both share. */
  commonMm: number
  wallMm: number
  wallPermittivity: number
  /** From the wires to the wall, both sides together. */
  airMm: number
}

const HAIR_MM = 1e-6

/** Which electrodes face each other, strip by strip across the width. */
export function faces(electrodes: readonly Electrode[], dielectrics: readonly Dielectric[]): Face[] {
  const edges = [...new Set([...electrodes, ...dielectrics].flatMap(({ leftMm, rightMm }) => [leftMm, rightMm]).filter(Number.isFinite))].sort((a, b) => a - b)
  const order = [...electrodes].sort((a, b) => a.bottomMm - b.bottomMm)
  const found: Face[] = []
  for (let index = 1; index < edges.length; index++) {
    const [leftMm, rightMm] = [edges[index - 1]!, edges[index]!]
    if (rightMm - leftMm < HAIR_MM) continue
    const within = ({ leftMm: left, rightMm: right }: { leftMm: number; rightMm: number }) => left <= leftMm + HAIR_MM && right >= rightMm - HAIR_MM
    const stack = order.filter(within)
    const solid = dielectrics.filter(within)
    const levels = levelsOf(stack)
    for (let level = 1; level < levels.length; level++) {
      for (const lower of levels[level - 1]!) for (const upper of levels[level]!) append(found, { lower, upper, leftMm, rightMm, ...insulationBetween(lower, upper, solid) })
    }
  }
  return found
}

/** What lies at the same height stands beside each other: windings wound together. */
function levelsOf(stack: readonly Electrode[]): Electrode[][] {
  const levels: Electrode[][] = []
  for (const electrode of stack) {
    const level = levels[levels.length - 1]
    if (level && isBeside(level[0]!, electrode)) level.push(electrode)
    else levels.push([electrode])
  }
  return levels
}

const isBeside = (one: Electrode, other: Electrode) =>
  one.kind === 'wire' && other.kind === 'wire' && Math.min(one.topMm, other.topMm) - Math.max(one.bottomMm, other.bottomMm) > 0.5 * Math.min(one.topMm - one.bottomMm, other.topMm - other.bottomMm)

/** Layers of two windings wound together, turn beside turn. */
export function besidePairs(electrodes: readonly Electrode[]): [WireElectrode, WireElectrode][] {
  const wires = electrodes.filter((electrode): electrode is WireElectrode => electrode.kind === 'wire')
  return wires.flatMap((one, index) =>
    wires.slice(index + 1).flatMap((other): [WireElectrode, WireElectrode][] => {
      const commonMm = Math.min(one.rightMm, other.rightMm) - Math.max(one.leftMm, other.leftMm)
      return isBeside(one, other) && commonMm > 0.5 * Math.min(one.rightMm - one.leftMm, other.rightMm - other.leftMm) ? [[one, other]] : []
    }),
  )
}

function insulationBetween(lower: Electrode, upper: Electrode, solid: readonly Dielectric[]): Pick<Face, 'tapeMm' | 'tapePermittivity' | 'airMm'> {
  const distanceMm = Math.max(0, upper.bottomMm - lower.topMm)
  let tapeMm = 0
  let series = 0
  for (const { bottomMm, topMm, permittivity } of solid) {
    const thicknessMm = Math.min(topMm, upper.bottomMm) - Math.max(bottomMm, lower.topMm)
    if (thicknessMm <= HAIR_MM) continue
    tapeMm += thicknessMm
    series += thicknessMm / permittivity
  }
  return { tapeMm, tapePermittivity: series > 0 ? tapeMm / series : 1, airMm: Math.max(0, distanceMm - tapeMm) }
}

/** A strip that goes on from the one before is one face with it. */
function append(found: Face[], face: Face): void {
  const before = found.find((one) => one.lower === face.lower && one.upper === face.upper && Math.abs(one.rightMm - face.leftMm) < HAIR_MM && Math.abs(one.tapeMm - face.tapeMm) < HAIR_MM && Math.abs(one.airMm - face.airMm) < HAIR_MM)
  if (before) before.rightMm = face.rightMm
  else found.push(face)
}

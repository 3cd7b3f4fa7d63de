import type { Electrode, Face, Flank, PlaneElectrode, WireElectrode } from './electrodes'
import { turnToTurnFPerM } from './turn-to-turn'
import { EPSILON_0_F_PER_M, wireCellFPerM } from './wire-cell'
import type { CellWall } from './wire-cell'

/** Two layers whose wires and pitches differ by less count as equal. */
const EQUAL_SHARE = 0.02

/** How the wires of two equal layers stand over each other; `crossing` is the mean of both. */
export type Alignment = 'in-line' | 'staggered' | 'crossing'

type Gap = Pick<Face, 'tapeMm' | 'tapePermittivity' | 'airMm'>

/**
 * Capacitance of two electrodes that face each other, per area, in F/m².
 *
 * Two planes: insulation and air in series. Wires and plane: the cell of a row of wires. Two equal layers: the mean of
 * in line and staggered, since the helix of the next layer crosses the one below twice in each turn. Unequal layers:
 * the one with the closer wires is a plane as far behind its surface as its own cell says.
 *
 * Source: `wireCellFPerM`; crossing of the helices: geometry of layers wound to and fro.
 */
export function facingFPerM2(face: Pick<Face, 'lower' | 'upper'> & Gap, fill: number, alignment: Alignment = 'crossing'): number {
  const { lower, upper } = face
  if (lower.kind === 'plane' && upper.kind === 'plane') return EPSILON_0_F_PER_M / (equivalentMm(face, fill) * 1e-3)
  if (lower.kind === 'plane') return rowFPerM2(upper as WireElectrode, face, 'plane', fill)
  if (upper.kind === 'plane') return rowFPerM2(lower, face, 'plane', fill)
  if (isEqual(lower, upper)) return equalFPerM2(lower, half(face), fill, alignment)
  return unequalFPerM2(lower, upper, face, fill)
}

/** Distance in vacuum that has the capacitance of two planes; never nought, so that touching foils stay finite. */
const equivalentMm = ({ tapeMm, tapePermittivity, airMm }: Gap, fill: number) => Math.max(1e-3, tapeMm / tapePermittivity + airMm / fill)

const half = <G extends Gap>(gap: G): G => ({ ...gap, tapeMm: gap.tapeMm / 2, airMm: gap.airMm / 2 })

const near = (a: number, b: number) => Math.abs(a - b) <= EQUAL_SHARE * Math.max(a, b)

const isEqual = (a: WireElectrode, b: WireElectrode) => near(a.pitchMm, b.pitchMm) && near(a.overallMm, b.overallMm) && near(a.conductorMm, b.conductorMm) && a.permittivity === b.permittivity

/** Each row against the plane of symmetry, two of them in series. */
function equalFPerM2(row: WireElectrode, toMiddle: Gap, fill: number, alignment: Alignment): number {
  const inLine = () => rowFPerM2(row, toMiddle, 'plane', fill) / 2
  const staggered = () => rowFPerM2(row, toMiddle, 'staggered', fill) / 2
  if (alignment === 'crossing') return (inLine() + staggered()) / 2
  return alignment === 'in-line' ? inLine() : staggered()
}

function unequalFPerM2(lower: WireElectrode, upper: WireElectrode, gap: Gap, fill: number): number {
  const [sparse, dense] = lower.pitchMm >= upper.pitchMm ? [lower, upper] : [upper, lower]
  const behindMm = Math.max(0, (EPSILON_0_F_PER_M / rowFPerM2(dense, half(gap), 'plane', fill)) * 1e3 - equivalentMm(half(gap), fill))
  return rowFPerM2(sparse, { ...gap, tapeMm: gap.tapeMm + behindMm * gap.tapePermittivity }, 'plane', fill)
}

/** One row of wires against a wall, per area of the layer. */
function rowFPerM2(row: WireElectrode, { tapeMm, tapePermittivity, airMm }: Gap, wall: CellWall, fill: number): number {
  const perWireFPerM = held([row.conductorMm, row.overallMm, row.pitchMm, row.permittivity, tapeMm, tapePermittivity, airMm, wall, fill].join(' '), () =>
    wireCellFPerM({
      conductorMm: row.conductorMm,
      overallMm: row.overallMm,
      pitchMm: Math.max(row.pitchMm, row.overallMm),
      airMm,
      tapeMm,
      enamelPermittivity: row.permittivity,
      tapePermittivity,
      fillPermittivity: fill,
      wall,
    }),
  )
  return perWireFPerM / (row.pitchMm * 1e-3)
}

/** Cells repeat from layer to layer and from one keystroke to the next. */
const MOST_HELD = 400
const heldCells = new Map<string, number>()

function held(key: string, cell: () => number): number {
  const known = heldCells.get(key)
  if (known !== undefined) return known
  const value = cell()
  if (heldCells.size >= MOST_HELD) heldCells.clear()
  heldCells.set(key, value)
  return value
}

/** Between the turns of one layer, all pairs, for one volt a turn: F·(V/turn)² is twice the energy. */
export function withinLayerF(layer: WireElectrode, fill: number, alone: boolean): number {
  if (layer.turns < 2) return 0
  const airMm = Math.max(0, layer.turnPitchMm - layer.parallel * layer.overallMm)
  const pairFPerM = turnToTurnFPerM({
    conductorMm: layer.conductorMm,
    overallMm: layer.overallMm,
    airMm,
    insulationPermittivity: layer.permittivity,
    fillPermittivity: fill,
    halfAngleRad: alone ? Math.PI / 2 : Math.PI / 6,
  })
  return (layer.turns - 1) * pairFPerM * layer.turnLengthMm * 1e-3
}

/**
 * The ends of two layers through the wall between sections, in F: the end wires of the stacked layers are a row whose pitch is the
 * height of a layer.
 *
 * Source: `facingFPerM2` turned by a quarter.
 */
export function flankF({ left, right, commonMm, wallMm, wallPermittivity, airMm }: Flank, fill: number): number {
  const upright = (layer: WireElectrode): WireElectrode => ({ ...layer, pitchMm: Math.max(layer.overallMm, layer.topMm - layer.bottomMm) })
  const gap = { tapeMm: wallMm, tapePermittivity: wallPermittivity, airMm }
  return facingFPerM2({ lower: upright(left), upper: upright(right), ...gap }, fill, 'in-line') * commonMm * 1e-3 * ((left.turnLengthMm + right.turnLengthMm) / 2) * 1e-3
}

/** Two layers wound together: every turn touches one of the other winding on either side but for the ends, F. */
export function besideF(one: WireElectrode, other: WireElectrode, fill: number): number {
  const pairFPerM = turnToTurnFPerM({
    conductorMm: Math.min(one.conductorMm, other.conductorMm),
    overallMm: Math.min(one.overallMm, other.overallMm),
    insulationPermittivity: Math.min(one.permittivity, other.permittivity),
    fillPermittivity: fill,
  })
  return Math.max(1, one.turns + other.turns - 1) * pairFPerM * ((one.turnLengthMm + other.turnLengthMm) / 2) * 1e-3
}

/** Length of turn along which two electrodes face each other, m. */
export const facingLengthM = (lower: Electrode, upper: Electrode): number => ((lower.turnLengthMm + upper.turnLengthMm) / 2) * 1e-3 * Math.min(coverOf(lower), coverOf(upper))

const coverOf = (electrode: Electrode) => (electrode.kind === 'plane' ? (electrode satisfies PlaneElectrode).cover : 1)

import { requireNotNegative, requirePositive } from '../require'
import { solveLinear } from '../solve-linear'

/** Electric constant, F/m. Source: CODATA 2018. */
export const EPSILON_0_F_PER_M = 8.8541878128e-12

/** Where the field of a layer of wires ends behind the tape. */
export type CellWall =
  /** A conducting plane: foil, shield, core, or the plane of symmetry between two layers in line. */
  | 'plane'
  /** The plane of symmetry between two equal layers that stand half a pitch apart. */
  | 'staggered'

export interface WireCellInput {
  conductorMm: number
  /** Over the enamel or the extruded insulation. */
  overallMm: number
  /** From wire to wire along the layer. */
  pitchMm: number
  /** From the wires' overall surface to the tape. */
  airMm?: number
  /** From the surface of the tape to the wall. */
  tapeMm: number
  enamelPermittivity: number
  tapePermittivity: number
  /** Of what lies between the wires: 1 for air, more when impregnated. */
  fillPermittivity?: number
  wall: CellWall
}

/** Multipoles per wire: ten give the field of touching wires on 0.1 mm of tape within 0.1 %. */
const MULTIPOLES = 10

/**
 * Capacitance of one wire of a layer to the wall behind the tape, per length of wire, in F/m: an endless row of coated
 * round wires at one potential, a slab of tape, and no field on the far side of the row.
 *
 * The potential around each wire is a series of line multipoles. The coating answers each of them by a factor, the other
 * wires of the row act by lattice sums, and the tape reflects each spatial harmonic of the row by its own coefficient; what
 * remains is one small linear system. Between two layers in line the middle of the tape is an equipotential; half a
 * pitch apart it is one for even harmonics and a line of flow for odd ones. No parallel plate is assumed anywhere.
 *
 * Source: Lord Rayleigh, Phil. Mag. 34 (1892) 481 (rows of cylinders by multipoles); reflection at a dielectric slab
 * by separation of variables.
 *
 * @throws RangeError unless lengths are positive (air and tape not negative), overall ≥ conductor, pitch ≥ overall, and permittivities ≥ 1
 */
export function wireCellFPerM(input: WireCellInput): number {
  const cell = dimensionless(input)
  const multipoles = solveLinear(...system(cell))
  if (!multipoles) throw new RangeError('the multipoles of the row cannot be told apart')
  return 2 * Math.PI * EPSILON_0_F_PER_M * (input.fillPermittivity ?? 1) / potential(cell, multipoles)
}

/** The cell in units of the wire's overall radius, permittivities over that of the fill. */
interface Cell {
  /** Conductor radius. */
  conductor: number
  pitch: number
  /** Centre of the wire to the tape. */
  height: number
  tape: number
  enamel: number
  tapePermittivity: number
  /** Spatial harmonics of the row at the tape: wave number, reflection with the way there and back. */
  harmonics: readonly { number: number; k: number; reflected: number }[]
}

function dimensionless(input: WireCellInput): Cell {
  const { conductorMm, overallMm, pitchMm, airMm = 0, tapeMm, fillPermittivity = 1 } = input
  requirePositive('conductorMm', conductorMm)
  requireNotNegative('airMm', airMm)
  requireNotNegative('tapeMm', tapeMm)
  if (!(overallMm >= conductorMm && Number.isFinite(overallMm))) throw new RangeError(`overallMm must be at least conductorMm ${conductorMm}: ${overallMm}`)
  if (!(pitchMm >= overallMm * (1 - 1e-9) && Number.isFinite(pitchMm))) throw new RangeError(`pitchMm must be at least overallMm ${overallMm}: ${pitchMm}`)
  for (const name of ['enamelPermittivity', 'tapePermittivity'] as const) requirePermittivity(name, input[name])
  requirePermittivity('fillPermittivity', fillPermittivity)
  if (!(overallMm + airMm + tapeMm > conductorMm)) throw new RangeError('overallMm, airMm and tapeMm leave no insulation')
  const radius = overallMm / 2
  const cell = {
    conductor: conductorMm / overallMm,
    pitch: pitchMm / radius,
    height: 1 + airMm / radius,
    tape: tapeMm / radius,
    enamel: input.enamelPermittivity / fillPermittivity,
    tapePermittivity: input.tapePermittivity / fillPermittivity,
  }
  return { ...cell, harmonics: harmonicsOf(cell, input.wall) }
}

function requirePermittivity(name: string, value: number): void {
  if (!(value >= 1 && Number.isFinite(value))) throw new RangeError(`${name} must be 1 or more: ${value}`)
}

/** Harmonics beyond these are weaker than 10⁻⁶ at the tape even for the highest multipole. */
function harmonicsOf({ pitch, height, tape, tapePermittivity }: Omit<Cell, 'harmonics'>, wall: CellWall): Cell['harmonics'] {
  const count = Math.ceil((pitch * (MULTIPOLES + 12)) / (2 * Math.PI * height)) + 2
  return Array.from({ length: count }, (_, index) => {
    const number = index + 1
    const k = (2 * Math.PI * number) / pitch
    const isFlowLine = wall === 'staggered' && number % 2 === 1
    const slope = tape === 0 && isFlowLine ? 0 : tapePermittivity * (isFlowLine ? Math.tanh(k * tape) : 1 / Math.tanh(k * tape))
    const reflection = slope === Infinity ? -1 : (1 - slope) / (1 + slope)
    return { number, k, reflected: reflection * Math.exp(-2 * k * height) }
  })
}

/** How strongly a coated wire answers a multipole of the field around it. */
function coatingAnswer({ conductor, enamel }: Cell, order: number): number {
  const image = conductor ** (2 * order)
  return (1 - image - enamel * (1 + image)) / (1 - image + enamel * (1 + image))
}

/** Σ over the other wires of the row of (i·j·pitch)^−order: zero for odd orders. */
const latticeSum = (order: number, pitch: number) => (order % 2 === 1 ? 0 : (2 * (order % 4 === 0 ? 1 : -1) * zeta(order)) / pitch ** order)

/** Matrix and right side for the regular field at each wire, charge such that 2πε0·V = 1/C. */
function system(cell: Cell): [matrix: number[][], right: number[]] {
  const { pitch, harmonics } = cell
  const reflectedPowers = Array.from({ length: 2 * MULTIPOLES }, (_, power) => harmonics.reduce((sum, { k, reflected }) => sum + reflected * k ** power, 0))
  const answers = Array.from({ length: MULTIPOLES }, (_, index) => coatingAnswer(cell, index + 1))
  const matrix = answers.map((_, row) =>
    answers.map((answer, column) => {
      const [l, m] = [row + 1, column + 1]
      const neighbours = (m % 2 === 0 ? 1 : -1) * binomial(m + l - 1, l) * latticeSum(m + l, pitch)
      const tape = ((2 * Math.PI) / pitch) * (reflectedPowers[m - 1 + l]! / (factorial(m - 1) * factorial(l)))
      return (l === m ? 1 : 0) - answer * (neighbours + tape)
    }),
  )
  const right = answers.map((_, row) => {
    const l = row + 1
    const row1 = l % 2 === 0 ? ((l % 4 === 0 ? 1 : -1) * zeta(l) * 2) / l / pitch ** l : 0
    const oneSided = l === 1 ? -Math.PI / pitch : 0
    return row1 + oneSided + harmonics.reduce((sum, { number, k, reflected }) => sum + (reflected * k ** l) / number, 0) / factorial(l)
  })
  return [matrix, right]
}

/** Potential of the conductors over the wall, for a charge of 2πε0 per length. */
function potential(cell: Cell, regular: readonly number[]): number {
  const { pitch, height, tape, tapePermittivity, harmonics, conductor, enamel } = cell
  const multipoles = regular.map((value, index) => value * coatingAnswer(cell, index + 1))
  const straight = ((2 * Math.PI) / pitch) * (height + tape / tapePermittivity) - (multipoles[0]! * Math.PI) / pitch - Math.log((2 * Math.PI) / pitch)
  const neighbours = multipoles.reduce((sum, value, index) => sum + (index % 2 === 1 ? value * latticeSum(index + 1, pitch) : 0), 0)
  const reflected = harmonics.reduce((sum, { number, k, reflected: share }) => {
    const incident = 1 / number + ((2 * Math.PI) / pitch) * multipoles.reduce((total, value, index) => total + (value * k ** index) / factorial(index), 0)
    return sum + share * incident
  }, 0)
  return straight + neighbours + reflected - Math.log(conductor) / enamel
}

// ---------------------------------------------------------------------------------------------

const FACTORIALS = Array.from({ length: 2 * MULTIPOLES + 1 }).reduce<number[]>((list, _, index) => [...list, index === 0 ? 1 : list[index - 1]! * index], [])
const factorial = (n: number) => FACTORIALS[n]!
const binomial = (n: number, k: number) => factorial(n) / (factorial(k) * factorial(n - k))

/** Riemann's zeta at a whole number from 2 on: forty terms and the integral of the rest with its end correction. */
const ZETAS = Array.from({ length: 2 * MULTIPOLES + 1 }, (_, s) => {
  if (s < 2) return NaN
  let sum = 0
  for (let n = 1; n < 40; n++) sum += n ** -s
  return sum + 40 ** (1 - s) / (s - 1) + 40 ** -s / 2 + (s * 40 ** (-s - 1)) / 12
})
const zeta = (s: number) => ZETAS[s]!

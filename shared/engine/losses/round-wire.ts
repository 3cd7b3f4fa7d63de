import { requireBetween, requireNotNegative, requirePositive } from '../require'

export interface Complex {
  re: number
  im: number
}

/**
 * What a straight round wire does in a field that alternates: its ac resistance, and the strengths of the line dipole and line
 * quadrupole that its eddy currents put up against a uniform field and against a field that grows along the wire's breadth.
 */
export interface RoundWireResponse {
  /** Ratio of ac to dc resistance of the wire alone, Re{(z/2)·J0(z)/J1(z)}. */
  skinFactor: number
  /** J2(z)/J0(z): 0 for a thin wire, −1 for one that keeps the field out. */
  dipole: Complex
  /** J3(z)/J1(z), the same for a field gradient. */
  quadrupole: Complex
}

/** From this d/δ on the asymptotic series is exact to twelve digits. */
const ASYMPTOTIC_FROM = 40

/** Beyond this the functions differ from their limits by less than the resistivity of copper is known. */
const GREATEST_DIAMETER_IN_SKIN_DEPTHS = 1e7

/**
 * Response of a round wire at a diameter over skin depth of d/δ, with z = (1 − j)·d/(2δ).
 *
 * The ratios r_n = J_n/J_(n−1) follow from r_n = 1/(2n/z − r_(n+1)) backwards, which is stable; for thick wires from
 * Hankel's asymptotic series. Source: Kelvin's solution of the round wire, and the conducting cylinder across a field
 * (J. Lammeraner and M. Štafl, Eddy Currents, 1966); NIST DLMF 10.6.1 and 10.17.3.
 *
 * @throws RangeError unless d/δ lies between 0 and 10⁷
 */
export function roundWireResponse(diameterInSkinDepths: number): RoundWireResponse {
  requireBetween('diameterInSkinDepths', diameterInSkinDepths, 0, GREATEST_DIAMETER_IN_SKIN_DEPTHS)
  if (diameterInSkinDepths === 0) return { skinFactor: 1, dipole: { re: 0, im: 0 }, quadrupole: { re: 0, im: 0 } }
  const x = diameterInSkinDepths / 2
  const { r1, r2, r3 } = diameterInSkinDepths < ASYMPTOTIC_FROM ? recurredRatios(x) : asymptoticRatios(x)
  // (z/2)/r1 with z = x·(1 − j).
  const skinFactor = ((x / 2) * (r1.re - r1.im)) / (r1.re ** 2 + r1.im ** 2)
  return { skinFactor, dipole: product(r1, r2), quadrupole: product(r2, r3) }
}

/** r1 = J1/J0, r2 = J2/J1, r3 = J3/J2. */
interface Ratios {
  r1: Complex
  r2: Complex
  r3: Complex
}

const product = (a: Complex, b: Complex): Complex => ({ re: a.re * b.re - a.im * b.im, im: a.re * b.im + a.im * b.re })

function recurredRatios(x: number): Ratios {
  let r3 = { re: 0, im: 0 }
  let r2 = r3
  let re = 0
  let im = 0
  for (let n = Math.ceil(Math.SQRT2 * x) + 14; n >= 1; n--) {
    // 2n/z = (n/x)·(1 + j) for z = x·(1 − j).
    const denominatorRe = n / x - re
    const denominatorIm = n / x - im
    const square = denominatorRe * denominatorRe + denominatorIm * denominatorIm
    re = denominatorRe / square
    im = -denominatorIm / square
    if (n === 3) r3 = { re, im }
    else if (n === 2) r2 = { re, im }
  }
  return { r1: { re, im }, r2, r3 }
}

function asymptoticRatios(x: number): Ratios {
  const series = [0, 1, 2, 3].map((order) => hankelSeries(order, x))
  // J_n/J_(n−1) = −j times the ratio of the series, since exp(jz) outweighs exp(−jz).
  const ratio = (n: number): Complex => {
    const quotient = divide(series[n]!, series[n - 1]!)
    return { re: quotient.im, im: -quotient.re }
  }
  return { r1: ratio(1), r2: ratio(2), r3: ratio(3) }
}

const divide = (a: Complex, b: Complex): Complex => {
  const square = b.re ** 2 + b.im ** 2
  return { re: (a.re * b.re + a.im * b.im) / square, im: (a.im * b.re - a.re * b.im) / square }
}

/** Σ (j/z)^k·a_k(ν), a_k = Π(4ν² − (2i − 1)²)/(k!·8^k), z = x·(1 − j), so that j/z = (−1 + j)/(2x). */
function hankelSeries(order: number, x: number): Complex {
  const step: Complex = { re: -1 / (2 * x), im: 1 / (2 * x) }
  let term: Complex = { re: 1, im: 0 }
  const sum = { ...term }
  for (let k = 1; k <= 10; k++) {
    const factor = (4 * order * order - (2 * k - 1) ** 2) / (8 * k)
    term = product(term, { re: step.re * factor, im: step.im * factor })
    sum.re += term.re
    sum.im += term.im
  }
  return sum
}

/**
 * Ratio of ac to dc resistance of a round wire alone in space, by its diameter over skin depth.
 *
 * Source: Kelvin's exact solution in Bessel functions.
 *
 * @throws RangeError unless d/δ lies between 0 and 10⁷
 */
export const skinFactor = (diameterInSkinDepths: number): number => roundWireResponse(diameterInSkinDepths).skinFactor

export interface ProximityLossInput {
  diameterMm: number
  skinDepthMm: number
  resistivityOhmM: number
}

/**
 * Loss of a metre of round wire in a uniform field across it, in W/m per (A/m)² of the field's rms value; half of it per (A/m)²
 * of the peak:
 *
 *     G = π·ρ·(d/δ)²·(−Im J2(z)/J0(z))
 *
 * For thin wires it tends to π·ω²·µ0²·d⁴/(64·ρ). The field is the one without this wire's eddy currents.
 * Source: conducting cylinder across a field (Lammeraner and Štafl 1966; J. Ferreira, IEEE Trans. Power Electron. 9 (1994)
 * 127); limit: C. Sullivan, IEEE Trans. Power Electron. 14 (1999) 283.
 *
 * @throws RangeError unless the diameter is not negative and skin depth and resistivity are positive
 */
export function proximityLossPerMetre({ diameterMm, skinDepthMm, resistivityOhmM }: ProximityLossInput): number {
  requireNotNegative('diameterMm', diameterMm)
  requirePositive('skinDepthMm', skinDepthMm)
  requirePositive('resistivityOhmM', resistivityOhmM)
  const ratio = diameterMm / skinDepthMm
  return Math.PI * resistivityOhmM * ratio ** 2 * -roundWireResponse(ratio).dipole.im
}

/**
 * Factor on the proximity loss of a wire that lies in a row of its like, since the neighbours' eddy currents weaken a field
 * along the row and strengthen one across it:
 *
 *     1/|1 ∓ s·J2/J0|²,  s = (d/2)²·Σ 1/x²
 *
 * x are the distances to the other wires of the row; an endless row of pitch p has s = (π²/3)·(d/2p)².
 * Source: line dipoles of cylinders in a row, Lord Rayleigh, Phil. Mag. 34 (1892) 481, first order.
 *
 * @throws RangeError when s is negative
 */
export function rowReaction(dipole: Complex, packing: number): { along: number; across: number } {
  requireNotNegative('packing', packing)
  const im = (packing * dipole.im) ** 2
  return { along: 1 / ((1 - packing * dipole.re) ** 2 + im), across: 1 / ((1 + packing * dipole.re) ** 2 + im) }
}

/**
 * What the currents of its neighbours add to the ac resistance of a wire in a row, relative to its dc resistance: at each wire
 * their fields cancel and leave a gradient, whose eddy loss is
 *
 *     (d/δ)²·s²/8·(−Im J3(z)/J1(z))
 *
 * Source: conducting cylinder in a two-dimensional field of order two, as `rowReaction`.
 *
 * @throws RangeError when s is negative
 */
export function rowGradientFactor({ diameterInSkinDepths, quadrupole, packing }: { diameterInSkinDepths: number; quadrupole: Complex; packing: number }): number {
  requireNotNegative('packing', packing)
  return ((diameterInSkinDepths * packing) ** 2 / 8) * -quadrupole.im
}

/** Exact solutions for a lone round wire, by the power series of the Bessel functions: what the field figures are judged with. */

type Complex = readonly [number, number]

const times = (a: Complex, b: Complex): Complex => [a[0] * b[0] - a[1] * b[1], a[0] * b[1] + a[1] * b[0]]

function over(a: Complex, b: Complex): Complex {
  const square = b[0] ** 2 + b[1] ** 2
  return [(a[0] * b[0] + a[1] * b[1]) / square, (a[1] * b[0] - a[0] * b[1]) / square]
}

function besselJ(order: number, z: Complex): Complex {
  const half: Complex = [z[0] / 2, z[1] / 2]
  let term: Complex = [1, 0]
  for (let n = 1; n <= order; n++) term = times(term, [half[0] / n, half[1] / n])
  const step = times(half, half)
  let sum = term
  for (let k = 1; k < 80; k++) {
    const next = times(term, step)
    term = [-next[0] / (k * (k + order)), -next[1] / (k * (k + order))]
    sum = [sum[0] + term[0], sum[1] + term[1]]
  }
  return sum
}

export const SIGMA_S_PER_M = 5.8e7
const MU_0 = 4e-7 * Math.PI

const argument = (diameterM: number, frequencyHz: number): Complex => {
  const inDepths = (diameterM / 2) * Math.sqrt(Math.PI * frequencyHz * MU_0 * SIGMA_S_PER_M)
  return [inDepths, -inDepths]
}

export const dcResistanceOhmPerM = (diameterM: number): number => 4 / (SIGMA_S_PER_M * Math.PI * diameterM ** 2)

/** Ratio of ac to dc resistance of the wire alone. */
export function skinFactor(diameterM: number, frequencyHz: number): number {
  const z = argument(diameterM, frequencyHz)
  return times(z, over(besselJ(0, z), besselJ(1, z)))[0] / 2
}

/** Loss per metre in an even transverse field of peak 1 A/m, W/m: −π·ω·µ0·r²·Im(J2(z)/J0(z)), z = (1 − j)·r/δ. Source: C. Sullivan, IEEE Trans. Power Electron. 14 (1999) 283. */
export function transverseLossWPerM(diameterM: number, frequencyHz: number): number {
  const z = argument(diameterM, frequencyHz)
  return -Math.PI * 2 * Math.PI * frequencyHz * MU_0 * (diameterM / 2) ** 2 * over(besselJ(2, z), besselJ(0, z))[1]
}

import { besselj } from 'bessel'
import { proximityLossPerMetre, roundWireResponse, rowGradientFactor, rowReaction, skinFactor } from '#shared/engine/losses/round-wire'
import { describe, expect, it } from 'vitest'
import { expectWithin } from './relative'

interface Complex {
  re: number
  im: number
}

const times = (a: Complex, b: Complex): Complex => ({ re: a.re * b.re - a.im * b.im, im: a.re * b.im + a.im * b.re })
const over = (a: Complex, b: Complex): Complex => {
  const square = b.re ** 2 + b.im ** 2
  return { re: (a.re * b.re + a.im * b.im) / square, im: (a.im * b.re - a.re * b.im) / square }
}
const turned = (angle: number, length: number): Complex => ({ re: length * Math.cos(angle), im: length * Math.sin(angle) })

/**
 * Kelvin's ber_ν(y) + j·bei_ν(y) = J_ν(y·exp(3πj/4)) from Bessel functions of a real argument, which a general-purpose package has:
 * Σ exp((3ν + k)πj/4)·y^k·J_(ν+k)(y)/(2^(k/2)·k!). Source: NIST DLMF 10.66.1.
 */
function kelvin(order: number, y: number): Complex {
  const sum = { re: 0, im: 0 }
  let factor = 1
  for (let k = 0; k < 60; k++) {
    const term = turned(((3 * order + k) * Math.PI) / 4, factor * besselj(y, order + k))
    sum.re += term.re
    sum.im += term.im
    factor *= y / (Math.SQRT2 * (k + 1))
  }
  return sum
}

/** J_n((1 − j)·x) = (−1)^n·(ber_n + j·bei_n)(x·√2), since exp(3πj/4) is −(1 − j)/√2. */
const ofWire = (order: number, x: number): Complex => times({ re: (-1) ** order, im: 0 }, kelvin(order, x * Math.SQRT2))

// Source: package bessel (Apache-2.0), functions of a real argument, and the series of NIST DLMF 10.66.1.
describe('cylinder functions against a general-purpose package', () => {
  it.each([0.2, 0.5, 1, 1.5, 2, 3, 4, 6, 8])('d/δ = %d', (ratio) => {
    const [j0, j1, j2, j3] = [0, 1, 2, 3].map((order) => ofWire(order, ratio / 2)) as [Complex, Complex, Complex, Complex]
    const response = roundWireResponse(ratio)
    const z = { re: ratio / 4, im: -ratio / 4 }
    expectWithin(response.skinFactor, times(z, over(j0, j1)).re, 2e-7)
    const [dipole, quadrupole] = [over(j2, j0), over(j3, j1)]
    for (const [own, other] of [[response.dipole, dipole], [response.quadrupole, quadrupole]] as const) {
      expect(Math.hypot(own.re - other.re, own.im - other.im) / Math.hypot(other.re, other.im)).toBeLessThan(2e-6)
    }
  })
})

// Source: exact solution in Bessel functions, own arbitrary-precision values.
describe('round wire alone', () => {
  it.each([[1, 1.0013], [1.5, 1.00656], [2, 1.02049], [3, 1.09733], [4, 1.26464], [6, 1.76813]])('d/δ %d: %d', (ratio, factor) => expectWithin(skinFactor(ratio), factor, 2e-5))

  // Source: d/(4δ) + 1/4 + 3δ/(32·d/2): Hankel's series of the two functions, first terms.
  it.each([60, 200, 1000])('thick wire, d/δ = %d', (ratio) => expectWithin(skinFactor(ratio), ratio / 4 + 1 / 4 + 3 / (16 * ratio), 1e-5))

  // Source: first term of the power series, 1 + (d/δ)⁴/768.
  it.each([0.1, 0.4])('thin wire, d/δ = %d', (ratio) => expectWithin(skinFactor(ratio) - 1, ratio ** 4 / 768, 0.01))

  it('does not jump where the asymptotic series takes over', () => {
    const [below, above] = [roundWireResponse(40 * (1 - 1e-12)), roundWireResponse(40)]
    expectWithin(below.skinFactor, above.skinFactor, 1e-11)
    expectWithin(below.dipole.im, above.dipole.im, 1e-10)
    expectWithin(below.quadrupole.im, above.quadrupole.im, 1e-10)
  })

  // McLyman's Table 4-13 takes a ring of one skin depth; the exact figures differ from it by up to 5 %.
  it.each([
    { gauge: 20, diameterMm: 0.81182, handbook: 1.303, exact: 1.238 },
    { gauge: 24, diameterMm: 0.51056, handbook: 1.033, exact: 1.045 },
    { gauge: 18, diameterMm: 1.02369, handbook: 1.53, exact: 1.472 },
  ])('AWG $gauge at 100 kHz: handbook $handbook, exact $exact', ({ diameterMm, handbook, exact }) => {
    // The handbook's skin depth at 20 °C, 6.62 cm/√f.
    const depthMm = 66.2 / Math.sqrt(100e3)
    const factor = skinFactor(diameterMm / depthMm)
    expectWithin(factor, exact, 5e-3)
    expectWithin(diameterMm ** 2 / (diameterMm ** 2 - (diameterMm - 2 * depthMm) ** 2), handbook, 5e-3)
    expectWithin(factor, handbook, 0.055)
  })
})

describe('wire across a field', () => {
  const resistivityOhmM = 1 / 58e6
  const depthMm = (frequencyHz: number) => 1e3 * Math.sqrt(resistivityOhmM / (Math.PI * 4e-7 * Math.PI * frequencyHz))

  // Source: C. Sullivan, IEEE Trans. Power Electron. 14 (1999) 283: π·ω²·B²·d⁴/(64·ρ) with B rms.
  it.each([[0.05, 100e3], [0.1, 50e3], [0.02, 1e6]])('thin wire of %d mm at %d Hz', (diameterMm, frequencyHz) => {
    const thin = (Math.PI * (2 * Math.PI * frequencyHz * 4e-7 * Math.PI) ** 2 * (diameterMm * 1e-3) ** 4) / (64 * resistivityOhmM)
    expectWithin(proximityLossPerMetre({ diameterMm, skinDepthMm: depthMm(frequencyHz), resistivityOhmM }), thin, 5e-3)
  })

  // Source: plane surface under the tangential field 2·H·sin θ of a cylinder that keeps the field out: ρ/δ·2·H²·2π·(d/2).
  it('thick wire: surface loss', () => {
    const [diameterMm, skinDepthMm] = [2, 0.002]
    expectWithin(proximityLossPerMetre({ diameterMm, skinDepthMm, resistivityOhmM }), (2 * Math.PI * diameterMm * resistivityOhmM) / skinDepthMm, 5e-3)
  })

  it('grows as f² in thin and as √f in thick wire', () => {
    const loss = (diameterMm: number, frequencyHz: number) => proximityLossPerMetre({ diameterMm, skinDepthMm: depthMm(frequencyHz), resistivityOhmM })
    expectWithin(loss(0.02, 2e5) / loss(0.02, 1e5), 4, 1e-4)
    expectWithin(loss(20, 2e6) / loss(20, 1e6), Math.SQRT2, 0.01)
  })
})

describe('wire in a row', () => {
  it('leaves a thin wire’s loss alone', () => {
    const { dipole, quadrupole } = roundWireResponse(0.1)
    expectWithin(rowReaction(dipole, 0.5).along, 1, 1e-5)
    expect(rowGradientFactor({ diameterInSkinDepths: 0.1, quadrupole, packing: 0.5 })).toBeLessThan(1e-6)
  })
  it('screens a field along the row and gathers one across it', () => {
    const { along, across } = rowReaction(roundWireResponse(6).dipole, 0.5)
    expect(along).toBeLessThan(0.7)
    expect(across).toBeGreaterThan(1.5)
  })
})

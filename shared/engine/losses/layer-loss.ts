import { requireNotNegative, requirePositive } from '../require'
import type { Complex } from './round-wire'

/** Beyond this the hyperbolic quotients are 1 to all digits, and cosh would overflow. */
const SATURATED = 40

export interface LayerLossInput {
  /** Field along the layer on its inner and outer face, rms, A/m; their difference is the current per metre of breadth. */
  innerA: Complex
  outerA: Complex
  heightMm: number
  skinDepthMm: number
  resistivityOhmM: number
}

/**
 * Loss of a layer that fills its breadth, in watt per square metre of face:
 *
 *     (ρ/δ)·[(|H_i|² + |H_o|²)·g1 − 4·Re(H_i·H_o*)·g2]
 *     g1 = (sinh 2ξ + sin 2ξ)/(cosh 2ξ − cos 2ξ),  g2 = (sinh ξ·cos ξ + cosh ξ·sin ξ)/(cosh 2ξ − cos 2ξ),  ξ = h/δ
 *
 * One-dimensional field, complex on each face, so that windings which conduct at different times count by their phases.
 * Source: J.-P. Vandelac and P. Ziogas, IEEE Trans. Power Electron. 3 (1988) 334; P. Dowell, Proc. IEE 113 (1966) 1387.
 *
 * @throws RangeError unless height, skin depth and resistivity are positive
 */
export function layerLossWPerM2({ innerA, outerA, heightMm, skinDepthMm, resistivityOhmM }: LayerLossInput): number {
  requirePositive('resistivityOhmM', resistivityOhmM)
  const xi = thickness(heightMm, skinDepthMm)
  const squares = innerA.re ** 2 + innerA.im ** 2 + outerA.re ** 2 + outerA.im ** 2
  const perM = resistivityOhmM / (skinDepthMm * 1e-3)
  if (xi > SATURATED) return perM * squares
  const mixed = innerA.re * outerA.re + innerA.im * outerA.im
  const divisor = Math.cosh(2 * xi) - Math.cos(2 * xi)
  const own = (Math.sinh(2 * xi) + Math.sin(2 * xi)) / divisor
  const coupled = (Math.sinh(xi) * Math.cos(xi) + Math.cosh(xi) * Math.sin(xi)) / divisor
  return perM * (squares * own - 4 * mixed * coupled)
}

function thickness(heightMm: number, skinDepthMm: number): number {
  requirePositive('heightMm', heightMm)
  requirePositive('skinDepthMm', skinDepthMm)
  return heightMm / skinDepthMm
}

/**
 * Ratio of ac to dc resistance of a foil by its own current alone, which has opposite fields on its faces:
 * (ξ/2)·(sinh ξ + sin ξ)/(cosh ξ − cos ξ), ξ = h/δ.
 *
 * Source: as `layerLossWPerM2`; J. Ferreira, IEEE Trans. Power Electron. 9 (1994) 127 (skin and proximity are orthogonal).
 *
 * @throws RangeError unless height and skin depth are positive
 */
export function foilSkinFactor(heightMm: number, skinDepthMm: number): number {
  const xi = thickness(heightMm, skinDepthMm)
  if (xi > SATURATED) return xi / 2
  return ((xi / 2) * (Math.sinh(xi) + Math.sin(xi))) / (Math.cosh(xi) - Math.cos(xi))
}

/**
 * Loss of a metre of foil in a field along it, equal on both faces, in W/m per (A/m)² of the field's rms value:
 * 2·b·(ρ/δ)·(sinh ξ − sin ξ)/(cosh ξ + cos ξ).
 *
 * Source: as `foilSkinFactor`. The ends of the foil are not in it.
 *
 * @throws RangeError unless the breadth is not negative and height, skin depth and resistivity are positive
 */
export function foilProximityLossPerMetre({ heightMm, skinDepthMm, breadthMm, resistivityOhmM }: { heightMm: number; skinDepthMm: number; breadthMm: number; resistivityOhmM: number }): number {
  requireNotNegative('breadthMm', breadthMm)
  requirePositive('resistivityOhmM', resistivityOhmM)
  const xi = thickness(heightMm, skinDepthMm)
  const quotient = xi > SATURATED ? 1 : (Math.sinh(xi) - Math.sin(xi)) / (Math.cosh(xi) + Math.cos(xi))
  return 2 * (breadthMm / skinDepthMm) * resistivityOhmM * quotient
}

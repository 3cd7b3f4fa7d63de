import { modifiedBessel } from './bessel'

/**
 * What one axial wave cos q·y does across the window: potential A and axial field −(1/r)·d(rA)/dr of the solution that has
 * no tangential field at the leg (`inner`) and of the one that has none at the outer wall (`outer`). The response at r to a
 * unit of the wave at s is `scale · weight(s) · A_inner(the smaller) · A_outer(the greater)`.
 */
export interface RadialWave {
  at: (radialMm: number) => RadialPoint
  scale: number
}

export interface RadialPoint {
  innerA: number
  innerH: number
  outerA: number
  outerH: number
  weight: number
}

/** Beyond this product of wave number and radius the exponentials would overflow. */
export const GREATEST_ARGUMENT = 300

/**
 * In a plane: cosh q·x and cosh q·(h − x) over q·sinh q·h.
 *
 * Source: Laplace's equation, separated; E. Roth (1928) in its single-series form.
 */
export function planeWave(q: number, heightMm: number): RadialWave {
  return {
    scale: 1 / (q * Math.sinh(q * heightMm)),
    at: (x) => ({
      innerA: Math.cosh(q * x),
      innerH: -q * Math.sinh(q * x),
      outerA: Math.cosh(q * (heightMm - x)),
      outerH: q * Math.sinh(q * (heightMm - x)),
      weight: 1,
    }),
  }
}

/**
 * Round a leg: I1 and K1, with I0 and K0 at the walls.
 *
 * Source: L. Rabins, Trans. AIEE 75 III (1956) 261: separated in cylindrical coordinates.
 */
export function cylinderWave(q: number, legRadiusMm: number, heightMm: number): RadialWave {
  const leg = modifiedBessel(q * legRadiusMm)
  const wall = modifiedBessel(q * (legRadiusMm + heightMm))
  return {
    scale: 1 / (leg.k0 * wall.i0 - leg.i0 * wall.k0),
    at: (radialMm) => {
      const { i0, i1, k0, k1 } = modifiedBessel(q * (legRadiusMm + radialMm))
      return {
        innerA: leg.k0 * i1 + leg.i0 * k1,
        innerH: -q * (leg.k0 * i0 - leg.i0 * k0),
        outerA: wall.k0 * i1 + wall.i0 * k1,
        outerH: -q * (wall.k0 * i0 - wall.i0 * k0),
        weight: legRadiusMm + radialMm,
      }
    },
  }
}

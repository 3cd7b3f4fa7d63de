import { requirePositive } from '../require'

/** Modified Bessel functions of order 0 and 1 at one argument. */
export interface ModifiedBessel {
  i0: number
  i1: number
  k0: number
  k1: number
}

const polynomial = (t: number, coefficients: readonly number[]): number => coefficients.reduceRight((sum, coefficient) => sum * t + coefficient, 0)

const I0_SMALL = [1, 3.5156229, 3.0899424, 1.2067492, 0.2659732, 0.0360768, 0.0045813]
const I1_SMALL = [0.5, 0.87890594, 0.51498869, 0.15084934, 0.02658733, 0.00301532, 0.00032411]
const I0_LARGE = [0.39894228, 0.01328592, 0.00225319, -0.00157565, 0.00916281, -0.02057706, 0.02635537, -0.01647633, 0.00392377]
const I1_LARGE = [0.39894228, -0.03988024, -0.00362018, 0.00163801, -0.01031555, 0.02282967, -0.02895312, 0.01787654, -0.00420059]
const K0_SMALL = [-0.57721566, 0.4227842, 0.23069756, 0.0348859, 0.00262698, 0.0001075, 0.0000074]
const K1_SMALL = [1, 0.15443144, -0.67278579, -0.18156897, -0.01919402, -0.00110404, -0.00004686]
const K0_LARGE = [1.25331414, -0.07832358, 0.02189568, -0.01062446, 0.00587872, -0.0025154, 0.00053208]
const K1_LARGE = [1.25331414, 0.23498619, -0.0365562, 0.01504268, -0.00780353, 0.00325614, -0.00068245]

/**
 * I0, I1, K0 and K1 of a positive argument, each within 2·10⁻⁷ of itself.
 *
 * Source: M. Abramowitz, I. Stegun, Handbook of Mathematical Functions, 9.8.1 to 9.8.8.
 *
 * @throws RangeError unless the argument is positive
 */
export function modifiedBessel(x: number): ModifiedBessel {
  requirePositive('x', x)
  const growth = Math.exp(x) / Math.sqrt(x)
  const small = (x / 3.75) ** 2
  const i0 = x < 3.75 ? polynomial(small, I0_SMALL) : growth * polynomial(3.75 / x, I0_LARGE)
  const i1 = x < 3.75 ? x * polynomial(small, I1_SMALL) : growth * polynomial(3.75 / x, I1_LARGE)
  if (x > 2) {
    const decay = 1 / (growth * x)
    return { i0, i1, k0: decay * polynomial(2 / x, K0_LARGE), k1: decay * polynomial(2 / x, K1_LARGE) }
  }
  const quarter = (x * x) / 4
  return { i0, i1, k0: -Math.log(x / 2) * i0 + polynomial(quarter, K0_SMALL), k1: Math.log(x / 2) * i1 + polynomial(quarter, K1_SMALL) / x }
}

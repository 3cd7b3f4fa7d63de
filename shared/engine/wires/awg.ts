import { requireBetween, requirePositive } from '../require'

/**
 * Bare diameter of an AWG size, d = 0.127 mm·92^((36 − n)/39). Sizes 1/0 to 4/0 are 0 to −3.
 *
 * Source: ASTM B258.
 *
 * @throws RangeError unless the gauge is a whole number from −3 to 56
 */
export function awgDiameterMm(gauge: number): number {
  requireBetween('gauge', gauge, -3, 56)
  if (!Number.isInteger(gauge)) throw new RangeError(`gauge must be a whole number: ${gauge}`)
  return 0.127 * 92 ** ((36 - gauge) / 39)
}

/**
 * AWG size whose diameter is nearest by ratio, the inverse of `awgDiameterMm` rounded to a size.
 *
 * Source: ASTM B258.
 *
 * @throws RangeError unless the diameter is positive
 */
export function nearestAwg(diameterMm: number): number {
  requirePositive('diameterMm', diameterMm)
  return Math.round(36 - (39 * Math.log(diameterMm / 0.127)) / Math.log(92))
}

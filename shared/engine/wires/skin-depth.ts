import { MU_0_H_PER_M } from '../constants'
import { requirePositive } from '../require'
import { resistivityOhmMm2PerM } from './resistance'
import type { ConductorMetal } from './resistance'

/**
 * Depth at which the field has fallen to 1/e, δ = √(ρ/(π·µ0·f)), in mm, for a non-magnetic conductor.
 *
 * Source: diffusion equation of a plane conductor; resistivity by IEC 60028:1925.
 *
 * @throws RangeError unless the frequency is positive and the temperature within −60…300 °C
 */
export function skinDepthMm(input: { frequencyHz: number; temperatureC: number; metal?: ConductorMetal }): number {
  requirePositive('frequencyHz', input.frequencyHz)
  const resistivityOhmM = resistivityOhmMm2PerM(input.temperatureC, input.metal) * 1e-6
  return Math.sqrt(resistivityOhmM / (Math.PI * MU_0_H_PER_M * input.frequencyHz)) * 1e3
}

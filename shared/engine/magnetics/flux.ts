import { interpolateTable } from '../interpolate'
import type { TablePoint } from '../interpolate'
import type { Answer } from '../answer'
import { requireNotNegative, requirePositive } from '../require'

export interface PeakFluxInput {
  inductanceH: number
  currentA: number
  turns: number
  /** The least area of the path for the saturation check, the effective area for the loss. */
  areaMm2: number
}

/**
 * Flux density B = L·I/(N·A), in tesla.
 *
 * Source: Faraday's law.
 *
 * @throws RangeError unless inductance, turns and area are positive and the current is not negative
 */
export function peakFluxDensityT({ inductanceH, currentA, turns, areaMm2 }: PeakFluxInput): number {
  requirePositive('inductanceH', inductanceH)
  requireNotNegative('currentA', currentA)
  requirePositive('turns', turns)
  requirePositive('areaMm2', areaMm2)
  return (inductanceH * currentA) / (turns * areaMm2 * 1e-6)
}

/**
 * Swing of flux density, peak to peak, ΔB = Φ/A, in tesla, from the flux of one turn in weber.
 *
 * Source: Faraday's law.
 *
 * @throws RangeError unless the area is positive and the flux is not negative
 */
export function fluxDensitySwingT({ fluxSwingWb, areaMm2 }: { fluxSwingWb: number; areaMm2: number }): number {
  requireNotNegative('fluxSwingWb', fluxSwingWb)
  requirePositive('areaMm2', areaMm2)
  return fluxSwingWb / (areaMm2 * 1e-6)
}

/**
 * Least turns that keep a flux density, N = L·I/(B·A), not rounded.
 *
 * Source: Faraday's law.
 *
 * @throws RangeError unless all are positive
 */
export function turnsForFlux(input: { inductanceH: number; currentA: number; fluxDensityT: number; areaMm2: number }): number {
  for (const [name, value] of Object.entries(input)) requirePositive(name, value)
  return (input.inductanceH * input.currentA) / (input.fluxDensityT * input.areaMm2 * 1e-6)
}

export interface SaturationPoint {
  temperatureC: number
  fluxDensityT: number
}

/**
 * Saturation flux density at a temperature, in tesla, on straight lines between the published points;
 * beyond the coldest and the hottest point the answer is not checkable.
 *
 * Source: the material's data sheet, named by the caller.
 *
 * @throws RangeError when there is no point
 */
export function saturationFluxDensityT(points: readonly SaturationPoint[], temperatureC: number): Answer<number> {
  const rows = [...points].sort((a, b) => a.temperatureC - b.temperatureC).map(({ temperatureC: t, fluxDensityT }): TablePoint => [t, fluxDensityT])
  return interpolateTable(rows, temperatureC)
}

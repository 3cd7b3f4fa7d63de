import { requireNotNegative, requirePositive } from '../require'

/**
 * How a temperature rise is estimated. The models differ by 25 % among each other: every figure names its own.
 *
 * - `mclyman-surface`: ΔT = 450·ψ^0.826, ψ in W/cm². Source: C. McLyman, Handbook, 3rd ed. 2004, ch. 6 (from memory).
 * - `powder-catalogue-surface`: ΔT = (P/A)^0.833, P in mW and A in cm². Source: powder-core catalogues (from memory).
 * - `ferrite-volume`: R_th = 53·V_e^−0.54, V_e in cm³. Source: S. Mulder, ferrite handbook (from memory).
 * - `planar-volume`: R_th = 1000/(24·√V_e), V_e in cm³. Source: Ferroxcube, Design of Planar Power Transformers.
 * - `thermal-resistance`: a stated R_th. Source: the core's data sheet or a measurement.
 */
export type ThermalModel =
  | { kind: 'mclyman-surface'; surfaceMm2: number }
  | { kind: 'powder-catalogue-surface'; surfaceMm2: number }
  | { kind: 'ferrite-volume'; effectiveVolumeMm3: number }
  | { kind: 'planar-volume'; effectiveVolumeMm3: number }
  | { kind: 'thermal-resistance'; thermalResistanceKPerW: number }

/** Relative accuracy to state beside every estimated rise. Source: comparison of the models at equal surface load. */
export const TEMPERATURE_RISE_ACCURACY_FRACTION = 0.25

/** Hot spot above the mean winding temperature by resistance, K. Source: practice with IEC 60085 classes (from memory). */
export const HOT_SPOT_ALLOWANCE_K = 10

/**
 * Temperature rise in kelvin under a loss in watt, natural convection, in the named model.
 *
 * Source: see `ThermalModel`.
 *
 * @throws RangeError unless the loss is not negative and the model's figure positive
 */
export function temperatureRiseK(model: ThermalModel, lossW: number): number {
  requireNotNegative('lossW', lossW)
  switch (model.kind) {
    case 'mclyman-surface':
      return 450 * surfaceLoadWPerCm2(lossW, model.surfaceMm2) ** 0.826
    case 'powder-catalogue-surface':
      return (surfaceLoadWPerCm2(lossW, model.surfaceMm2) * 1000) ** 0.833
    case 'ferrite-volume':
    case 'planar-volume':
      return lossW * volumeThermalResistanceKPerW(model.kind, model.effectiveVolumeMm3)
    case 'thermal-resistance':
      requirePositive('thermalResistanceKPerW', model.thermalResistanceKPerW)
      return lossW * model.thermalResistanceKPerW
  }
}

function surfaceLoadWPerCm2(lossW: number, surfaceMm2: number): number {
  requirePositive('surfaceMm2', surfaceMm2)
  return lossW / (surfaceMm2 * 1e-2)
}

/**
 * Thermal resistance from the effective volume, in K/W.
 *
 * Source: see `ThermalModel`.
 *
 * @throws RangeError unless the volume is positive
 */
export function volumeThermalResistanceKPerW(kind: 'ferrite-volume' | 'planar-volume', effectiveVolumeMm3: number): number {
  requirePositive('effectiveVolumeMm3', effectiveVolumeMm3)
  const volumeCm3 = effectiveVolumeMm3 * 1e-3
  return kind === 'ferrite-volume' ? 53 * volumeCm3 ** -0.54 : 1000 / (24 * Math.sqrt(volumeCm3))
}

/**
 * Surface of the box around a wound part that gives off heat, in mm²: all faces but the one it stands on where told so.
 *
 * Source: geometry.
 *
 * @throws RangeError unless all edges are positive
 */
export function boxSurfaceMm2(input: { lengthMm: number; widthMm: number; heightMm: number; withoutBase?: boolean }): number {
  const { lengthMm, widthMm, heightMm, withoutBase = false } = input
  requirePositive('lengthMm', lengthMm)
  requirePositive('widthMm', widthMm)
  requirePositive('heightMm', heightMm)
  const base = lengthMm * widthMm
  return (withoutBase ? base : 2 * base) + 2 * heightMm * (lengthMm + widthMm)
}

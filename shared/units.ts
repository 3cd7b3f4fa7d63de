declare const unit: unique symbol

/** A number that the compiler will not mix with another unit. */
export type Radians = number & { readonly [unit]: 'rad' }
export type Degrees = number & { readonly [unit]: 'deg' }

export const degrees = (value: number) => value as Degrees
export const radians = (value: number) => value as Radians
export const toRadians = (angle: Degrees) => ((angle * Math.PI) / 180) as Radians
export const toDegrees = (angle: Radians) => ((angle * 180) / Math.PI) as Degrees

/** Millimetres of one international inch, exact. Source: ISO 80000-3, Annex. */
export const MM_PER_INCH = 25.4

/** Square millimetres of one circular mil, the area of a circle of 0.001 in. */
export const MM2_PER_CIRCULAR_MIL = (Math.PI / 4) * (MM_PER_INCH / 1000) ** 2

/** Temperature of the ice point in kelvin, exact. Source: ISO 80000-5. */
export const ICE_POINT_K = 273.15

export const mmToM = (lengthMm: number) => lengthMm * 1e-3
export const mToMm = (lengthM: number) => lengthM * 1e3
export const mm2ToM2 = (areaMm2: number) => areaMm2 * 1e-6
export const m2ToMm2 = (areaM2: number) => areaM2 * 1e6
export const mm2ToCm2 = (areaMm2: number) => areaMm2 * 1e-2
export const mm3ToM3 = (volumeMm3: number) => volumeMm3 * 1e-9
export const mm3ToCm3 = (volumeMm3: number) => volumeMm3 * 1e-3
export const inchToMm = (lengthIn: number) => lengthIn * MM_PER_INCH
export const mmToInch = (lengthMm: number) => lengthMm / MM_PER_INCH
export const circularMilToMm2 = (areaCircularMil: number) => areaCircularMil * MM2_PER_CIRCULAR_MIL
export const mm2ToCircularMil = (areaMm2: number) => areaMm2 / MM2_PER_CIRCULAR_MIL
export const celsiusToKelvin = (temperatureC: number) => temperatureC + ICE_POINT_K
export const kelvinToCelsius = (temperatureK: number) => temperatureK - ICE_POINT_K
export const gaussToTesla = (fluxDensityG: number) => fluxDensityG * 1e-4
export const teslaToGauss = (fluxDensityT: number) => fluxDensityT * 1e4
export const oerstedToAPerM = (fieldOe: number) => (fieldOe * 1000) / (4 * Math.PI)
export const aPerMToOersted = (fieldAPerM: number) => (fieldAPerM * 4 * Math.PI) / 1000

/** Core loss density: 1 kW/m³ is 1 mW/cm³. */
export const kwPerM3ToWPerM3 = (lossKwPerM3: number) => lossKwPerM3 * 1e3
export const wPerM3ToKwPerM3 = (lossWPerM3: number) => lossWPerM3 * 1e-3

/** Inductance factor in nH to permeance in henry, and back. */
export const nhToH = (inductanceNh: number) => inductanceNh * 1e-9
export const hToNh = (inductanceH: number) => inductanceH * 1e9

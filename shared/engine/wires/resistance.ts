import {
  ALUMINIUM_ALPHA_20C_PER_K, ALUMINIUM_RESISTIVITY_20C_OHM_MM2_PER_M, COPPER_ALPHA_20C_PER_K, COPPER_RESISTIVITY_20C_OHM_MM2_PER_M,
  COPPER_ZERO_RESISTANCE_OFFSET_C, ENAMELLED_WIRE_CONDUCTIVITY, REFERENCE_TEMPERATURE_C,
} from '../constants'
import { requireBetween, requireCount, requireNotNegative, requirePositive } from '../require'

export type ConductorMetal = 'copper' | 'aluminium'

const METALS: Record<ConductorMetal, { resistivity20: number; alpha: number }> = {
  copper: { resistivity20: COPPER_RESISTIVITY_20C_OHM_MM2_PER_M, alpha: COPPER_ALPHA_20C_PER_K },
  aluminium: { resistivity20: ALUMINIUM_RESISTIVITY_20C_OHM_MM2_PER_M, alpha: ALUMINIUM_ALPHA_20C_PER_K },
}

/** Range of conductor temperature for which the linear law is taken, °C. */
export const RESISTANCE_TEMPERATURE_RANGE_C = [-60, 300] as const

/**
 * Factor by which resistance exceeds its value at 20 °C: 1 + α_20·(T − 20 °C).
 *
 * Source: IEC 60028:1925 (copper), IEC 60889 (aluminium); linear law.
 *
 * @throws RangeError outside −60…300 °C
 */
export function resistanceFactor(temperatureC: number, metal: ConductorMetal = 'copper'): number {
  requireBetween('temperatureC', temperatureC, ...RESISTANCE_TEMPERATURE_RANGE_C)
  return 1 + METALS[metal].alpha * (temperatureC - REFERENCE_TEMPERATURE_C)
}

/** Resistivity at a temperature, in Ω·mm²/m. Source: as `resistanceFactor`. @throws RangeError as `resistanceFactor` */
export const resistivityOhmMm2PerM = (temperatureC: number, metal: ConductorMetal = 'copper'): number =>
  METALS[metal].resistivity20 * resistanceFactor(temperatureC, metal)

/** Area of a round conductor, in mm². @throws RangeError unless the diameter is positive */
export function roundAreaMm2(diameterMm: number): number {
  requirePositive('diameterMm', diameterMm)
  return (Math.PI / 4) * diameterMm ** 2
}

export interface WindingResistanceInput {
  /** Length of the conductor, leads included. */
  lengthM: number
  /** Area of metal of one strand. */
  strandAreaMm2: number
  /** Strands and wires in parallel. */
  parallelCount?: number
  temperatureC: number
  metal?: ConductorMetal
}

/**
 * Direct-current resistance, R = ρ_20·(1 + α_20·(T − 20 °C))·l/(n·A), in ohm.
 *
 * Source: IEC 60028:1925; linear temperature law.
 *
 * @throws RangeError unless length, area and count are positive and the temperature within −60…300 °C
 */
export function windingResistanceOhm({ lengthM, strandAreaMm2, parallelCount = 1, temperatureC, metal = 'copper' }: WindingResistanceInput): number {
  requirePositive('lengthM', lengthM)
  requirePositive('strandAreaMm2', strandAreaMm2)
  requireCount('parallelCount', parallelCount)
  return (resistivityOhmMm2PerM(temperatureC, metal) * lengthM) / (parallelCount * strandAreaMm2)
}

/**
 * Length of a winding's conductor, N·MLT and both leads, in metre.
 *
 * Source: geometry.
 *
 * @throws RangeError unless turns and mean turn length are positive
 */
export function windingLengthM(input: { turns: number; meanTurnLengthMm: number; leadsMm?: number }): number {
  requirePositive('turns', input.turns)
  requirePositive('meanTurnLengthMm', input.meanTurnLengthMm)
  requireNotNegative('leadsMm', input.leadsMm ?? 0)
  return (input.turns * input.meanTurnLengthMm + (input.leadsMm ?? 0)) * 1e-3
}

export interface WireResistanceLimits {
  minimumOhmPerM: number
  nominalOhmPerM: number
  maximumOhmPerM: number
}

/** Diameter up to which the resistance limits are ±10 % of nominal instead of following the diameter. Source: IEC 60317-0-1. */
export const IEC_SMALL_WIRE_LIMIT_MM = 0.063

/**
 * Resistance of enamelled round copper wire at 20 °C, in Ω/m: nominal with 58.5 m/(Ω·mm²) and the nominal diameter,
 * minimum with 59 and the greatest, maximum with 58 and the least; up to 0.063 mm ±10 % of nominal.
 *
 * Source: IEC 60317-0-1, annex on the calculation of resistance.
 *
 * @throws RangeError unless the diameter is positive and the tolerance, needed above 0.063 mm, smaller than it
 */
export function iecWireResistance(input: { diameterMm: number; toleranceMm?: number }): WireResistanceLimits {
  const { diameterMm, toleranceMm } = input
  const nominalOhmPerM = 1 / (ENAMELLED_WIRE_CONDUCTIVITY.nominal * roundAreaMm2(diameterMm))
  if (diameterMm <= IEC_SMALL_WIRE_LIMIT_MM) {
    return { minimumOhmPerM: 0.9 * nominalOhmPerM, nominalOhmPerM, maximumOhmPerM: 1.1 * nominalOhmPerM }
  }
  if (!(toleranceMm !== undefined && toleranceMm >= 0 && toleranceMm < diameterMm)) {
    throw new RangeError(`toleranceMm must lie between 0 and diameterMm: ${toleranceMm}`)
  }
  return {
    minimumOhmPerM: 1 / (ENAMELLED_WIRE_CONDUCTIVITY.highest * roundAreaMm2(diameterMm + toleranceMm)),
    nominalOhmPerM,
    maximumOhmPerM: 1 / (ENAMELLED_WIRE_CONDUCTIVITY.lowest * roundAreaMm2(diameterMm - toleranceMm)),
  }
}

/**
 * Temperature of a copper winding by the change of its resistance, T_2 = (R_2/R_1)·(234.5 °C + T_1) − 234.5 °C.
 *
 * Source: IEC 60034-1 (resistance method).
 *
 * @throws RangeError unless the ratio is positive
 */
export function temperatureByResistanceC(input: { resistanceRatio: number; coldTemperatureC: number }): number {
  requirePositive('resistanceRatio', input.resistanceRatio)
  return input.resistanceRatio * (COPPER_ZERO_RESISTANCE_OFFSET_C + input.coldTemperatureC) - COPPER_ZERO_RESISTANCE_OFFSET_C
}

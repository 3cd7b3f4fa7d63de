import { requireBetween, requirePositive } from '../require'

/**
 * How long the rectifier charges the capacitor in each half cycle.
 *
 * - `charging-time`: the conduction time is stated. Source: Power Integrations AN-17.
 * - `charging-fraction`: it is a stated fraction of the half cycle. Source: Fairchild AN-4137.
 * - `exact-angle`: it follows from the sine and the minimum voltage, by the energy balance of the capacitor.
 * - `published-arcsine`: the discharge takes 0.25 + arcsin(r)/π periods, as the UC3842 design procedure has it.
 *   Conservative: the exact time is 0.25 + arcsin(r)/(2π) periods.
 */
export type ChargingModel =
  | { kind: 'charging-time'; chargingTimeS: number }
  | { kind: 'charging-fraction'; chargingFraction: number }
  | { kind: 'exact-angle' }
  | { kind: 'published-arcsine' }

export interface MainsBulkInput {
  /** Least mains voltage, rms. */
  mainsVoltageV: number
  mainsFrequencyHz: number
  /** Power drawn from the capacitor: output power over efficiency. */
  inputPowerW: number
  capacitanceF: number
  charging: ChargingModel
}

export type BulkMinimum =
  | { state: 'held'; minimumV: number; model: ChargingModel['kind'] }
  /** The capacitor is empty before the mains charges it again. */
  | { state: 'capacitor-too-small'; model: ChargingModel['kind']; missingEnergyJ: number }

/**
 * Least voltage of the bulk capacitor behind a full-wave rectifier, in volt:
 *
 *     V_min = √(2·V_ac² − 2·P·t_d/C),  t_d the time without charging
 *
 * No rectifier drop, no source impedance.
 * Source: energy balance; Power Integrations AN-17, Fairchild AN-4137, UC3842 data sheet (see `ChargingModel`).
 *
 * @throws RangeError on a value out of its range
 */
export function bulkMinimum(input: MainsBulkInput): BulkMinimum {
  checkMains(input)
  const { charging } = input
  const model = charging.kind
  const atFixedTime = (dischargeS: number): BulkMinimum => {
    const squareV2 = minimumSquareV2(input, dischargeS)
    if (squareV2 > 0) return { state: 'held', minimumV: Math.sqrt(squareV2), model }
    return { state: 'capacitor-too-small', model, missingEnergyJ: (-squareV2 * input.capacitanceF) / 2 }
  }
  const halfCycleS = 1 / (2 * input.mainsFrequencyHz)
  switch (charging.kind) {
    case 'charging-time':
      requireBetween('chargingTimeS', charging.chargingTimeS, 0, halfCycleS)
      return atFixedTime(halfCycleS - charging.chargingTimeS)
    case 'charging-fraction':
      requireBetween('chargingFraction', charging.chargingFraction, 0, 1)
      return atFixedTime(halfCycleS * (1 - charging.chargingFraction))
    case 'exact-angle':
    case 'published-arcsine':
      return atAngle(input, charging.kind)
  }
}

function checkMains(input: MainsBulkInput): void {
  requirePositive('mainsVoltageV', input.mainsVoltageV)
  requirePositive('mainsFrequencyHz', input.mainsFrequencyHz)
  requirePositive('inputPowerW', input.inputPowerW)
  requirePositive('capacitanceF', input.capacitanceF)
}

const minimumSquareV2 = ({ mainsVoltageV, inputPowerW, capacitanceF }: MainsBulkInput, dischargeS: number) =>
  2 * mainsVoltageV ** 2 - (2 * inputPowerW * dischargeS) / capacitanceF

function dischargePeriods(kind: 'exact-angle' | 'published-arcsine', ratio: number): number {
  return 0.25 + Math.asin(ratio) / (kind === 'exact-angle' ? 2 * Math.PI : Math.PI)
}

function atAngle(input: MainsBulkInput, kind: 'exact-angle' | 'published-arcsine'): BulkMinimum {
  const peakV = Math.SQRT2 * input.mainsVoltageV
  const excess = (minimumV: number) => minimumSquareV2(input, dischargePeriods(kind, minimumV / peakV) / input.mainsFrequencyHz) - minimumV ** 2
  const atZero = excess(0)
  if (atZero <= 0) return { state: 'capacitor-too-small', model: kind, missingEnergyJ: (-atZero * input.capacitanceF) / 2 }
  let lowV = 0
  let highV = peakV
  for (let step = 0; step < 60; step++) {
    const middleV = (lowV + highV) / 2
    if (excess(middleV) > 0) lowV = middleV
    else highV = middleV
  }
  return { state: 'held', minimumV: (lowV + highV) / 2, model: kind }
}

/**
 * Capacitance that holds a minimum voltage, in farad: C = 2·P·t_d/(2·V_ac² − V_min²).
 *
 * Source: as `bulkMinimum`.
 *
 * @throws RangeError unless the minimum voltage lies below the mains peak
 */
export function bulkCapacitanceF(input: {
  mainsVoltageV: number
  mainsFrequencyHz: number
  inputPowerW: number
  minimumV: number
  model: 'exact-angle' | 'published-arcsine'
}): number {
  const { mainsVoltageV, mainsFrequencyHz, inputPowerW, minimumV, model } = input
  checkMains({ ...input, capacitanceF: 1, charging: { kind: model } })
  const peakV = Math.SQRT2 * mainsVoltageV
  if (!(minimumV > 0 && minimumV < peakV)) throw new RangeError(`minimumV must lie between 0 and the mains peak ${peakV}: ${minimumV}`)
  return (2 * inputPowerW * dischargePeriods(model, minimumV / peakV)) / (mainsFrequencyHz * (peakV ** 2 - minimumV ** 2))
}

/**
 * Greatest bulk voltage, √2 times the greatest mains voltage, in volt.
 *
 * Source: peak of a sine.
 *
 * @throws RangeError unless the mains voltage is positive
 */
export function bulkMaximumV(mainsVoltageV: number): number {
  requirePositive('mainsVoltageV', mainsVoltageV)
  return Math.SQRT2 * mainsVoltageV
}

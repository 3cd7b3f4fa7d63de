import type { FilteredOutput, ForcedDuty } from '../duties/converter'
import type { CurrentLimit, Supply } from '../specification'
import { filterForShare, filterForVoltage, filterInductanceH } from './output-filter'
import type { FilterState } from './output-filter'
import { loadOf, regulatedIndex } from './outputs'
import type { FedOutput } from './outputs'
import type { CircuitFinding, DutyTraits, OperatingPoint, OutputState } from './topology'
import { UnreachablePoint } from './unreachable'
import type { Waveform } from '../waveforms/waveform'

/** Least load that a state is made for, of full load: below it controllers leave out pulses. Source: common practice. */
const LEAST_LOAD = 1e-3

type AnyForced = ForcedDuty & { outputs: readonly FilteredOutput[] }

export interface DriveInput {
  duty: AnyForced
  fed: readonly FedOutput<FilteredOutput>[]
  primaryTurns: number
  /** Voltage that the primary takes from the supply: of a half-bridge half the input voltage. */
  sourceV: number
  maximumSourceV: number
  /** Pulses at the filters per period of the flux. */
  pulses: 1 | 2
}

export interface FilteredState {
  filters: FilterState[]
  /** Voltages and drops as the filters see them exceed the stated ones by this factor, so that the efficiency comes out. */
  lossFactor: number
  /** Conduction of one switch over the period of the flux. */
  dutyRatio: number
}

/**
 * All filters at an operating point: the regulated output sets the duty ratio, the others follow from their turns.
 *
 * Losses beyond the stated drops count as a longer pulse: the currents of the windings stay, their duration grows.
 * Source: energy balance; Erickson and Maksimović, ch. 2 and 6.
 *
 * @throws UnreachablePoint where no duty ratio gives the voltage; RangeError on a value out of its range
 */
export function filteredState(input: DriveInput, point: OperatingPoint): FilteredState {
  const { duty, fed, pulses } = input
  const regulated = fed[regulatedIndex(fed)]!
  const lossFactor = lossFactorOf(input)
  const pulsePeriodS = 1 / (pulses * duty.switchingFrequencyHz)
  const filterInput = ({ output, index, windings }: FedOutput<FilteredOutput>) => ({
    pulseV: pulseV(input, windings[0]!.turns, input.sourceV),
    pulsePeriodS,
    inductanceH: inductanceOf(input, { output, index, windings }, lossFactor),
    currentA: loadOf(output, point),
  })
  const main = filterInput(regulated)
  const neededV = windingV(regulated.output) * lossFactor
  if (!(neededV < main.pulseV)) throw unreachable(duty, neededV / main.pulseV / pulses, 1 / pulses)
  const { pulseShare } = filterForVoltage({ ...main, currentA: Math.max(main.currentA, LEAST_LOAD * regulated.output.fullLoadCurrentA) }, neededV)
  return { filters: fed.map((one) => (one === regulated ? filterForVoltage({ ...main, currentA: Math.max(main.currentA, LEAST_LOAD * one.output.fullLoadCurrentA) }, neededV) : filterForShare(filterInput(one), pulseShare))), lossFactor, dutyRatio: pulseShare / pulses }
}

const unreachable = (duty: ForcedDuty, dutyRatio: number, most: number) =>
  new UnreachablePoint({ code: 'duty-ratio-not-reachable', severity: 'error', path: 'requirement.duty.maximumDutyRatio', values: { dutyRatio, limit: Math.min(duty.maximumDutyRatio, most) } })

/** Voltage with its rectifier's drop, V. */
const windingV = ({ voltageV, rectifierDropV }: FilteredOutput): number => Math.abs(voltageV) + rectifierDropV

const pulseV = ({ duty, primaryTurns }: DriveInput, turns: number, sourceV: number): number => ((sourceV - duty.switchDropV) * turns) / primaryTurns

/** (P_out/η)·(U_p/U_source) over the power of outputs and stated drops, at least 1. */
function lossFactorOf({ duty, fed, sourceV }: DriveInput): number {
  const outW = fed.reduce((sum, { output }) => sum + Math.abs(output.voltageV) * output.fullLoadCurrentA, 0)
  const withDropsW = fed.reduce((sum, { output }) => sum + windingV(output) * output.fullLoadCurrentA, 0)
  return Math.max(1, ((outW / duty.efficiency) * (sourceV - duty.switchDropV)) / sourceV / withDropsW)
}

/** The filter's inductance as stated, or from its ripple at the greatest input and full load. */
function inductanceOf(input: DriveInput, { output, windings }: FedOutput<FilteredOutput>, lossFactor: number): number {
  if (output.filterInductanceH !== null) return output.filterInductanceH
  const outputV = windingV(output) * lossFactor
  const greatestV = pulseV(input, windings[0]!.turns, input.maximumSourceV)
  const pulsePeriodS = 1 / (input.pulses * input.duty.switchingFrequencyHz)
  const pulseShare = Math.min(0.99, outputV / greatestV)
  return filterInductanceH({ outputV, pulseShare, pulsePeriodS, rippleA: output.rippleRatio * output.fullLoadCurrentA })
}

/** What the outputs get, from the states of their filters. */
export function outputStates({ fed }: DriveInput, { filters, lossFactor }: FilteredState, inductorsA: readonly Waveform[], rectifierV: (turns: number) => number): OutputState[] {
  return fed.map(({ output, windings }, position) => {
    const magnitudeV = filters[position]!.outputV / lossFactor - output.rectifierDropV
    return {
      outputId: output.id,
      voltageV: output.voltageV < 0 ? -magnitudeV : magnitudeV,
      rectifiedA: inductorsA[position]!,
      rectifierPeakV: rectifierV(windings[0]!.turns),
      mode: filters[position]!.mode,
    }
  })
}

/** Above this the current loop of peak-current control is unstable without a slope. Source: Unitrode application note U-97. */
const SLOPE_SHARE = 0.5

/** Doubts about a duty ratio: beyond the controller, or in need of slope compensation. `pulseShare` is that at the filter. */
export function dutyFindings({ maximumDutyRatio, currentLimit }: ForcedDuty, { dutyRatio, pulseShare, mode }: { dutyRatio: number; pulseShare: number; mode: string }): CircuitFinding[] {
  const path = 'requirement.duty.maximumDutyRatio'
  return [
    ...(dutyRatio > maximumDutyRatio ? [{ code: 'duty-ratio-not-reachable', severity: 'error', path, values: { dutyRatio, limit: maximumDutyRatio } } as const] : []),
    ...(currentLimit && mode === 'continuous' && pulseShare > SLOPE_SHARE ? [{ code: 'slope-compensation-needed', severity: 'note', path: 'requirement.duty.currentLimit', values: { dutyRatio: pulseShare } } as const] : []),
  ]
}

/** Greatest direct voltage of a supply, V. */
export const greatestV = (supply: Supply): number => (supply.kind === 'dc' ? supply.maximumV : Math.SQRT2 * supply.maximumV)

/** What generic stages ask of every converter of the buck family. */
export function forcedTraits(duty: AnyForced & { supply: Supply; currentLimit: CurrentLimit | null }): DutyTraits {
  const outW = duty.outputs.reduce((sum, { voltageV, fullLoadCurrentA }) => sum + Math.abs(voltageV) * fullLoadCurrentA, 0)
  return {
    supply: duty.supply,
    outputs: duty.outputs,
    inputPowerW: outW / duty.efficiency,
    efficiency: duty.efficiency,
    currentLimit: duty.currentLimit,
    frequencyHz: { minimum: duty.switchingFrequencyHz, maximum: duty.switchingFrequencyHz },
    switchRatingV: duty.switchRatingV,
  }
}

/**
 * Rate at which the current of the closed switch rises, A/s: the magnetising current and the inductors' by the ratios of turns.
 *
 * Source: circuit equation.
 */
export function switchSlopeAPerS(input: DriveInput, { filters }: FilteredState, { onV, inductanceH }: { onV: number; inductanceH: number }): number {
  return input.fed.reduce((sum, _, position) => {
    const { windings } = input.fed[position]!
    const { minimumA, maximumA, pulseShare } = filters[position]!
    const riseS = pulseShare / (input.pulses * input.duty.switchingFrequencyHz)
    return sum + ((windings[0]!.turns / input.primaryTurns) * (maximumA - minimumA)) / riseS
  }, onV / inductanceH)
}

/**
 * Time in which the leakage inductance lets the load current pass from one winding to another, L_leak·ΔI/U, s; null where the
 * leakage is not known.
 *
 * Source: circuit equation of the leakage inductance.
 */
export const commutationTimeS = (leakageH: number | null, stepA: number, voltageV: number): number | null => (leakageH === null || !(voltageV > 0) ? null : (leakageH * stepA) / voltageV)

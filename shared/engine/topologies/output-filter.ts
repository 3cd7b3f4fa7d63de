import { requireNotNegative, requirePositive } from '../require'
import { conductionMode } from './flyback'
import type { ConductionMode } from './flyback'

/** The inductor of an output behind its rectifier: pulses of one height at its input, a steady voltage at its output. */
export interface FilterInput {
  /** Voltage of the winding while it feeds, V. */
  pulseV: number
  /** Time from one pulse to the next, s. */
  pulsePeriodS: number
  inductanceH: number
  currentA: number
}

export interface FilterState {
  mode: ConductionMode
  /** Share of the pulse period in which the pulse lasts. */
  pulseShare: number
  /** Output voltage with all drops, V. */
  outputV: number
  minimumA: number
  maximumA: number
  /** From the beginning of the pulse until the current has fallen to its least value, s. */
  conductionS: number
}

function checkFilter({ pulseV, pulsePeriodS, inductanceH, currentA }: FilterInput): void {
  requirePositive('pulseV', pulseV)
  requirePositive('pulsePeriodS', pulsePeriodS)
  requirePositive('inductanceH', inductanceH)
  requireNotNegative('currentA', currentA)
}

/**
 * Pulse share that holds an output voltage, with the mode it leads to:
 *
 *     δ = V/V_p in continuous conduction,  δ = √(2·L·I·V/((V_p − V)·V_p·T)) in discontinuous conduction
 *
 * Source: R. Erickson and D. Maksimović, Fundamentals of Power Electronics, ch. 2 and 5 (buck converter).
 *
 * @throws RangeError on a value out of its range, or when the output voltage does not lie below the pulse's
 */
export function filterForVoltage(input: FilterInput, outputV: number): FilterState {
  checkFilter(input)
  requirePositive('outputV', outputV)
  const { pulseV, pulsePeriodS, inductanceH, currentA } = input
  if (!(outputV < pulseV)) throw new RangeError(`outputV must be below the pulse voltage ${pulseV}: ${outputV}`)
  const continuousShare = outputV / pulseV
  if (rippleRatio(input, { outputV, pulseShare: continuousShare }) <= 1) return continuousState(input, { outputV, pulseShare: continuousShare })
  requirePositive('currentA', currentA)
  const pulseShare = Math.sqrt((2 * inductanceH * currentA * outputV) / ((pulseV - outputV) * pulseV * pulsePeriodS))
  return discontinuousState(input, { outputV, pulseShare })
}

/**
 * Output voltage that a pulse share gives, with the mode it leads to:
 *
 *     V = δ·V_p in continuous conduction,  V = V_p/(1 + 2·L·I/(δ²·T·V_p)) in discontinuous conduction
 *
 * Source: as `filterForVoltage`.
 *
 * @throws RangeError on a value out of its range
 */
export function filterForShare(input: FilterInput, pulseShare: number): FilterState {
  checkFilter(input)
  if (!(pulseShare > 0 && pulseShare <= 1)) throw new RangeError(`pulseShare must lie between 0 and 1: ${pulseShare}`)
  const { pulseV, pulsePeriodS, inductanceH, currentA } = input
  const outputV = pulseShare * pulseV
  if (rippleRatio(input, { outputV, pulseShare }) <= 1) return continuousState(input, { outputV, pulseShare })
  return discontinuousState(input, { outputV: pulseV / (1 + (2 * inductanceH * currentA) / (pulseShare ** 2 * pulsePeriodS * pulseV)), pulseShare })
}

type Point = Pick<FilterState, 'outputV' | 'pulseShare'>

/** Ripple of the inductor's current from its fall, ΔI = V·(1 − δ)·T/L. */
const rippleA = ({ pulsePeriodS, inductanceH }: FilterInput, { outputV, pulseShare }: Point): number => (outputV * (1 - pulseShare) * pulsePeriodS) / inductanceH

/** ΔI/(2·I): above 1 the current stops. */
const rippleRatio = (input: FilterInput, point: Point): number => rippleA(input, point) / (2 * input.currentA)

function continuousState(input: FilterInput, point: Point): FilterState {
  const halfA = rippleA(input, point) / 2
  return { ...point, mode: conductionMode(rippleRatio(input, point)), minimumA: Math.max(0, input.currentA - halfA), maximumA: input.currentA + halfA, conductionS: input.pulsePeriodS }
}

function discontinuousState({ pulseV, pulsePeriodS, inductanceH }: FilterInput, { outputV, pulseShare }: Point): FilterState {
  const maximumA = ((pulseV - outputV) * pulseShare * pulsePeriodS) / inductanceH
  const fallShare = (pulseShare * (pulseV - outputV)) / outputV
  return { mode: 'discontinuous', pulseShare, outputV, minimumA: 0, maximumA, conductionS: Math.min(1, pulseShare + fallShare) * pulsePeriodS }
}

/**
 * Inductance for a ripple, L = V·(1 − δ)·T/ΔI, in henry.
 *
 * Source: volt-second balance.
 *
 * @throws RangeError on a value out of its range
 */
export function filterInductanceH(input: { outputV: number; pulseShare: number; pulsePeriodS: number; rippleA: number }): number {
  for (const [name, value] of Object.entries(input)) requirePositive(name, value)
  if (!(input.pulseShare < 1)) throw new RangeError(`pulseShare must be below 1: ${input.pulseShare}`)
  return (input.outputV * (1 - input.pulseShare) * input.pulsePeriodS) / input.rippleA
}

/** Current of the inductor at a time after the beginning of a pulse, A. Straight between the pulse's end and the end of conduction. */
export function filterCurrentA({ pulseShare, minimumA, maximumA, conductionS }: FilterState, pulsePeriodS: number, tS: number): number {
  const pulseS = pulseShare * pulsePeriodS
  if (tS <= pulseS) return minimumA + ((maximumA - minimumA) * tS) / pulseS
  if (tS >= conductionS) return minimumA
  return maximumA + ((minimumA - maximumA) * (tS - pulseS)) / (conductionS - pulseS)
}

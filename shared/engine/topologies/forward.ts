import { requireNotNegative, requirePositive } from '../require'
import { filterCurrentA } from './output-filter'
import type { FilterState } from './output-filter'
import { pieceWaveform, timeline } from './pieces'
import type { WindingWaveforms } from './topology'
import type { Waveform } from '../waveforms/waveform'

/** How the magnetising current is led away, with the voltage at the primary while it falls. */
export type ForwardResetPath =
  /** Into the supply by a winding of its own. */
  | { kind: 'reset-winding'; turns: number }
  /** Into the supply by the primary itself and two diodes. */
  | { kind: 'two-switch' }
  /** Into a capacitor and back, over the whole off time. */
  | { kind: 'active-clamp' }

export interface ForwardSecondary {
  turns: number
  filter: FilterState
}

export interface ForwardInput {
  inputVoltageV: number
  switchDropV: number
  frequencyHz: number
  primaryTurns: number
  /** Magnetising inductance at the primary. */
  primaryInductanceH: number
  /** Conduction of the switch over the period, that of every filter. */
  dutyRatio: number
  reset: ForwardResetPath
  secondaries: readonly ForwardSecondary[]
  /** Time that currents take to pass at an edge; 0 for ideal edges. */
  commutationS: number
}

export interface ForwardState {
  /** Reverse voltage at the primary while the core is demagnetised. */
  resetVoltageV: number
  /** Time of demagnetisation over the period. */
  resetShare: number
  primary: WindingWaveforms
  /** Of the reset winding; null without one. */
  reset: WindingWaveforms | null
  secondaries: WindingWaveforms[]
  inductorsA: Waveform[]
  /** Current from the supply, back-flow negative. */
  supplyA: Waveform
  magnetisingA: Waveform
  fluxWb: Waveform
}

/**
 * Reverse voltage at the primary and the share of the period that demagnetisation takes:
 *
 *     V_r = V_in·N_p/N_r with a reset winding, V_in with two switches, V_p·D/(1 − D) with an active clamp;
 *     D_r = D·V_p/V_r
 *
 * Source: volt-second balance; Erickson and Maksimović, Fundamentals of Power Electronics, ch. 6 (forward converter).
 *
 * @throws RangeError on a value out of its range
 */
export function forwardReset({ inputVoltageV, switchDropV, primaryTurns, dutyRatio, reset }: Pick<ForwardInput, 'inputVoltageV' | 'switchDropV' | 'primaryTurns' | 'dutyRatio' | 'reset'>): Pick<ForwardState, 'resetVoltageV' | 'resetShare'> {
  requireNotNegative('switchDropV', switchDropV)
  requirePositive('inputVoltageV - switchDropV', inputVoltageV - switchDropV)
  requirePositive('primaryTurns', primaryTurns)
  if (!(dutyRatio > 0 && dutyRatio < 1)) throw new RangeError(`dutyRatio must lie between 0 and 1: ${dutyRatio}`)
  const onV = inputVoltageV - switchDropV
  if (reset.kind === 'active-clamp') return { resetVoltageV: (onV * dutyRatio) / (1 - dutyRatio), resetShare: 1 - dutyRatio }
  if (reset.kind === 'reset-winding') requirePositive('reset.turns', reset.turns)
  const resetVoltageV = reset.kind === 'reset-winding' ? (inputVoltageV * primaryTurns) / reset.turns : inputVoltageV
  return { resetVoltageV, resetShare: (dutyRatio * onV) / resetVoltageV }
}

/**
 * Steady state of a forward converter's transformer. The primary carries the inductors' currents by the ratios of turns and the
 * magnetising current, which falls through the reset path afterwards; the core begins each period from zero, with an active clamp
 * it swings about zero.
 *
 * No leakage but for the commutation time, no ringing in the idle interval, reset diodes without drop.
 * Source: Erickson and Maksimović, Fundamentals of Power Electronics, ch. 6.
 *
 * @throws RangeError on a value out of its range, or when conduction and reset take longer than the period
 */
export function forwardState(input: ForwardInput): ForwardState {
  const { frequencyHz, primaryTurns, primaryInductanceH, dutyRatio, reset, secondaries, commutationS } = input
  requirePositive('frequencyHz', frequencyHz)
  requirePositive('primaryInductanceH', primaryInductanceH)
  const { resetVoltageV, resetShare } = forwardReset(input)
  if (!(dutyRatio + resetShare <= 1 + 1e-9)) throw new RangeError(`dutyRatio and reset must fit the period: ${dutyRatio} and ${resetShare}`)
  const periodS = 1 / frequencyHz
  const onS = dutyRatio * periodS
  const resetEndS = Math.min(periodS, onS + resetShare * periodS)
  const onV = input.inputVoltageV - input.switchDropV
  const swingA = (onV * onS) / primaryInductanceH
  const lowA = reset.kind === 'active-clamp' ? -swingA / 2 : 0

  const line = timeline(periodS, [onS, resetEndS, ...secondaries.map(({ filter }) => filter.conductionS)])
  const wave = (value: Parameters<typeof pieceWaveform>[1]) => pieceWaveform(line, value)
  const current = (value: Parameters<typeof pieceWaveform>[1]) => pieceWaveform(line, value, commutationS)
  const on = (middleS: number) => middleS < onS
  const resetting = (middleS: number) => middleS > onS && middleS < resetEndS
  const magnetising = (tS: number) => (tS <= onS ? lowA + (swingA * tS) / onS : tS >= resetEndS ? lowA : lowA + (swingA * (resetEndS - tS)) / (resetEndS - onS))
  const inductor = (index: number) => (tS: number) => filterCurrentA(secondaries[index]!.filter, periodS, tS)
  const loadA = (tS: number) => secondaries.reduce((sum, { turns }, index) => sum + (turns / primaryTurns) * inductor(index)(tS), 0)
  const ownReset = reset.kind !== 'reset-winding'
  const primaryA = (tS: number, middleS: number) => (on(middleS) ? magnetising(tS) + loadA(tS) : resetting(middleS) && ownReset ? magnetising(tS) : 0)
  const voltage = (turns: number) => wave((_, middleS) => (on(middleS) ? (onV * turns) / primaryTurns : resetting(middleS) ? (-resetVoltageV * turns) / primaryTurns : 0))
  const resetRatio = reset.kind === 'reset-winding' ? primaryTurns / reset.turns : 1
  const returned = reset.kind === 'active-clamp' ? 0 : -resetRatio

  return {
    resetVoltageV,
    resetShare,
    primary: { currentA: current(primaryA), voltageV: voltage(primaryTurns) },
    reset: reset.kind === 'reset-winding' ? { currentA: current((tS, middleS) => (resetting(middleS) ? magnetising(tS) * resetRatio : 0)), voltageV: voltage(reset.turns) } : null,
    secondaries: secondaries.map(({ turns }, index) => ({ currentA: current((tS, middleS) => (on(middleS) ? -inductor(index)(tS) : 0)), voltageV: voltage(turns) })),
    inductorsA: secondaries.map((_, index) => wave(inductor(index))),
    supplyA: wave((tS, middleS) => (on(middleS) ? magnetising(tS) + loadA(tS) : resetting(middleS) ? returned * magnetising(tS) : 0)),
    magnetisingA: wave(magnetising),
    fluxWb: wave((tS) => (magnetising(tS) * primaryInductanceH) / primaryTurns),
  }
}

import { requirePositive } from '../require'
import type { Waveform } from '../waveforms/waveform'
import { filterCurrentA } from './output-filter'
import type { FilterState } from './output-filter'
import { pieceWaveform, timeline } from './pieces'
import type { PieceValue } from './pieces'
import type { WindingWaveforms } from './topology'

export interface BridgeSecondary {
  /** Of one half where the winding is tapped. */
  turns: number
  rectifier: 'centre-tapped' | 'full-wave'
  filter: FilterState
}

/** Between the pulses the primary is open, or shorted so that it carries the reflected current on. */
export type BridgeIdle = 'open' | 'shorted'

export interface BridgeInput {
  /** Voltage at the primary while a switch conducts, drops taken off. */
  driveV: number
  frequencyHz: number
  /** Of one half where the primary is tapped. */
  primaryTurns: number
  /** Magnetising inductance at the primary, or one half of it. */
  primaryInductanceH: number
  /** Conduction of one side over the period, at most a half. */
  dutyRatio: number
  primary: 'single' | 'tapped'
  idle: BridgeIdle
  secondaries: readonly BridgeSecondary[]
  commutationS: number
}

export interface BridgeState {
  /** One winding, or two halves. */
  primaries: WindingWaveforms[]
  /** Per secondary one winding, or two halves: the first conducts while the dotted ends are positive. */
  secondaries: WindingWaveforms[][]
  inductorsA: Waveform[]
  supplyA: Waveform
  magnetisingA: Waveform
  fluxWb: Waveform
}

/**
 * Steady state of a transformer whose flux swings both ways: half-bridge, full-bridge and push-pull.
 *
 * While a side conducts, the primary carries the inductors' currents by the ratios of turns and the magnetising current. Between
 * the pulses of an open primary the inductors' currents run through the secondaries: tapped halves share them evenly but for the
 * magnetising current, which the outputs carry in proportion to their ampere-turns; what they cannot carry stays in the primary.
 *
 * No leakage but for the commutation time; both sides alike.
 * Source: Erickson and Maksimović, Fundamentals of Power Electronics, ch. 6 (full-bridge and half-bridge isolated buck converters).
 *
 * @throws RangeError on a value out of its range
 */
export function bridgeState(input: BridgeInput): BridgeState {
  const { frequencyHz, primaryTurns, primaryInductanceH, dutyRatio, secondaries, commutationS, driveV } = input
  requirePositive('driveV', driveV)
  requirePositive('frequencyHz', frequencyHz)
  requirePositive('primaryTurns', primaryTurns)
  requirePositive('primaryInductanceH', primaryInductanceH)
  if (!(dutyRatio > 0 && dutyRatio <= 0.5)) throw new RangeError(`dutyRatio must lie between 0 and 0.5: ${dutyRatio}`)
  const periodS = 1 / frequencyHz
  const halfS = periodS / 2
  const onS = dutyRatio * periodS
  const line = timeline(periodS, [0, halfS].flatMap((startS) => [startS, startS + onS, ...secondaries.map(({ filter }) => startS + filter.conductionS)]))
  const wave = (value: PieceValue) => pieceWaveform(line, value)
  const current = (value: PieceValue) => pieceWaveform(line, value, commutationS)

  const peakA = (driveV * onS) / (2 * primaryInductanceH)
  const sign = (middleS: number) => (middleS < halfS ? 1 : -1)
  /** Time since the half period of a piece began. */
  const within = (tS: number, middleS: number) => (middleS < halfS ? tS : tS - halfS)
  const on = (middleS: number) => within(middleS, middleS) < onS
  const magnetising: PieceValue = (tS, middleS) => sign(middleS) * (on(middleS) ? peakA * ((2 * within(tS, middleS)) / onS - 1) : peakA)
  const inductor = (index: number): PieceValue => (tS, middleS) => filterCurrentA(secondaries[index]!.filter, halfS, within(tS, middleS))
  const loadA: PieceValue = (tS, middleS) => secondaries.reduce((sum, { turns }, index) => sum + (turns / primaryTurns) * inductor(index)(tS, middleS), 0)
  const feeds = (middleS: number) => on(middleS) || input.idle === 'shorted'
  /** Share of the secondaries' ampere-turns that the magnetising current takes while the primary is open. */
  const taken: PieceValue = (tS, middleS) => {
    const load = loadA(tS, middleS)
    const magnetisingA = magnetising(tS, middleS)
    return load <= Math.abs(magnetisingA) ? (load > 0 ? Math.sign(magnetisingA) : 0) : magnetisingA / load
  }
  const primaryA: PieceValue = (tS, middleS) => {
    const magnetisingA = magnetising(tS, middleS)
    if (feeds(middleS)) return magnetisingA + sign(middleS) * loadA(tS, middleS)
    return magnetisingA - taken(tS, middleS) * loadA(tS, middleS)
  }
  const voltage = (turns: number) => wave((_, middleS) => (on(middleS) ? (sign(middleS) * driveV * turns) / primaryTurns : 0))

  const halfWinding = (index: number, half: 1 | -1): PieceValue => (tS, middleS) => {
    const inductorA = inductor(index)(tS, middleS)
    if (feeds(middleS)) return sign(middleS) === half ? -half * inductorA : 0
    return (-half * inductorA + taken(tS, middleS) * inductorA) / 2
  }
  const wholeWinding = (index: number): PieceValue => (tS, middleS) => {
    const inductorA = inductor(index)(tS, middleS)
    return feeds(middleS) ? -sign(middleS) * inductorA : taken(tS, middleS) * inductorA
  }
  const secondary = ({ turns, rectifier }: BridgeSecondary, index: number): WindingWaveforms[] => {
    const voltageV = voltage(turns)
    const values = rectifier === 'centre-tapped' ? [halfWinding(index, 1), halfWinding(index, -1)] : [wholeWinding(index)]
    return values.map((value) => ({ currentA: current(value), voltageV }))
  }
  return {
    primaries: primaries(input, { current, primaryA, voltageV: voltage(primaryTurns), sign, on }),
    secondaries: secondaries.map(secondary),
    inductorsA: secondaries.map((_, index) => wave(inductor(index))),
    supplyA: wave((tS, middleS) => (on(middleS) ? sign(middleS) * primaryA(tS, middleS) : 0)),
    magnetisingA: wave(magnetising),
    fluxWb: wave((tS, middleS) => (magnetising(tS, middleS) * primaryInductanceH) / primaryTurns),
  }
}

interface PrimaryParts {
  current: (value: PieceValue) => Waveform
  primaryA: PieceValue
  voltageV: Waveform
  sign: (middleS: number) => number
  on: (middleS: number) => boolean
}

/** A tapped primary conducts in the half of its switch; what is left between the pulses flows through the diode of the other one. */
function primaries({ primary }: BridgeInput, { current, primaryA, voltageV, sign, on }: PrimaryParts): WindingWaveforms[] {
  if (primary === 'single') return [{ currentA: current(primaryA), voltageV }]
  const half = (own: 1 | -1): PieceValue => (tS, middleS) => {
    const conducts = on(middleS) ? sign(middleS) === own : sign(middleS) !== own
    return conducts ? primaryA(tS, middleS) : 0
  }
  return [1 as const, -1 as const].map((own) => ({ currentA: current(half(own)), voltageV }))
}

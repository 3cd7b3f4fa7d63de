import type { LlcDuty, ResonantOutput } from '../duties/llc'
import { offsetWaveform, sumWaveforms } from '../waveforms/combine'
import { maximum, mean } from '../waveforms/statistics'
import type { Waveform } from '../waveforms/waveform'
import { windingsNeeded } from './bridge-circuits'
import { greatestV } from './forced-outputs'
import { firstHarmonicGain, llcForOutput, seriesResonanceHz } from './llc'
import type { LlcState, LlcTank } from './llc'
import { llcInstants, llcWaveform } from './llc-waves'
import type { LlcInstant } from './llc-waves'
import { fedOutputs, loadOf, outputPowerW, regulatedIndex } from './outputs'
import type { FedOutput } from './outputs'
import { rectifierEnds } from './rectifier-ends'
import type { Circuit, CircuitFigure, CircuitFinding, CircuitInput, CircuitMode, CircuitState, OperatingPoint, OutputState, Topology, WindingEnds, WindingWaveforms } from './topology'
import { UnreachablePoint } from './unreachable'

type Input = CircuitInput<LlcDuty>
type Fed = FedOutput<ResonantOutput>

/** Least load that a state is made for, of full load: below it controllers leave out pulses. Source: common practice. */
const LEAST_LOAD = 1e-3

/** Frequencies nearer to the series resonance than this are called at it. */
const AT_RESONANCE = 0.005

function circuit(input: Input): Circuit {
  const { duty, windings, primary } = input
  const { fed, findings } = fedOutputs(duty.outputs, windings.filter(({ role }) => role !== 'primary'), primary.id, windingsNeeded)
  const uneven = fed.flatMap(({ windings: [one, other] }): CircuitFinding[] => (one && other && one.turns !== other.turns ? [{ code: 'half-windings-differ', severity: 'error', path: 'windings', values: { winding: one.name, other: other.name } }] : []))
  return { findings: [...findings, ...uneven], solve: fed.length > 0 ? (point) => stateOf(input, fed, point) : null }
}

const windingV = ({ voltageV, rectifierDropV }: ResonantOutput): number => Math.abs(voltageV) + rectifierDropV

const tankOf = ({ duty, inductanceH }: Input, inputV: number): LlcTank => ({
  sourceV: (inputV - duty.switchDropV) / 2,
  resonantInductanceH: duty.resonantInductanceH,
  resonantCapacitanceF: duty.resonantCapacitanceF,
  magnetisingInductanceH: inductanceH,
})

interface Load {
  /** Regulated output with its drop, at the primary. */
  outputV: number
  /** Mean rectified current, at the primary, losses beyond the drops included. */
  outputA: number
  /** Share of the ampere-turns per output. */
  shares: number[]
}

/**
 * The load at the primary. The outputs share the rectified ampere-turns in proportion to load, and losses beyond the stated drops
 * pass through the secondaries as more current, which is on the safe side for their wire.
 */
function loadAt({ duty, primary }: Input, fed: readonly Fed[], point: OperatingPoint): Load {
  const regulated = fed[regulatedIndex(fed)]!
  const perTurnV = windingV(regulated.output) / regulated.windings[0]!.turns
  const ampereTurns = fed.map(({ output, windings }) => windings[0]!.turns * Math.max(loadOf(output, point), LEAST_LOAD * output.fullLoadCurrentA))
  const sum = ampereTurns.reduce((total, one) => total + one, 0)
  const fullAmpereTurns = fed.reduce((total, { output, windings }) => total + windings[0]!.turns * output.fullLoadCurrentA, 0)
  const lossFactor = Math.max(1, outputPowerW(duty) / duty.efficiency / (perTurnV * fullAmpereTurns))
  return { outputV: perTurnV * primary.turns, outputA: (lossFactor * sum) / primary.turns, shares: ampereTurns.map((one) => one / sum) }
}

function stateOf(input: Input, fed: readonly Fed[], point: OperatingPoint): CircuitState {
  const { duty, primary } = input
  const { inputV } = point
  const tank = tankOf(input, inputV)
  const load = loadAt(input, fed, point)
  const answer = llcForOutput(tank, load)
  if (answer.state === 'not-reached') throw notReached(point, answer.nearestGain, load.outputV / tank.sourceV)
  const { llc } = answer
  const instants = llcInstants(llc)
  const wave = (value: (instant: LlcInstant) => number) => llcWaveform(llc, instants, value)
  const resonantA = wave((one) => one.resonantA)
  const magnetisingV = wave((one) => one.magnetisingV)
  const capacitorV = wave((one) => one.capacitorV)
  const terminalV = duty.resonantInductor === 'leakage' ? wave((one) => one.half * tank.sourceV - one.capacitorV) : magnetisingV
  const secondaries = fed.map((one, index) => secondaryWaves(one, load.shares[index]!, primary.turns, wave))
  return {
    mode: modeOf(llc),
    dutyRatio: 0.5,
    frequencyHz: llc.frequencyHz,
    windings: new Map<string, WindingWaveforms>([[primary.id, { currentA: resonantA, voltageV: terminalV }], ...secondaries.flat()]),
    ends: endsOf(input, fed, { capacitorV, terminalV, secondaries, inputV }),
    fluxWb: wave((one) => (one.magnetisingA * input.inductanceH) / primary.turns),
    inputPowerW: (inputV / 2) * mean(wave((one) => one.half * one.resonantA)),
    switchPeakV: inputV + (duty.clampSpikeV ?? 0),
    switchPeakA: maximum(resonantA),
    switchSlopeAPerS: (tank.sourceV + load.outputV) / duty.resonantInductanceH,
    outputs: fed.map((one, index) => outputState(one, { load, share: load.shares[index]!, primaryTurns: primary.turns, wave, mode: modeOf(llc) })),
    commutationS: null,
    figures: figuresOf(input, llc, inputV),
    findings: frequencyFindings(duty, llc),
  }
}

const notReached = ({ inputV, load }: OperatingPoint, gain: number, needed: number) =>
  // Without load hardly any tank regulates by frequency alone: the controller then leaves out pulses.
  new UnreachablePoint({ code: 'gain-not-reachable', severity: load === 'full' ? 'error' : 'note', path: 'requirement.duty.resonantInductanceH', values: { inputV, gain, needed } })

function modeOf(state: LlcState): CircuitMode {
  const x = state.frequencyHz / seriesResonanceHz(state.tank)
  return Math.abs(x - 1) < AT_RESONANCE ? 'at-resonance' : x < 1 ? 'below-resonance' : 'above-resonance'
}

/** Rectified current at the primary, with the sign of the primary's. */
const rectified = ({ mode, resonantA, magnetisingA }: LlcInstant): number => (mode === 'O' ? 0 : resonantA - magnetisingA)

type Wave = (value: (instant: LlcInstant) => number) => Waveform

/** Halves conduct in turn, the first while the dotted ends are positive; currents leave at the positive end. */
function secondaryWaves({ output, windings }: Fed, share: number, primaryTurns: number, wave: Wave): [string, WindingWaveforms][] {
  const { turns } = windings[0]!
  const voltageV = wave(({ magnetisingV }) => (magnetisingV * turns) / primaryTurns)
  const currentA = (instant: LlcInstant) => (-rectified(instant) * share * primaryTurns) / turns
  if (output.rectifier === 'full-wave') return [[windings[0]!.id, { currentA: wave(currentA), voltageV }]]
  const half = (mode: LlcInstant['mode']) => wave((instant) => (instant.mode === mode ? currentA(instant) : 0))
  return [[windings[0]!.id, { currentA: half('P'), voltageV }], [windings[1]!.id, { currentA: half('N'), voltageV }]]
}

function outputState({ output, windings }: Fed, { load, share, primaryTurns, wave, mode }: { load: Load; share: number; primaryTurns: number; wave: Wave; mode: CircuitMode }): OutputState {
  const { turns } = windings[0]!
  const windingPeakV = (load.outputV * turns) / primaryTurns
  const magnitudeV = windingPeakV - output.rectifierDropV
  return {
    outputId: output.id,
    voltageV: output.voltageV < 0 ? -magnitudeV : magnitudeV,
    rectifiedA: wave((instant) => (Math.abs(rectified(instant)) * share * primaryTurns) / turns),
    rectifierPeakV: magnitudeV + (output.rectifier === 'centre-tapped' ? windingPeakV : 0),
    mode,
  }
}

/** Switched node, series inductor, primary, capacitor, return: the primary's finish lies on the capacitor. */
function endsOf({ primary }: Input, fed: readonly Fed[], { capacitorV, terminalV, secondaries, inputV }: { capacitorV: Waveform; terminalV: Waveform; secondaries: [string, WindingWaveforms][][]; inputV: number }): Map<string, WindingEnds> {
  const finish = offsetWaveform(capacitorV, inputV / 2)
  const ends = new Map<string, WindingEnds>([[primary.id, { start: sumWaveforms([finish, terminalV]), finish, startSpikeV: 0, finishSpikeV: 0 }]])
  fed.forEach((_, index) => secondaries[index]!.forEach(([id, { voltageV }], half, all) => ends.set(id, rectifierEnds(voltageV, all.length > 1 ? (half === 0 ? 'first-half' : 'second-half') : 'whole'))))
  return ends
}

function frequencyFindings({ minimumFrequencyHz, maximumFrequencyHz }: LlcDuty, { frequencyHz }: LlcState): CircuitFinding[] {
  if (frequencyHz >= minimumFrequencyHz && frequencyHz <= maximumFrequencyHz) return []
  const path = `requirement.duty.${frequencyHz < minimumFrequencyHz ? 'minimumFrequencyHz' : 'maximumFrequencyHz'}`
  return [{ code: 'frequency-out-of-range', severity: 'warning', path, values: { frequencyHz, minimumHz: minimumFrequencyHz, maximumHz: maximumFrequencyHz } }]
}

/** Gain, its first-harmonic approximation, and what switching at zero voltage asks and gets. */
function figuresOf({ duty, inductanceH }: Input, { tank, frequencyHz, outputV, outputA, segments }: LlcState, inputV: number): CircuitFigure[] {
  const turnOffA = -segments[0]!.from.resonantA
  const neededC = duty.bridgeCapacitanceF === null ? null : duty.bridgeCapacitanceF * inputV
  const availableC = duty.deadTimeS === null ? null : turnOffA * duty.deadTimeS
  return [
    { code: 'gain', value: outputV / tank.sourceV, unit: '', formula: 'U_o’/(U_in/2)', source: 'time-domain steady state' },
    { code: 'first-harmonic-gain', value: firstHarmonicGain({ ...duty, magnetisingInductanceH: inductanceH }, { frequencyHz, loadOhm: outputV / outputA }), unit: '', formula: '1/√((1 + (1 − 1/x²)/m)² + (Q·(x − 1/x))²), for choosing only', source: 'first-harmonic approximation, De Simone and others 2006' },
    { code: 'series-resonance', value: seriesResonanceHz(tank), unit: 'Hz', formula: '1/(2π·√(L_r·C_r))', source: 'definition' },
    { code: 'turn-off-current', value: turnOffA, unit: 'A', formula: 'i(T/2)', source: 'time-domain steady state' },
    { code: 'zero-voltage-charge', value: neededC, unit: 'C', formula: 'C_bridge·U_in', source: 'charge of the switched node' },
    { code: 'zero-voltage-margin', value: neededC === null || availableC === null ? null : availableC / neededC, unit: '', formula: 'i(T/2)·t_dead/(C_bridge·U_in), at least 1', source: 'charge of the switched node, current taken as constant in the dead time' },
  ]
}

export const LLC: Topology<LlcDuty> = {
  core: 'resonant',
  traits: (duty) => ({
    supply: duty.supply,
    outputs: duty.outputs,
    inputPowerW: outputPowerW(duty) / duty.efficiency,
    efficiency: duty.efficiency,
    currentLimit: duty.currentLimit,
    frequencyHz: { minimum: duty.minimumFrequencyHz, maximum: duty.maximumFrequencyHz },
    switchRatingV: duty.switchRatingV,
  }),
  circuit,
  // At the least frequency the regulated output clamps the winding for the longest time.
  worstPulse: ({ duty, primary, windings }) => {
    const { fed } = fedOutputs(duty.outputs, windings.filter(({ role }) => role !== 'primary'), primary.id, windingsNeeded)
    const regulated = fed[regulatedIndex(fed)]
    const voltV = regulated ? (windingV(regulated.output) * primary.turns) / regulated.windings[0]!.turns : greatestV(duty.supply) / 2
    return { voltSecondsVs: voltV / (4 * duty.minimumFrequencyHz), formula: 'N_p/N_s·(U_o + U_F)/(4·f_min)' }
  },
  words: {
    source: 'time domain, modes P, O, N; Lazar and Martinelli, APEC 2001',
    dutyRatio: () => 'half the period',
    switchPeakV: 'U_in + spike',
    flux: 'L_m·i_m/(N·A_e)',
    frequency: 'found so that the regulated output has its voltage',
  },
}

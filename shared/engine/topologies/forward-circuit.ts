import type { FilteredOutput } from '../duties/converter'
import type { ForwardDuty } from '../duties/forward'
import { offsetWaveform, scaleWaveform, steadyLike } from '../waveforms/combine'
import { maximum, mean } from '../waveforms/statistics'
import { commutationTimeS, dutyFindings, filteredState, forcedTraits, greatestV, outputStates, switchSlopeAPerS } from './forced-outputs'
import type { DriveInput, FilteredState } from './forced-outputs'
import { forwardReset, forwardState } from './forward'
import type { ForwardResetPath, ForwardState } from './forward'
import { fedOutputs } from './outputs'
import type { FedOutput } from './outputs'
import type { Circuit, CircuitFinding, CircuitInput, CircuitState, CircuitWinding, OperatingPoint, Topology, WindingEnds, WindingWaveforms } from './topology'
import { UnreachablePoint } from './unreachable'

type Input = CircuitInput<ForwardDuty>

interface Parts {
  fed: readonly FedOutput<FilteredOutput>[]
  resetWinding: CircuitWinding | null
}

const isReset = ({ role }: CircuitWinding) => role === 'reset'

function circuit(input: Input): Circuit {
  const { duty, windings, primary } = input
  const { fed, findings } = fedOutputs(duty.outputs, windings.filter((one) => !isReset(one)), primary.id)
  const resetWinding = duty.reset === 'reset-winding' ? (windings.find((one) => isReset(one) && one.id !== primary.id) ?? null) : null
  const missing = duty.reset === 'reset-winding' && !resetWinding
  return {
    findings: missing ? [...findings, { code: 'reset-winding-missing', severity: 'error', path: 'windings', values: {} }] : findings,
    solve: fed.length > 0 && !missing ? (point) => stateOf(input, { fed, resetWinding }, point) : null,
  }
}

function pathOf({ reset }: ForwardDuty, winding: CircuitWinding | null): ForwardResetPath {
  if (reset === 'reset-winding') return { kind: reset, turns: winding!.turns }
  return { kind: reset }
}

function stateOf(input: Input, { fed, resetWinding }: Parts, point: OperatingPoint): CircuitState {
  const { duty, primary, inductanceH } = input
  const { inputV } = point
  const drive: DriveInput = { duty, fed, primaryTurns: primary.turns, sourceV: inputV, maximumSourceV: greatestV(duty.supply), pulses: 1 }
  const filtered = filteredState(drive, point)
  const core = { inputVoltageV: inputV, switchDropV: duty.switchDropV, primaryTurns: primary.turns, dutyRatio: filtered.dutyRatio, reset: pathOf(duty, resetWinding) }
  const reset = forwardReset(core)
  if (filtered.dutyRatio + reset.resetShare > 1 + 1e-9) throw notReset(duty, filtered.dutyRatio, reset.resetShare)
  const onV = inputV - duty.switchDropV
  const stepA = fed.reduce((sum, { windings }, index) => sum + (windings[0]!.turns / primary.turns) * filtered.filters[index]!.maximumA, 0)
  const commutationS = commutationTimeS(input.leakageH(primary.id, fed.map(({ windings }) => windings[0]!.id)), stepA, onV)
  const state = forwardState({
    ...core,
    frequencyHz: duty.switchingFrequencyHz,
    primaryInductanceH: inductanceH,
    secondaries: fed.map(({ windings }, index) => ({ turns: windings[0]!.turns, filter: filtered.filters[index]! })),
    commutationS: commutationS ?? 0,
  })
  return {
    mode: filtered.filters[0]!.mode,
    dutyRatio: filtered.dutyRatio,
    frequencyHz: duty.switchingFrequencyHz,
    windings: windingsOf(input, { fed, resetWinding }, state),
    ends: endsOf(input, { fed, resetWinding }, state, inputV),
    fluxWb: state.fluxWb,
    inputPowerW: inputV * mean(state.supplyA),
    switchPeakV: duty.reset === 'two-switch' ? inputV : inputV + reset.resetVoltageV + (duty.clampSpikeV ?? 0),
    switchPeakA: maximum(state.supplyA),
    switchSlopeAPerS: switchSlopeAPerS(drive, filtered, { onV, inductanceH }),
    outputs: outputStates(drive, filtered, state.inductorsA, (turns) => (Math.max(reset.resetVoltageV, onV) * turns) / primary.turns),
    commutationS,
    figures: [{ code: 'reset-share', value: reset.resetShare, unit: '', formula: 'D·U_p/U_r', source: 'volt-second balance' }],
    findings: findingsOf(duty, filtered, reset.resetShare),
  }
}

function findingsOf(duty: ForwardDuty, { dutyRatio, filters }: FilteredState, resetShare: number): CircuitFinding[] {
  // At the controller's longest pulse the core must still have time to reset; an active clamp has it by its nature.
  const shareAtLimit = duty.maximumDutyRatio * (1 + resetShare / dutyRatio)
  const walks = duty.reset !== 'active-clamp' && shareAtLimit > 1 + 1e-9
  return [
    ...dutyFindings(duty, { dutyRatio, pulseShare: dutyRatio, mode: filters[0]!.mode }),
    ...(walks ? [resetFinding('warning', duty.maximumDutyRatio, shareAtLimit)] : []),
  ]
}

const resetFinding = (severity: CircuitFinding['severity'], dutyRatio: number, share: number): CircuitFinding => ({ code: 'reset-not-complete', severity, path: 'requirement.duty.maximumDutyRatio', values: { share, dutyRatio, leastRatio: dutyRatio / (1 - dutyRatio) } })

const notReset = (_: ForwardDuty, dutyRatio: number, resetShare: number) => new UnreachablePoint(resetFinding('error', dutyRatio, dutyRatio + resetShare))

function windingsOf({ primary }: Input, { fed, resetWinding }: Parts, state: ForwardState): Map<string, WindingWaveforms> {
  const windings = new Map<string, WindingWaveforms>([[primary.id, state.primary]])
  if (resetWinding && state.reset) windings.set(resetWinding.id, state.reset)
  fed.forEach((one, index) => windings.set(one.windings[0]!.id, state.secondaries[index]!))
  return windings
}

/**
 * One switch: the primary hangs on the input voltage. Two: it floats between the rails. The reset winding hangs on the input
 * voltage with its other end on its diode; every output has one end on its return.
 */
function endsOf({ duty, primary }: Input, { fed, resetWinding }: Parts, state: ForwardState, inputV: number): Map<string, WindingEnds> {
  const own = state.primary.voltageV
  const spike = { startSpikeV: 0, finishSpikeV: 0 }
  const half = scaleWaveform(own, 0.5)
  const ends = new Map<string, WindingEnds>()
  if (duty.reset === 'two-switch') ends.set(primary.id, { start: offsetWaveform(half, inputV / 2), finish: offsetWaveform(scaleWaveform(half, -1), inputV / 2), ...spike })
  else ends.set(primary.id, { start: steadyLike(own, inputV), finish: offsetWaveform(scaleWaveform(own, -1), inputV), startSpikeV: 0, finishSpikeV: duty.clampSpikeV ?? 0 })
  if (resetWinding && state.reset) ends.set(resetWinding.id, { start: offsetWaveform(state.reset.voltageV, inputV), finish: steadyLike(state.reset.voltageV, inputV), ...spike })
  fed.forEach(({ output, windings }, index) => {
    const { voltageV } = state.secondaries[index]!
    const none = steadyLike(voltageV, 0)
    ends.set(windings[0]!.id, { ...(output.voltageV < 0 ? { start: none, finish: scaleWaveform(voltageV, -1) } : { start: voltageV, finish: none }), ...spike })
  })
  return ends
}

export const FORWARD: Topology<ForwardDuty> = {
  core: 'unipolar',
  traits: forcedTraits,
  circuit,
  worstPulse: ({ duty }) => ({ voltSecondsVs: ((greatestV(duty.supply) - duty.switchDropV) * duty.maximumDutyRatio) / duty.switchingFrequencyHz, formula: '(U_max − U_sw)·D_max/f' }),
  words: {
    source: 'Erickson and Maksimović, Fundamentals of Power Electronics, ch. 2, 5 and 6',
    dutyRatio: (mode) => (mode === 'discontinuous' ? '√(2·L·I·U/((U_s − U)·U_s·T))' : '(U_out + U_F)/U_s'),
    switchPeakV: 'U_in + U_r + spike; U_in with two switches',
    flux: '∫u dt/(N·A_e)',
    commutation: 'L_leak·ΔI/U_p',
  },
}


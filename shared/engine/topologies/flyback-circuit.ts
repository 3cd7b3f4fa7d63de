import type { FlybackDuty } from '../specification'
import { scaleWaveform, steadyLike } from '../waveforms/combine'
import { mean } from '../waveforms/statistics'
import type { Waveform } from '../waveforms/waveform'
import { flybackState } from './flyback'
import type { FlybackState } from './flyback'
import { flybackBoundaryInductanceH } from './flyback-design'
import { fedOutputs, loadOf, outputPowerW, regulatedIndex } from './outputs'
import type { FedOutput } from './outputs'
import type { Circuit, CircuitInput, CircuitState, OperatingPoint, Topology, WindingEnds, WindingWaveforms } from './topology'

type Input = CircuitInput<FlybackDuty>
type Fed = FedOutput<FlybackDuty['outputs'][number]>

function circuit(input: Input): Circuit {
  const { duty, windings, primary } = input
  const { fed, findings } = fedOutputs(duty.outputs, windings, primary.id)
  return { findings, solve: fed.length > 0 ? (point) => stateOf(input, fed, point) : null }
}

function solve({ duty, primary, inductanceH }: Input, fed: readonly Fed[], point: OperatingPoint): FlybackState {
  return flybackState({
    inputVoltageV: point.inputV,
    switchDropV: duty.switchDropV,
    frequencyHz: duty.switchingFrequencyHz,
    primaryTurns: primary.turns,
    primaryInductanceH: inductanceH,
    outputs: fed.map(({ output, windings }) => ({ turns: windings[0]!.turns, voltageV: output.voltageV, rectifierDropV: output.rectifierDropV, currentA: loadOf(output, point) })),
    regulatedOutput: regulatedIndex(fed),
    losses: { kind: 'losses-transferred', efficiency: duty.efficiency },
  })
}

function stateOf(input: Input, fed: readonly Fed[], point: OperatingPoint): CircuitState {
  const { duty, primary, inductanceH } = input
  const { inputV } = point
  const state = solve(input, fed, point)
  const windings = new Map<string, WindingWaveforms>([[primary.id, state.primary]])
  fed.forEach((one, index) => windings.set(one.windings[0]!.id, state.outputs[index]!))
  return {
    mode: state.mode,
    dutyRatio: state.dutyCycle,
    frequencyHz: duty.switchingFrequencyHz,
    windings,
    ends: endsOf(input, fed, state, inputV),
    fluxWb: state.fluxWb,
    inputPowerW: inputV * mean(state.primary.currentA),
    switchPeakV: state.switchStressV + (duty.clampSpikeV ?? 0),
    switchPeakA: state.peakCurrentA,
    switchSlopeAPerS: inputV / inductanceH,
    outputs: fed.map(({ output }, index) => ({ outputId: output.id, voltageV: state.outputs[index]!.loadVoltageV, rectifiedA: state.outputs[index]!.currentA, rectifierPeakV: state.outputs[index]!.rectifierStressV, mode: state.mode })),
    commutationS: null,
    figures: [boundaryInductance(duty, state, inputV)],
    findings: [],
  }
}

/** The primary hangs on the input voltage and its other end on the switch; every output has one end on its return. */
function endsOf({ duty, primary }: Input, fed: readonly Fed[], state: FlybackState, inputV: number): Map<string, WindingEnds> {
  const ends = new Map<string, WindingEnds>()
  const own = state.primary.voltageV
  ends.set(primary.id, { start: steadyLike(own, inputV), finish: lowered(own, inputV), startSpikeV: 0, finishSpikeV: duty.clampSpikeV ?? 0 })
  fed.forEach(({ output, windings }, index) => {
    const { voltageV } = state.outputs[index]!
    const none = steadyLike(voltageV, 0)
    ends.set(windings[0]!.id, { ...(output.voltageV < 0 ? { start: voltageV, finish: none } : { start: none, finish: scaleWaveform(voltageV, -1) }), startSpikeV: 0, finishSpikeV: 0 })
  })
  return ends
}

const lowered = ({ periodS, points }: Waveform, fromV: number): Waveform => ({ periodS, points: points.map(([tS, value]) => [tS, fromV - value] as const) })

/** Inductance at which conduction is just continuous at this point. */
function boundaryInductance({ switchDropV, switchingFrequencyHz: frequencyHz }: FlybackDuty, { reflectedVoltageV, transferredPowerW }: FlybackState, inputV: number) {
  const inputVoltageV = inputV - switchDropV
  const value = flybackBoundaryInductanceH({ inputVoltageV, dutyCycle: reflectedVoltageV / (reflectedVoltageV + inputVoltageV), powerW: transferredPowerW, frequencyHz })
  return { code: 'boundary-inductance', value, unit: 'H', formula: '(U_p·D)²/(2·P·f)', source: 'Fairchild AN-4137; L. Dixon, SLUP127' }
}

export const FLYBACK: Topology<FlybackDuty> = {
  core: 'stores-energy',
  traits: (duty) => ({
    supply: duty.supply,
    outputs: duty.outputs,
    inputPowerW: outputPowerW(duty) / duty.efficiency,
    efficiency: duty.efficiency,
    currentLimit: duty.currentLimit,
    frequencyHz: { minimum: duty.switchingFrequencyHz, maximum: duty.switchingFrequencyHz },
    switchRatingV: duty.switchRatingV,
  }),
  circuit,
  words: {
    source: 'L. Dixon, SLUP127; Erickson and Maksimović, Fundamentals of Power Electronics, ch. 5 and 6',
    dutyRatio: (mode) => (mode === 'discontinuous' ? '√(2·L·P·f)/U_p' : 'U_R/(U_R + U_p)'),
    switchPeakV: 'U_in + U_R + spike',
    flux: 'L·i/(N·A_e)',
  },
}

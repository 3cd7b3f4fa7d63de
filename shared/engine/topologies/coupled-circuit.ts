import type { CoupledInductorDuty } from '../specification'
import { offsetWaveform, scaleWaveform, steadyLike, sumWaveforms } from '../waveforms/combine'
import { maximum, mean } from '../waveforms/statistics'
import { currentSlopesAPerS, seriesCapacitorInductorState } from './coupled-inductor'
import type { Circuit, CircuitFinding, CircuitInput, CircuitState, CircuitWinding, OperatingPoint, Topology } from './topology'

type Input = CircuitInput<CoupledInductorDuty>

const finding = (code: CircuitFinding['code'], severity: CircuitFinding['severity'], path: string, values: CircuitFinding['values'] = {}): CircuitFinding => ({ code, severity, path, values })

function circuit(input: Input): Circuit {
  const second = input.windings.find(({ id }) => id !== input.primary.id)
  if (!second) return { findings: [finding('output-without-winding', 'error', 'windings', { output: 'second winding' })], solve: null }
  const coupling = couplingOf(input, second)
  if (coupling === null) return { findings: [finding('coupling-not-known', 'warning', 'electrical.leakage')], solve: null }
  return { findings: [], solve: (point) => stateOf(input, { second, coupling }, point) }
}

/** The coupling follows from the leakage at the first winding with the second one shorted: k = √(1 − L_leak/L). */
function couplingOf({ primary, inductanceH, leakageH }: Input, second: CircuitWinding): number | null {
  const leakage = leakageH(primary.id, [second.id])
  if (leakage !== null && leakage < inductanceH) return Math.sqrt(1 - leakage / inductanceH)
  // With equal turns both windings see the same volts per turn, and the ripple divides evenly whatever the coupling.
  return second.turns === primary.turns ? 1 : null
}

function stateOf({ duty, primary, inductanceH }: Input, { second, coupling }: { second: CircuitWinding; coupling: number }, { inputV, load, loadFactor }: OperatingPoint): CircuitState {
  const pair = { turns: [primary.turns, second.turns] as const, inductanceH, coupling }
  const state = seriesCapacitorInductorState({
    pair,
    inputVoltageV: inputV - duty.switchDropV,
    outputVoltageV: duty.outputVoltageV,
    // The losses beyond the rectifier's raise the current on the input side, as a greater drop would.
    rectifierDropV: Math.max(duty.outputDropV, duty.outputVoltageV * (1 / duty.efficiency - 1)),
    outputCurrentA: (load === 'full' ? duty.outputCurrentA : 0) * loadFactor,
    frequencyHz: duty.switchingFrequencyHz,
  })
  const [one, other] = state.windings
  const sumA = sumWaveforms([one.currentA, other.currentA])
  const slopes = currentSlopesAPerS(pair, [inputV, inputV])
  const own = (voltageV: typeof one.voltageV, fromV: number) => ({ start: steadyLike(voltageV, fromV), finish: offsetWaveform(scaleWaveform(voltageV, -1), fromV), startSpikeV: 0, finishSpikeV: 0 })
  return {
    mode: state.mode,
    dutyRatio: state.dutyCycle,
    frequencyHz: duty.switchingFrequencyHz,
    windings: new Map([[primary.id, one], [second.id, other]]),
    ends: new Map([[primary.id, own(one.voltageV, inputV)], [second.id, own(other.voltageV, 0)]]),
    fluxWb: state.fluxWb[0],
    inputPowerW: inputV * mean(one.currentA),
    switchPeakV: inputV + duty.outputVoltageV + duty.outputDropV,
    switchPeakA: maximum(sumA),
    switchSlopeAPerS: slopes[0] + slopes[1],
    outputs: [],
    commutationS: null,
    figures: [],
    findings: [],
  }
}

export const COUPLED_INDUCTOR: Topology<CoupledInductorDuty> = {
  core: 'stores-energy',
  traits: (duty) => ({
    supply: duty.supply,
    outputs: [],
    inputPowerW: (duty.outputVoltageV * duty.outputCurrentA) / duty.efficiency,
    efficiency: duty.efficiency,
    currentLimit: duty.currentLimit,
    frequencyHz: { minimum: duty.switchingFrequencyHz, maximum: duty.switchingFrequencyHz },
    switchRatingV: null,
  }),
  circuit,
  // The switch carries both windings' currents; with more turns on the second they weigh more.
  limitWeight: ({ ratio }) => Math.max(1, ratio),
  words: {
    source: 'Severns and Bloom, coupled inductors; Erickson and Maksimović, ch. 5',
    dutyRatio: (mode) => (mode === 'discontinuous' ? '√(2·L·P·f)/U_p' : 'U_R/(U_R + U_p)'),
    switchPeakV: 'U_in + U_out + U_F',
    flux: 'L·i/(N·A_e)',
  },
}

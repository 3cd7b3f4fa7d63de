import type { InductorDuty, LineSupply } from '../duties/inductor'
import type { Supply } from '../specification'
import { offsetWaveform, scaleWaveform, steadyLike } from '../waveforms/combine'
import { maximum } from '../waveforms/statistics'
import type { Waveform } from '../waveforms/waveform'
import { boostInductorState, buckInductorState, lineBoostState } from './inductor'
import type { InductorState, LineBoostState } from './inductor'
import type { Circuit, CircuitFigure, CircuitInput, CircuitState, NamedPoint, OperatingPoint, Topology, WindingEnds } from './topology'

type Input = CircuitInput<InductorDuty>

const loadA = ({ outputCurrentA, lightLoadCurrentA }: InductorDuty, { load, loadFactor }: OperatingPoint) => (load === 'full' ? outputCurrentA : lightLoadCurrentA) * loadFactor

/** The losses beyond the rectifier's raise the current as a greater drop would. */
const dropV = ({ outputDropV, outputVoltageV, efficiency }: InductorDuty) => Math.max(outputDropV, outputVoltageV * (1 / efficiency - 1))

const circuit = (input: Input): Circuit => ({ findings: [], solve: (point) => (input.duty.use === 'line-boost' ? lineState(input, point) : converterState(input, point)) })

function converterState(input: Input, point: OperatingPoint): CircuitState {
  const { duty, inductanceH } = input
  const of = {
    inputVoltageV: point.inputV, switchDropV: duty.switchDropV, outputVoltageV: duty.outputVoltageV, rectifierDropV: dropV(duty),
    outputCurrentA: loadA(duty, point), frequencyHz: duty.switchingFrequencyHz, inductanceH,
  }
  const state = duty.use === 'buck' ? buckInductorState(of) : boostInductorState(of)
  const onA = state.dutyCycle / (state.dutyCycle + state.rectifierFraction)
  const meanA = state.mode === 'continuous' ? (state.peakCurrentA + state.minimumCurrentA) / 2 : (state.peakCurrentA / 2) * (state.dutyCycle + state.rectifierFraction)
  return {
    ...circuitState(input, state, point),
    fluxWb: scaleWaveform(state.fluxLinkageWb, 1 / input.primary.turns),
    inputPowerW: point.inputV * meanA * (duty.use === 'buck' ? onA : 1),
    switchPeakA: state.peakCurrentA,
    switchSlopeAPerS: (point.inputV - (duty.use === 'buck' ? duty.outputVoltageV : 0)) / inductanceH,
    figures: [ripple(state.rippleA, 'U_on·D/(L·f)')],
  }
}

/** The half-wave in one period with its mean squares; the flux reaches what it does at its greatest. */
function lineState(input: Input, point: OperatingPoint): CircuitState {
  const { duty, inductanceH, primary } = input
  const inputPowerW = (duty.outputVoltageV * loadA(duty, point)) / duty.efficiency
  const state = lineBoostState({ lineVoltageV: point.inputV / Math.SQRT2, outputVoltageV: duty.outputVoltageV, rectifierDropV: duty.outputDropV, inputPowerW, frequencyHz: duty.switchingFrequencyHz, inductanceH })
  const { equivalent } = state
  return {
    ...circuitState(input, equivalent, point),
    mode: state.crest.mode,
    dutyRatio: state.crest.dutyCycle,
    fluxWb: scaleWaveform(offsetWaveform(equivalent.fluxLinkageWb, inductanceH * state.greatestPeakA - maximum(equivalent.fluxLinkageWb)), 1 / primary.turns),
    inputPowerW,
    switchPeakA: state.greatestPeakA,
    switchSlopeAPerS: point.inputV / inductanceH,
    figures: lineFigures(state),
  }
}

const ripple = (value: number, formula: string): CircuitFigure => ({ code: 'ripple-current', value, unit: 'A', formula, source: 'Erickson and Maksimović, Fundamentals of Power Electronics, ch. 2' })

function lineFigures({ greatestRippleA, greatestPeakA, rippleRmsA, rmsA, discontinuousShare }: LineBoostState): CircuitFigure[] {
  const source = 'Erickson and Maksimović, Fundamentals of Power Electronics, ch. 18'
  return [
    ripple(greatestRippleA, 'greatest u·(1 − u/U_out)/(L·f) of the half-wave'),
    { code: 'half-wave-peak-current', value: greatestPeakA, unit: 'A', formula: 'greatest √2·P/U·sin θ + ΔI/2', source },
    { code: 'half-wave-rms-current', value: rmsA, unit: 'A', formula: '√⟨i² + ΔI²/12⟩ over θ', source },
    { code: 'half-wave-ripple-rms-current', value: rippleRmsA, unit: 'A', formula: '√⟨ΔI²/12⟩ over θ', source },
    { code: 'half-wave-discontinuous-share', value: discontinuousShare, unit: '1', formula: 'part of the half-wave in which the current stops', source },
  ]
}

function circuitState({ duty, primary }: Input, state: InductorState, { inputV }: OperatingPoint) {
  return {
    mode: state.mode,
    dutyRatio: state.dutyCycle,
    frequencyHz: duty.switchingFrequencyHz,
    windings: new Map([[primary.id, { currentA: state.currentA, voltageV: state.voltageV }]]),
    ends: new Map([[primary.id, endsOf(duty, state.voltageV, inputV)]]),
    switchPeakV: state.switchStressV,
    outputs: [],
    commutationS: null,
    findings: [],
  }
}

/** A buck's inductor hangs on the output, a boost's on the input. */
function endsOf({ use, outputVoltageV }: InductorDuty, voltageV: Waveform, inputV: number): WindingEnds {
  const spikes = { startSpikeV: 0, finishSpikeV: 0 }
  if (use === 'buck') return { start: offsetWaveform(voltageV, outputVoltageV), finish: steadyLike(voltageV, outputVoltageV), ...spikes }
  return { start: steadyLike(voltageV, inputV), finish: offsetWaveform(scaleWaveform(voltageV, -1), inputV), ...spikes }
}

function points(duty: InductorDuty): NamedPoint[] {
  const crest = duty.supply.kind === 'line' ? Math.SQRT2 : 1
  const { minimumV, nominalV, maximumV } = duty.supply
  const inputs = [['minimum-input', 'light-load-minimum-input', minimumV], ['nominal-input', 'light-load', nominalV], ['maximum-input', 'light-load-maximum-input', maximumV]] as const
  return [
    ...inputs.map(([name, , inputV]): NamedPoint => ({ name, inputV: inputV * crest, load: 'full', loadFactor: 1 })),
    ...(duty.lightLoadCurrentA > 0 ? inputs.map(([, name, inputV]): NamedPoint => ({ name, inputV: inputV * crest, load: 'light', loadFactor: 1 })) : []),
  ]
}

/** The part sees the crest of the line, as behind a bulk capacitor that never sags. */
const supplyOf = (supply: InductorDuty['supply']): Supply => (supply.kind === 'dc' ? supply : mainsOf(supply))
const mainsOf = ({ minimumV, nominalV, maximumV, lineFrequencyHz }: LineSupply): Supply => ({ kind: 'mains', minimumV, nominalV, maximumV, lineFrequencyHz, bulkCapacitanceF: 1, conductionTimeS: 0 })

export const INDUCTOR: Topology<InductorDuty> = {
  core: 'stores-energy',
  traits: (duty) => ({
    supply: supplyOf(duty.supply),
    outputs: [],
    inputPowerW: (duty.outputVoltageV * duty.outputCurrentA) / duty.efficiency,
    efficiency: duty.efficiency,
    currentLimit: duty.currentLimit,
    frequencyHz: { minimum: duty.switchingFrequencyHz, maximum: duty.switchingFrequencyHz },
    switchRatingV: null,
  }),
  circuit,
  points,
  words: {
    source: 'Erickson and Maksimović, Fundamentals of Power Electronics, ch. 2, 5 and 18',
    dutyRatio: (mode) => (mode === 'discontinuous' ? '√(2·I·L·f/(U_on·(1 + U_on/U_off)))' : 'U_off/(U_on + U_off)'),
    switchPeakV: 'U_in or U_out, with the rectifier',
    flux: 'L·i/(N·A_e)',
  },
}

import type { CommonModeChokeDuty } from '../duties/common-mode-choke'
import { scaleWaveform, steadyLike } from '../waveforms/combine'
import { peak } from '../waveforms/statistics'
import { commonModeChokeState, inductiveImpedanceOhm } from './common-mode-choke'
import type { Circuit, CircuitFigure, CircuitFinding, CircuitInput, CircuitState, CircuitWinding, OperatingPoint, Topology, WindingEnds, WindingWaveforms } from './topology'

type Input = CircuitInput<CommonModeChokeDuty>

function circuit(input: Input): Circuit {
  const { primary, windings } = input
  const second = windings.find(({ id }) => id !== primary.id)
  if (!second) return { findings: [{ code: 'output-without-winding', severity: 'error', path: 'windings', values: { output: 'second line' } }], solve: null }
  const leakageH = input.leakageH(primary.id, [second.id])
  return { findings: findingsOf(primary, second, leakageH), solve: (point) => stateOf(input, { second, leakageH }, point) }
}

function findingsOf(primary: CircuitWinding, second: CircuitWinding, leakageH: number | null): CircuitFinding[] {
  const unequal: CircuitFinding[] = primary.turns === second.turns ? [] : [{ code: 'choke-turns-differ', severity: 'error', path: 'windings', values: { winding: primary.name, turns: primary.turns, other: second.name, otherTurns: second.turns } }]
  return leakageH === null ? [...unequal, { code: 'differential-leakage-not-known', severity: 'warning', path: 'electrical.commonMode', values: {} }] : unequal
}

function stateOf({ duty, primary, inductanceH }: Input, { second, leakageH }: { second: CircuitWinding; leakageH: number | null }, { inputV, loadFactor }: OperatingPoint): CircuitState {
  const state = commonModeChokeState({ turns: primary.turns, inductanceH, differentialLeakageH: leakageH ?? 0, lineRmsA: duty.lineCurrentA * loadFactor, linePeakA: duty.linePeakA * loadFactor, lineFrequencyHz: duty.lineFrequencyHz })
  const windings = new Map<string, WindingWaveforms>([[primary.id, state.windings[0]], [second.id, state.windings[1]]])
  const ends = (voltageV: WindingWaveforms['voltageV'], baseV: number): WindingEnds => ({ start: steadyLike(voltageV, baseV), finish: steadyLike(voltageV, baseV), startSpikeV: 0, finishSpikeV: 0 })
  return {
    mode: 'forced',
    dutyRatio: 1,
    frequencyHz: duty.lineFrequencyHz === 0 ? duty.switchingFrequencyHz : duty.lineFrequencyHz,
    windings,
    // The two lines lie at the rated voltage's crest against each other.
    ends: new Map([[primary.id, ends(state.windings[0].voltageV, inputV)], [second.id, ends(state.windings[1].voltageV, 0)]]),
    fluxWb: scaleWaveform(state.differentialFluxLinkageWb, 1 / primary.turns),
    inputPowerW: 0,
    switchPeakV: null,
    switchPeakA: null,
    switchSlopeAPerS: null,
    outputs: [],
    commutationS: null,
    figures: [...leakageFigures(leakageH, peak(state.differentialFluxLinkageWb)), ...impedances(duty, inductanceH)],
    findings: [],
  }
}

function leakageFigures(leakageH: number | null, linkageWb: number): CircuitFigure[] {
  const source = 'M. Nave, Power Line Filter Design for Switched-Mode Power Supplies'
  return [
    { code: 'differential-leakage', value: leakageH, unit: 'H', formula: 'at one winding, the other shorted', source },
    { code: 'differential-flux-linkage', value: leakageH === null ? null : linkageWb, unit: 'V·s', formula: 'L_dm·Î', source },
  ]
}

/** The material's permeability falls with frequency, which these values do not know: they hold below its corner. */
const impedances = ({ impedance }: CommonModeChokeDuty, inductanceH: number): CircuitFigure[] =>
  impedance.map(({ frequencyHz }) => ({ code: 'common-mode-impedance', value: inductiveImpedanceOhm(inductanceH, frequencyHz), unit: 'Ω', formula: `2π·f·L at ${frequencyHz} Hz, permeability taken as constant`, source: 'definition of inductance' }))

export const COMMON_MODE_CHOKE: Topology<CommonModeChokeDuty> = {
  core: 'bipolar',
  traits: ({ switchingFrequencyHz }) => ({ supply: null, outputs: [], inputPowerW: null, efficiency: null, currentLimit: null, frequencyHz: { minimum: switchingFrequencyHz, maximum: switchingFrequencyHz }, switchRatingV: null }),
  circuit,
  points: ({ ratedVoltageV, lineFrequencyHz }) => [{ name: 'nominal-input', inputV: ratedVoltageV * (lineFrequencyHz === 0 ? 1 : Math.SQRT2), load: 'full', loadFactor: 1 }],
  words: { source: 'M. Nave, Power Line Filter Design for Switched-Mode Power Supplies', dutyRatio: () => 'no switching', switchPeakV: '', flux: 'L_dm·i/(N·A_e)' },
}

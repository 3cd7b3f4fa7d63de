import type { CurrentSenseDuty } from '../duties/current-sense'
import { steadyLike } from '../waveforms/combine'
import { mean, meanSquare } from '../waveforms/statistics'
import { alternatingSenseState, pulseSenseState } from './current-sense'
import type { CurrentSenseState } from './current-sense'
import type { Circuit, CircuitFigure, CircuitFinding, CircuitInput, CircuitState, CircuitWinding, OperatingPoint, Topology, WindingEnds, WindingWaveforms } from './topology'

type Input = CircuitInput<CurrentSenseDuty>

interface Sense {
  /** Null where the measured conductor passes through the core and is no winding of the part. */
  primary: CircuitWinding | null
  secondary: CircuitWinding
  secondaryInductanceH: number
}

function circuit(input: Input): Circuit {
  const { windings, primary: stated, inductanceH } = input
  const secondary = windings.find(({ role }) => role === 'secondary') ?? null
  if (!secondary) return { findings: [{ code: 'output-without-winding', severity: 'error', path: 'windings', values: { output: 'burden' } }], solve: null }
  const sense: Sense = { primary: windings.find(({ role }) => role === 'primary') ?? null, secondary, secondaryInductanceH: inductanceH * (secondary.turns / stated.turns) ** 2 }
  return { findings: ratioFindings(input, sense), solve: (point) => stateOf(input, sense, point) }
}

/** How far the ratio of turns may lie from the one asked. Source: common practice. */
const RATIO_TOLERANCE = 0.01

function ratioFindings({ duty }: Input, { primary, secondary }: Sense): CircuitFinding[] {
  const ratio = secondary.turns / (primary?.turns ?? 1)
  return Math.abs(ratio / duty.ratio - 1) <= RATIO_TOLERANCE ? [] : [{ code: 'sense-ratio-differs', severity: 'warning', path: 'requirement.duty.ratio', values: { ratio, asked: duty.ratio } }]
}

function solve({ duty }: Input, { primary, secondary, secondaryInductanceH }: Sense, { loadFactor }: OperatingPoint): CurrentSenseState {
  const common = {
    primaryTurns: primary?.turns ?? 1, secondaryTurns: secondary.turns, secondaryInductanceH, burdenOhm: duty.burdenOhm,
    rectifierDropV: duty.rectifierDropV, primaryCurrentA: duty.maximumCurrentA * loadFactor, dutyCycle: duty.dutyRatio, frequencyHz: duty.switchingFrequencyHz,
  }
  if (duty.waveform !== 'unipolar-pulse') return alternatingSenseState({ ...common, waveform: duty.waveform, directCurrentA: duty.directCurrentA })
  // Without a voltage of its own the rectifier's drop and the burden reset: the drop alone is on the safe side.
  return pulseSenseState({ ...common, resetVoltageV: duty.resetVoltageV ?? Math.max(duty.rectifierDropV, Number.EPSILON) })
}

function stateOf(input: Input, sense: Sense, point: OperatingPoint): CircuitState {
  const { duty } = input
  const state = solve(input, sense, point)
  const windings = new Map<string, WindingWaveforms>([...(sense.primary ? [[sense.primary.id, state.primary] as const] : []), [sense.secondary.id, state.secondary]])
  return {
    mode: 'forced',
    dutyRatio: duty.waveform === 'sine' ? 1 : duty.dutyRatio,
    frequencyHz: duty.switchingFrequencyHz,
    windings,
    ends: new Map([...windings].map(([id, { voltageV }]): [string, WindingEnds] => [id, { start: voltageV, finish: steadyLike(voltageV, 0), startSpikeV: 0, finishSpikeV: 0 }])),
    fluxWb: state.fluxWb,
    inputPowerW: meanSquare(state.burdenVoltageV) / duty.burdenOhm + duty.rectifierDropV * Math.abs(mean(state.burdenVoltageV)) / duty.burdenOhm,
    switchPeakV: null,
    switchPeakA: null,
    switchSlopeAPerS: null,
    outputs: [],
    commutationS: null,
    figures: figuresOf(duty, state),
    findings: resetFindings(state),
  }
}

const LAW = 'L·di/dt = U_F + R·(I/n − i_m), integrated'

function figuresOf({ waveform, burdenOhm, directCurrentA, ratio }: CurrentSenseDuty, state: CurrentSenseState): CircuitFigure[] {
  const sine = waveform === 'sine'
  return [
    { code: 'magnetising-error', value: state.magnetisingError, unit: '1', formula: sine ? 'R/√(R² + ω²·L²)' : 'Î_m/(I/n)', source: LAW },
    { code: 'droop', value: state.droop, unit: '1', formula: sine ? '1 − ω·L/√(R² + ω²·L²)' : 'fall of the burden’s voltage over the pulse', source: LAW },
    { code: 'pulse-volt-seconds', value: state.voltSecondsVs, unit: 'V·s', formula: 'L·Δi_m at the secondary, rectifier and burden included', source: LAW },
    { code: 'burden-power', value: meanSquare(state.burdenVoltageV) / burdenOhm, unit: 'W', formula: '⟨u²⟩/R', source: 'Joule’s law' },
    { code: 'direct-magnetising-current', value: waveform === 'unipolar-pulse' ? 0 : directCurrentA / ratio, unit: 'A', formula: 'I_dc/n at the secondary', source: 'a direct current is not transformed' },
    ...(state.resetS === null ? [] : [
      { code: 'reset-time', value: state.resetS, unit: 's', formula: 'L·Î_m/U_reset', source: LAW },
      { code: 'reset-time-available', value: state.resetAvailableS, unit: 's', formula: '(1 − D)/f', source: 'duty' },
    ]),
  ]
}

const resetFindings = ({ resetS, resetAvailableS }: CurrentSenseState): CircuitFinding[] =>
  resetS !== null && resetAvailableS !== null && resetS > resetAvailableS ? [{ code: 'sense-reset-too-slow', severity: 'error', path: 'requirement.duty.resetVoltageV', values: { neededS: resetS, availableS: resetAvailableS } }] : []

/** Voltage at a primary of one turn for each turn of ratio: burden and rectifier over the ratio. */
const primaryVoltageV = ({ burdenOhm, ratio, rectifierDropV }: CurrentSenseDuty, currentA: number) => (rectifierDropV + (burdenOhm * currentA) / ratio) / ratio

export const CURRENT_SENSE: Topology<CurrentSenseDuty> = {
  core: 'unipolar',
  traits: ({ switchingFrequencyHz }) => ({ supply: null, outputs: [], inputPowerW: null, efficiency: null, currentLimit: null, frequencyHz: { minimum: switchingFrequencyHz, maximum: switchingFrequencyHz }, switchRatingV: null }),
  circuit,
  points: (duty) => [
    { name: 'nominal-input', inputV: primaryVoltageV(duty, duty.nominalCurrentA), load: 'full', loadFactor: duty.nominalCurrentA / duty.maximumCurrentA },
    { name: 'maximum-input', inputV: primaryVoltageV(duty, duty.maximumCurrentA), load: 'full', loadFactor: 1 },
  ],
  worstPulse: ({ duty, primary, windings }) => {
    const turns = windings.find(({ role }) => role === 'secondary')?.turns ?? primary.turns
    const secondaryVs = ((duty.rectifierDropV + (duty.burdenOhm * duty.maximumCurrentA) / duty.ratio) * (duty.waveform === 'sine' ? 1 / Math.PI : duty.dutyRatio)) / duty.switchingFrequencyHz
    return { voltSecondsVs: (secondaryVs * primary.turns) / turns, formula: duty.waveform === 'sine' ? '(U_F + R·I/n)/(π·f)' : '(U_F + R·I/n)·D/f' }
  },
  words: { source: LAW, dutyRatio: () => 'as stated', switchPeakV: '', flux: 'L·i_m/(N·A_e)' },
}

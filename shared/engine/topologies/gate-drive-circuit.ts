import type { GateDriveDuty } from '../duties/gate-drive'
import { steadyLike } from '../waveforms/combine'
import { gateDriveState } from './gate-drive'
import type { GateDriveState } from './gate-drive'
import type { Circuit, CircuitFigure, CircuitFinding, CircuitInput, CircuitState, CircuitWinding, OperatingPoint, Topology, WindingEnds, WindingWaveforms } from './topology'

type Input = CircuitInput<GateDriveDuty>

interface Gate {
  winding: CircuitWinding
  gateChargeC: number
}

function circuit(input: Input): Circuit {
  const { duty, windings, primary } = input
  const findings: CircuitFinding[] = []
  const gates = duty.outputs.flatMap((output, index): Gate[] => {
    const winding = windings.find(({ id, outputId }) => outputId === output.id && id !== primary.id)
    if (winding) return [{ winding, gateChargeC: output.gateChargeC }]
    findings.push({ code: 'output-without-winding', severity: 'error', path: `requirement.duty.outputs.${index}`, values: { output: output.name } })
    return []
  })
  return { findings, solve: (point) => stateOf(input, gates, point) }
}

/** The pulse that asks most of the core: the longest, or behind a capacitor the one nearest to half the period. */
export const worstDuty = ({ drive, dutyRatio: { minimum, maximum } }: GateDriveDuty): number => {
  if (drive === 'bipolar') return Math.min(0.5, maximum)
  return minimum <= 0.5 && maximum >= 0.5 ? 0.5 : maximum < 0.5 ? maximum : minimum
}

function stateOf(input: Input, gates: readonly Gate[], { inputV, loadFactor }: OperatingPoint): CircuitState {
  const { duty, primary, inductanceH } = input
  const dutyCycle = worstDuty(duty)
  const state = gateDriveState({
    drive: duty.drive,
    driverVoltageV: inputV,
    frequencyHz: duty.switchingFrequencyHz,
    dutyCycle,
    primaryTurns: primary.turns,
    primaryInductanceH: inductanceH,
    driverResistanceOhm: duty.driverResistanceOhm,
    couplingCapacitanceF: duty.couplingCapacitanceF,
    transitionS: duty.transitionS,
    gates: gates.map(({ winding, gateChargeC }) => ({ turns: winding.turns, gateChargeC: gateChargeC * loadFactor })),
  })
  const windings = new Map<string, WindingWaveforms>([[primary.id, state.primary], ...gates.map(({ winding }, index): [string, WindingWaveforms] => [winding.id, state.gates[index]!])])
  return {
    mode: 'forced',
    dutyRatio: dutyCycle,
    frequencyHz: duty.switchingFrequencyHz,
    windings,
    ends: new Map([...windings].map(([id, { voltageV }]): [string, WindingEnds] => [id, { start: voltageV, finish: steadyLike(voltageV, 0), startSpikeV: 0, finishSpikeV: 0 }])),
    fluxWb: state.fluxWb,
    inputPowerW: state.gatePowerW,
    switchPeakV: null,
    switchPeakA: null,
    switchSlopeAPerS: null,
    outputs: [],
    commutationS: null,
    figures: figuresOf(duty, state, firstPulseVs(duty, inputV)),
    findings: capacitorFindings(duty, state, inputV),
  }
}

const BALOGH = 'L. Balogh, Texas Instruments SLUA618'

/** The longest pulse at the start, when the capacitor is empty and the flux at zero. */
const firstPulseVs = ({ dutyRatio, switchingFrequencyHz }: GateDriveDuty, voltageV: number) => (voltageV * dutyRatio.maximum) / switchingFrequencyHz

function figuresOf(duty: GateDriveDuty, state: GateDriveState, firstVs: number): CircuitFigure[] {
  return [
    { code: 'pulse-volt-seconds', value: state.voltSecondsVs, unit: 'V·s', formula: duty.drive === 'bipolar' ? 'U·D/f' : 'U·D·(1 − D)/f', source: BALOGH },
    { code: 'first-pulse-volt-seconds', value: firstVs, unit: 'V·s', formula: 'U·D_max/f, before a coupling capacitor is charged', source: BALOGH },
    { code: 'magnetising-peak-current', value: state.peakMagnetisingA, unit: 'A', formula: 'λ/(2·L)', source: 'Faraday’s law' },
    { code: 'droop', value: state.droop, unit: '1', formula: '1 − e^(−R·t/L)', source: 'IEC 61007; pulse into a resistance and an inductance' },
    { code: 'gate-power', value: state.gatePowerW, unit: 'W', formula: 'Σ Q·N_s/N_p·U·f for each charge', source: BALOGH },
    ...(state.capacitorRippleV === null ? [] : [{ code: 'coupling-capacitor-ripple', value: state.capacitorRippleV, unit: 'V', formula: '(Σ Q·N_s/N_p + Î_m·T/4)/C', source: BALOGH }]),
  ]
}

/** Share of the driver's voltage that the coupling capacitor's ripple may be. Source: common practice. */
const RIPPLE_SHARE = 0.1

function capacitorFindings({ drive }: GateDriveDuty, { capacitorRippleV }: GateDriveState, inputV: number): CircuitFinding[] {
  const path = 'requirement.duty.couplingCapacitanceF'
  if (drive === 'unipolar-dc-restored' && capacitorRippleV === null) return [{ code: 'coupling-capacitor-missing', severity: 'error', path, values: {} }]
  if (capacitorRippleV === null || capacitorRippleV <= RIPPLE_SHARE * inputV) return []
  return [{ code: 'coupling-capacitor-small', severity: 'warning', path, values: { rippleV: capacitorRippleV, usualV: RIPPLE_SHARE * inputV } }]
}

export const GATE_DRIVE: Topology<GateDriveDuty> = {
  core: 'bipolar',
  traits: ({ supply, switchingFrequencyHz }) => ({ supply, outputs: [], inputPowerW: null, efficiency: null, currentLimit: null, frequencyHz: { minimum: switchingFrequencyHz, maximum: switchingFrequencyHz }, switchRatingV: null }),
  circuit,
  points: ({ supply }) => [
    { name: 'minimum-input', inputV: supply.minimumV, load: 'full', loadFactor: 1 },
    { name: 'nominal-input', inputV: supply.nominalV, load: 'full', loadFactor: 1 },
    { name: 'maximum-input', inputV: supply.maximumV, load: 'full', loadFactor: 1 },
  ],
  // The capacitor is empty at the start, and the flux starts from zero: the whole pulse swings it to one side.
  worstPulse: ({ duty }) => ({ voltSecondsVs: firstPulseVs(duty, duty.supply.maximumV), formula: 'U_max·D_max/f' }),
  words: { source: `${BALOGH}; Faraday’s law`, dutyRatio: () => 'the pulse that asks most of the core', switchPeakV: 'U', flux: 'L·i_m/(N·A_e)' },
}


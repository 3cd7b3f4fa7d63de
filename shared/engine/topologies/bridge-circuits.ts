import type { BridgeOutput, FullBridgeDuty, HalfBridgeDuty, PushPullDuty } from '../duties/bridges'
import { offsetWaveform, scaleWaveform, steadyLike } from '../waveforms/combine'
import { maximum, mean, peak } from '../waveforms/statistics'
import type { Waveform } from '../waveforms/waveform'
import { bridgeState } from './bridge'
import type { BridgeInput, BridgeState } from './bridge'
import { commutationTimeS, dutyFindings, filteredState, forcedTraits, greatestV, outputStates, switchSlopeAPerS } from './forced-outputs'
import type { DriveInput } from './forced-outputs'
import { fedOutputs } from './outputs'
import type { FedOutput } from './outputs'
import { rectifierEnds } from './rectifier-ends'
import type { Circuit, CircuitFinding, CircuitInput, CircuitState, CircuitWinding, CircuitWords, OperatingPoint, Topology, WindingEnds, WindingWaveforms } from './topology'

type BridgeDuty = HalfBridgeDuty | FullBridgeDuty | PushPullDuty

/** What tells the three from each other. */
interface Form {
  /** Voltage that the primary takes from the supply over the input voltage. */
  sourceShare: number
  primary: BridgeInput['primary']
  idle: (duty: BridgeDuty) => BridgeInput['idle']
  /** Voltage of an open switch over the input voltage. */
  switchShare: number
}

const FORMS: Readonly<Record<BridgeDuty['topology'], Form>> = {
  'half-bridge': { sourceShare: 0.5, primary: 'single', idle: () => 'open', switchShare: 1 },
  'full-bridge': { sourceShare: 1, primary: 'single', idle: (duty) => (duty.topology === 'full-bridge' && duty.control === 'phase-shift' ? 'shorted' : 'open'), switchShare: 1 },
  'push-pull': { sourceShare: 1, primary: 'tapped', idle: () => 'open', switchShare: 2 },
}

interface Parts {
  fed: readonly FedOutput<BridgeOutput>[]
  /** One primary, or the two halves of a tapped one. */
  primaries: readonly CircuitWinding[]
}

/** Windings that a rectifier needs. */
export const windingsNeeded = ({ rectifier }: Pick<BridgeOutput, 'rectifier'>): number => (rectifier === 'centre-tapped' ? 2 : 1)

function circuit(input: CircuitInput<BridgeDuty>): Circuit {
  const { duty, windings, primary } = input
  const tapped = FORMS[duty.topology].primary === 'tapped'
  const other = tapped ? windings.find(({ id, role }) => id !== primary.id && role === 'primary') : undefined
  const primaries = other ? [primary, other] : [primary]
  const { fed, findings } = fedOutputs(duty.outputs, windings.filter(({ role }) => role !== 'primary' && role !== 'reset'), primary.id, windingsNeeded)
  const all = [...findings, ...halfFindings(primaries), ...fed.flatMap(({ windings: halves }) => halfFindings(halves))]
  if (tapped && !other) return { findings: [...all, { code: 'primary-lacks-half-winding', severity: 'error', path: 'windings', values: {} }], solve: null }
  return { findings: all, solve: fed.length > 0 ? (point) => stateOf(input, { fed, primaries }, point) : null }
}

function halfFindings([one, other]: readonly CircuitWinding[]): CircuitFinding[] {
  if (!one || !other || one.turns === other.turns) return []
  return [{ code: 'half-windings-differ', severity: 'error', path: 'windings', values: { winding: one.name, other: other.name } }]
}

function stateOf(input: CircuitInput<BridgeDuty>, parts: Parts, point: OperatingPoint): CircuitState {
  const { duty, primary, inductanceH } = input
  const { fed } = parts
  const form = FORMS[duty.topology]
  const sourceV = point.inputV * form.sourceShare
  const onV = sourceV - duty.switchDropV
  const drive: DriveInput = { duty, fed, primaryTurns: primary.turns, sourceV, maximumSourceV: greatestV(duty.supply) * form.sourceShare, pulses: 2 }
  const filtered = filteredState(drive, point)
  const stepA = fed.reduce((sum, { windings }, index) => sum + (windings[0]!.turns / primary.turns) * filtered.filters[index]!.maximumA, 0)
  const commutationS = commutationTimeS(input.leakageH(primary.id, fed.map(({ windings }) => windings[0]!.id)), stepA, onV)
  const state = bridgeState({
    driveV: onV,
    frequencyHz: duty.switchingFrequencyHz,
    primaryTurns: primary.turns,
    primaryInductanceH: inductanceH,
    dutyRatio: filtered.dutyRatio,
    primary: form.primary,
    idle: form.idle(duty),
    secondaries: fed.map(({ output, windings }, index) => ({ turns: windings[0]!.turns, rectifier: output.rectifier, filter: filtered.filters[index]! })),
    commutationS: commutationS ?? 0,
  })
  const doubled = (output: BridgeOutput | undefined) => (output?.rectifier === 'centre-tapped' ? 2 : 1)
  return {
    mode: filtered.filters[0]!.mode,
    dutyRatio: filtered.dutyRatio,
    frequencyHz: duty.switchingFrequencyHz,
    windings: windingsOf(parts, state),
    ends: endsOf(duty, parts, state, point.inputV),
    fluxWb: state.fluxWb,
    inputPowerW: sourceV * mean(state.supplyA),
    switchPeakV: form.switchShare * point.inputV + (duty.clampSpikeV ?? 0),
    switchPeakA: maximum(state.supplyA),
    switchSlopeAPerS: switchSlopeAPerS(drive, filtered, { onV, inductanceH }),
    outputs: outputStates(drive, filtered, state.inductorsA, (turns) => (onV * turns) / primary.turns).map((one) => ({ ...one, rectifierPeakV: one.rectifierPeakV! * doubled(fed.find(({ output }) => output.id === one.outputId)?.output) })),
    commutationS,
    figures: [{ code: 'magnetising-peak', value: peak(state.magnetisingA), unit: 'A', formula: 'U_p·D/(2·L·f)', source: 'Faraday’s law' }],
    findings: dutyFindings(duty, { dutyRatio: filtered.dutyRatio, pulseShare: 2 * filtered.dutyRatio, mode: filtered.filters[0]!.mode }),
  }
}

function windingsOf({ fed, primaries }: Parts, state: BridgeState): Map<string, WindingWaveforms> {
  const own = primaries.map(({ id }, index) => [id, state.primaries[index]!] as const)
  return new Map([...own, ...fed.flatMap(({ windings }, position) => windings.map(({ id }, half) => [id, state.secondaries[position]![half]!] as const))])
}

function endsOf(duty: BridgeDuty, { fed, primaries }: Parts, state: BridgeState, inputV: number): Map<string, WindingEnds> {
  const ends = new Map<string, WindingEnds>()
  primaryEnds(duty, state.primaries[0]!.voltageV, inputV).forEach((one, index) => ends.set(primaries[index]!.id, one))
  fed.forEach(({ windings }, position) =>
    windings.forEach(({ id }, half) => {
      const { voltageV } = state.secondaries[position]![half]!
      ends.set(id, rectifierEnds(voltageV, windings.length > 1 ? (half === 0 ? 'first-half' : 'second-half') : 'whole'))
    }))
  return ends
}

const plain = { startSpikeV: 0, finishSpikeV: 0 }

/** Half-bridge: from the switched node to the middle of the capacitors. Full bridge: between both nodes. Push-pull: the tap on the input voltage. */
function primaryEnds(duty: BridgeDuty, voltageV: Waveform, inputV: number): WindingEnds[] {
  const negative = scaleWaveform(voltageV, -1)
  if (duty.topology === 'half-bridge') return [{ start: offsetWaveform(voltageV, inputV / 2), finish: steadyLike(voltageV, inputV / 2), ...plain }]
  if (duty.topology === 'push-pull') {
    const spike = duty.clampSpikeV ?? 0
    return [
      { start: steadyLike(voltageV, inputV), finish: offsetWaveform(negative, inputV), startSpikeV: 0, finishSpikeV: spike },
      { start: offsetWaveform(voltageV, inputV), finish: steadyLike(voltageV, inputV), startSpikeV: spike, finishSpikeV: 0 },
    ]
  }
  if (duty.control === 'phase-shift') return [railEnds(voltageV, inputV)]
  return [{ start: offsetWaveform(scaleWaveform(voltageV, 0.5), inputV / 2), finish: offsetWaveform(scaleWaveform(negative, 0.5), inputV / 2), ...plain }]
}

/** Phase shift: both ends lie on the upper rail after a positive pulse and on the lower one after a negative pulse. */
function railEnds({ periodS, points }: Waveform, inputV: number): WindingEnds {
  let high = true
  const start = points.map(([tS, value]) => {
    if (value !== 0) high = value > 0
    return [tS, high ? inputV : 0] as const
  })
  const finish = points.map(([tS, value], index) => [tS, value > 0 ? 0 : value < 0 ? inputV : start[index]![1]] as const)
  return { start: { periodS, points: start }, finish: { periodS, points: finish }, ...plain }
}

const words = (drive: string, switchPeakV: string): CircuitWords => ({
  source: 'Erickson and Maksimović, Fundamentals of Power Electronics, ch. 2, 5 and 6',
  dutyRatio: (mode) => (mode === 'discontinuous' ? '½·√(2·L·I·U/((U_s − U)·U_s·T/2))' : `(U_out + U_F)/(2·U_s), U_p = ${drive}`),
  switchPeakV,
  flux: '∫u dt/(N·A_e), about zero',
  commutation: 'L_leak·ΔI/U_p',
})

const bridge = <D extends BridgeDuty>(topology: D['topology'], told: CircuitWords): Topology<D> => ({
  core: 'bipolar',
  traits: forcedTraits,
  circuit: circuit as Topology<D>['circuit'],
  worstPulse: ({ duty }) => ({ voltSecondsVs: ((greatestV(duty.supply) * FORMS[topology].sourceShare - duty.switchDropV) * Math.min(0.5, duty.maximumDutyRatio)) / duty.switchingFrequencyHz, formula: '(U_p,max − U_sw)·D_max/f, the first pulse from zero flux' }),
  words: told,
})

export const HALF_BRIDGE = bridge<HalfBridgeDuty>('half-bridge', words('U_in/2 − U_sw', 'U_in + spike'))
export const FULL_BRIDGE = bridge<FullBridgeDuty>('full-bridge', words('U_in − U_sw', 'U_in + spike'))
export const PUSH_PULL = bridge<PushPullDuty>('push-pull', words('U_in − U_sw', '2·U_in + spike'))

import type { FlybackDuty } from '../specification'
import { differenceOfWaveforms, offsetWaveform, scaleWaveform, steadyLike, sumWaveforms } from '../waveforms/combine'
import { maximum } from '../waveforms/statistics'
import type { Waveform } from '../waveforms/waveform'
import { flybackBranches, outputVoltagesV } from './flyback-branches'
import type { FlybackBranch } from './flyback-branches'
import { flybackBoundaryInductanceH } from './flyback-design'
import type { UnitLeakage } from './flyback-leakage'
import { magnetisingCurrentA, solveFlyback } from './flyback-solve'
import type { FlybackParts, SolvedFlyback } from './flyback-solve'
import { fedOutputs, outputPowerW, regulatedIndex } from './outputs'
import type { Circuit, CircuitFigure, CircuitFinding, CircuitInput, CircuitState, OperatingPoint, Topology, WindingEnds, WindingWaveforms } from './topology'

type Input = CircuitInput<FlybackDuty>

function circuit(input: Input): Circuit {
  const { duty, windings, primary, inductanceH } = input
  const { fed, findings } = fedOutputs(duty.outputs, windings, primary.id)
  const { branches, findings: stacking } = flybackBranches(fed)
  const unitLeakageH = duty.sharing === 'from-leakages' && fed.length > 1 ? unitLeakages(input, branches) : null
  const parts: FlybackParts = {
    duty, primaryTurns: primary.turns, inductanceH, branches, regulated: regulatedIndex(fed),
    commonLeakageH: input.leakageH(primary.id, branches.map(({ winding }) => winding.id)),
    unitLeakageH: hasClamp(duty) ? unitLeakageH : null,
  }
  return { findings: [...findings, ...stacking, ...sharingFindings(parts, unitLeakageH)], solve: fed.length > 0 ? (point) => stateOf(input, parts, point) : null }
}

const hasClamp = ({ clampSpikeV }: FlybackDuty) => clampSpikeV !== null && clampSpikeV > 0

/** Leakages of all pairs at unit turns; null where one of them is not known. */
function unitLeakages({ primary, leakageH }: Input, branches: readonly FlybackBranch[]): UnitLeakage | null {
  const windings = [primary, ...branches.map(({ winding }) => winding)]
  const table = windings.map((one, j) => windings.map((other, k) => (k <= j ? null : leakageH(one.id, [other.id]))))
  if (table.some((row, j) => row.some((value, k) => k > j && !(value !== null && value > 0)))) return null
  return (j, k) => table[j]![k]! / windings[j]!.turns ** 2
}

function sharingFindings({ duty, branches }: FlybackParts, unitLeakageH: UnitLeakage | null): CircuitFinding[] {
  if (duty.sharing !== 'from-leakages' || branches.length < 2 || (unitLeakageH && hasClamp(duty))) return []
  return [{ code: 'sharing-not-known', severity: 'warning', path: hasClamp(duty) ? 'requirement.duty.sharing' : 'requirement.duty.clampSpikeV', values: { reason: hasClamp(duty) ? 'leakage' : 'clamp' } }]
}

// ---------------------------------------------------------------------------------------------

function stateOf(input: Input, parts: FlybackParts, point: OperatingPoint): CircuitState {
  const { duty, primary, inductanceH } = input
  const { inputV } = point
  const solved = solveFlyback(parts, point)
  const voltages = outputVoltagesV(parts.branches, solved.branchVoltagesV)
  return {
    mode: solved.mode,
    dutyRatio: solved.dutyCycle,
    frequencyHz: solved.frequencyHz,
    windings: new Map([[primary.id, solved.primary], ...windingsOf(parts, solved)]),
    ends: endsOf(input, parts, solved, { inputV, voltages }),
    fluxWb: scaleWaveform(magnetisingCurrentA(solved, parts), inductanceH / primary.turns),
    inputPowerW: solved.inputPowerW,
    switchPeakV: inputV + solved.reflectedVoltageV + (duty.clampSpikeV ?? 0),
    switchPeakA: solved.peakCurrentA,
    switchSlopeAPerS: inputV / inductanceH,
    outputs: parts.branches.map(({ fed }, index) => ({
      outputId: fed.output.id, voltageV: voltages[index]!, rectifiedA: solved.branches[index]!.currentA, rectifierPeakV: rectifierPeakV(parts, solved, index), mode: solved.mode,
    })),
    commutationS: solved.commutationS,
    figures: figuresOf(parts, solved, point),
    findings: [...solved.findings, ...slopeFindings(parts, solved, inputV)],
  }
}

/** Own current and voltage of each winding: of windings in series the lower one carries both branches' currents. */
function windingsOf({ branches }: FlybackParts, { branches: waves }: SolvedFlyback): [string, WindingWaveforms][] {
  return branches.map(({ winding, through }, index): [string, WindingWaveforms] => {
    const carried = branches.flatMap((other, position) => (other.through.includes(index) ? [waves[position]!.currentA] : []))
    const below = through[1]
    return [winding.id, {
      currentA: carried.length > 1 ? sumWaveforms(carried) : carried[0]!,
      voltageV: below === undefined ? waves[index]!.voltageV : differenceOfWaveforms(waves[index]!.voltageV, waves[below]!.voltageV),
    }]
  })
}

/** The whole way's voltage while the switch conducts, and the output against it. */
const rectifierPeakV = ({ branches }: FlybackParts, { branches: waves, branchVoltagesV }: SolvedFlyback, index: number): number =>
  Math.max(0, maximum(waves[index]!.voltageV)) + branchVoltagesV[index]! - branches[index]!.fed.output.rectifierDropV

/**
 * The primary hangs on the input voltage and its other end on the switch; every output has one end on its return, on the lower
 * output or on the winding below. Where the commutation is solved, the clamp's spike is in the waveform.
 */
function endsOf({ duty, primary }: Input, parts: FlybackParts, solved: SolvedFlyback, { inputV, voltages }: { inputV: number; voltages: readonly number[] }): Map<string, WindingEnds> {
  const ends = new Map<string, WindingEnds>()
  const own = solved.primary.voltageV
  const spikeV = solved.commutationS === null ? (duty.clampSpikeV ?? 0) : 0
  ends.set(primary.id, { start: steadyLike(own, inputV), finish: offsetWaveform(scaleWaveform(own, -1), inputV), startSpikeV: 0, finishSpikeV: spikeV })
  parts.branches.forEach((branch, index) => {
    const { voltageV } = solved.branches[index]!
    const baseV = branch.standsOn >= 0 ? voltages[branch.standsOn]! : 0
    const below = branch.through[1]
    const near = below === undefined ? steadyLike(voltageV, baseV) : rectified(parts.branches[below]!, solved.branches[below]!.voltageV, voltages[parts.branches[below]!.standsOn] ?? 0)
    const far = rectified(branch, voltageV, baseV)
    ends.set(branch.winding.id, { ...(branch.fed.output.voltageV < 0 ? { start: far, finish: near } : { start: near, finish: far }), startSpikeV: 0, finishSpikeV: 0 })
  })
  return ends
}

/** Potential at the rectifier's end of a way. */
const rectified = ({ fed }: FlybackBranch, voltageV: Waveform, baseV: number): Waveform => offsetWaveform(fed.output.voltageV < 0 ? voltageV : scaleWaveform(voltageV, -1), baseV)

// ---------------------------------------------------------------------------------------------

function figuresOf({ duty, inductanceH, commonLeakageH }: FlybackParts, solved: SolvedFlyback, { inputV }: OperatingPoint): CircuitFigure[] {
  const { reflectedVoltageV, transferredPowerW, frequencyHz, peakCurrentA } = solved
  const inputVoltageV = inputV - duty.switchDropV
  const boundary = flybackBoundaryInductanceH({ inputVoltageV, dutyCycle: reflectedVoltageV / (reflectedVoltageV + inputVoltageV), powerW: transferredPowerW, frequencyHz })
  const clampV = reflectedVoltageV + (duty.clampSpikeV ?? 0)
  const loss = commonLeakageH !== null && hasClamp(duty) ? clampLossW({ leakageH: commonLeakageH, peakCurrentA, frequencyHz, clampV, reflectedV: reflectedVoltageV }) : null
  return [
    { code: 'boundary-inductance', value: boundary, unit: 'H', formula: '(U_p·D)²/(2·P·f)', source: 'Fairchild AN-4137; L. Dixon, SLUP127' },
    { code: 'reflected-voltage', value: reflectedVoltageV, unit: 'V', formula: 'N_p·(U_out + U_F)/N_s', source: 'volt-second balance' },
    { code: 'magnetising-valley-current', value: solved.minimumCurrentA, unit: 'A', formula: solved.model, source: 'energy balance; inductance matrix where commutation is solved' },
    { code: 'clamp-loss', value: solved.clampPowerW ?? loss, unit: 'W', formula: solved.clampPowerW === null ? '½·L_leak·Î²·f·U_c/(U_c − U_R)' : 'U_c·∫i dt·f while the current passes over', source: 'energy of the leakage inductance with the reflected voltage in series' },
    ...(solved.valley ? [
      { code: 'valley-number', value: solved.valley.valley, unit: '1', formula: 'first minimum below the greatest frequency', source: 'Fairchild AN-4146' },
      { code: 'valley-dead-time', value: solved.valley.deadS, unit: 's', formula: '(2n − 1)·π·√(L·C)', source: 'LC circuit' },
    ] : []),
    ...(inductanceH > 0 ? [{ code: 'falling-slope', value: reflectedVoltageV / inductanceH, unit: 'A/s', formula: 'U_R/L at the primary', source: 'Faraday’s law' }] : []),
  ]
}

/**
 * Power that a clamp takes from the leakage inductance, ½·L·Î²·f·V_c/(V_c − V_R), in watt.
 *
 * Source: energy of the leakage with the reflected voltage in series while its current dies away (clamp design, application notes).
 */
export const clampLossW = ({ leakageH, peakCurrentA, frequencyHz, clampV, reflectedV }: { leakageH: number; peakCurrentA: number; frequencyHz: number; clampV: number; reflectedV: number }): number =>
  (0.5 * leakageH * peakCurrentA ** 2 * frequencyHz * clampV) / (clampV - reflectedV)

/** Peak-current control above half the period: the least slope that keeps it from period doubling, and the usual one. */
function slopeFindings({ duty, inductanceH }: FlybackParts, { mode, dutyCycle, reflectedVoltageV }: SolvedFlyback, inputV: number): CircuitFinding[] {
  if (mode !== 'continuous' || dutyCycle <= 0.5) return []
  const rising = (inputV - duty.switchDropV) / inductanceH
  const falling = reflectedVoltageV / inductanceH
  // Source: R. Erickson and D. Maksimović, Fundamentals of Power Electronics, ch. 12: m_a > (m_2 − m_1)/2.
  return [{ code: 'slope-compensation-needed', severity: 'note', path: 'requirement.duty', values: { dutyRatio: dutyCycle, leastAPerS: Math.max(0, (falling - rising) / 2), usualAPerS: falling / 2 } }]
}

export const FLYBACK: Topology<FlybackDuty> = {
  core: 'stores-energy',
  traits: (duty) => ({
    supply: duty.supply,
    outputs: duty.outputs,
    inputPowerW: outputPowerW(duty) / duty.efficiency,
    efficiency: duty.efficiency,
    currentLimit: duty.currentLimit,
    frequencyHz: { minimum: duty.switchingFrequencyHz, maximum: duty.conduction.kind === 'quasi-resonant' ? Math.max(duty.switchingFrequencyHz, duty.conduction.maximumFrequencyHz) : duty.switchingFrequencyHz },
    switchRatingV: duty.switchRatingV,
  }),
  circuit,
  words: {
    source: 'L. Dixon, SLUP127; Erickson and Maksimović, Fundamentals of Power Electronics, ch. 5 and 6',
    dutyRatio: (mode) => (mode === 'discontinuous' ? '√(2·L·P·f)/U_p' : 'U_R/(U_R + U_p)'),
    switchPeakV: 'U_in + U_R + spike',
    flux: 'L·i/(N·A_e)',
    frequency: 'as stated; quasi-resonant: 1/(L·Î·(1/U_p + 1/U_R) + t_d)',
    commutation: 'L_leak·Î/(U_c − U_R)',
  },
}

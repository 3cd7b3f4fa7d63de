import { flybackState } from '../topologies/flyback'
import type { FlybackState } from '../topologies/flyback'
import type { CornerResult } from '../evaluation'
import { worstCaseCurrentLimitA } from '../topologies/flyback-design'
import { scaleWaveform } from '../waveforms/combine'
import { maximum, mean, peakToPeak } from '../waveforms/statistics'
import type { FlybackDuty, Winding } from '../specification'
import { attempt, positive, report } from './context'
import type { Context } from './context'
import { cornerWinding } from './corner-result'
import type { CornerState, WindingWaves } from './corner-result'
import type { InductanceBasis } from './inductance'
import { outputPowerW, supplyRange } from './supply'
import type { SupplyRange } from './supply'

interface MappedOutput {
  winding: Winding
  output: FlybackDuty['outputs'][number]
}

interface FlybackInput {
  context: Context
  duty: FlybackDuty
  basis: InductanceBasis
  primary: Winding
  outputs: MappedOutput[]
  areaMm2: number | null
}

function inputOf(context: Context, duty: FlybackDuty, basis: InductanceBasis): FlybackInput | null {
  const { primary, core, sets } = context
  const outputs = primary ? mapOutputs(context, duty) : []
  if (!primary || outputs.length === 0) return null
  return { context, duty, basis, primary, outputs, areaMm2: core ? core.effectiveAreaMm2 * sets : null }
}

/** Full load at one direct input voltage; for the working voltage at the rated mains. */
export function flybackCornerAt(context: Context, duty: FlybackDuty, basis: InductanceBasis, inputV: number): CornerState | null {
  const input = inputOf({ ...context, findings: [] }, duty, basis)
  return input && corner(input, { name: 'nominal-input', inputV, load: fullLoadOf })
}

/** Corners of a flyback: minimum, nominal and maximum input at full load, light load, and the current limit. */
export function flybackCorners(context: Context, duty: FlybackDuty, basis: InductanceBasis): CornerState[] {
  const input = inputOf(context, duty, basis)
  if (!input) return []
  const range = dutySupply(context, duty)
  const fullLoad = (name: CornerResult['name'], inputV: number) => corner(input, { name, inputV, load: fullLoadOf })
  return [
    ...(positive(range.minimumV) ? [fullLoad('minimum-input', range.minimumV)] : []),
    fullLoad('nominal-input', range.nominalV),
    fullLoad('maximum-input', range.maximumV),
    lightLoad(input, range),
    currentLimit(input, range),
  ].filter((state) => state !== null)
}

/** The working range of voltages; without a valley of the bulk capacitor the minimum is left out. */
export function dutySupply(context: Context, duty: FlybackDuty): SupplyRange {
  const answer = attempt(context, 'requirement.duty.supply', () => supplyRange(duty.supply, outputPowerW(duty) / duty.efficiency))
  if (answer?.state === 'known') return answer.range
  if (answer) report(context, 'bulk-capacitor-too-small', 'error', 'requirement.duty.supply.bulkCapacitanceF', { missingEnergyJ: answer.missingEnergyJ })
  const { supply } = duty
  return { minimumV: Number.NaN, nominalV: supply.nominalV * Math.SQRT2, maximumV: supply.maximumV * Math.SQRT2 }
}

function mapOutputs(context: Context, duty: FlybackDuty): MappedOutput[] {
  const { windings } = context.specification
  return duty.outputs.flatMap((output, index) => {
    const feeding = windings.filter(({ outputId }) => outputId === output.id)
    const path = `requirement.duty.outputs.${index}`
    if (feeding.length === 0) report(context, 'output-without-winding', 'error', path, { output: output.name })
    if (feeding.length > 1) report(context, 'output-has-several-windings', 'warning', path, { output: output.name, windings: feeding.map(({ name }) => name).join(', ') })
    const winding = feeding[0]
    return winding && positive(winding.turns) && winding.id !== context.primary?.id ? [{ winding, output }] : []
  })
}

const fullLoadOf = ({ output }: MappedOutput) => output.fullLoadCurrentA

interface CornerInput {
  name: CornerResult['name']
  inputV: number
  load: (mapped: MappedOutput) => number
}

function solve({ duty, basis, primary, outputs }: FlybackInput, { inputV, load }: Pick<CornerInput, 'inputV' | 'load'>): FlybackState {
  const regulated = Math.max(0, outputs.findIndex(({ output }) => output.role === 'main'))
  return flybackState({
    inputVoltageV: inputV,
    switchDropV: duty.switchDropV,
    frequencyHz: duty.switchingFrequencyHz,
    primaryTurns: primary.turns,
    primaryInductanceH: basis.nominalH,
    outputs: outputs.map((mapped) => ({
      turns: mapped.winding.turns,
      voltageV: mapped.output.voltageV,
      rectifierDropV: mapped.output.rectifierDropV,
      currentA: load(mapped),
    })),
    regulatedOutput: regulated,
    losses: { kind: 'losses-transferred', efficiency: duty.efficiency },
  })
}

function corner(input: FlybackInput, of: CornerInput): CornerState | null {
  const state = attempt(input.context, 'requirement.duty', () => solve(input, of))
  return state && stateOf(input, of, state)
}

function stateOf(input: FlybackInput, { name, inputV }: CornerInput, state: FlybackState): CornerState {
  const { primary, outputs, duty, areaMm2 } = input
  const waves = new Map<string, WindingWaves>([[primary.id, state.primary]])
  outputs.forEach(({ winding }, index) => waves.set(winding.id, state.outputs[index]!))
  const fluxDensityT = areaMm2 === null ? null : scaleWaveform(state.fluxWb, 1e6 / areaMm2)
  return {
    result: {
      name,
      inputV,
      mode: state.mode,
      dutyRatio: state.dutyCycle,
      windings: [...waves].map(([id, wave]) => cornerWinding(id, wave)),
      fluxSwingT: fluxDensityT && peakToPeak(fluxDensityT),
      fluxPeakT: fluxDensityT && maximum(fluxDensityT),
      inputPowerW: inputV * mean(state.primary.currentA),
      switchPeakV: state.switchStressV + (duty.clampSpikeV ?? 0),
    },
    waves,
    fluxDensityT,
  }
}

function lightLoad(input: FlybackInput, { nominalV }: SupplyRange): CornerState | null {
  const load = ({ output }: MappedOutput) => output.lightLoadCurrentA
  if (!input.outputs.some((mapped) => load(mapped) > 0)) return null
  return corner(input, { name: 'light-load', inputV: nominalV, load })
}

/**
 * The overload at which the switch just reaches its greatest peak current, at the least input: there the
 * windings carry most. The loads are raised alike, since the loss model is linear in load.
 */
function currentLimit(input: FlybackInput, range: SupplyRange): CornerState | null {
  const { duty, basis, context } = input
  const inputV = positive(range.minimumV) ? range.minimumV : range.nominalV
  const limit = duty.currentLimit
  if (!limit) return null
  return attempt(context, 'requirement.duty.currentLimit', () => {
    const peakA = worstCaseCurrentLimitA({ thresholdA: limit.nominalA, toleranceFraction: limit.tolerance, delayS: limit.delayS, inputVoltageV: inputV, inductanceH: basis.nominalH })
    const fullLoad = solve(input, { inputV, load: fullLoadOf })
    const factor = powerAtPeakW(input, fullLoad, { inputV, peakA }) / fullLoad.transferredPowerW
    const of: CornerInput = { name: 'current-limit', inputV, load: (mapped) => mapped.output.fullLoadCurrentA * factor }
    return stateOf(input, of, solve(input, of))
  })
}

/** Power through the core at a peak current: P = ½·L·f·(I_pk² − I_min²), with the ripple of continuous conduction where there is one. */
function powerAtPeakW({ duty, basis }: FlybackInput, { reflectedVoltageV }: FlybackState, { inputV, peakA }: { inputV: number; peakA: number }): number {
  const primaryV = inputV - duty.switchDropV
  const dutyRatio = reflectedVoltageV / (reflectedVoltageV + primaryV)
  const rippleA = (primaryV * dutyRatio) / (basis.nominalH * duty.switchingFrequencyHz)
  const lowA = Math.max(0, peakA - rippleA)
  return 0.5 * basis.nominalH * duty.switchingFrequencyHz * (peakA ** 2 - lowA ** 2)
}

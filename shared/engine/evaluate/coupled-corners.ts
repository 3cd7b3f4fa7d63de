import { seriesCapacitorInductorState } from '../topologies/coupled-inductor'
import type { CoupledInductorState } from '../topologies/coupled-inductor'
import { maximum, mean, peakToPeak } from '../waveforms/statistics'
import { scaleWaveform, sumWaveforms } from '../waveforms/combine'
import type { CoupledInductorDuty, Winding } from '../specification'
import type { CornerResult } from '../evaluation'
import { attempt, positive, report } from './context'
import type { Context } from './context'
import { cornerWinding } from './corner-result'
import type { CornerState } from './corner-result'
import type { InductanceBasis } from './inductance'

/** The second winding of a coupled inductor: the first one beside the primary. */
export const secondWinding = ({ specification, primary }: Context): Winding | null =>
  specification.windings.find(({ id, role }) => id !== primary?.id && role !== 'shield') ?? null

/**
 * Corners of a coupled inductor. `leakageH` is that of the first winding with the second one shorted: the
 * coupling follows from it, k = √(1 − L_leak/L).
 */
export function coupledCorners(context: Context, duty: CoupledInductorDuty, basis: InductanceBasis, leakageH: number | null): CornerState[] {
  const second = secondWinding(context)
  if (!context.primary || !second || !positive(second.turns)) {
    report(context, 'output-without-winding', 'error', 'windings', { output: 'second winding' })
    return []
  }
  const coupling = couplingOf(context, basis, second, leakageH)
  if (coupling === null) return []
  const { minimumV, nominalV, maximumV } = duty.supply
  const at = (name: CornerResult['name'], inputV: number, share = 1) => corner(context, { duty, basis, second, coupling }, { name, inputV, share })
  return [
    at('minimum-input', minimumV),
    at('nominal-input', nominalV),
    at('maximum-input', maximumV),
    overload(context, { duty, basis, second, coupling }),
  ].filter((state) => state !== null)
}

function couplingOf(context: Context, basis: InductanceBasis, second: Winding, leakageH: number | null): number | null {
  // With equal turns both windings see the same volts per turn, and the ripple divides evenly whatever the coupling.
  if (leakageH !== null && leakageH < basis.nominalH) return Math.sqrt(1 - leakageH / basis.nominalH)
  if (second.turns === basis.turns) return 1
  report(context, 'coupling-not-known', 'warning', 'electrical.leakage')
  return null
}

interface ChokeInput {
  duty: CoupledInductorDuty
  basis: InductanceBasis
  second: Winding
  coupling: number
}

interface ChokeCorner {
  name: CornerResult['name']
  inputV: number
  share: number
}

function solve({ duty, basis, second, coupling }: ChokeInput, { inputV, share }: ChokeCorner): CoupledInductorState {
  return seriesCapacitorInductorState({
    pair: { turns: [basis.turns, second.turns], inductanceH: basis.nominalH, coupling },
    inputVoltageV: inputV - duty.switchDropV,
    outputVoltageV: duty.outputVoltageV,
    // The losses beyond the rectifier's raise the current on the input side, as a greater drop would.
    rectifierDropV: Math.max(duty.outputDropV, duty.outputVoltageV * (1 / duty.efficiency - 1)),
    outputCurrentA: duty.outputCurrentA * share,
    frequencyHz: duty.switchingFrequencyHz,
  })
}

function corner(context: Context, input: ChokeInput, of: ChokeCorner): CornerState | null {
  const state = attempt(context, 'requirement.duty', () => solve(input, of))
  if (!state) return null
  const { core, sets, primary } = context
  const waves = new Map([[primary!.id, state.windings[0]], [input.second.id, state.windings[1]]])
  const fluxDensityT = core ? scaleWaveform(state.fluxWb[0], 1e6 / (core.effectiveAreaMm2 * sets)) : null
  return {
    result: {
      name: of.name,
      inputV: of.inputV,
      mode: state.mode,
      dutyRatio: state.dutyCycle,
      windings: [...waves].map(([id, wave]) => cornerWinding(id, wave)),
      fluxSwingT: fluxDensityT && peakToPeak(fluxDensityT),
      fluxPeakT: fluxDensityT && maximum(fluxDensityT),
      inputPowerW: of.inputV * mean(state.windings[0].currentA),
      switchPeakV: of.inputV + input.duty.outputVoltageV + input.duty.outputDropV,
    },
    waves,
    fluxDensityT,
  }
}

/** The load at which both windings' currents together, which the switch carries, reach the current limit. */
function overload(context: Context, input: ChokeInput): CornerState | null {
  const { currentLimit, supply } = input.duty
  if (!currentLimit) return null
  const inputV = supply.minimumV
  const share = attempt(context, 'requirement.duty.currentLimit', () => {
    const { windings, mode } = solve(input, { name: 'current-limit', inputV, share: 1 })
    const sum = sumWaveforms(windings.map(({ currentA }) => currentA))
    const limitA = currentLimit.nominalA * (1 + currentLimit.tolerance) + (inputV * currentLimit.delayS * 2) / (input.basis.nominalH * (1 + input.coupling))
    if (mode === 'discontinuous') return (limitA / maximum(sum)) ** 2
    return Math.max(0.01, (limitA - peakToPeak(sum) / 2) / mean(sum))
  })
  return share === null ? null : corner(context, input, { name: 'current-limit', inputV, share })
}

import type { CornerOutput, CornerResult, CornerWinding } from '../evaluation'
import type { CircuitState, OutputState, PointName, WindingEnds, WindingWaveforms } from '../topologies/topology'
import { runningIntegral, scaleWaveform, offsetWaveform } from '../waveforms/combine'
import { acRms, maximum, mean, minimum, peak, peakToPeak, rms } from '../waveforms/statistics'
import type { Waveform } from '../waveforms/waveform'

export type WindingWaves = WindingWaveforms

/** One corner with the waveforms that the later stages take. */
export interface CornerState {
  result: CornerResult
  waves: ReadonlyMap<string, WindingWaveforms>
  ends: ReadonlyMap<string, WindingEnds>
  /** Flux that links one turn, Wb. */
  fluxWb: Waveform
  /** Flux density on the effective area; null without a core. */
  fluxDensityT: Waveform | null
}

/** Full load: neither light load nor the overload of the current limit. */
const FULL_LOAD: readonly PointName[] = ['minimum-input', 'nominal-input', 'maximum-input']

export const atFullLoad = ({ name }: Pick<CornerResult, 'name'>): boolean => FULL_LOAD.includes(name)

export const cornerWinding = (windingId: string, { currentA, voltageV }: WindingWaveforms): CornerWinding => ({
  windingId,
  dcA: Math.abs(mean(currentA)),
  rmsA: rms(currentA),
  acRmsA: acRms(currentA),
  peakA: peak(currentA),
  positivePeakV: Math.max(0, maximum(voltageV)),
  negativePeakV: Math.min(0, minimum(voltageV)),
  rmsV: rms(voltageV),
  currentWaveform: currentA.points,
})

/** What an output's capacitor takes: everything of the rectified current but its mean. */
function cornerOutput({ outputId, voltageV, rectifiedA, mode }: OutputState): CornerOutput {
  const alternatingA = offsetWaveform(rectifiedA, -mean(rectifiedA))
  return { outputId, voltageV, mode, rippleA: peakToPeak(rectifiedA), capacitorRmsA: rms(alternatingA), rippleChargeC: chargeSwing(alternatingA) }
}

/** Swing of the charge of a current without mean, C; ramps through zero have their extreme between the corners. */
function chargeSwing(currentA: Waveform): number {
  const points = currentA.points.flatMap(([tS, value], index) => {
    const before = currentA.points[index - 1]
    if (!before || before[1] * value >= 0 || tS === before[0]) return [[tS, value] as const]
    return [[before[0] + ((tS - before[0]) * before[1]) / (before[1] - value), 0] as const, [tS, value] as const]
  })
  return peakToPeak(runningIntegral({ periodS: currentA.periodS, points }))
}

/** A solved operating point as the evaluation shows it. `areaMm2` is the effective area of all sets; null without a core. */
export function cornerState(state: CircuitState, { name, inputV, primary, areaMm2 }: { name: PointName; inputV: number; primary: { id: string; turns: number }; areaMm2: number | null }): CornerState {
  const fluxDensityT = areaMm2 === null ? null : scaleWaveform(state.fluxWb, 1e6 / areaMm2)
  return {
    result: {
      name,
      inputV,
      mode: state.mode,
      dutyRatio: state.dutyRatio,
      frequencyHz: state.frequencyHz,
      windings: [...state.windings].map(([id, wave]) => cornerWinding(id, wave)),
      voltSecondsVs: peakToPeak(state.fluxWb) * primary.turns,
      fluxSwingT: fluxDensityT && peakToPeak(fluxDensityT),
      fluxPeakT: fluxDensityT && peak(fluxDensityT),
      ...(fluxDensityT && { fluxWaveform: fluxDensityT.points }),
      inputPowerW: state.inputPowerW,
      switchPeakV: state.switchPeakV,
      rectifiers: state.outputs.flatMap(({ outputId, rectifierPeakV }) => (rectifierPeakV === null ? [] : [{ outputId, reversePeakV: rectifierPeakV }])),
      outputs: state.outputs.map(cornerOutput),
      commutationS: state.commutationS,
      figures: [...state.figures],
    },
    waves: state.windings,
    ends: state.ends,
    fluxWb: state.fluxWb,
    fluxDensityT,
  }
}

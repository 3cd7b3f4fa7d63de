import type { CornerResult, CornerWinding } from '../evaluation'
import { acRms, maximum, mean, minimum, peak, rms } from '../waveforms/statistics'
import type { Waveform } from '../waveforms/waveform'

export interface WindingWaves {
  currentA: Waveform
  voltageV: Waveform
}

/** One corner with the waveforms that the later stages take. */
export interface CornerState {
  result: CornerResult
  waves: ReadonlyMap<string, WindingWaves>
  /** Flux density on the effective area; null without a core. */
  fluxDensityT: Waveform | null
}

export const cornerWinding = (windingId: string, { currentA, voltageV }: WindingWaves): CornerWinding => ({
  windingId,
  dcA: mean(currentA),
  rmsA: rms(currentA),
  acRmsA: acRms(currentA),
  peakA: peak(currentA),
  positivePeakV: Math.max(0, maximum(voltageV)),
  negativePeakV: Math.min(0, minimum(voltageV)),
  rmsV: rms(voltageV),
  currentWaveform: currentA.points,
})

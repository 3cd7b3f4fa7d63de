import { scaleWaveform, steadyLike } from '../waveforms/combine'
import type { Waveform } from '../waveforms/waveform'
import type { WindingEnds } from './topology'

const plain = { startSpikeV: 0, finishSpikeV: 0 }

/**
 * Potentials of a rectified secondary against its return. The tap lies on the return: the first half ends there and the second
 * begins there; a whole winding lies between its bridge's rectifiers, so that its lower end is on the return.
 */
export function rectifierEnds(voltageV: Waveform, part: 'first-half' | 'second-half' | 'whole'): WindingEnds {
  const none = steadyLike(voltageV, 0)
  if (part === 'first-half') return { start: voltageV, finish: none, ...plain }
  if (part === 'second-half') return { start: none, finish: scaleWaveform(voltageV, -1), ...plain }
  const positive = (sign: number): Waveform => ({ periodS: voltageV.periodS, points: voltageV.points.map(([tS, value]) => [tS, Math.max(0, sign * value)] as const) })
  return { start: positive(1), finish: positive(-1), ...plain }
}

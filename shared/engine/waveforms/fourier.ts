import { requireCount } from '../require'
import { totalVariation } from './statistics'
import { waveformSegments } from './waveform'
import type { Waveform, WaveformSegment } from './waveform'

/** f(t) = mean + Σ (cosine·cos nωt + sine·sin nωt); amplitudes are peak values in the quantity's unit. */
export interface Harmonic {
  order: number
  frequencyHz: number
  cosine: number
  sine: number
  amplitude: number
  rms: number
}

/**
 * Fourier coefficients of orders 1 to `count`, by the closed integral over each straight piece.
 * Exact but for rounding. Source: definition of the Fourier series, integrated by parts.
 *
 * @throws RangeError when the count is not a whole number above zero
 */
export function harmonics(waveform: Waveform, count: number): Harmonic[] {
  requireCount('count', count)
  const held = computed.get(waveform)
  if (held && held.length === count) return held
  const segments = waveformSegments(waveform)
  const list = Array.from({ length: count }, (_, index) => harmonicOf(waveform.periodS, segments, index + 1))
  computed.set(waveform, list)
  return list
}

// A temperature iteration asks for the harmonics of one waveform dozens of times.
const computed = new WeakMap<Waveform, Harmonic[]>()

function harmonicOf(periodS: number, segments: readonly WaveformSegment[], order: number): Harmonic {
  const omega = (2 * Math.PI * order) / periodS
  let cosine = 0
  let sine = 0
  for (const { startS, endS, durationS, from, to } of segments) {
    const a = omega * startS
    const b = omega * endS
    // Differences of cosines as products, since short pieces would lose digits.
    const half = Math.sin((b - a) / 2)
    const slope = (to - from) / (omega * durationS)
    cosine += to * Math.sin(b) - from * Math.sin(a) - 2 * slope * Math.sin((a + b) / 2) * half
    sine += from * Math.cos(a) - to * Math.cos(b) + 2 * slope * Math.cos((a + b) / 2) * half
  }
  const scale = 2 / (omega * periodS)
  const amplitude = Math.hypot(cosine, sine) * scale
  return { order, frequencyHz: order / periodS, cosine: cosine * scale, sine: sine * scale, amplitude, rms: amplitude / Math.SQRT2 }
}

/**
 * Upper bound of the mean square that all orders above `count` can hold together, in the quantity's unit squared.
 *
 *     amplitude_n ≤ V/(π n),  so  Σ_{n>N} amplitude_n²/2 ≤ V²/(2 π² N)
 *
 * V is the total variation. Source: bound of the Fourier coefficients of a function of bounded variation (Zygmund, Trigonometric Series, II.4).
 *
 * @throws RangeError when the count is not a whole number above zero
 */
export function harmonicTailMeanSquareBound(waveform: Waveform, count: number): number {
  requireCount('count', count)
  return totalVariation(waveform) ** 2 / (2 * Math.PI ** 2 * count)
}

import type { Evaluation } from '../evaluation'

/**
 * An evaluation without a number that is none: inputs at the edge of what a document may hold (10¹⁵ and 10⁻³⁰⁰) can
 * overflow where they meet. A figure that may be missing becomes null; one that must be there becomes 0.
 */
export function finiteOnly(evaluation: Evaluation): Evaluation {
  return isFinite(evaluation) ? evaluation : (cleaned(evaluation, '') as Evaluation)
}

/** Figures of the evaluation that cannot be null. */
const ALWAYS_NUMBERS = new Set(['inputV', 'frequencyHz', 'voltSecondsVs', 'voltageV', 'rippleA', 'capacitorRmsA', 'rippleChargeC', 'reversePeakV', 'dutyRatio', 'dcA', 'rmsA', 'acRmsA', 'peakA', 'positivePeakV', 'negativePeakV', 'rmsV', 'inputPowerW', 'copperAreaMm2', 'buildMm', 'buildRatio', 'copperFill', 'windowFill', 'windowWidthMm', 'windowHeightMm', 'xMm', 'yMm', 'widthMm', 'thicknessMm', 'heightMm', 'currentWaveform'])

function isFinite(value: unknown): boolean {
  if (typeof value === 'number') return Number.isFinite(value)
  if (Array.isArray(value)) return value.every(isFinite)
  if (value !== null && typeof value === 'object') return Object.values(value).every(isFinite)
  return true
}

function cleaned(value: unknown, key: string): unknown {
  if (typeof value === 'number') return Number.isFinite(value) ? value : ALWAYS_NUMBERS.has(key) ? 0 : null
  if (Array.isArray(value)) return value.map((entry: unknown) => cleaned(entry, key))
  if (value !== null && typeof value === 'object') return Object.fromEntries(Object.entries(value).map(([name, entry]) => [name, cleaned(entry, name)]))
  return value
}

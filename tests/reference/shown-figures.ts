import type { Evaluation } from '#shared/engine/evaluation'

/** Dotted paths of all figures that a screen or the drawing shows. */
export function shownFigures(evaluation: Evaluation): string[] {
  const { corners, magnetics, windings, leakages, capacitances, commonModeCapacitances, boundaryCapacitances, selfResonance, layout, losses, thermal, boundaries, mass } = evaluation
  const hidden = /Waveform|layout\.items|layout\.outlines|\.layers$|turnsPerLayer|paths\.\d+\.points/
  const paths: string[] = []
  const walk = (value: unknown, path: string) => {
    if (hidden.test(path) && !/boundaries.*layers$/.test(path)) return
    if (typeof value === 'number') paths.push(path.replace(/\.value$/, ''))
    else if (value !== null && typeof value === 'object') for (const [key, entry] of Object.entries(value)) walk(entry, path === '' ? key : `${path}.${key}`)
  }
  walk({ corners, magnetics, windings, leakages, capacitances, commonModeCapacitances, boundaryCapacitances, selfResonance, layout, losses, thermal, boundaries, mass }, '')
  return paths
}

/** The figure at such a path. */
export function shownAt(evaluation: Evaluation, path: string): unknown {
  const found = path.split('.').reduce<unknown>((value, key) => (value as Record<string, unknown>)[key], evaluation)
  return found !== null && typeof found === 'object' ? (found as { value: number }).value : found
}

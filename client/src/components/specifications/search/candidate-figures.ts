import type { CandidateFigures, SearchCandidate } from '#shared/engine/index'
import { formatEngineering, formatFigure, formatNumber } from '#shared/number-format'
import { shownUnit } from '#shared/shown-units'

export type FigureKey = keyof CandidateFigures

export interface FigureColumn {
  key: FigureKey
  label: string
  unit: string
  text: (value: number | null) => string
}

const three = { significant: 3 } as const
const column = (key: FigureKey, label: string, unit: string, text: FigureColumn['text']): FigureColumn => ({ key, label, unit, text })
const inUnit = (symbol: string) => (value: number | null) => formatFigure(value, shownUnit(symbol), three)

/** Figures by which candidates are compared, in the order of the table. */
export const FIGURE_COLUMNS: readonly FigureColumn[] = [
  column('lossW', 'Loss', 'W', inUnit('W')),
  column('copperLossW', 'of it copper', 'W', inUnit('W')),
  column('coreLossW', 'of it core', 'W', inUnit('W')),
  column('riseK', 'Rise', 'K', inUnit('K')),
  column('volumeMm3', 'Volume', 'cm³', (value) => formatNumber(value === null ? null : value / 1000, three)),
  column('heightMm', 'Height', 'mm', inUnit('mm')),
  column('copperG', 'Copper', 'g', inUnit('g')),
  column('leakageH', 'Leakage', 'µH', inUnit('µH')),
  column('fluxUtilisation', 'Flux of saturation', '%', inUnit('%')),
  column('buildRatio', 'Build of window', '%', inUnit('%')),
]

export const METHOD_WORDS: Readonly<Record<SearchCandidate['method'], string>> = {
  'margin-tape': 'margin tape',
  'triple-insulated-wire': 'triple-insulated wire',
  'functional': 'functional insulation',
}

/** One winding in a word: turns and wire. */
export const windingText = ({ winding, turns, wire, parallel }: SearchCandidate['wires'][number]): string =>
  `${winding}: ${formatNumber(turns)} turns of ${parallel > 1 ? `${parallel} × ` : ''}${wire}`

/** A figure with its unit, for reading aloud and for the comparison. */
export const figureText = ({ key, unit, text }: FigureColumn, { figures }: SearchCandidate): string => (key === 'leakageH' ? formatEngineering(figures[key], 'H', three) : `${text(figures[key])} ${unit}`)

/** Smaller is better in all of them; the best of those compared is marked. */
export function bestOf({ key }: FigureColumn, candidates: readonly SearchCandidate[]): number | null {
  const known = candidates.map(({ figures }) => figures[key]).filter((value) => value !== null)
  return known.length > 1 ? Math.min(...known) : null
}

export type SortKey = 'rank' | 'core' | FigureKey

/** Candidates in the order asked; `rank` is the order of the search, a missing figure comes last. */
export function inOrder(candidates: readonly SearchCandidate[], key: SortKey, descending: boolean): SearchCandidate[] {
  if (key === 'rank') return descending ? [...candidates].reverse() : [...candidates]
  const sign = descending ? -1 : 1
  const compare = (one: SearchCandidate, other: SearchCandidate) => {
    if (key === 'core') return sign * one.core.localeCompare(other.core, 'en', { numeric: true })
    const [a, b] = [one.figures[key], other.figures[key]]
    if (a === null || b === null) return Number(a === null) - Number(b === null)
    return sign * (a - b)
  }
  return [...candidates].sort((one, other) => compare(one, other) || (one.id < other.id ? -1 : 1))
}

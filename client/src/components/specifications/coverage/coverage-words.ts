import type { FaultCoverage, RowForecast } from '#shared/engine/index'
import type { TestRow } from '#shared/engine/specification'
import { formatEngineering, formatNumber, formatQuantity } from '#shared/number-format'
import { shownUnit } from '#shared/shown-units'

type Values = FaultCoverage['values']
const mm = (value: string | number | undefined) => formatQuantity(Number(value), shownUnit('mm'), { significant: 2 })

const FAULT_WORDS: Readonly<Record<FaultCoverage['kind'], (values: Values) => string>> = {
  'one-turn-more': (v) => `${v.winding} has one turn too many (${v.turns})`,
  'one-turn-less': (v) => `${v.winding} has one turn too few (${v.turns})`,
  'reversed-dot': (v) => `${v.winding} is connected the wrong way round`,
  'swapped-windings': (v) => `${v.winding} and ${v.other} lie on each other’s pins`,
  'missing-gap': (v) => `The gap of ${mm(v.gapMm)} is missing`,
  'wrong-core-grade': (v) => `The core is of ${v.material}`,
  'core-not-seated': (v) => `The core halves stand ${mm(v.openMm)} open`,
  'missing-tape-layer': (v) => `Step ${v.step} has one layer of tape too few (${v.layers})`,
  'open-strand': (v) => `${v.winding} has one wire open (${v.wires} left)`,
  'shorted-turn': (v) => `One turn of ${v.winding} is shorted`,
}

export const faultText = ({ kind, values }: FaultCoverage): string => FAULT_WORDS[kind](values)

export const STATE_WORDS: Readonly<Record<FaultCoverage['state'], string>> = {
  'every-part': 'found on every part',
  'sample-only': 'found on samples only',
  'partly': 'found on some parts',
  'never': 'found by no row',
}

/** From the worst to the best. */
export const STATES: readonly FaultCoverage['state'][] = ['never', 'partly', 'sample-only', 'every-part']

export const shareText = (share: number): string => (share >= 0.9995 ? '100 %' : `${formatNumber(share * 100, { significant: share < 0.1 ? 1 : 3 })} %`)

export const foundByText = ({ foundBy }: FaultCoverage): string => foundBy.map(({ symbol, share, extent }) => `${symbol} ${shareText(share)}${extent === 'every-part' ? '' : ' (sample)'}`).join(', ')

/** Expected reading with its standard deviation, in the row's unit. */
export function forecastText({ mean, deviation }: RowForecast, unit: TestRow['unit']): string {
  if (mean === null) return '–'
  const show = (value: number) => (unit === '1' ? formatNumber(value, { significant: 4 }) : unit === 'mm' ? formatQuantity(value, shownUnit('mm')) : formatEngineering(value, unit, { significant: 3 }))
  return deviation === null ? show(mean) : `${show(mean)}, s ${show(deviation)}`
}

const CAUSE_WORDS: Readonly<Record<RowForecast['shares'][number]['cause'], string>> = {
  'core-factor': 'AL of the core',
  'gap-length': 'length of the gap',
  'permeability': 'permeability',
  'wire-resistance': 'resistance of the wire',
  'turn-length': 'length of a turn',
  'winding-geometry': 'how the turns lie',
  'instrument': 'instrument',
}

export const causesText = ({ shares }: RowForecast): string => shares.map(({ cause, halfWidth }) => `${CAUSE_WORDS[cause]} ±${formatNumber(halfWidth * 100, { significant: 2 })} %`).join(', ')

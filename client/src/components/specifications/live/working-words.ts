import { formatEngineering, formatNumber } from '#shared/number-format'
import { placeWords } from '../place-words'
import { SECTIONS } from '../sections'

const PREFIXED = ['H', 'A', 'T', 'V', 'Hz', 'Ω', 'W', 'F', 's', 'm', 'Vs']

/** A figure of a working with its unit; SI units take the prefix that suits. */
export function withUnit(value: number | string | null, unit: string): string {
  if (typeof value === 'string') return value
  if (PREFIXED.includes(unit)) return formatEngineering(value, unit, { significant: 5 })
  const figure = formatNumber(value, { significant: 5 })
  return unit === '1' || unit === '' ? figure : `${figure}\u00a0${unit}`
}

const PLACE = /^[a-z]+(?:\.[A-Za-z0-9]+)+/
const CALCULATED = /^(magnetics|thermal|losses|layout|corners|leakages|boundaries|capacitances|faults)\./

/** Where an input came from: the engine's place as the form calls it. */
export function inWords(origin: string): string {
  if (CALCULATED.test(origin)) return origin.replace(PLACE, 'calculated')
  return origin.replace(PLACE, (place) => (SECTIONS.some(({ places }) => places.includes(place.split('.')[0]!)) ? placeWords(place) : place))
}

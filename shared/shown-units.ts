/** A unit as it stands beside a figure on a screen, a sheet or in a file. */
export interface ShownUnit {
  /** What people read, e.g. `µH`. Empty for a plain count or ratio. */
  symbol: string
  /** The unit without its decimal prefix, e.g. `H`; empty when prefixes make no sense. */
  base: string
  /** Power of ten between `symbol` and `base`: −6 for µH. */
  exponent: number
  /** Power of ten from the figure shown to the value kept: −6 for µH (henry), 0 for mm (millimetre). */
  modelExponent: number
  /** Whether a bare prefix letter (`4k7`, `120u`) can be read without doubt. */
  letterCode: boolean
}

/** Decimal prefixes of ISO 80000-1 that this trade uses. */
export const PREFIX_EXPONENTS: Readonly<Record<string, number>> = { p: -12, n: -9, µ: -6, m: -3, '': 0, k: 3, M: 6, G: 9 }

const electric = (prefix: string, base: string): ShownUnit => ({
  symbol: `${prefix}${base}`,
  base,
  exponent: PREFIX_EXPONENTS[prefix]!,
  modelExponent: PREFIX_EXPONENTS[prefix]!,
  letterCode: true,
})

/** Prefixes may be typed, but only with the unit: `10m` in a time field may be ten minutes. */
const spelled = (prefix: string, base: string): ShownUnit => ({ ...electric(prefix, base), letterCode: false })

const plain = (symbol: string, modelExponent = 0): ShownUnit => ({ symbol, base: '', exponent: 0, modelExponent, letterCode: false })

/** Geometry is kept in millimetres, so a figure in mm is kept as it is shown. */
const length = (prefix: string): ShownUnit => {
  const exponent = PREFIX_EXPONENTS[prefix]!
  return { symbol: `${prefix}m`, base: 'm', exponent, modelExponent: exponent + 3, letterCode: false }
}

const family = (make: (prefix: string, base: string) => ShownUnit, base: string, prefixes: readonly string[]) =>
  prefixes.map((prefix) => make(prefix, base))

const ALL: readonly ShownUnit[] = [
  ...family(electric, 'V', ['', 'm', 'k']),
  ...family(electric, 'A', ['', 'm', 'µ']),
  ...family(electric, 'Ω', ['', 'm', 'k', 'M', 'G']),
  ...family(electric, 'H', ['', 'm', 'µ', 'n']),
  ...family(electric, 'F', ['', 'µ', 'n', 'p']),
  ...family(electric, 'Hz', ['', 'k', 'M']),
  ...family(electric, 'W', ['', 'm', 'k']),
  ...family(electric, 'T', ['', 'm']),
  ...family(electric, 'Vs', ['', 'm', 'µ']),
  ...family(electric, 'C', ['', 'n', 'p']),
  ...family(spelled, 's', ['', 'm', 'µ', 'n']),
  ...family(spelled, 'g', ['', 'k']),
  ...['', 'm', 'µ'].map(length),
  plain(''),
  plain('%', -2),
  plain('°C'),
  plain('K'),
  plain('K/W'),
  plain('A/m'),
  plain('A/mm²', 6),
  plain('kW/m³', 3),
  plain('kg/m³'),
  plain('Ω/m'),
  plain('mΩ/m', -3),
  plain('mm²'),
  plain('mm³'),
  plain('d'),
  plain('pcs'),
  plain('turns'),
  plain('layers'),
  plain('N'),
  plain('V/ns', 9),
]

const BY_SYMBOL = new Map(ALL.map((unit) => [unit.symbol, unit]))

/**
 * Looks up a unit by its symbol. Values are kept in SI, geometry in millimetres, temperatures in °C,
 * percentages as fractions.
 *
 * @throws RangeError when no such unit is listed
 */
export function shownUnit(symbol: string): ShownUnit {
  const unit = BY_SYMBOL.get(symbol)
  if (!unit) throw new RangeError(`no such unit: ${symbol}`)
  return unit
}

/**
 * Writes a unit the one way this program compares units: `μ` and `u` as `µ`, `Ω` as one sign, no blanks,
 * raised figures and `^` as plain figures.
 */
export function plainUnit(text: string): string {
  return text
    .normalize('NFKC')
    .replace(/[\s·^]/g, '')
    .replace(/μ/g, 'µ')
    .replace(/^u/, 'µ')
    .replace(/(ohms?|Ohms?|OHM)$/, 'Ω')
}

import { PREFIX_EXPONENTS, plainUnit, type ShownUnit } from '#shared/shown-units'
import type { MeasuredUnit } from './model'
import { isEmptyWord } from './words'

export type UnitReading =
  | { kind: 'unit'; unit: ShownUnit }
  /** Written all in capitals: milli or mega. */
  | { kind: 'ambiguous'; units: [ShownUnit, ShownUnit] }
  /** A unit, but of another quantity. */
  | { kind: 'unlike' }
  | { kind: 'none' }

/** Bases as they are recognised at the end of a unit, longest first. `mm` is the base of lengths. */
const BASES: readonly { base: Exclude<MeasuredUnit, '1' | 'mm'>; ends: RegExp }[] = [
  { base: 'Hz', ends: /hz$/i },
  { base: 'Ω', ends: /(Ω|R)$/ },
  { base: 'H', ends: /[Hh]$/ },
  { base: 'F', ends: /[Ff]$/ },
  { base: 'V', ends: /[Vv]$/ },
  { base: 'A', ends: /[Aa]$/ },
]

const PREFIX_ALIASES: Readonly<Record<string, string>> = { K: 'k', u: 'µ', U: 'µ', N: 'n', P: 'p' }

/** The unit with a prefix, so that `unitOf('Ω', 'm')` is the milliohm. Values are kept in the base (mm for lengths). */
export function unitOf(base: MeasuredUnit, prefix: string): ShownUnit {
  if (base === '1') return { symbol: '', base: '', exponent: 0, modelExponent: 0, letterCode: false }
  const exponent = PREFIX_EXPONENTS[prefix]!
  if (base === 'mm') return { symbol: `${prefix}m`, base: 'm', exponent, modelExponent: exponent + 3, letterCode: false }
  return { symbol: `${prefix}${base}`, base, exponent, modelExponent: exponent, letterCode: true }
}

/** Prefixes that a unit of this quantity is offered with when a file does not say. */
export const usualPrefixes = (base: MeasuredUnit): readonly string[] => {
  switch (base) {
    case 'H':
      return ['n', 'µ', 'm', '']
    case 'Ω':
      return ['m', '', 'k', 'M', 'G']
    case 'V':
      return ['m', '', 'k']
    case 'A':
      return ['µ', 'm', '']
    case 'Hz':
      return ['', 'k', 'M']
    case 'F':
      return ['p', 'n', 'µ']
    case 'mm':
      return ['µ', 'm']
    case '1':
      return ['']
  }
}

interface Split {
  base: MeasuredUnit
  prefix: string
}

function splitUnit(text: string): Split | null {
  const typed = plainUnit(text)
  if (/^(m|µ|c|)m$/.test(typed) && typed !== 'm') return typed.startsWith('c') ? null : { base: 'mm', prefix: typed.slice(0, -1) }
  const found = BASES.find(({ ends }) => ends.test(typed))
  if (!found) return null
  const raw = typed.replace(found.ends, '')
  const prefix = PREFIX_ALIASES[raw] ?? raw
  return Object.hasOwn(PREFIX_EXPONENTS, prefix) ? { base: found.base, prefix: found.base === 'Hz' && prefix === 'm' ? 'M' : prefix } : null
}

/** Whether a text is a unit at all, of any quantity. */
export const isUnitText = (text: string): boolean => splitUnit(text) !== null || /^(%|1|ratio|°C|s|ms)$/.test(text.trim())

/** Whether a line holds units: nothing else, and one that is more than a bare `1` at least. */
export const isUnitLine = (cells: readonly string[]): boolean => cells.every(isUnitText) && cells.some((cell) => splitUnit(cell) !== null && !isEmptyWord(cell))

/**
 * Reads a unit of a given quantity: `uH`, `µH` (U+00B5) and `μH` (U+03BC) are one, `mohm` and `Mohm` are
 * two. `MOHM` and `MH`, all in capitals, may be milli or mega and are ambiguous.
 */
export function readUnit(text: string, base: MeasuredUnit): UnitReading {
  if (text.trim() === '') return { kind: 'none' }
  if (base === '1') return /^(1|ratio|:1|)$/i.test(text.trim()) ? { kind: 'unit', unit: unitOf('1', '') } : { kind: 'unlike' }
  const split = splitUnit(text)
  if (!split) return { kind: 'none' }
  if (split.base !== base) return { kind: 'unlike' }
  const capitals = /^M\s*(OHMS?|H|A|V|F)$/.test(text.trim())
  // MA, MV and MF do not occur as mega on wound parts, yet the text itself does not say so.
  if (capitals && split.prefix === 'M') return { kind: 'ambiguous', units: [unitOf(base, 'm'), unitOf(base, 'M')] }
  return { kind: 'unit', unit: unitOf(base, split.prefix) }
}

export interface SplitHeading {
  label: string
  /** Null when the heading states none. */
  unit: string | null
}

/** Parts a heading into label and unit: `Lp (uH)`, `Lp[µH]`, `DCR/mΩ`, `Lp, µH`, `Lp in µH`, `Lp uH`. */
export function splitHeading(heading: string): SplitHeading {
  const text = heading.normalize('NFKC').replace(/\s+/g, ' ').trim()
  const bracketed = /^(.*?)\s*[[({]\s*([^\])}]*)\s*[\])}]$/.exec(text)
  if (bracketed && isUnitText(bracketed[2]!)) return { label: bracketed[1]!, unit: bracketed[2]! }

  const cut = /^(.*?)\s*(?:\/|,\s*|;\s*|\bin )\s*([^/,; ]+)$/.exec(text)
  if (cut && isUnitText(cut[2]!)) return { label: cut[1]!, unit: cut[2]! }

  const last = /^(.+)[ _]([^ _]+)$/.exec(text)
  // A single letter behind a blank is more often a winding's name than a unit.
  if (last && last[2]!.length > 1 && isUnitText(last[2]!) && !/^S\d|^P\d/.test(last[2]!)) return { label: last[1]!, unit: last[2]! }
  return { label: text, unit: null }
}

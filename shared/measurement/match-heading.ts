import type { ExpectedRow, MeasuredCharacteristic } from './model'

const SYNONYMS: Readonly<Record<MeasuredCharacteristic, readonly string[]>> = {
  inductance: ['inductance', 'ind', 'lp', 'ls', 'l'],
  'inductance-at-bias': ['inductanceatbias', 'lbias', 'lsat', 'isat'],
  leakage: ['leakageinductance', 'leakage', 'lleak', 'llk', 'lk', 'lsigma', 'lσ'],
  'dc-resistance': ['dcresistance', 'resistance', 'rdc', 'dcr', 'r'],
  'turns-ratio': ['turnsratio', 'turnratio', 'ratio', 'tr', 'n'],
  polarity: ['polarity', 'phase', 'dots'],
  'self-resonance': ['selfresonance', 'resonance', 'srf', 'fres'],
  'interwinding-capacitance': ['interwindingcapacitance', 'capacitance', 'cww', 'cps', 'c'],
  hipot: ['hipot', 'highpot', 'dielectricstrength', 'dielectric', 'withstand', 'hv', 'acw', 'dcw'],
  'insulation-resistance': ['insulationresistance', 'insulation', 'riso', 'ir'],
  surge: ['surge', 'impulsewinding', 'iwt'],
  impulse: ['impulse'],
  'partial-discharge': ['partialdischarge', 'pd'],
  dimension: ['dimension', 'dim'],
  visual: ['visual', 'appearance', 'workmanship'],
}

/** A label or symbol with nothing but letters, figures and Greek, in small letters, conditions cut off. */
export const plainLabel = (text: string): string =>
  text
    .normalize('NFKC')
    .split('@')[0]!
    .toLowerCase()
    .replace(/[^\p{L}\p{N}]/gu, '')

/** What is left of a label behind a name of the characteristic; null when it begins with none of them. */
function restBehindName(label: string, characteristic: MeasuredCharacteristic): string | null {
  const name = SYNONYMS[characteristic].find((synonym) => label.startsWith(synonym))
  return name === undefined ? null : label.slice(name.length)
}

export interface HeadingMatch {
  rowId: string
  how: 'symbol' | 'synonym'
}

/**
 * Finds the test row that a heading means: by its symbol, else by a usual name of the characteristic with the
 * same winding behind it (`DCR S1` for `Rdc S1`), else by the name alone when only one row has that
 * characteristic. A remark in brackets, `(pass/fail)`, is passed over. Null when nothing or more than one row fits.
 */
export function matchHeading(label: string, expected: readonly ExpectedRow[]): HeadingMatch | null {
  const whole = matchLabel(plainLabel(label), expected)
  const remark = /^(.+?)\s*[[({][^\])}]*[\])}]$/.exec(label)
  return whole ?? (remark ? matchLabel(plainLabel(remark[1]!), expected) : null)
}

function matchLabel(plain: string, expected: readonly ExpectedRow[]): HeadingMatch | null {
  if (plain === '') return null
  const exact = expected.filter(({ symbol }) => plainLabel(symbol) === plain)
  if (exact.length === 1) return { rowId: exact[0]!.id, how: 'symbol' }

  const named = expected.filter((row) => {
    const rest = restBehindName(plain, row.characteristic)
    return rest !== null && rest === (restBehindName(plainLabel(row.symbol), row.characteristic) ?? plainLabel(row.symbol))
  })
  if (named.length === 1) return { rowId: named[0]!.id, how: 'synonym' }

  const bare = expected.filter((row) => SYNONYMS[row.characteristic].includes(plain))
  const onlyOne = bare.length === 1 && expected.filter(({ characteristic }) => characteristic === bare[0]!.characteristic).length === 1
  return onlyOne ? { rowId: bare[0]!.id, how: 'synonym' } : null
}

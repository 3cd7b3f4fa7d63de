import type { RevisionChange } from '#shared/engine/specification'
import { enteredText } from '#shared/number-format'
import { readFigure } from '#shared/number-text'
import { shownUnit } from '#shared/shown-units'

/** Lists are entered as lines of text; blank lines say nothing. */
export const linesOf = (text: string): string[] => text.split('\n').map((line) => line.trim()).filter((line) => line !== '')

/** Terminals apart by commas or blanks. */
export const terminalsOf = (text: string): string[] => text.split(/[\s,]+/).filter((name) => name !== '')

export const terminalGroupsOf = (text: string): string[][] => text.split(';').map(terminalsOf).filter((names) => names.length > 0)
export const terminalGroupsText = (groups: readonly (readonly string[])[]): string => groups.map((names) => names.join(', ')).join('; ')

export const changeText = ({ field, before, after }: RevisionChange): string => `${field}: ${before} → ${after}`

/** `field: old → new`; an arrow may be typed as `->`. Null when it is not written so. */
export function changeOf(line: string): RevisionChange | null {
  const match = /^([^:]+):(.*?)(?:→|->)(.*)$/.exec(line)
  return match && { field: match[1]!.trim(), before: match[2]!.trim(), after: match[3]!.trim() }
}

interface ImpedancePoint {
  frequencyHz: number
  minimumOhm: number
}

const KILOHERTZ = shownUnit('kHz')
const OHM = shownUnit('Ω')

export const impedanceText = ({ frequencyHz, minimumOhm }: ImpedancePoint): string => `${enteredText(frequencyHz, KILOHERTZ)} kHz: ${enteredText(minimumOhm, OHM)} Ω`

/** `150 kHz: 1000 Ω`. Null when it is not written so. */
export function impedanceOf(line: string): ImpedancePoint | null {
  const [left, right, ...rest] = line.split(':')
  if (left === undefined || right === undefined || rest.length > 0) return null
  const frequency = readFigure(left.trim(), KILOHERTZ)
  const impedance = readFigure(right.trim(), OHM)
  if (frequency.kind !== 'figure' || impedance.kind !== 'figure' || frequency.value <= 0 || impedance.value <= 0) return null
  return { frequencyHz: frequency.value, minimumOhm: impedance.value }
}

import type { PartDraft } from './part-rows'

/** One thing about a row that cannot be, with the dotted path of the field to mend. */
export interface PartProblem {
  path: string
  message: string
}

/** What no single field shows: figures of one row that contradict one another. */
export function partProblems(row: PartDraft): PartProblem[] {
  return [...unverifiedProblems(row), ...kindProblems(row)]
}

function kindProblems(row: PartDraft): PartProblem[] {
  switch (row.kind) {
    case 'core':
      return coreProblems(row)
    case 'former':
      return formerProblems(row)
    case 'material':
      return materialProblems(row)
    case 'wire':
      return wireProblems(row)
    case 'tape':
    case 'sleeve':
      return []
  }
}

/** The fields marked as unverified must be there; a generic row must name at least one. */
function unverifiedProblems(row: PartDraft): PartProblem[] {
  const unknown = row.unverified.filter((path) => !hasField(row, path))
  if (unknown.length > 0) return [{ path: 'unverified', message: `The row has no field “${unknown[0]}”.` }]
  if (row.confidence === 'generic' && row.unverified.length === 0) {
    return [{ path: 'unverified', message: 'A generic row names the fields that nobody vouches for; tick at least one.' }]
  }
  return []
}

/** True when the dotted path leads to a field, or into an object that is left empty. */
export function hasField(row: object, path: string): boolean {
  let value: unknown = row
  for (const [index, key] of path.split('.').entries()) {
    if (index > 0 && value === null) return true
    if (typeof value !== 'object' || value === null || !Object.hasOwn(value, key)) return false
    value = (value as Record<string, unknown>)[key]
  }
  return true
}

/** Printed figures are rounded; beyond this they contradict one another. */
const VOLUME_TOLERANCE = 0.05

function coreProblems(row: Extract<PartDraft, { kind: 'core' }>): PartProblem[] {
  const problems: PartProblem[] = []
  if (row.minimumAreaMm2 > row.effectiveAreaMm2) problems.push({ path: 'minimumAreaMm2', message: 'The least area is larger than the effective area.' })
  const volume = row.effectiveAreaMm2 * row.effectiveLengthMm
  if (Math.abs(volume / row.effectiveVolumeMm3 - 1) > VOLUME_TOLERANCE) {
    problems.push({ path: 'effectiveVolumeMm3', message: 'The effective volume differs from effective area times effective length by more than 5 % (IEC 60205).' })
  }
  const { b, d, e, f } = row.dimensionsMm
  if (row.shape !== 'toroid' && e !== null && f !== null && e <= f) problems.push({ path: 'dimensionsMm.e', message: 'The window is no wider than the centre leg (E not above F).' })
  if (row.shape !== 'toroid' && b !== null && d !== null && b <= d) problems.push({ path: 'dimensionsMm.d', message: 'The window is as high as the core (D not below B).' })
  return problems
}

function formerProblems(row: Extract<PartDraft, { kind: 'former' }>): PartProblem[] {
  const numbers = row.pins.map((pin) => pin.number)
  const twice = numbers.findIndex((number, index) => numbers.indexOf(number) !== index)
  return twice === -1 ? [] : [{ path: `pins.${twice}.number`, message: `Pin ${numbers[twice]} is there twice.` }]
}

function materialProblems(row: Extract<PartDraft, { kind: 'material' }>): PartProblem[] {
  const problems: PartProblem[] = []
  row.saturation.forEach((point, index) => {
    const before = row.saturation[index - 1]
    if (before && point.temperatureC <= before.temperatureC) {
      problems.push({ path: `saturation.${index}.temperatureC`, message: 'The points of saturation must rise in temperature.' })
    }
  })
  row.lossFits.forEach((fit, index) => {
    if (fit.minimumHz >= fit.maximumHz) problems.push({ path: `lossFits.${index}.maximumHz`, message: 'The range of the fit ends below its start.' })
    const before = row.lossFits[index - 1]
    if (before && fit.minimumHz < before.maximumHz) problems.push({ path: `lossFits.${index}.minimumHz`, message: 'The ranges of the fits overlap.' })
    const least = leastTemperatureFactor(fit)
    if (least <= 0) problems.push({ path: `lossFits.${index}.ct0`, message: 'The temperature factor of the fit is not positive between 0 °C and 120 °C.' })
  })
  const range = row.frequencyRangeHz
  if (range && range.minimum >= range.maximum) problems.push({ path: 'frequencyRangeHz.maximum', message: 'The frequency range ends below its start.' })
  return problems
}

/** Least value of ct0 − ct1·T + ct2·T² from 0 °C to 120 °C. */
function leastTemperatureFactor({ ct0, ct1, ct2 }: { ct0: number; ct1: number; ct2: number }): number {
  const vertexC = ct2 > 0 ? Math.min(120, Math.max(0, ct1 / (2 * ct2))) : 0
  return Math.min(...[0, vertexC, 120].map((temperatureC) => ct0 - ct1 * temperatureC + ct2 * temperatureC ** 2))
}

function wireProblems(row: Extract<PartDraft, { kind: 'wire' }>): PartProblem[] {
  const problems: PartProblem[] = []
  const { nominalOhmPerM, minimumOhmPerM, maximumOhmPerM } = row.resistance20
  if (minimumOhmPerM !== null && minimumOhmPerM > nominalOhmPerM) problems.push({ path: 'resistance20.minimumOhmPerM', message: 'The least resistance is above the nominal one.' })
  if (maximumOhmPerM !== null && maximumOhmPerM < nominalOhmPerM) problems.push({ path: 'resistance20.maximumOhmPerM', message: 'The greatest resistance is below the nominal one.' })
  for (const [insulation, sizeMm] of Object.entries(row.overallMm)) {
    if (sizeMm !== null && sizeMm < row.conductorMm) problems.push({ path: `overallMm.${insulation}`, message: 'The overall diameter is smaller than the conductor.' })
  }
  if (row.form === 'foil' && row.widthMm === null) problems.push({ path: 'widthMm', message: 'A foil has a width.' })
  return problems
}

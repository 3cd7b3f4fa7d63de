import { evaluate } from '../evaluate'
import type { Library } from '../library'
import type { SpecificationDocument, TestRow } from '../specification'
import { asBuilt, injectFaults } from './faults'
import type { Fault, FaultKind } from './faults'
import { predictedIndex, shareOutside } from './normal'
import { rowValue } from './row-value'
import type { BuiltPart, RowValue } from './row-value'
import { relativeDeviation, rowSpread } from './spread'
import type { SpreadShare } from './spread'

/** What a row of the test table is expected to read in production. */
export interface RowForecast {
  rowId: string
  symbol: string
  /** Mean in the row's unit; null where the engine cannot tell. */
  mean: number | null
  deviation: number | null
  shares: SpreadShare[]
  /** Predicted performance index; null without limits or without a known spread. */
  ppk: number | null
  /** Share of good parts that the row refuses. */
  refusedShare: number | null
}

/** How surely one row finds one fault, 0…1. */
export interface Detection {
  rowId: string
  symbol: string
  extent: TestRow['extent']
  share: number
}

export interface FaultCoverage {
  kind: FaultKind
  values: Fault['values']
  /** Rows that find it in more than a hundredth of the parts, the surest first. */
  foundBy: Detection[]
  /** `every-part`: a row on every part finds it surely; `sample-only`: only rows on samples do; `partly`: no row surely; `never`. */
  state: 'every-part' | 'sample-only' | 'partly' | 'never'
}

export interface TestCoverage {
  rows: RowForecast[]
  faults: FaultCoverage[]
}

export interface CoverageOptions {
  /** Only these faults; all unless said. */
  kinds?: readonly FaultKind[]
}

/** From this share of faulty parts on a row finds a fault surely. Source: three deviations on one side. */
export const SURE_SHARE = 0.9986
const WORTH_NAMING = 0.01

/**
 * What the test table is worth: the expected reading of each row with its spread, and which row finds which fault. Every fault is
 * an edited document run through `evaluate`; nothing here knows what a fault does.
 *
 * Readings of a faulty part spread about its own mean by the same relative deviation as those of a good one.
 */
export function testCoverage(document: SpecificationDocument, library: Library, { kinds }: CoverageOptions = {}): TestCoverage {
  const { tests } = document.specification
  const evaluation = evaluate(document, library)
  const faults = injectFaults(document, library, evaluation).filter(({ kind }) => !kinds || kinds.includes(kind))
  const built = asBuilt(document, evaluation)
  const good: BuiltPart = { document: built, evaluation: evaluate(built, library) }
  const rows = tests.map((row) => forecast(document, library, row, rowValue(good, document, row)))
  return { rows, faults: faults.map((fault) => coverageOf(fault, document, rows)) }
}

function forecast(document: SpecificationDocument, library: Library, row: TestRow, value: RowValue): RowForecast {
  const shares = rowSpread(document, library, row)
  const relative = relativeDeviation(shares)
  const mean = value?.kind === 'reading' ? value.value : null
  const deviation = mean !== null && relative !== null && mean !== 0 ? Math.abs(mean) * relative : null
  const known = mean !== null && deviation !== null
  return {
    rowId: row.id,
    symbol: row.symbol,
    mean,
    deviation,
    shares,
    ppk: known ? predictedIndex(mean, deviation, row) : null,
    refusedShare: known ? shareOutside(mean, deviation, row) : value?.kind === 'verdict' ? Number(!value.pass) : null,
  }
}

function coverageOf(fault: Fault, document: SpecificationDocument, forecasts: readonly RowForecast[]): FaultCoverage {
  const part: BuiltPart = { document: fault.document, evaluation: evaluate(fault.document, fault.library) }
  const foundBy = document.specification.tests
    .map((row, index): Detection => ({ rowId: row.id, symbol: row.symbol, extent: row.extent, share: detectedShare(row, rowValue(part, document, row), forecasts[index]!) }))
    .filter(({ share }) => share > WORTH_NAMING)
    .sort((one, other) => other.share - one.share || (one.rowId < other.rowId ? -1 : 1))
  const sure = foundBy.filter(({ share, extent }) => share >= SURE_SHARE && extent !== 'reference')
  const state = sure.some(({ extent }) => extent === 'every-part') ? 'every-part' : sure.length > 0 ? 'sample-only' : foundBy.length > 0 ? 'partly' : 'never'
  return { kind: fault.kind, values: fault.values, foundBy, state }
}

function detectedShare(row: TestRow, value: RowValue, { mean, deviation }: RowForecast): number {
  if (value === null) return 0
  if (value.kind === 'verdict') return Number(!value.pass)
  if (mean === null || deviation === null || (row.minimum === null && row.maximum === null)) return 0
  return shareOutside(value.value, Math.max(Math.abs(value.value) * (deviation / Math.abs(mean)), deviation * 1e-6), row)
}

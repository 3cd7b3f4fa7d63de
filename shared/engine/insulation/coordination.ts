import { known, mapAnswer, notCheckable } from '../answer'
import type { Answer } from '../answer'
import { interpolateTable } from '../interpolate'
import type { TablePoint } from '../interpolate'
import { requireNotNegative, requirePositive } from '../require'
import {
  ALTITUDE_FACTOR, CREEPAGE, CREEPAGE_COLUMNS, HIGH_FREQUENCY_CLEARANCE, HIGH_FREQUENCY_POLLUTION_FACTOR, IMPULSE_CLEARANCE_A,
  IMPULSE_CLEARANCE_B, POLLUTION_MINIMUM_MM, PREFERRED_IMPULSE_V, RATED_IMPULSE, RECURRING_PEAK_CLEARANCE,
} from './tables'
import type { CreepageColumn, OvervoltageCategory, PollutionDegree } from './tables'

export type InsulationKind = 'functional' | 'basic' | 'supplementary' | 'double' | 'reinforced'
export type MaterialGroup = 'I' | 'II' | 'IIIa' | 'IIIb'

/** Double and reinforced insulation are dimensioned alike. */
export const isReinforced = (insulation: InsulationKind): boolean => insulation === 'double' || insulation === 'reinforced'

const KV = 1e-3

/** First row at or above x; rows hold up to and including their x, so no value is drawn between two rows. */
function rowUp(table: readonly TablePoint[], x: number): Answer<number> {
  const row = table.find(([rowX]) => x <= rowX * (1 + 1e-12))
  return row ? known(row[1]) : notCheckable('past-last-row', { asked: x, lastRow: table[table.length - 1]![0] })
}

/**
 * Rated impulse voltage of equipment on a supply, in V peak.
 *
 * Source: IEC 60664-1:2020, Table F.1. The rows of 1250 and 1500 V are for d.c. only.
 *
 * @throws RangeError unless the voltage is positive
 */
export function ratedImpulseV(input: { lineToNeutralV: number; overvoltageCategory: OvervoltageCategory; directCurrent?: boolean }): Answer<number> {
  requirePositive('lineToNeutralV', input.lineToNeutralV)
  const rows = RATED_IMPULSE.filter(({ directCurrentOnly }) => input.directCurrent || !directCurrentOnly)
  const row = rows.find(({ lineToNeutralV }) => input.lineToNeutralV <= lineToNeutralV)
  if (!row) return notCheckable('past-last-row', { askedV: input.lineToNeutralV, lastRowV: rows[rows.length - 1]!.lineToNeutralV })
  return known(row.impulseV[input.overvoltageCategory])
}

/**
 * Impulse voltage that reinforced insulation is dimensioned for, in V peak: the next higher of the preferred series, or
 * 160 % of a value outside it.
 *
 * Source: IEC 60664-1:2020, clearances of reinforced insulation.
 *
 * @throws RangeError unless the voltage is positive
 */
export function reinforcedImpulseV(impulseV: number): Answer<number> {
  requirePositive('impulseV', impulseV)
  const index = (PREFERRED_IMPULSE_V as readonly number[]).indexOf(impulseV)
  if (index < 0) return known(1.6 * impulseV)
  const next = PREFERRED_IMPULSE_V[index + 1]
  return next === undefined ? notCheckable('past-last-row', { askedV: impulseV, lastRowV: impulseV }) : known(next)
}

export interface ImpulseClearanceInput {
  impulseV: number
  pollutionDegree: PollutionDegree
  /** Inhomogeneous unless proven by test. */
  field?: 'inhomogeneous' | 'homogeneous'
}

/**
 * Clearance for an impulse voltage up to 2000 m, in mm, at least the minimum of the pollution degree; rows are not interpolated.
 *
 * Source: IEC 60664-1:2020, Table F.2.
 *
 * @throws RangeError unless the voltage is positive
 */
export function impulseClearanceMm({ impulseV, pollutionDegree, field = 'inhomogeneous' }: ImpulseClearanceInput): Answer<number> {
  requirePositive('impulseV', impulseV)
  const table = field === 'homogeneous' && impulseV > 1000 ? IMPULSE_CLEARANCE_B : IMPULSE_CLEARANCE_A
  return mapAnswer(rowUp(table, impulseV * KV), (mm) => Math.max(mm, POLLUTION_MINIMUM_MM[pollutionDegree]))
}

/**
 * Clearance for a steady-state or recurring peak voltage up to 30 kHz and 2000 m, in mm; rows are not interpolated.
 *
 * Source: IEC 60664-1:2020, Table F.8; minimum of the pollution degree by Table F.2.
 *
 * @throws RangeError when the voltage is negative
 */
export function recurringPeakClearanceMm({ peakV, pollutionDegree }: { peakV: number; pollutionDegree: PollutionDegree }): Answer<number> {
  requireNotNegative('peakV', peakV)
  return mapAnswer(rowUp(RECURRING_PEAK_CLEARANCE, peakV * KV), (mm) => Math.max(mm, POLLUTION_MINIMUM_MM[pollutionDegree]))
}

/**
 * Clearance for a peak voltage whose fundamental lies above 30 kHz, in mm; rows are not interpolated.
 *
 * Source: IEC 62368-1:2018, Table 11 (alignment of the rows of medium confidence).
 *
 * @throws RangeError when the voltage is negative
 */
export function highFrequencyClearanceMm(input: { peakV: number; pollutionDegree: PollutionDegree; insulation: InsulationKind }): Answer<number> {
  const { peakV, pollutionDegree, insulation } = input
  requireNotNegative('peakV', peakV)
  const factor = HIGH_FREQUENCY_POLLUTION_FACTOR[pollutionDegree]
  if (factor === null) return notCheckable('pollution-degree-not-in-table', { pollutionDegree })
  const row = HIGH_FREQUENCY_CLEARANCE.find(([rowV]) => peakV <= rowV)
  if (!row) return notCheckable('past-last-row', { askedV: peakV, lastRowV: 2000 })
  return known(factor * (isReinforced(insulation) ? row[2] : row[1]))
}

/**
 * Factor on clearances by altitude: 1 up to 2000 m, then interpolated between rows, or the next row where a product
 * standard allows no interpolation.
 *
 * Source: IEC 60664-1:2020, Table A.2.
 *
 * @throws RangeError when the altitude is not a number
 */
export function altitudeFactor(altitudeM: number, interpolate = true): Answer<number> {
  if (!Number.isFinite(altitudeM)) throw new RangeError(`altitudeM must be a number: ${altitudeM}`)
  if (altitudeM <= 2000) return known(1)
  return interpolate ? interpolateTable(ALTITUDE_FACTOR, altitudeM) : rowUp(ALTITUDE_FACTOR, altitudeM)
}

export interface CreepageInput {
  workingVoltageRmsV: number
  pollutionDegree: PollutionDegree
  materialGroup: MaterialGroup
  /** Columns for printed wiring. */
  printedWiring?: boolean
  /** False takes the next row. */
  interpolate?: boolean
}

/**
 * Creepage distance of basic or supplementary insulation, in mm, straight between rows; below 10 V that of 10 V.
 *
 * Source: IEC 60664-1:2020, Table F.5; group IIIb is not to be used at pollution degree 3 above 630 V.
 *
 * @throws RangeError when the voltage is negative
 */
export function creepageMm(input: CreepageInput): Answer<number> {
  const { workingVoltageRmsV, pollutionDegree, materialGroup, interpolate = true } = input
  requireNotNegative('workingVoltageRmsV', workingVoltageRmsV)
  const column = creepageColumn(input)
  if (column === null) return notCheckable('pollution-degree-not-in-table', { pollutionDegree })
  if (materialGroup === 'IIIb' && (column === 'pcb2' || (pollutionDegree === 3 && workingVoltageRmsV > 630))) {
    return notCheckable('material-group-not-permitted', { askedV: workingVoltageRmsV, lastRowV: 630 })
  }
  const index = CREEPAGE_COLUMNS.indexOf(column) + 1
  const table = CREEPAGE.flatMap((row): TablePoint[] => (row[index] == null ? [] : [[row[0]!, row[index]]]))
  const askedV = Math.max(workingVoltageRmsV, table[0]![0])
  return interpolate ? interpolateTable(table, askedV) : rowUp(table, askedV)
}

function creepageColumn({ pollutionDegree, materialGroup, printedWiring = false }: CreepageInput): CreepageColumn | null {
  if (pollutionDegree === 4) return null
  if (printedWiring && pollutionDegree < 3) return pollutionDegree === 1 ? 'pcb1' : 'pcb2'
  if (pollutionDegree === 1) return 'pd1'
  return `pd${pollutionDegree}-${materialGroup === 'IIIa' || materialGroup === 'IIIb' ? 'III' : materialGroup}`
}

/**
 * Material group of a comparative tracking index; unknown counts as IIIb.
 *
 * Source: IEC 60664-1:2020, material groups; the rule for unknown from memory.
 *
 * @throws RangeError when the index is negative
 */
export function materialGroupOf(comparativeTrackingIndex: number | null): Answer<MaterialGroup> {
  if (comparativeTrackingIndex === null) return known('IIIb')
  requireNotNegative('comparativeTrackingIndex', comparativeTrackingIndex)
  if (comparativeTrackingIndex >= 600) return known('I')
  if (comparativeTrackingIndex >= 400) return known('II')
  if (comparativeTrackingIndex >= 175) return known('IIIa')
  if (comparativeTrackingIndex >= 100) return known('IIIb')
  return notCheckable('before-first-row', { askedCti: comparativeTrackingIndex, firstRowCti: 100 })
}

/**
 * Least width of a groove that lengthens a creepage path, in mm; below a clearance of 3 mm a third of it is enough.
 *
 * Source: IEC 60664-1:2020, groove width X.
 *
 * @throws RangeError unless the clearance is positive
 */
export function grooveWidthMm({ pollutionDegree, clearanceMm }: { pollutionDegree: PollutionDegree; clearanceMm: number }): Answer<number> {
  requirePositive('clearanceMm', clearanceMm)
  const widths: Record<PollutionDegree, number | null> = { 1: 0.25, 2: 1, 3: 1.5, 4: null }
  const widthMm = widths[pollutionDegree]
  if (widthMm === null) return notCheckable('pollution-degree-not-in-table', { pollutionDegree })
  return known(clearanceMm < 3 ? Math.min(widthMm, clearanceMm / 3) : widthMm)
}

/** Margin at each end of the coil former, in mm: the path between windings runs round the end of the tape twice. Source: geometry; L. Dixon, SLUP127, p. 5-14. */
export function marginPerSideMm(requiredCreepageMm: number): number {
  requireNotNegative('requiredCreepageMm', requiredCreepageMm)
  return requiredCreepageMm / 2
}

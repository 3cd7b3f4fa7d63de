import { known, mapAnswer, notCheckable } from '../answer'
import type { Answer } from '../answer'
import { interpolateTable } from '../interpolate'
import type { TablePoint } from '../interpolate'
import { CITATIONS } from './citation'
import type { Citation } from './citation'
import { isReinforced } from './coordination'
import type { InsulationKind } from './coordination'

/** A value, the reason why there is none, or that the standard asks for none. */
export type Requirement<T> = Answer<T> | { state: 'not-required' }

export type TestVoltageRule = 'required-withstand' | 'working-peak' | 'temporary-overvoltage' | 'working-voltage' | 'rated-voltage' | 'means-of-protection'

export interface TestVoltageContribution {
  rule: TestVoltageRule
  valueV: number
  citation: Citation
}

export interface TestVoltage {
  /** In the form that the standard states. */
  valueV: number
  form: 'peak-or-dc' | 'ac-rms'
  acRmsV: number
  dcV: number
  /** Type test, s. */
  typeTestDurationS: number
  governedBy: TestVoltageRule
  contributions: TestVoltageContribution[]
}

export interface TestStress {
  insulation: InsulationKind
  workingVoltageRmsV: number
  recurringPeakV: number
  ratedImpulseV: number | null
  nominalMainsV: number | null
}

const TYPE_TEST_DURATION_S = 60

function highest(form: TestVoltage['form'], contributions: TestVoltageContribution[]): TestVoltage {
  const top = contributions.reduce((best, next) => (next.valueV > best.valueV ? next : best))
  const acRmsV = form === 'ac-rms' ? top.valueV : top.valueV / Math.SQRT2
  return { valueV: top.valueV, form, acRmsV, dcV: acRmsV * Math.SQRT2, typeTestDurationS: TYPE_TEST_DURATION_S, governedBy: top.rule, contributions }
}

type TestRow = readonly [upToV: number, basicV: number, reinforcedV: number]

/** Test by required withstand voltage, V peak. Source: IEC 62368-1:2018, Table 25 (from memory). */
export const AUDIO_VIDEO_WITHSTAND: readonly TestRow[] = [[1500, 1500, 2500], [2500, 2500, 4000], [4000, 4000, 6000], [6000, 6000, 8000]]

/** Factors on the recurring peak, basic and reinforced. Source: IEC 62368-1:2018, Table 26 (from memory). */
export const AUDIO_VIDEO_PEAK_FACTOR = { basic: 1.3, reinforced: 1.6 } as const

/** Test by nominal mains voltage, V peak. Source: IEC 62368-1:2018, Table 27 (from memory). */
export const AUDIO_VIDEO_TEMPORARY: readonly TestRow[] = [[250, 2000, 4000], [600, 2500, 5000]]

function testRow(rows: readonly TestRow[], askedV: number, insulation: InsulationKind): Answer<number> {
  const row = rows.find(([upToV]) => askedV <= upToV)
  if (!row) return notCheckable('past-last-row', { askedV, lastRowV: rows[rows.length - 1]![0] })
  return known(isReinforced(insulation) ? row[2] : row[1])
}

/**
 * Electric-strength test of IEC 62368-1, V peak or d.c.: the highest of required withstand, recurring peak and temporary
 * overvoltage.
 *
 * Source: IEC 62368-1:2018, 5.4.9.1 (from memory; 4000 V d.c. for 240 V, category II, reinforced read in a test report).
 */
export function audioVideoTest(stress: TestStress): Answer<TestVoltage> {
  const { insulation, recurringPeakV, ratedImpulseV, nominalMainsV } = stress
  const factor = isReinforced(insulation) ? AUDIO_VIDEO_PEAK_FACTOR.reinforced : AUDIO_VIDEO_PEAK_FACTOR.basic
  const contributions: TestVoltageContribution[] = [{ rule: 'working-peak', valueV: factor * recurringPeakV, citation: CITATIONS.audioVideoWorkingPeak }]
  const asked = [
    { rule: 'required-withstand', rows: AUDIO_VIDEO_WITHSTAND, askedV: ratedImpulseV, citation: CITATIONS.audioVideoWithstand },
    { rule: 'temporary-overvoltage', rows: AUDIO_VIDEO_TEMPORARY, askedV: nominalMainsV, citation: CITATIONS.audioVideoTemporary },
  ] as const
  for (const { rule, rows, askedV, citation } of asked) {
    if (askedV === null) continue
    const value = testRow(rows, askedV, insulation)
    if (value.state !== 'known') return value
    contributions.push({ rule, valueV: value.value, citation })
  }
  return known(highest('peak-or-dc', contributions))
}

/** Working voltage, basic or supplementary, double or reinforced, all V rms. Source: IEC 61558-1:2005, Table 8a (from memory). */
export const TRANSFORMER_TEST: readonly TestRow[] = [[50, 250, 500], [150, 1400, 2800], [300, 2100, 4200], [600, 2500, 5000], [1000, 2750, 5500]]

/**
 * Dielectric strength test of IEC 61558-1, V rms, interpolated by working voltage; up to 50 V the first row.
 *
 * Source: IEC 61558-1:2005, Table 8a (from memory).
 */
export function transformerTest({ insulation, workingVoltageRmsV }: TestStress): Answer<TestVoltage> {
  const table = TRANSFORMER_TEST.map(([upToV, basicV, reinforcedV]): TablePoint => [upToV, isReinforced(insulation) ? reinforcedV : basicV])
  const citation = workingVoltageRmsV <= 50 ? CITATIONS.transformerTestLowest : CITATIONS.transformerTest
  return mapAnswer(interpolateTable(table, Math.max(50, workingVoltageRmsV)), (valueV) => highest('ac-rms', [{ rule: 'working-voltage', valueV, citation }]))
}

/** Rated voltage up to which the row of IEC 60335-1 holds, V. Source: IEC 60335-1, Table 4 (from memory). */
export const HOUSEHOLD_RATED_LIMIT_V = 250

/** Test by kind of insulation up to 250 V rated, V rms. Source: IEC 60335-1, Table 4 (from memory). */
export const HOUSEHOLD_TEST_V = { basic: 1000, supplementary: 1750, reinforced: 3000 } as const

/** Electric-strength test of IEC 60335-1, V rms, by rated voltage. Source: IEC 60335-1, Table 4 (from memory). */
export function householdTest({ insulation, nominalMainsV }: TestStress): Answer<TestVoltage> {
  if (nominalMainsV === null) return notCheckable('no-row-for-input')
  if (nominalMainsV > HOUSEHOLD_RATED_LIMIT_V) return notCheckable('past-last-row', { askedV: nominalMainsV, lastRowV: HOUSEHOLD_RATED_LIMIT_V })
  const valueV = isReinforced(insulation) ? HOUSEHOLD_TEST_V.reinforced : HOUSEHOLD_TEST_V[insulation === 'supplementary' ? 'supplementary' : 'basic']
  return known(highest('ac-rms', [{ rule: 'rated-voltage', valueV, citation: CITATIONS.householdTest }]))
}

/** Test voltage of a row of IEC 60601-1, V rms. Source: IEC 60601-1:2005+A1+A2, Table 6. */
export const medicalTest = (testVoltageRmsV: number): TestVoltage =>
  highest('ac-rms', [{ rule: 'means-of-protection', valueV: testVoltageRmsV, citation: CITATIONS.medicalMeans }])

/** Tests of winding wire that serves as insulation without interleaf, V rms; from memory. Source: IEC 62368-1:2018, Annex J. */
export const INSULATED_WIRE_TESTS = {
  twistedPairTypeTestV: { basic: 3000, reinforced: 6000 },
  afterBendTypeTestV: { basic: 2750, reinforced: 5500 },
  routineSparkTestV: { basic: 1500, reinforced: 3000 },
  leastLayers: { supplementary: 2, reinforced: 3 },
  diameterRangeMm: [0.05, 5],
  citation: CITATIONS.wireWithoutInterleaf,
} as const

import { known, notCheckable } from '../answer'
import type { Answer } from '../answer'
import { requireNotNegative } from '../require'
import { CITATIONS } from './citation'
import type { Citation } from './citation'
import { altitudeFactor, isReinforced } from './coordination'
import type { InsulationKind } from './coordination'
import { governing, requiredClearance, requiredCreepage } from './distances'
import type { BoundaryStress, RequiredDistance } from './distances'
import { audioVideoTest, householdTest, medicalTest, transformerTest } from './test-voltages'
import type { Requirement, TestVoltage } from './test-voltages'

export type ProductStandard = 'IEC 60664-1' | 'IEC 62368-1' | 'IEC 61558-1' | 'IEC 60335-1' | 'IEC 60601-1'
export type MeansOfProtection = 'MOOP' | 'MOPP'

export interface BoundaryDuty extends BoundaryStress {
  standard: ProductStandard
  /** Nominal mains voltage, rms line to neutral; null off the mains. */
  nominalMainsV: number | null
  /** For IEC 60601-1: protection of operator or patient. */
  meansOfProtection?: MeansOfProtection
}

export interface SheetAlternative {
  layers: number
  /** How many of the layers together must pass the test of the insulation. */
  layersThatPass: number
}

export interface SolidInsulation {
  minimumThicknessMm: number
  /** Thin sheet without minimum thickness, instead. */
  sheetAlternatives: readonly SheetAlternative[]
  citation: Citation
}

export interface BoundaryRequirements {
  standard: ProductStandard
  clearance: Answer<RequiredDistance>
  creepage: Answer<RequiredDistance>
  throughInsulation: Requirement<SolidInsulation>
  testVoltage: Requirement<TestVoltage>
}

/**
 * What the chosen product standard asks of one boundary: clearance, creepage, distance through insulation and test voltage,
 * each with its citation. Distances follow IEC 60664-1 but for IEC 60601-1, which has rows of its own; that IEC 60335-1
 * agrees with it is recalled, and the own distance tables of IEC 61558-1 are not held: both are said.
 *
 * Source: see `CITATIONS`. The edition in force and the certification body decide.
 *
 * @throws RangeError on a value out of its range
 */
export function boundaryRequirements(duty: BoundaryDuty): BoundaryRequirements {
  requireNotNegative('workingVoltageRmsV', duty.workingVoltageRmsV)
  requireNotNegative('recurringPeakV', duty.recurringPeakV)
  const distances = duty.standard === 'IEC 60601-1' && duty.insulation !== 'functional' ? medicalDistances(duty) : coordinatedDistances(duty)
  return { standard: duty.standard, ...distances, throughInsulation: solidInsulation(duty), testVoltage: testVoltage(duty) }
}

function coordinatedDistances(duty: BoundaryDuty): Pick<BoundaryRequirements, 'clearance' | 'creepage'> {
  const clearance = withOwnTable(duty, requiredClearance(duty, { highFrequencyTable: duty.standard === 'IEC 62368-1' }))
  return { clearance, creepage: withOwnTable(duty, requiredCreepage(duty, clearance)) }
}

function withOwnTable({ standard }: BoundaryDuty, distance: Answer<RequiredDistance>): Answer<RequiredDistance> {
  if (distance.state !== 'known') return distance
  if (standard === 'IEC 60335-1') return known({ ...distance.value, contributions: distance.value.contributions.map((one) => ({ ...one, citation: CITATIONS.householdDistances })) })
  if (standard !== 'IEC 61558-1') return distance
  return known({ ...distance.value, unchecked: [...distance.value.unchecked, notCheckable('table-not-held')] })
}

export interface MedicalRow {
  creepageMm: number
  clearanceMm: number
  testVoltageRmsV: number
}

/** One and two means of protection up to 250 V rms, 354 V peak. Source: IEC 60601-1:2005+A1+A2, Tables 6 and 12 to 16. */
export const MEDICAL_ROWS: Readonly<Record<MeansOfProtection, readonly [one: MedicalRow, two: MedicalRow]>> = {
  MOOP: [{ creepageMm: 2.5, clearanceMm: 2, testVoltageRmsV: 1500 }, { creepageMm: 5, clearanceMm: 4, testVoltageRmsV: 3000 }],
  MOPP: [{ creepageMm: 4, clearanceMm: 2.5, testVoltageRmsV: 1500 }, { creepageMm: 8, clearanceMm: 5, testVoltageRmsV: 4000 }],
}

/** Voltages up to which the medical rows hold. Source: as `MEDICAL_ROWS`. */
export const MEDICAL_LIMIT = { rmsV: 250, peakV: 354 } as const

function medicalRow({ meansOfProtection, insulation, workingVoltageRmsV, recurringPeakV }: BoundaryDuty): Answer<MedicalRow> {
  if (!meansOfProtection) return notCheckable('means-of-protection-not-stated')
  if (workingVoltageRmsV > MEDICAL_LIMIT.rmsV || recurringPeakV > MEDICAL_LIMIT.peakV) {
    return notCheckable('past-last-row', { askedV: workingVoltageRmsV, askedPeakV: recurringPeakV, lastRowV: MEDICAL_LIMIT.rmsV })
  }
  return known(MEDICAL_ROWS[meansOfProtection][isReinforced(insulation) ? 1 : 0])
}

function medicalDistances(duty: BoundaryDuty): Pick<BoundaryRequirements, 'clearance' | 'creepage'> {
  const row = medicalRow(duty)
  const factor = altitudeFactor(duty.altitudeM)
  if (row.state !== 'known') return { clearance: row, creepage: row }
  if (factor.state !== 'known') return { clearance: factor, creepage: factor }
  const clearanceMm = row.value.clearanceMm * factor.value
  const citation = CITATIONS.medicalMeans
  return {
    clearance: known(governing([{ rule: 'means-of-protection', distanceMm: clearanceMm, citation }], factor.value, [])),
    creepage: known(governing([
      { rule: 'means-of-protection', distanceMm: row.value.creepageMm, citation },
      { rule: 'not-below-clearance', distanceMm: clearanceMm, citation },
    ], 1, [])),
  }
}

/** Peak working voltage above which a distance through insulation is asked, V. Source: IEC 62368-1:2018, 5.4.4.2. */
export const SOLID_INSULATION_THRESHOLD_PEAK_V = 71

const TWO_OR_THREE_SHEETS: readonly SheetAlternative[] = [{ layers: 2, layersThatPass: 1 }, { layers: 3, layersThatPass: 2 }]

const protects = (insulation: InsulationKind) => insulation === 'supplementary' || isReinforced(insulation)

function solidInsulation({ standard, insulation, recurringPeakV }: BoundaryDuty): Requirement<SolidInsulation> {
  const reinforced = isReinforced(insulation)
  switch (standard) {
    case 'IEC 60664-1':
    case 'IEC 61558-1':
      return insulation === 'functional' ? { state: 'not-required' } : notCheckable('table-not-held')
    case 'IEC 62368-1':
      if (!protects(insulation) || recurringPeakV <= SOLID_INSULATION_THRESHOLD_PEAK_V) return { state: 'not-required' }
      return known({ minimumThicknessMm: 0.4, sheetAlternatives: TWO_OR_THREE_SHEETS, citation: CITATIONS.audioVideoSolid })
    case 'IEC 60335-1':
      if (!protects(insulation)) return { state: 'not-required' }
      return known({
        minimumThicknessMm: reinforced ? 2 : 1,
        sheetAlternatives: [{ layers: reinforced ? 3 : 2, layersThatPass: reinforced ? 2 : 1 }],
        citation: CITATIONS.householdSolidLayers,
      })
    case 'IEC 60601-1':
      if (!protects(insulation) || recurringPeakV <= SOLID_INSULATION_THRESHOLD_PEAK_V) return { state: 'not-required' }
      return known({ minimumThicknessMm: 0.4, sheetAlternatives: TWO_OR_THREE_SHEETS, citation: CITATIONS.medicalSolid })
  }
}

function testVoltage(duty: BoundaryDuty): Requirement<TestVoltage> {
  if (duty.insulation === 'functional') return { state: 'not-required' }
  switch (duty.standard) {
    case 'IEC 60664-1':
      return notCheckable('table-not-held')
    case 'IEC 62368-1':
      return audioVideoTest(duty)
    case 'IEC 61558-1':
      return transformerTest(duty)
    case 'IEC 60335-1':
      return householdTest(duty)
    case 'IEC 60601-1': {
      const row = medicalRow(duty)
      return row.state === 'known' ? known(medicalTest(row.value.testVoltageRmsV)) : row
    }
  }
}

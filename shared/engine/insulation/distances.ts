import { known, mapAnswer, notCheckable } from '../answer'
import type { Answer, NotCheckable } from '../answer'
import { CITATIONS } from './citation'
import type { Citation } from './citation'
import {
  altitudeFactor, creepageMm, highFrequencyClearanceMm, impulseClearanceMm, isReinforced, recurringPeakClearanceMm, reinforcedImpulseV,
} from './coordination'
import type { InsulationKind, MaterialGroup } from './coordination'
import { HIGH_FREQUENCY_LIMIT_HZ } from './tables'
import type { PollutionDegree } from './tables'

export interface BoundaryStress {
  insulation: InsulationKind
  workingVoltageRmsV: number
  recurringPeakV: number
  /** Fundamental of the recurring voltage. */
  frequencyHz: number
  /** Rated impulse across the boundary; null where no transient reaches it. */
  ratedImpulseV: number | null
  pollutionDegree: PollutionDegree
  materialGroup: MaterialGroup
  altitudeM: number
  printedWiring?: boolean
}

export type DistanceRule =
  | 'impulse'
  | 'recurring-peak'
  | 'high-frequency-peak'
  | 'tracking'
  | 'not-below-clearance'
  | 'means-of-protection'

export interface DistanceContribution {
  rule: DistanceRule
  distanceMm: number
  citation: Citation
}

export interface RequiredDistance {
  distanceMm: number
  governedBy: DistanceRule
  /** All rules looked at, altitude already in. */
  contributions: DistanceContribution[]
  altitudeFactor: number
  /** Rules that apply and could not be looked at; the distance stands without them. */
  unchecked: NotCheckable[]
}

/** The greatest contribution governs. */
export function governing(contributions: DistanceContribution[], factor: number, unchecked: NotCheckable[]): RequiredDistance {
  const greatest = contributions.reduce((top, next) => (next.distanceMm > top.distanceMm ? next : top))
  return { distanceMm: greatest.distanceMm, governedBy: greatest.rule, contributions, altitudeFactor: factor, unchecked }
}

/** Whether the tables for voltages above 30 kHz hold too. Source: IEC 60664-4, scope. */
export const isHighFrequency = ({ frequencyHz }: Pick<BoundaryStress, 'frequencyHz'>): boolean => frequencyHz > HIGH_FREQUENCY_LIMIT_HZ

export interface ClearanceOptions {
  /** Whether the chosen product standard's table for voltages above 30 kHz is the one held. */
  highFrequencyTable: boolean
}

/**
 * Required clearance: the greatest of impulse, recurring peak and (above 30 kHz) high-frequency peak, times the factor of
 * altitude. Reinforced insulation takes the next preferred impulse and 160 % of the recurring peak.
 *
 * Source: IEC 60664-1:2020; IEC 62368-1:2018, Table 11.
 *
 * @throws RangeError on a value out of its range
 */
export function requiredClearance(stress: BoundaryStress, { highFrequencyTable }: ClearanceOptions): Answer<RequiredDistance> {
  const factor = altitudeFactor(stress.altitudeM)
  if (factor.state !== 'known') return factor
  const rules = clearanceRules(stress, highFrequencyTable)
  const missing = rules.find(({ distance }) => distance.state === 'not-checkable')
  if (missing && missing.distance.state === 'not-checkable') return missing.distance
  const contributions = rules.flatMap(({ rule, distance, citation }): DistanceContribution[] =>
    distance.state === 'known' ? [{ rule, distanceMm: distance.value * factor.value, citation }] : [])
  const unchecked = isHighFrequency(stress) && !highFrequencyTable ? [notCheckable('high-frequency-table-not-held', { frequencyHz: stress.frequencyHz })] : []
  return known(governing(contributions, factor.value, unchecked))
}

function clearanceRules(stress: BoundaryStress, highFrequencyTable: boolean): { rule: DistanceRule; distance: Answer<number>; citation: Citation }[] {
  const { insulation, pollutionDegree, recurringPeakV, ratedImpulseV: impulseV } = stress
  const reinforced = isReinforced(insulation)
  const recurring = recurringPeakClearanceMm({ peakV: recurringPeakV * (reinforced ? 1.6 : 1), pollutionDegree })
  const rules = [{ rule: 'recurring-peak' as DistanceRule, distance: recurring, citation: reinforced ? CITATIONS.reinforcedPeak as Citation : CITATIONS.recurringPeakClearance }]
  if (impulseV !== null) {
    const dimensioned = reinforced ? reinforcedImpulseV(impulseV) : known(impulseV)
    const distance = dimensioned.state === 'known' ? impulseClearanceMm({ impulseV: dimensioned.value, pollutionDegree }) : dimensioned
    rules.unshift({ rule: 'impulse', distance, citation: reinforced ? CITATIONS.reinforcedClearance : CITATIONS.impulseClearance })
  }
  if (isHighFrequency(stress) && highFrequencyTable) {
    const distance = highFrequencyClearanceMm({ peakV: recurringPeakV, pollutionDegree, insulation })
    rules.push({ rule: 'high-frequency-peak', distance, citation: CITATIONS.highFrequencyClearance })
  }
  return rules
}

/**
 * Required creepage: the tracking table by rms voltage, twice for reinforced insulation, and never below the required
 * clearance. The creepage table for voltages above 30 kHz (IEC 60664-4) is not held, which is said where it would apply.
 *
 * Source: IEC 60664-1:2020, Table F.5.
 *
 * @throws RangeError on a value out of its range
 */
export function requiredCreepage(stress: BoundaryStress, clearance: Answer<RequiredDistance>): Answer<RequiredDistance> {
  if (clearance.state !== 'known') return clearance
  const tracking = creepageMm(stress)
  return mapAnswer(tracking, (basicMm) => {
    const contributions: DistanceContribution[] = [
      { rule: 'tracking', distanceMm: basicMm * (isReinforced(stress.insulation) ? 2 : 1), citation: CITATIONS.creepage },
      { rule: 'not-below-clearance', distanceMm: clearance.value.distanceMm, citation: CITATIONS.creepage },
    ]
    const unchecked = isHighFrequency(stress) ? [notCheckable('high-frequency-table-not-held', { frequencyHz: stress.frequencyHz })] : []
    return governing(contributions, 1, unchecked)
  })
}

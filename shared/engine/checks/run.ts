import type { CheckResult } from '../evaluation'
import { BUILD_CHECKS } from './build-fit'
import { CHOKE_CHECKS } from './chokes'
import { COVERAGE_CHECKS } from './coverage'
import { DOCUMENT_CHECKS } from './documentation'
import { ELECTRICAL_CHECKS } from './electrical'
import { FLUX_CHECKS } from './flux'
import { HEAT_CHECKS } from './heat'
import { INSULATION_CHECKS } from './insulation'
import { JOINT_CHECKS } from './joints'
import { LIBRARY_CHECKS } from './library'
import { LEAD_CHECKS } from './leads'
import { marginOf } from './outcome'
import type { Check, CheckInput, Outcome } from './outcome'
import { PAPER_CHECKS } from './papers'
import { PARASITIC_CHECKS } from './parasitics'
import { READING_CHECKS } from './readings'
import { RING_CHECKS } from './rings'
import { ROW_CHECKS } from './row-limits'
import { SAFETY_CHECKS } from './safety'
import { STRENGTH_CHECKS } from './strength'
import { TERMINATION_CHECKS } from './terminations'
import { THERMAL_CHECKS } from './thermal'
import { WINDABILITY_CHECKS } from './windability'
import { WITHSTAND_CHECKS } from './withstand'

/** All release checks by their permanent code. */
export const CHECKS: Readonly<Record<string, Check>> = {
  ...ELECTRICAL_CHECKS,
  ...FLUX_CHECKS,
  ...PARASITIC_CHECKS,
  ...CHOKE_CHECKS,
  ...THERMAL_CHECKS,
  ...HEAT_CHECKS,
  ...INSULATION_CHECKS,
  ...SAFETY_CHECKS,
  ...LEAD_CHECKS,
  ...WITHSTAND_CHECKS,
  ...STRENGTH_CHECKS,
  ...WINDABILITY_CHECKS,
  ...BUILD_CHECKS,
  ...RING_CHECKS,
  ...TERMINATION_CHECKS,
  ...JOINT_CHECKS,
  ...DOCUMENT_CHECKS,
  ...PAPER_CHECKS,
  ...COVERAGE_CHECKS,
  ...READING_CHECKS,
  ...ROW_CHECKS,
  ...LIBRARY_CHECKS,
}

/** Runs every check that applies; one result for each place a check looks at. */
export function runChecks(input: CheckInput): CheckResult[] {
  return Object.entries(CHECKS).flatMap(([code, check]) => check.run(input).map((outcome) => result(code, check, outcome)))
}

const result = (code: string, check: Check, outcome: Outcome): CheckResult => ({
  code,
  severity: outcome.severity ?? check.severity,
  state: outcome.state,
  value: outcome.value,
  limit: outcome.limit,
  unit: outcome.unit,
  margin: marginOf(outcome),
  source: check.source,
  path: outcome.path,
  values: outcome.values ?? {},
})

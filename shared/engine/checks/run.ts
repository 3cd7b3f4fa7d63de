import type { CheckResult } from '../evaluation'
import { COVERAGE_CHECKS } from './coverage'
import { DOCUMENT_CHECKS } from './documentation'
import { ELECTRICAL_CHECKS } from './electrical'
import { INSULATION_CHECKS } from './insulation'
import { LIBRARY_CHECKS } from './library'
import { LEAD_CHECKS } from './leads'
import { marginOf } from './outcome'
import type { Check, CheckInput, Outcome } from './outcome'
import { ROW_CHECKS } from './row-limits'
import { SAFETY_CHECKS } from './safety'
import { TERMINATION_CHECKS } from './terminations'
import { THERMAL_CHECKS } from './thermal'
import { WINDABILITY_CHECKS } from './windability'
import { WITHSTAND_CHECKS } from './withstand'

/** All release checks by their permanent code. */
export const CHECKS: Readonly<Record<string, Check>> = {
  ...ELECTRICAL_CHECKS,
  ...THERMAL_CHECKS,
  ...INSULATION_CHECKS,
  ...SAFETY_CHECKS,
  ...LEAD_CHECKS,
  ...WITHSTAND_CHECKS,
  ...WINDABILITY_CHECKS,
  ...TERMINATION_CHECKS,
  ...DOCUMENT_CHECKS,
  ...COVERAGE_CHECKS,
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

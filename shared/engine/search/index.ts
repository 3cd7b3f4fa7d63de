import type { Finding } from '../findings'
import type { Library } from '../library'
import { planOf } from '../propose/plan'
import type { RequirementSheet } from '../specification'
import { evaluateFinalists } from './finalists'
import type { SearchPreferences } from './preferences'
import type { SearchOutcome, SearchProgress } from './progress'
import { outcome } from './ranking'
import { scopeOf } from './scope'
import { screenAll } from './screening'

export type { CandidateFigures, RejectedCore, SearchCandidate } from './candidates'
export type { SearchPreferences } from './preferences'
export type { SearchOutcome, SearchProgress } from './progress'

/**
 * Candidates from a duty over the whole library, one step at a time, so that whoever drives it can show progress and stop:
 * variants of core, material, turns, density and insulation are ordered by closed forms, the best of each core are laid out and
 * evaluated in full, and what fails names the check that rejected it.
 *
 * Deterministic: equal input gives the same candidates in the same order.
 */
export function* searchSteps(requirement: RequirementSheet, library: Library, wishes: SearchPreferences = {}): Generator<SearchProgress, SearchOutcome, boolean | undefined> {
  try {
    const plan = planOf(requirement)
    if (!plan) return nothing({ code: 'duty-without-proposal', severity: 'warning', path: 'requirement.duty', values: { topology: requirement.duty.topology } })
    const scope = scopeOf(requirement, library, { plan, wishes })
    const screening = yield* screenAll(scope)
    if (screening.stopped) return outcome(scope, { made: [], rejected: screening.rejected, screened: screening.screened, evaluated: 0, stopped: true })
    return yield* evaluateFinalists(scope, screening)
  } catch (error) {
    // A sheet whose figures contradict each other is no misuse: the stage's refusal becomes a finding.
    if (!(error instanceof RangeError)) throw error
    return nothing({ code: 'duty-not-solvable', severity: 'error', path: 'requirement.duty', values: { reason: error.message } })
  }
}

const nothing = (finding: Finding): SearchOutcome => ({ candidates: [], rejected: [], findings: [finding], screened: 0, evaluated: 0, stopped: false })

/** The whole search at once. `onProgress` answering false stops it with what was found. */
export function search(requirement: RequirementSheet, library: Library, wishes: SearchPreferences = {}, onProgress: (progress: SearchProgress) => boolean | void = () => undefined): SearchOutcome {
  const steps = searchSteps(requirement, library, wishes)
  let step = steps.next()
  while (!step.done) step = steps.next(onProgress(step.value) === false)
  return step.value
}

import { placeOfCheck } from '#shared/contracts/specifications'
import type { CheckResult } from '#shared/engine/evaluation'
import { isWithin } from '../document-paths'

export interface CheckGroup {
  key: 'stops' | 'answer' | 'unknown' | 'notes' | 'passed' | 'met'
  title: string
  results: CheckResult[]
}

/**
 * The results by what they ask of a person. What could not be checked is never met; where it belongs to a check that
 * stops release it stops release too.
 */
export function groupChecks(checks: readonly CheckResult[], overridden: ReadonlySet<string> = new Set()): CheckGroup[] {
  const stopped = (check: CheckResult) => check.severity === 'S' && check.state !== 'met'
  const of = (key: CheckGroup['key'], title: string, belongs: (check: CheckResult) => boolean): CheckGroup => ({ key, title, results: checks.filter(belongs) })
  return [
    of('stops', 'Stops release', (check) => stopped(check) && check.state === 'not-met' && !overridden.has(placeOfCheck(check))),
    of('unknown', 'Could not be checked', (check) => check.state === 'not-checkable' && !(stopped(check) && overridden.has(placeOfCheck(check)))),
    of('answer', 'Wants an answer', (check) => check.severity === 'M' && check.state === 'not-met'),
    of('notes', 'For information', (check) => check.severity === 'N' && check.state === 'not-met'),
    of('passed', 'Let pass with a reason', (check) => stopped(check) && overridden.has(placeOfCheck(check))),
    of('met', 'Met', (check) => check.state === 'met'),
  ]
}

/** Results that stop release as things stand; a check let pass at one place stops it at every other. */
export const stoppingChecks = (checks: readonly CheckResult[], overridden: ReadonlySet<string>): CheckResult[] =>
  checks.filter((check) => check.severity === 'S' && check.state !== 'met' && !overridden.has(placeOfCheck(check)))

/** In one line what the checks say: what stops release, be it broken or not to be told, before what only wants an answer. */
export function checkSummary(checks: readonly CheckResult[]): string {
  const count = (belongs: (check: CheckResult) => boolean) => checks.filter(belongs).length
  const broken = count(({ severity, state }) => severity === 'S' && state === 'not-met')
  const untold = count(({ severity, state }) => severity === 'S' && state === 'not-checkable')
  const open = count(({ severity, state }) => severity !== 'S' && state === 'not-checkable')
  const answers = count(({ severity, state }) => severity === 'M' && state === 'not-met')
  return [
    `${broken + untold} stop release (${broken} not met, ${untold} that could not be checked)`,
    `${open} ${open === 1 ? 'other' : 'others'} could not be checked`,
    `${answers} ${answers === 1 ? 'wants' : 'want'} an answer`,
    `${count(({ state }) => state === 'met')} met`,
  ].join(', ')
}

/** Codes that stop release as things stand. */
export function stoppingCodes(checks: readonly CheckResult[], overridden: ReadonlySet<string>): string[] {
  return [...new Set(stoppingChecks(checks, overridden).map(({ code }) => code))]
}

/** Place → codes of the checks that are not met there and want something done. */
export function flagsByPlace(checks: readonly CheckResult[]): Map<string, string[]> {
  const flags = new Map<string, string[]>()
  for (const { code, path, state, severity } of checks) {
    if (state !== 'not-met' || severity === 'N') continue
    const codes = flags.get(path) ?? []
    if (!codes.includes(code)) flags.set(path, [...codes, code])
  }
  return flags
}

/** All codes at a place and within it. */
export const flagsWithin = (flags: ReadonlyMap<string, readonly string[]>, place: string): string[] => [
  ...new Set([...flags].filter(([path]) => isWithin(path, place)).flatMap(([, codes]) => codes)),
]

import type { CheckResult, Evaluation } from '../evaluation'
import type { ProposalPreferences } from './preferences'
import type { Rejection } from './reasons'

/** Checks that an engineer would rather not have to answer, where a slightly larger core meets them. */
const AVOIDED = new Set(['T01', 'T02', 'T03', 'T04', 'W04', 'W06', 'W08', 'P03', 'P04', 'E12', 'E15'])

const broken = ({ state, severity }: CheckResult) => state === 'not-met' && severity !== 'N'

/** Checks of one code that are not met, notes left out. */
export const brokenChecks = ({ checks }: Pick<Evaluation, 'checks'>, code: string): CheckResult[] => checks.filter((check) => check.code === code && broken(check))

/** How many questions a design that is no failure leaves open. */
export const compromisesOf = ({ checks }: Pick<Evaluation, 'checks'>): number => checks.filter((check) => AVOIDED.has(check.code) && broken(check)).length

/** The first reason why a layout is no proposal; null for one that is. */
export function judge(evaluation: Evaluation, { buildLimit }: ProposalPreferences): Rejection | null {
  const { layout, findings } = evaluation
  const fails = (codes: readonly string[]) => codes.some((code) => brokenChecks(evaluation, code).length > 0)
  if (findings.some(({ code }) => code === 'turn-wider-than-layer')) return 'layer-width'
  if (layout.buildRatio > buildLimit || fails(['W03'])) return 'build'
  if (fails(['W01'])) return 'layer-width'
  if (fails(['E01'])) return 'flux'
  // A high factor that does not stop release is a question: what it loses is in the temperature.
  if (brokenChecks(evaluation, 'T03').some(({ severity }) => severity === 'S')) return 'resistance'
  if (fails(['T07', 'T08', 'T11'])) return 'temperature'
  if (fails(['I04', 'I05', 'I08', 'I09', 'I10'])) return 'insulation'
  return null
}

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

/** Of each reason the checks that stand behind it, in the order in which they are looked at. */
const JUDGED: readonly { rejection: Rejection; codes: readonly string[]; counts?: (check: CheckResult) => boolean }[] = [
  { rejection: 'build', codes: ['W03'] },
  { rejection: 'layer-width', codes: ['W01'] },
  { rejection: 'flux', codes: ['E01'] },
  // A high factor that does not stop release is a question: what it loses is in the temperature.
  { rejection: 'resistance', codes: ['T03'], counts: ({ severity }) => severity === 'S' },
  { rejection: 'temperature', codes: ['T07', 'T08', 'T11'] },
  { rejection: 'insulation', codes: ['I04', 'I05', 'I08', 'I09', 'I10'] },
]

/** The check by which an evaluation breaks a reason; null where the layout itself did, or nothing. */
export function judgedBy(evaluation: Pick<Evaluation, 'checks'>, rejection: Rejection): string | null {
  const judged = JUDGED.find((one) => one.rejection === rejection)
  return judged?.codes.find((code) => brokenChecks(evaluation, code).some(judged.counts ?? (() => true))) ?? null
}

/** The first reason why a layout is no proposal; null for one that is. */
export function judge(evaluation: Pick<Evaluation, 'layout' | 'findings' | 'checks'>, { buildLimit }: Pick<ProposalPreferences, 'buildLimit'>): Rejection | null {
  const { layout, findings } = evaluation
  if (findings.some(({ code }) => code === 'turn-wider-than-layer')) return 'layer-width'
  if (layout.buildRatio > buildLimit) return 'build'
  return JUDGED.find(({ rejection }) => judgedBy(evaluation, rejection) !== null)?.rejection ?? null
}

import type { Context } from '#server/context'
import { asActor, type Actor, type Transaction } from '#server/db/as-actor'
import { sampleSets } from '#server/db/schema/index'
import { AppError } from '#server/errors'
import { canReportSamples } from '#server/policies/samples'
import type { SampleReport, SampleSet } from '#shared/contracts/samples'
import { applyAnswers } from '#shared/measurement/apply-answers'
import type { Answer } from '#shared/measurement/model'
import { eq } from 'drizzle-orm'
import { lockSet, type SetRow } from './find-samples'
import { unreadableReport } from './refusals'
import { companyToday } from './request-samples'
import { fileBytes, loadSet, viewSet } from './view-set'

/** Takes answers about cells, all or none. The file is read outside any transaction; the version tells of a change meanwhile. */
export async function answerQuestions(ctx: Context, actor: Actor, setId: string, version: number, answers: Answer[]): Promise<SampleSet> {
  const { set, rows, file } = await asActor(ctx, actor, (tx) => loadSet(tx, actor, setId))
  requireChangeable(actor, set, version)
  if (set.kind !== 'readings') throw new AppError('conflict', 'A report without a table of readings asks nothing.')

  const answered = applyAnswers(await fileBytes(ctx, file.sha256), rows, set.answers, answers)
  if (answered.kind === 'refused') throw unreadableReport(answered)
  if (answered.kind === 'unfitting') throw unfitting(answered.answers)
  await asActor(ctx, actor, (tx) => store(tx, actor, setId, version, { answers: answered.answers }))
  return viewSet(ctx, actor, setId)
}

function unfitting(answers: Answer[]): AppError {
  const fields = Object.fromEntries(answers.map(({ questionId }) => [questionId, 'This answer does not fit the question, or the question is not asked any more.']))
  const where = answers.map(({ questionId }) => questionId.split(':')[1] ?? questionId).join(', ')
  return new AppError('answer-not-fitting', `The answer at ${where} does not fit; none was taken. Choose one of the answers that are offered.`, fields)
}

/** Keeps the declaration. */
export async function saveReport(ctx: Context, actor: Actor, setId: string, version: number, report: SampleReport): Promise<SampleSet> {
  await asActor(ctx, actor, async (tx) => {
    if (report.measuredOn > (await companyToday(tx, actor.companyId))) {
      throw new AppError('invalid-input', 'The date of the measurement lies in the future.', { 'report.measuredOn': 'This date lies in the future.' })
    }
    await store(tx, actor, setId, version, { report })
  })
  return viewSet(ctx, actor, setId)
}

async function store(tx: Transaction, actor: Actor, setId: string, version: number, values: Partial<Pick<SetRow, 'answers' | 'report'>>): Promise<void> {
  requireChangeable(actor, await lockSet(tx, actor, setId), version)
  await tx
    .update(sampleSets)
    .set({ ...values, version: version + 1 })
    .where(eq(sampleSets.id, setId))
}

export function requireChangeable(actor: Actor, set: SetRow, version: number): void {
  if (!canReportSamples(actor, set)) throw new AppError('not-allowed', 'A report is changed by the vendor.')
  if (set.phase !== 'read') throw new AppError('already-confirmed', 'This report was confirmed or replaced and does not change any more; hand in a new one.')
  if (set.version !== version) throw new AppError('stale-version', 'Somebody changed this report meanwhile; load it again.')
}

import { appNow, type Actor, type Transaction } from '#server/db/as-actor'
import { awards, rfqs } from '#server/db/schema/index'
import { AppError } from '#server/errors'
import { queueMail } from '#server/mail/queue-mail'
import { canDecideAward } from '#server/policies/awards'
import { recordAudit } from '#server/services/audit/record-audit'
import { namesOf, personOf } from '#server/services/specifications/read-revision'
import type { Award, APPROVAL_REFUSALS } from '#shared/contracts/awards'
import { eq } from 'drizzle-orm'
import { lockAward, readAward, refusalFor, requireEnquiryOpen, type AwardRow } from './read-awards'

/** Two approvers in the same second meet at the award's row: one approves, the other is told who did. */
export async function approveAward(tx: Transaction, actor: Actor, awardId: string, comparisonSha256: string, remark: string): Promise<Award> {
  const award = await lockAward(tx, actor, awardId)
  await requireOpen(tx, award)
  await requireEnquiryOpen(tx, award)
  const refusal = await refusalFor(tx, actor, award, comparisonSha256)
  if (refusal !== null) throw approvalRefused(refusal, award)
  await decide(tx, actor, award, 'approved', remark)
  await recordAudit(tx, actor, { type: 'award-approved', rfqId: award.rfqId, awardId, comparisonSha256 })
  return readAward(tx, actor, awardId)
}

export async function rejectAward(tx: Transaction, actor: Actor, awardId: string, reason: string): Promise<Award> {
  const award = await lockAward(tx, actor, awardId)
  await requireOpen(tx, award)
  if (!canDecideAward(actor, award)) throw approvalRefused('own-proposal', award)
  await decide(tx, actor, award, 'rejected', reason)
  await recordAudit(tx, actor, { type: 'award-rejected', rfqId: award.rfqId, awardId })
  return readAward(tx, actor, awardId)
}

async function requireOpen(tx: Transaction, award: AwardRow): Promise<void> {
  if (award.state === 'proposed') return
  if (award.state === 'void') throw new AppError('comparison-changed', 'The buyer has proposed anew on a newer comparison; this proposal is void.')
  const by = award.decidedBy ? personOf(await namesOf(tx, [award.decidedBy]), award.decidedBy).name : 'somebody'
  throw new AppError('already-decided', `This proposal was ${award.state} already, by ${by}.`)
}

async function decide(tx: Transaction, actor: Actor, award: AwardRow, state: 'approved' | 'rejected', reason: string): Promise<void> {
  await tx
    .update(awards)
    .set({ state, decidedBy: actor.personId, decidedAt: await appNow(tx), decisionReason: reason })
    .where(eq(awards.id, award.id))
  const [rfq] = await tx.select({ number: rfqs.number }).from(rfqs).where(eq(rfqs.id, award.rfqId))
  await queueMail(tx, actor, { template: 'award-decided', props: { awardId: award.id, rfqNumber: rfq!.number, approved: state === 'approved' }, to: { personId: award.proposedBy } })
}

function approvalRefused(refusal: (typeof APPROVAL_REFUSALS)[number], award: AwardRow): AppError {
  switch (refusal) {
    case 'not-proposed':
      return new AppError('already-decided', 'This proposal was decided already.')
    case 'comparison-changed':
      return new AppError('comparison-changed', 'This is not the comparison that the proposal rests on; load the page again and look at it.')
    case 'own-proposal':
      return new AppError('second-person-needed', 'You proposed this award yourself; another person approves it.')
    case 'conflict-of-interest':
      return new AppError('not-allowed', 'You declared an interest in this vendor; another approver decides.')
    case 'offer-expired':
      return new AppError('offer-expired', 'The quotation has expired; it cannot be awarded without an extension.')
    case 'no-limit':
      return new AppError('not-allowed', 'You have no approval limit.')
    case 'limit-currency':
      return new AppError('limit-currency', `Your limit is in a currency for which the comparison has no rate to ${award.currency}.`)
    case 'over-limit':
      return new AppError('over-limit', `The award is ${award.total} ${award.currency} with one-time cost, which is above your limit; an approver with a higher limit decides.`)
  }
}

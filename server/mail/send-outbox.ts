import type { Context } from '#server/context'
import { asWorker } from '#server/db/as-actor'
import { outboxMails } from '#server/db/schema/index'
import { and, eq, sql } from 'drizzle-orm'
import { composeMail } from './compose-mail'
import { expandMail } from './expand-mail'
import type { MailOutcome } from './transport'

type OutboxRow = typeof outboxMails.$inferSelect

/** A mail that was taken up and neither sent nor given back for so long is taken up again. */
const LEASE_SECONDS = 90
const LANES = 3
const LAST_ATTEMPT = 20
const LONGEST_WAIT_SECONDS = 3600

/** Sends what is due, several mails at once, until nothing is. */
export async function sendOutbox(ctx: Context): Promise<void> {
  while ((await expandMail(ctx)) > 0);
  await Promise.all(Array.from({ length: LANES }, () => drain(ctx)))
}

async function drain(ctx: Context): Promise<void> {
  for (let mail = await takeUp(ctx); mail; mail = await takeUp(ctx)) {
    const outcome = await deliver(ctx, mail)
    await mark(ctx, mail, outcome)
  }
}

/**
 * Takes one mail with a lease. No transaction is open while the mail server is spoken to: whoever is killed
 * there leaves the mail to be sent again, under the same Message-ID, when the lease has ended.
 */
function takeUp(ctx: Context): Promise<OutboxRow | undefined> {
  return asWorker(ctx, async (tx) => {
    const [due] = await tx
      .select({ id: outboxMails.id })
      .from(outboxMails)
      .where(and(eq(outboxMails.state, 'waiting'), sql`${outboxMails.nextAttemptAt} <= app_now()`))
      .orderBy(outboxMails.nextAttemptAt)
      .limit(1)
      .for('update', { skipLocked: true })
    if (!due) return undefined
    const lease = { attempts: sql`${outboxMails.attempts} + 1`, nextAttemptAt: sql`app_now() + make_interval(secs => ${LEASE_SECONDS})` }
    const [mail] = await tx.update(outboxMails).set(lease).where(eq(outboxMails.id, due.id)).returning()
    return mail
  })
}

async function deliver(ctx: Context, mail: OutboxRow): Promise<MailOutcome> {
  try {
    const message = await asWorker(ctx, (tx) => composeMail(tx, ctx, mail))
    return await ctx.mail.send(message)
  } catch (error) {
    ctx.logger.error('A mail could not be written', { mailId: mail.id, template: mail.template, error })
    return { kind: 'failed', reason: 'The mail could not be written.' }
  }
}

async function mark(ctx: Context, { id, attempts }: OutboxRow, outcome: MailOutcome): Promise<void> {
  const change = outcomeColumns(outcome, attempts)
  await asWorker(ctx, (tx) => tx.update(outboxMails).set(change).where(eq(outboxMails.id, id)))
  if (outcome.kind !== 'sent') ctx.logger.warn('A mail was not delivered', { mailId: id, attempts, reason: outcome.reason })
}

function outcomeColumns(outcome: MailOutcome, attempts: number) {
  if (outcome.kind === 'sent') return { state: 'sent' as const, sentAt: sql`app_now()`, lastError: '' }
  if (outcome.kind === 'refused' || attempts >= LAST_ATTEMPT) return { state: 'undeliverable' as const, lastError: outcome.reason }
  return { lastError: outcome.reason, nextAttemptAt: sql`app_now() + make_interval(secs => ${retrySeconds(attempts)})` }
}

/** Doubles from half a minute up to an hour. */
export const retrySeconds = (attempts: number): number => Math.min(15 * 2 ** attempts, LONGEST_WAIT_SECONDS)

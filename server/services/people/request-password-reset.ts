import type { Context } from '#server/context'
import { asAuth } from '#server/db/as-actor'
import { memberships, people } from '#server/db/schema/index'
import { queueMail } from '#server/mail/queue-mail'
import { recordAudit } from '#server/services/audit/record-audit'
import { and, eq, isNotNull, isNull } from 'drizzle-orm'
import { setTimeout as sleep } from 'node:timers/promises'
import { countAttempt, type AttemptLimit } from './count-attempt'

const HOUR = 60 * 60
const PER_ADDRESS: AttemptLimit = { bucket: 'reset-address', limit: 5, windowSeconds: HOUR }
const PER_CALLER: AttemptLimit = { bucket: 'reset-caller', limit: 30, windowSeconds: HOUR }

/** Longer than the work takes, so that the time of the answer does not tell whether there was any. */
const ANSWER_AFTER_MS = 150

export async function requestPasswordReset(ctx: Context, { email, ip }: { email: string; ip: string }): Promise<void> {
  await countAttempt(ctx, PER_CALLER, ip)
  await countAttempt(ctx, PER_ADDRESS, email)
  await Promise.all([sleep(ANSWER_AFTER_MS), queueReset(ctx, email)])
}

function queueReset(ctx: Context, email: string): Promise<void> {
  return asAuth(ctx, async (tx) => {
    const [person] = await tx
      .select({ personId: people.id, companyId: memberships.companyId })
      .from(people)
      .innerJoin(memberships, eq(memberships.personId, people.id))
      .where(and(eq(people.email, email), isNotNull(people.acceptedAt), isNull(people.leftAt)))
    if (!person) return
    await recordAudit(tx, person, { type: 'password-reset-requested', personId: person.personId })
    await queueMail(tx, person, { template: 'password-reset', props: {}, to: { personId: person.personId } })
  })
}

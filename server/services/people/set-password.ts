import type { Context } from '#server/context'
import { appNow, asAuth, type Transaction } from '#server/db/as-actor'
import { credentials, people } from '#server/db/schema/index'
import { AppError } from '#server/errors'
import { queueMail } from '#server/mail/queue-mail'
import { recordAudit } from '#server/services/audit/record-audit'
import type { SessionPerson } from '#shared/contracts/people'
import { eq, sql } from 'drizzle-orm'
import { countAttempt } from './count-attempt'
import { hashPassword, passwordMatches } from './secrets'
import { endAllSessions, startSession } from './sessions'

const PER_PERSON = { bucket: 'present-password', limit: 10, windowSeconds: 15 * 60 }

/** Puts the hash in place of the earlier one and ends every session of the person. */
export async function replacePassword(tx: Transaction, ctx: Context, personId: string, passwordHash: string): Promise<void> {
  await tx
    .insert(credentials)
    .values({ personId, passwordHash, updatedAt: sql`app_now()` })
    .onConflictDoUpdate({ target: credentials.personId, set: { passwordHash, updatedAt: sql`app_now()` } })
  await tx.update(people).set({ sessionsValidAfter: sql`app_now()` }).where(eq(people.id, personId))
  await endAllSessions(tx, ctx.config, personId)
}

export async function tellPasswordSet(tx: Transaction, personId: string, companyId: string): Promise<void> {
  await recordAudit(tx, { personId, companyId }, { type: 'password-set', personId })
  await queueMail(tx, { companyId }, { template: 'password-set', props: { at: (await appNow(tx)).toISOString() }, to: { personId } })
}

/** Returns the cookie of the one session that goes on. */
export async function changePassword(ctx: Context, person: SessionPerson, input: { currentPassword: string; newPassword: string }): Promise<string> {
  await countAttempt(ctx, PER_PERSON, person.id)
  const [known] = await asAuth(ctx, (tx) => tx.select().from(credentials).where(eq(credentials.personId, person.id)))
  if (!(await passwordMatches(known?.passwordHash ?? null, input.currentPassword))) {
    throw new AppError('invalid-input', 'The present password is not right.', { currentPassword: 'This is not the present password.' })
  }
  const passwordHash = await hashPassword(input.newPassword)
  return asAuth(ctx, async (tx) => {
    await replacePassword(tx, ctx, person.id, passwordHash)
    await tellPasswordSet(tx, person.id, person.company.id)
    return startSession(tx, ctx.config, person.id)
  })
}

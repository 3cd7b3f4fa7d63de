import type { Context } from '#server/context'
import { appNow, savepoint, type Transaction } from '#server/db/as-actor'
import { changeRequests, people } from '#server/db/schema/index'
import { AppError } from '#server/errors'
import { queueMail } from '#server/mail/queue-mail'
import { recordAudit } from '#server/services/audit/record-audit'
import { and, eq } from 'drizzle-orm'
import { addressFree } from './accept-invitation'
import { endAllSessions } from './sessions'

/** A confirmed new address counts from the moment somebody reads the mail sent to it. The old one is told. */
export async function applyNewAddress(tx: Transaction, ctx: Context, changeId: string): Promise<void> {
  const [found] = await tx
    .select({ request: changeRequests, oldAddress: people.email })
    .from(changeRequests)
    .innerJoin(people, eq(people.id, changeRequests.personId))
    .where(and(eq(changeRequests.id, changeId), eq(changeRequests.state, 'confirmed')))
    .for('update')
  if (found?.request.change.kind !== 'email') throw new AppError('link-expired', 'This change of address is no longer waiting.')

  const { personId, companyId, change } = found.request
  const now = await appNow(tx)
  await addressFree(() => savepoint(tx, () => tx.update(people).set({ email: change.email, sessionsValidAfter: now }).where(eq(people.id, personId))))
  await tx.update(changeRequests).set({ state: 'done' }).where(eq(changeRequests.id, changeId))
  await endAllSessions(tx, ctx.config, personId)
  await recordAudit(tx, { personId, companyId }, { type: 'address-changed', personId, changeId })
  await queueMail(tx, { companyId }, { template: 'change-done', props: { kind: 'email', at: now.toISOString() }, to: { personId, address: found.oldAddress } })
}

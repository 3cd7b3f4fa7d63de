import type { Transaction } from '#server/db/as-actor'
import { mailEvents } from '#server/db/schema/index'
import type { Role } from '#shared/contracts/endpoint'
import { sql } from 'drizzle-orm'
import type { MailProps, MailTemplateName } from './templates/index'

/** One person, or everybody of a company who holds one of the roles (all of the company without roles). */
export type MailRecipient = { personId: string; address?: string } | { companyId: string; roles?: readonly Role[] }

export interface QueuedMail<N extends MailTemplateName> {
  template: N
  props: MailProps<N>
  to: MailRecipient
}

/**
 * Writes a mail in the transaction of the fact it tells. The worker looks up the recipients, who may be people
 * that the sender cannot see, and sends each of them a mail of their own.
 */
export async function queueMail<N extends MailTemplateName>(tx: Transaction, sender: { companyId: string }, mail: QueuedMail<N>): Promise<void> {
  const { to } = mail
  await tx.insert(mailEvents).values({
    companyId: sender.companyId,
    toPersonId: 'personId' in to ? to.personId : null,
    toAddress: 'personId' in to ? to.address : null,
    toCompanyId: 'companyId' in to ? to.companyId : null,
    toRoles: 'companyId' in to && to.roles ? [...to.roles] : null,
    template: mail.template,
    props: mail.props as Record<string, unknown>,
    createdAt: sql`app_now()`,
  })
}

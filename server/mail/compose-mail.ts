import type { Context } from '#server/context'
import type { Transaction } from '#server/db/as-actor'
import { companies, mailEvents, memberships, people, type outboxMails } from '#server/db/schema/index'
import { createToken, type TokenRequest } from '#server/services/people/sign-in-tokens'
import { eq } from 'drizzle-orm'
import { MAIL_TEMPLATES, type MailTemplateName } from './templates/index'
import type { MailLink, MailTemplate } from './templates/template'
import type { OutgoingMail } from './transport'

type OutboxRow = typeof outboxMails.$inferSelect

/** How long a newcomer's link works that stands in a mail about something else. */
const NEWCOMER_HOURS = 14 * 24

/** Writes the mail. Its single-use token is made here, so that it stands in the mail and nowhere else. */
export async function composeMail(tx: Transaction, ctx: Context, mail: OutboxRow): Promise<OutgoingMail> {
  const [row] = await tx
    .select({ props: mailEvents.props, name: people.name, acceptedAt: people.acceptedAt, timeZone: companies.timeZone })
    .from(mailEvents)
    .innerJoin(people, eq(people.id, mail.personId))
    .innerJoin(memberships, eq(memberships.personId, people.id))
    .innerJoin(companies, eq(companies.id, memberships.companyId))
    .where(eq(mailEvents.id, mail.eventId))
  const template: MailTemplate<never> | undefined = MAIL_TEMPLATES[mail.template as MailTemplateName]
  if (!row || !template) throw new Error(`No template “${mail.template}”`)

  const props = row.props as never
  const moment = (iso: string) => formatMoment(iso, row.timeZone)
  const { link, expiresAt } = await makeLink(tx, ctx, template.link(props), { personId: mail.personId, isNewcomer: !row.acceptedAt })
  const text = template.write(props, { link, recipientName: row.name, linkValidUntil: expiresAt ? moment(expiresAt.toISOString()) : '', moment })
  return { from: ctx.config.MAIL_FROM, to: mail.address, messageId: mail.messageId, ...text }
}

interface Recipient {
  personId: string
  isNewcomer: boolean
}

async function makeLink(tx: Transaction, ctx: Context, link: MailLink, { personId, isNewcomer }: Recipient): Promise<{ link: string; expiresAt: Date | null }> {
  const base = ctx.config.PUBLIC_URL.replace(/\/$/, '')
  // The token stands behind the #, which browsers do not send to the server.
  const singleUse = async (request: TokenRequest, next = '') => {
    const { token, expiresAt } = await createToken(tx, request)
    return { link: `${base}/link${next}#${token}`, expiresAt }
  }
  if ('singleUse' in link) return singleUse({ purpose: link.singleUse, personId, changeId: link.changeId, validHours: link.validHours })
  if (link.welcomesNewcomers && isNewcomer) {
    return singleUse({ purpose: 'invitation', personId, validHours: NEWCOMER_HOURS }, `?next=${encodeURIComponent(link.path)}`)
  }
  return { link: `${base}${link.path}`, expiresAt: null }
}

/** Such as `Tue, 1 Dec 2026, 17:00 (Europe/Berlin, GMT+01:00)`. */
export function formatMoment(iso: string, timeZone: string): string {
  const at = new Date(iso)
  const text = new Intl.DateTimeFormat('en-GB', { timeZone, weekday: 'short', day: 'numeric', month: 'short', year: 'numeric', hour: '2-digit', minute: '2-digit', hourCycle: 'h23' })
  const offset = new Intl.DateTimeFormat('en-GB', { timeZone, timeZoneName: 'longOffset' }).formatToParts(at).find(({ type }) => type === 'timeZoneName')
  return `${text.format(at)} (${timeZone}, ${offset?.value === 'GMT' ? 'GMT+00:00' : offset?.value})`
}

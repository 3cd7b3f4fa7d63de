import type { Actor, Transaction } from '#server/db/as-actor'
import { companies, memberships, people } from '#server/db/schema/index'
import { AppError } from '#server/errors'
import { queueMail } from '#server/mail/queue-mail'
import { recordAudit } from '#server/services/audit/record-audit'
import type { BodyOf, ResponseOf } from '#shared/contracts/endpoint'
import type { Company, createCompany as createContract, listCompanies as listContract, updateCompany as updateContract } from '#shared/contracts/people'
import { count, eq } from 'drizzle-orm'
import { randomUUID } from 'node:crypto'

type CompanyInput = BodyOf<typeof updateContract>

/** The zones of the runtime's own IANA database. */
function refuseUnknownZone(timeZone: string): void {
  try {
    new Intl.DateTimeFormat('en', { timeZone })
  } catch {
    const message = `“${timeZone}” is not a time zone of the IANA database; write it like Europe/Berlin.`
    throw new AppError('invalid-input', message, { timeZone: message })
  }
}

export async function updateCompany(tx: Transaction, actor: Actor, input: CompanyInput): Promise<Company> {
  refuseUnknownZone(input.timeZone)
  await tx.update(companies).set(input).where(eq(companies.id, actor.companyId))
  await recordAudit(tx, actor, { type: 'company-updated', companyId: actor.companyId })
  const [row] = await tx.select().from(companies).where(eq(companies.id, actor.companyId))
  return row!
}

/** For the operator: which companies there are, never what they do. */
export async function listCompanies(tx: Transaction): Promise<ResponseOf<typeof listContract>> {
  const rows = await tx
    .select({ company: companies, peopleCount: count(memberships.personId) })
    .from(companies)
    .leftJoin(memberships, eq(memberships.companyId, companies.id))
    .groupBy(companies.id)
    .orderBy(companies.name, companies.id)
  return rows.map(({ company, peopleCount }) => ({ ...company, peopleCount, createdAt: company.createdAt.toISOString() }))
}

/** A new buying company with its first administrator, who alone invites everybody else. */
export async function createCompany(tx: Transaction, actor: Actor, { adminName, adminEmail, ...input }: BodyOf<typeof createContract>): Promise<Company> {
  refuseUnknownZone(input.timeZone)
  const [companyId, personId] = [randomUUID(), randomUUID()]
  await tx.insert(companies).values({ id: companyId, kind: 'buying', ...input })
  await tx.insert(people).values({ id: personId, name: adminName, email: adminEmail, invitedBy: actor.personId })
  await tx.insert(memberships).values({ personId, companyId, companyKind: 'buying', roles: ['admin'], isFirstContact: true })
  await recordAudit(tx, actor, { type: 'company-created', companyId }, { companyId })
  await recordAudit(tx, actor, { type: 'person-invited', personId, roles: ['admin'] }, { companyId })
  await queueMail(tx, actor, { template: 'invitation', props: { companyName: input.name }, to: { personId } })
  return { id: companyId, kind: 'buying', ...input }
}

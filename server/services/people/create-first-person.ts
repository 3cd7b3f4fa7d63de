import type { Context } from '#server/context'
import type { Transaction } from '#server/db/as-actor'
import { companies, memberships, people } from '#server/db/schema/index'
import { recordAudit } from '#server/services/audit/record-audit'
import { randomUUID } from 'node:crypto'
import { acceptInvitation } from './accept-invitation'

export interface FirstPerson {
  name: string
  email: string
  companyName: string
  passwordHash: string
}

/** A company with the one person who sets it up: the first administrator or the first operator of an installation. */
export async function createFirstPerson(tx: Transaction, ctx: Context, kind: 'buying' | 'operator', first: FirstPerson): Promise<string> {
  const [companyId, personId] = [randomUUID(), randomUUID()]
  await tx.insert(companies).values({ id: companyId, kind, name: first.companyName })
  await tx.insert(people).values({ id: personId, name: first.name, email: first.email })
  await tx.insert(memberships).values({ personId, companyId, companyKind: kind, roles: [kind === 'buying' ? 'admin' : 'operator'], isFirstContact: true })
  await recordAudit(tx, { personId, companyId }, { type: 'company-created', companyId })
  return acceptInvitation(tx, ctx, personId, first)
}

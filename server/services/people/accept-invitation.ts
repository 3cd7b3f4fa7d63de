import type { Context } from '#server/context'
import { savepoint, type Transaction } from '#server/db/as-actor'
import { people, vendorLinks } from '#server/db/schema/index'
import { AppError, violates } from '#server/errors'
import { recordAudit } from '#server/services/audit/record-audit'
import { and, eq, isNull, sql } from 'drizzle-orm'
import { readSessionPerson } from './sessions'
import { replacePassword } from './set-password'

/** The person can sign in from now on; a vendor's first person accepts the customers that invited it so far. */
export async function acceptInvitation(tx: Transaction, ctx: Context, personId: string, { name, passwordHash }: { name?: string; passwordHash: string }): Promise<string> {
  const person = await readSessionPerson(tx, personId)
  if (!person) throw new AppError('link-expired', 'This invitation was withdrawn; ask whoever invited you.')
  const accepted = await addressFree(() =>
    savepoint(tx, () =>
      tx
        .update(people)
        .set({ acceptedAt: sql`app_now()`, ...(name && { name }) })
        .where(and(eq(people.id, personId), isNull(people.acceptedAt)))
        .returning({ id: people.id }),
    ),
  )
  if (accepted.length === 0) throw new AppError('link-expired', 'This invitation was accepted before; please sign in.')
  await replacePassword(tx, ctx, personId, passwordHash)
  const actor = { personId, companyId: person.company.id }
  await recordAudit(tx, actor, { type: 'invitation-accepted', personId })
  if (person.company.kind === 'vendor') await acceptCustomers(tx, actor)
  return personId
}

/** Only whoever reads the mails of an address learns that it is in use. */
export async function addressFree<T>(work: () => Promise<T>): Promise<T> {
  try {
    return await work()
  } catch (error) {
    if (!violates(error, 'people_sign_in_address_key')) throw error
    throw new AppError('address-in-use', 'This mail address already signs in for another company here. Ask to be invited with another address.')
  }
}

async function acceptCustomers(tx: Transaction, actor: { personId: string; companyId: string }): Promise<void> {
  const rows = await tx
    .update(vendorLinks)
    .set({ acceptedAt: sql`app_now()` })
    .where(and(eq(vendorLinks.vendorCompanyId, actor.companyId), isNull(vendorLinks.acceptedAt)))
    .returning({ buyingCompanyId: vendorLinks.buyingCompanyId })
  for (const { buyingCompanyId } of rows) {
    await recordAudit(tx, actor, { type: 'customer-accepted', buyingCompanyId }, { companyId: buyingCompanyId })
  }
}

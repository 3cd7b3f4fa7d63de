import type { Context } from '#server/context'
import { asAuth, type Transaction } from '#server/db/as-actor'
import { changeRequests, companies, vendorLinks } from '#server/db/schema/index'
import type { SignInLink } from '#shared/contracts/people'
import { and, eq, isNull } from 'drizzle-orm'
import { readSessionPerson } from './sessions'
import { lockToken, type TokenRow } from './sign-in-tokens'

/** What the page behind a mail link shows before anything is entered. */
export function readSignInLink(ctx: Context, token: string): Promise<SignInLink> {
  return asAuth(ctx, async (tx) => {
    const row = await lockToken(tx, token)
    const person = row.personId ? await readSessionPerson(tx, row.personId) : null
    return {
      purpose: row.purpose,
      name: person?.name ?? null,
      email: (await newAddress(tx, row)) ?? person?.email ?? null,
      companyName: person?.company.name ?? null,
      companyKind: person?.company.kind ?? null,
      invitedBy: person ? await namesOfInviting(tx, person.company.id) : [],
      expiresAt: row.expiresAt.toISOString(),
    }
  })
}

async function newAddress(tx: Transaction, { changeId }: TokenRow): Promise<string | null> {
  if (!changeId) return null
  const [row] = await tx.select({ change: changeRequests.change }).from(changeRequests).where(eq(changeRequests.id, changeId))
  return row?.change.kind === 'email' ? row.change.email : null
}

async function namesOfInviting(tx: Transaction, vendorCompanyId: string): Promise<string[]> {
  const rows = await tx
    .select({ name: companies.name })
    .from(vendorLinks)
    .innerJoin(companies, eq(companies.id, vendorLinks.buyingCompanyId))
    .where(and(eq(vendorLinks.vendorCompanyId, vendorCompanyId), isNull(vendorLinks.acceptedAt)))
    .orderBy(companies.name)
  return rows.map(({ name }) => name)
}

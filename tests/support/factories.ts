import { asAuth, type Actor } from '#server/db/as-actor'
import { companies, credentials, memberships, people, vendorLinks } from '#server/db/schema/index'
import { hashPassword } from '#server/services/people/secrets'
import { startSession } from '#server/services/people/sessions'
import type { CompanyKind, Role } from '#shared/contracts/endpoint'
import { randomUUID } from 'node:crypto'
import type { TestApp } from './test-app'

export const PASSWORD = 'correct horse battery staple'
let passwordHash: Promise<string> | undefined
let count = 0

export interface TestCompany {
  id: string
  kind: CompanyKind
  name: string
}

export interface TestPerson extends Actor {
  name: string
  email: string
  /** Cookie header of a running session. */
  cookie: string
}

export async function buildCompany({ ctx }: TestApp, kind: CompanyKind, overrides: Partial<typeof companies.$inferInsert> = {}): Promise<TestCompany> {
  count += 1
  const company = { id: randomUUID(), kind, name: `${kind} company ${count}`, ...overrides }
  await asAuth(ctx, (tx) => tx.insert(companies).values(company))
  return company
}

export interface PersonOverrides {
  name?: string
  email?: string
  approvalLimit?: string
  approvalCurrency?: string
  /** A person who was invited and has not set a password. */
  invited?: boolean
  isFirstContact?: boolean
}

/** A person who can sign in with `PASSWORD` and has a running session. */
export async function buildPerson(test: TestApp, company: TestCompany, roles: Role[], overrides: PersonOverrides = {}): Promise<TestPerson> {
  count += 1
  const { name = `Person ${count}`, email = `person-${count}@company.example`, invited = false, isFirstContact = false } = overrides
  const isApprover = roles.includes('approver')
  const personId = randomUUID()
  passwordHash ??= hashPassword(PASSWORD)
  const hash = await passwordHash
  const cookie = await asAuth(test.ctx, async (tx) => {
    const past = new Date(Date.now() - 60_000)
    await tx.insert(people).values({ id: personId, name, email, acceptedAt: invited ? null : past, sessionsValidAfter: past })
    await tx.insert(memberships).values({
      personId,
      companyId: company.id,
      companyKind: company.kind,
      roles,
      isFirstContact,
      approvalLimit: isApprover ? (overrides.approvalLimit ?? '50000') : null,
      approvalCurrency: isApprover ? (overrides.approvalCurrency ?? 'EUR') : null,
    })
    if (invited) return ''
    await tx.insert(credentials).values({ personId, passwordHash: hash, updatedAt: past })
    return startSession(tx, test.ctx.config, personId)
  })
  return { personId, companyId: company.id, companyKind: company.kind, roles, name, email, cookie: cookie.split(';')[0]! }
}

/** A new session for a person, e.g. after the earlier ones were ended. */
export async function signInAs(test: TestApp, person: Pick<TestPerson, 'personId'>): Promise<string> {
  const cookie = await asAuth(test.ctx, (tx) => startSession(tx, test.ctx.config, person.personId))
  return cookie.split(';')[0]!
}

/** Makes a vendor known to a buying company, accepted unless said otherwise. */
export async function linkVendor(test: TestApp, buying: TestCompany, vendor: TestCompany, { accepted = true, name = vendor.name } = {}): Promise<void> {
  await asAuth(test.ctx, (tx) =>
    tx.insert(vendorLinks).values({ buyingCompanyId: buying.id, vendorCompanyId: vendor.id, invitedAt: new Date(), acceptedAt: accepted ? new Date() : null }),
  )
  const relation = { buying_company_id: buying.id, vendor_company_id: vendor.id, name, contact_name: 'Contact', contact_email: `contact-${randomUUID()}@vendor.example` }
  await test.database.query(
    `INSERT INTO vendor_relations (${Object.keys(relation).join(', ')}) VALUES ($1, $2, $3, $4, $5)`,
    Object.values(relation),
  )
}

/** A buying company with one person per role, and as many vendors as asked for, each with one person. */
export async function buildWorld(test: TestApp, vendorCount = 2) {
  const buying = await buildCompany(test, 'buying')
  const [engineer, checker, quality, buyer, approver, admin] = await Promise.all(
    (['engineer', 'checker', 'quality', 'buyer', 'approver', 'admin'] as const).map((role) => buildPerson(test, buying, [role])),
  )
  const vendors = await Promise.all(
    Array.from({ length: vendorCount }, async () => {
      const company = await buildCompany(test, 'vendor')
      const person = await buildPerson(test, company, ['vendor'], { isFirstContact: true })
      await linkVendor(test, buying, company)
      return { company, person }
    }),
  )
  return { buying, engineer: engineer!, checker: checker!, quality: quality!, buyer: buyer!, approver: approver!, admin: admin!, vendors }
}

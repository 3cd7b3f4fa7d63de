import type { Context } from '#server/context'
import { asActor, asAuth, type Actor, type Transaction } from '#server/db/as-actor'
import { companies, credentials, memberships, people, vendorLinks, vendorRelations } from '#server/db/schema/index'
import { recordAudit } from '#server/services/audit/record-audit'
import { hashPassword } from '#server/services/people/secrets'
import type { Role } from '#shared/contracts/endpoint'
import { eq, sql } from 'drizzle-orm'
import { randomUUID } from 'node:crypto'

/** Only for the demo, whose mail leaves the machine nowhere. */
export const DEMO_PASSWORD = 'dotside demo 2026'

export interface DemoPerson {
  email: string
  name: string
  roles: Role[]
  approvalLimit?: string
  /** As the start block says it. */
  shownAs: string
}

interface DemoCompany {
  kind: 'buying' | 'vendor' | 'operator'
  name: string
  country: string
  timeZone: string
  currency: string
  address: string
  people: DemoPerson[]
}

/** Suppliers of power supplies for harbour and tide-gauge instruments; everything here is invented. */
const BRIGHTMOOR: DemoCompany = {
  kind: 'buying',
  name: 'Brightmoor Power Works',
  country: 'GB',
  timeZone: 'Europe/London',
  currency: 'EUR',
  address: 'Brightmoor Power Works\nUnit 4, Ropewalk Quay\nBrightmoor BM1 4QW',
  people: [
    { email: 'edda.lowe@brightmoor.example', name: 'Edda Lowe', roles: ['engineer'], shownAs: 'engineer' },
    { email: 'tomas.arkell@brightmoor.example', name: 'Tomas Arkell', roles: ['engineer', 'checker'], shownAs: 'checker' },
    { email: 'ines.vance@brightmoor.example', name: 'Ines Vance', roles: ['quality'], shownAs: 'quality, second opener' },
    { email: 'joris.pell@brightmoor.example', name: 'Joris Pell', roles: ['buyer'], shownAs: 'buyer' },
    { email: 'maud.serrano@brightmoor.example', name: 'Maud Serrano', roles: ['approver'], approvalLimit: '50000', shownAs: 'approver to 50 000 EUR' },
    { email: 'hale.winter@brightmoor.example', name: 'Hale Winter', roles: ['approver'], approvalLimit: '250000', shownAs: 'approver to 250 000 EUR' },
    { email: 'pia.norrell@brightmoor.example', name: 'Pia Norrell', roles: ['admin'], shownAs: 'admin' },
  ],
}

const SALTERN: DemoCompany = {
  kind: 'buying',
  name: 'Saltern Instruments',
  country: 'NL',
  timeZone: 'Europe/Amsterdam',
  currency: 'EUR',
  address: 'Saltern Instruments\nZoutkade 11\n9999 XS Saltern',
  people: [
    { email: 'wim.haas@saltern.example', name: 'Wim Haas', roles: ['engineer', 'checker'], shownAs: 'engineer elsewhere' },
    { email: 'bas.kuiper@saltern.example', name: 'Bas Kuiper', roles: ['engineer'], shownAs: 'second engineer elsewhere' },
    { email: 'lotte.brink@saltern.example', name: 'Lotte Brink', roles: ['buyer', 'quality'], shownAs: 'buyer elsewhere' },
    { email: 'sanne.roos@saltern.example', name: 'Sanne Roos', roles: ['admin'], shownAs: 'admin elsewhere' },
  ],
}

const vendor = (name: string, country: string, timeZone: string, currency: string, address: string, email: string, person: string): DemoCompany => ({
  kind: 'vendor',
  name,
  country,
  timeZone,
  currency,
  address: `${name}\n${address}`,
  people: [{ email, name: person, roles: ['vendor'], shownAs: `vendor, ${name}` }],
})

const VENDORS = [
  vendor('Quillon Windings', 'CZ', 'Europe/Prague', 'USD', 'Cívková 8\n999 01 Kvilov', 'marek.dusek@quillon.example', 'Marek Dušek'),
  vendor('Tamsen Coilwork', 'DE', 'Europe/Berlin', 'EUR', 'Spulenweg 3\n99999 Tamsen', 'greta.tamsen@tamsen.example', 'Greta Tamsen'),
  vendor('Oakhollow Wound Parts', 'US', 'America/New_York', 'USD', '210 Mill Hollow Road\nOakhollow', 'dale.hobart@oakhollow.example', 'Dale Hobart'),
  vendor('Zellmark Inductive', 'AT', 'Europe/Vienna', 'EUR', 'Kernstraße 21\n9999 Zellmark', 'ruth.zeller@zellmark.example', 'Ruth Zeller'),
]

const OPERATOR: DemoCompany = {
  kind: 'operator',
  name: 'Harbourside Hosting',
  country: 'GB',
  timeZone: 'Europe/London',
  currency: 'EUR',
  address: 'Harbourside Hosting\nPier 2\nBrightmoor',
  people: [{ email: 'ola.marsh@harbourside.example', name: 'Ola Marsh', roles: ['operator'], shownAs: 'operator' }],
}

const COMPANIES = [BRIGHTMOOR, ...VENDORS, SALTERN, OPERATOR]

/** Everybody who signs in in the demo, in the order of the start block. */
export const DEMO_PEOPLE: readonly (DemoPerson & { companyName: string })[] = COMPANIES.flatMap((company) =>
  company.people.map((person) => ({ ...person, companyName: company.name })),
)

/** Which buying company knows which vendor, as what, since when under confidentiality. */
const RELATIONS = [
  { buying: BRIGHTMOOR, vendor: VENDORS[0]!, approval: 'approved', agreedDaysAgo: 420, notes: 'Runs vacuum impregnation in house.' },
  { buying: BRIGHTMOOR, vendor: VENDORS[1]!, approval: 'approved', agreedDaysAgo: 610, notes: 'Short lead times for samples.' },
  { buying: BRIGHTMOOR, vendor: VENDORS[2]!, approval: 'conditional', agreedDaysAgo: 200, notes: 'First lots need a full report.' },
  { buying: BRIGHTMOOR, vendor: VENDORS[3]!, approval: 'approved', agreedDaysAgo: 35, notes: '' },
  { buying: SALTERN, vendor: VENDORS[1]!, approval: 'approved', agreedDaysAgo: 90, notes: 'Our second source.' },
] as const

/** The demo's companies and people, in one transaction; the buying companies' own notes after it, as their people. */
export async function seedPeople(ctx: Context): Promise<void> {
  const passwordHash = await hashPassword(DEMO_PASSWORD)
  await asAuth(ctx, async (tx) => {
    // A start that broke off between this transaction and the next left them here.
    if ((await tx.$count(people, eq(people.email, DEMO_PEOPLE[0]!.email))) > 0) return
    const idOf = new Map<DemoCompany, string>()
    for (const company of COMPANIES) idOf.set(company, await insertCompany(tx, company, passwordHash))
    for (const { buying, vendor } of RELATIONS) {
      const pair = { buyingCompanyId: idOf.get(buying)!, vendorCompanyId: idOf.get(vendor)! }
      await tx.insert(vendorLinks).values({ ...pair, invitedAt: sql`app_now() - interval '700 days'`, acceptedAt: sql`app_now() - interval '699 days'` })
    }
  })
  for (const relation of RELATIONS) await insertRelation(ctx, relation)
}

async function insertCompany(tx: Transaction, { people: members, ...company }: DemoCompany, passwordHash: string): Promise<string> {
  const companyId = randomUUID()
  await tx.insert(companies).values({ id: companyId, ...company })
  for (const [index, { email, name, roles, approvalLimit }] of members.entries()) {
    const personId = randomUUID()
    await tx.insert(people).values({ id: personId, name, email, acceptedAt: sql`app_now()`, sessionsValidAfter: sql`app_now()` })
    await tx.insert(memberships).values({
      personId,
      companyId,
      companyKind: company.kind,
      roles,
      approvalLimit,
      approvalCurrency: approvalLimit && company.currency,
      isFirstContact: company.kind === 'vendor' && index === 0,
    })
    await tx.insert(credentials).values({ personId, passwordHash, updatedAt: sql`app_now()` })
    await recordAudit(tx, { personId, companyId }, { type: 'invitation-accepted', personId })
  }
  return companyId
}

async function insertRelation(ctx: Context, { buying, vendor, approval, agreedDaysAgo, notes }: (typeof RELATIONS)[number]): Promise<void> {
  const admin = await demoActor(ctx, buying.people.find(({ roles }) => roles.includes('admin'))!.email)
  const contact = vendor.people[0]!
  const { companyId } = await demoActor(ctx, contact.email)
  await asActor(ctx, admin, (tx) =>
    tx
      .insert(vendorRelations)
      .values({
        buyingCompanyId: admin.companyId,
        vendorCompanyId: companyId,
        name: vendor.name,
        contactName: contact.name,
        contactEmail: contact.email,
        approval,
        confidentialityAgreedOn: sql`(app_now() - make_interval(days => ${agreedDaysAgo}))::date`,
        notes,
      })
      .onConflictDoNothing(),
  )
}

/** One of the demo's people as an actor, for the steps that follow: they act through the services, as a person would. */
export async function demoActor(ctx: Context, email: string): Promise<Actor> {
  const [row] = await asAuth(ctx, (tx) =>
    tx.select({ membership: memberships }).from(people).innerJoin(memberships, eq(memberships.personId, people.id)).where(eq(people.email, email)),
  )
  if (!row) throw new Error(`Nobody in the demo has the address ${email}.`)
  const { personId, companyId, companyKind, roles } = row.membership
  return { personId, companyId, companyKind, roles }
}

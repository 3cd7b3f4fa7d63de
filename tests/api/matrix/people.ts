import { asAuth } from '#server/db/as-actor'
import { createToken } from '#server/services/people/sign-in-tokens'
import type { CompanyKind, Role } from '#shared/contracts/endpoint'
import * as contract from '#shared/contracts/people'
import { randomUUID } from 'node:crypto'
import { buildCompany, buildPerson, linkVendor, PASSWORD, signInAs, type TestCompany, type TestPerson } from '../../support/factories'
import { request } from '../../support/test-app'
import type { FeatureExpectations } from './expectation'
import type { MatrixWorld, World } from './world'

const PDF = '%PDF-1.7\n%%EOF\n'
const anyAddress = () => `${randomUUID()}@company.example`
const ORDINARY: Record<CompanyKind, Role> = { buying: 'engineer', vendor: 'vendor', operator: 'operator' }
const MANAGER: Record<CompanyKind, Role> = { buying: 'admin', vendor: 'vendor', operator: 'operator' }

const companyOf = ({ companyId, companyKind }: TestPerson): TestCompany => ({ id: companyId, kind: companyKind, name: '' })
const strangerTo = (world: World, person: TestPerson): TestPerson => (person.companyKind === 'vendor' ? world.vendors[0]!.person : world.admin)

async function invitationToken({ test, own }: MatrixWorld): Promise<string> {
  const { personId } = await buildPerson(test, own.buying, ['engineer'], { invited: true })
  return asAuth(test.ctx, (tx) => createToken(tx, { purpose: 'invitation', personId, validHours: 1 })).then(({ token }) => token)
}

/** A waiting change in the company, asked for by one manager about an ordinary person. */
async function waitingChange({ test }: MatrixWorld, company: TestCompany): Promise<{ changeId: string }> {
  const asking = await buildPerson(test, company, [MANAGER[company.kind]])
  const concerned = await buildPerson(test, company, [ORDINARY[company.kind]])
  const body = { kind: 'email', email: anyAddress() }
  const answer = await request(test.app, contract.requestChange, { as: asking.cookie, params: { personId: concerned.personId }, body }).expect(200)
  return { changeId: answer.body.id }
}

async function withAgreement({ test }: MatrixWorld, world: World): Promise<{ vendorId: string }> {
  const params = { vendorId: world.vendors[0]!.company.id }
  await request(test.app, contract.uploadAgreement, { as: world.buyer.cookie, params, file: { name: 'agreement.pdf', content: PDF } }).expect(200)
  return params
}

const vendorUpdate = { name: 'Winder', approval: 'approved', confidentialityAgreedOn: null, confidentialityExpiresOn: null, notes: '' }
const company = { name: 'Company', country: 'DE', timeZone: 'Europe/Berlin', currency: 'EUR', address: '' }
const ownVendor = ({ own }: MatrixWorld) => ({ vendorId: own.vendors[0]!.company.id })
const foreignVendor = ({ foreign }: MatrixWorld) => ({ vendorId: foreign.vendors[0]!.company.id })
/** Only a second person of the manager's role decides. */
const decided = { engineer: 403, checker: 403, quality: 403, buyer: 403, approver: 403 }

export const people: FeatureExpectations = {
  signIn: { own: ({ own }) => ({ body: { email: own.buyer.email, password: PASSWORD } }) },
  signOut: { own: async ({ test }, person) => ({ as: await signInAs(test, person) }) },
  readSession: { own: () => ({}) },
  changePassword: {
    own: async ({ test }, person) => ({
      as: (await buildPerson(test, companyOf(person), [...person.roles])).cookie,
      body: { currentPassword: PASSWORD, newPassword: 'a quite different password' },
    }),
  },
  requestPasswordReset: { own: () => ({ body: { email: anyAddress() } }) },
  readSignInLink: { own: async (world) => ({ body: { token: await invitationToken(world) } }) },
  useSignInLink: { own: async (world) => ({ body: { token: await invitationToken(world), password: 'a long enough password' } }) },

  listPeople: { own: () => ({}) },
  invitePerson: { own: (_, person) => ({ body: { name: 'New Person', email: anyAddress(), roles: [ORDINARY[person.companyKind]] } }) },
  resendInvitation: {
    own: async ({ test }, person) => ({ params: { personId: (await buildPerson(test, companyOf(person), [ORDINARY[person.companyKind]], { invited: true })).personId } }),
    foreign: ({ foreign }, person) => ({ params: { personId: strangerTo(foreign, person).personId } }),
  },
  requestChange: {
    own: async ({ test }, person) => ({
      params: { personId: (await buildPerson(test, companyOf(person), [ORDINARY[person.companyKind]])).personId },
      body: { kind: 'removal' },
    }),
    foreign: ({ foreign }, person) => ({ params: { personId: strangerTo(foreign, person).personId }, body: { kind: 'removal' } }),
  },
  listChanges: { own: () => ({}) },
  confirmChange: {
    own: async (world, person) => ({ params: await waitingChange(world, companyOf(person)) }),
    // To the operator no company is foreign here; it confirms where nobody else can, which this company has.
    foreign: async (world, person) =>
      person.companyKind === 'operator' ? { params: { changeId: randomUUID() } } : { params: await waitingChange(world, world.foreign.buying) },
    status: decided,
  },
  refuseChange: {
    own: async (world, person) => ({ params: await waitingChange(world, companyOf(person)) }),
    foreign: async (world, person) =>
      person.companyKind === 'operator' ? { params: { changeId: randomUUID() } } : { params: await waitingChange(world, world.foreign.buying) },
    status: decided,
  },

  listVendors: { own: () => ({}) },
  readVendor: { own: (world) => ({ params: ownVendor(world) }), foreign: (world) => ({ params: foreignVendor(world) }) },
  inviteVendor: { own: () => ({ body: { name: 'Winder', country: 'DE', contactName: 'Contact', contactEmail: anyAddress() } }) },
  updateVendor: {
    own: (world) => ({ params: ownVendor(world), body: vendorUpdate }),
    foreign: (world) => ({ params: foreignVendor(world), body: vendorUpdate }),
  },
  uploadAgreement: {
    own: (world) => ({ params: ownVendor(world), file: { name: 'agreement.pdf', content: PDF } }),
    foreign: (world) => ({ params: foreignVendor(world), file: { name: 'agreement.pdf', content: PDF } }),
  },
  downloadAgreement: {
    own: async (world) => ({ params: await withAgreement(world, world.own) }),
    foreign: async (world) => ({ params: await withAgreement(world, world.foreign) }),
  },

  listCustomers: { own: () => ({}) },
  acceptCustomer: {
    own: async ({ test }, person) => {
      const customer = await buildCompany(test, 'buying')
      await linkVendor(test, customer, companyOf(person), { accepted: false })
      return { params: { customerId: customer.id } }
    },
    foreign: ({ foreign }) => ({ params: { customerId: foreign.buying.id } }),
  },

  updateCompany: { own: () => ({ body: company }) },
  listCompanies: { own: () => ({}) },
  createCompany: { own: () => ({ body: { ...company, adminName: 'First Admin', adminEmail: anyAddress() } }) },
}

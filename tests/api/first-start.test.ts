import { makeFirstLinks } from '#server/db/seed/first-links'
import { demoActor, DEMO_PASSWORD, DEMO_PEOPLE, seedPeople } from '#server/db/seed/people'
import * as contract from '#shared/contracts/people'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { request, startTestApp, type TestApp } from '../support/test-app'

let test: TestApp
beforeEach(async () => {
  test = await startTestApp()
})
afterEach(() => test.stop())

const use = (link: string | undefined, email: string) =>
  request(test.app, contract.useSignInLink, { body: { token: link!.split('#')[1], password: 'a long enough password', name: 'First Person', email, companyName: 'Own Works' } })

describe('an installation without demo', () => {
  it('makes its first administrator and its first operator by links that work once', async () => {
    const { firstAdminLink, firstOperatorLink } = await makeFirstLinks(test.ctx)
    expect(firstAdminLink).toMatch(/^http:\/\/dotside\.test\/link#\S{40,}$/)
    const admin = await use(firstAdminLink, 'first@works.example').expect(200)
    expect(admin.body.person).toMatchObject({ roles: ['admin'], company: { kind: 'buying', name: 'Own Works' } })
    expect((await use(firstAdminLink, 'second@works.example')).body.code).toBe('link-expired')
    const operator = await use(firstOperatorLink, 'operator@works.example').expect(200)
    expect(operator.body.person).toMatchObject({ roles: ['operator'], company: { kind: 'operator' } })
    expect(await makeFirstLinks(test.ctx)).toEqual({ firstAdminLink: undefined, firstOperatorLink: undefined })
  })

  it('prints a new link at each start until one was used, and the earlier no longer works', async () => {
    const first = await makeFirstLinks(test.ctx)
    const second = await makeFirstLinks(test.ctx)
    expect((await use(first.firstAdminLink, 'first@works.example')).body.code).toBe('link-expired')
    await use(second.firstAdminLink, 'first@works.example').expect(200)
  })

  it('asks for what is missing, field by field, and leaves the link good', async () => {
    const { firstAdminLink } = await makeFirstLinks(test.ctx)
    const body = { token: firstAdminLink!.split('#')[1], password: 'a long enough password' }
    const refused = await request(test.app, contract.useSignInLink, { body })
    expect([refused.status, refused.body.fields]).toEqual([400, { name: 'Please enter your name.' }])
    await use(firstAdminLink, 'first@works.example').expect(200)
  })
})

describe('the demo', () => {
  it('lets everybody on its list sign in, and may be made again after a start that broke off', async () => {
    await seedPeople(test.ctx)
    await seedPeople(test.ctx)
    for (const { email, roles, companyName } of DEMO_PEOPLE) {
      const { body } = await request(test.app, contract.signIn, { body: { email, password: DEMO_PASSWORD } }).expect(200)
      expect(body).toMatchObject({ roles, company: { name: companyName } })
    }
  })

  it('shares one vendor between two buying companies that know nothing of each other', async () => {
    await seedPeople(test.ctx)
    const shared = await demoActor(test.ctx, 'greta.tamsen@tamsen.example')
    const relations = await test.database.query('SELECT buying_company_id FROM vendor_relations WHERE vendor_company_id = $1', [shared.companyId])
    expect(relations).toHaveLength(2)
  })
})

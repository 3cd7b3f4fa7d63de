import { acceptCustomer, confirmChange, requestChange } from '#shared/contracts/people'
import { listWorklist, type WorklistItem } from '#shared/contracts/worklist'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { buildCompany, buildPerson, buildWorld, linkVendor, type TestPerson } from '../support/factories'
import { request, startTestApp, type TestApp } from '../support/test-app'

let test: TestApp
let world: Awaited<ReturnType<typeof buildWorld>>

beforeAll(async () => {
  test = await startTestApp()
  world = await buildWorld(test, 1)
})
afterAll(() => test.stop())

async function worklist(person: TestPerson): Promise<WorklistItem[]> {
  const { body } = await request(test.app, listWorklist, { as: person.cookie }).expect(200)
  return body.items
}

describe('the worklist', () => {
  it('is nobody’s without signing in', async () => {
    const { body } = await request(test.app, listWorklist).expect(401)
    expect(body.code).toBe('not-signed-in')
  })

  it('shows a change to those who may confirm it, then to who asked for it as done', async () => {
    const second = await buildPerson(test, world.buying, ['admin'])
    const change = { kind: 'roles', roles: ['engineer', 'checker'], approvalLimit: null, approvalCurrency: null }
    const { body } = await request(test.app, requestChange, { params: { personId: world.engineer.personId }, body: change, as: world.admin.cookie }).expect(200)

    expect(await worklist(second)).toMatchObject([{ id: `person-change-${body.id}`, state: 'open', title: `Confirm new roles for ${world.engineer.name}`, link: { route: 'people' } }])
    expect(await worklist(world.admin)).toEqual([])
    expect(await worklist(world.buyer)).toEqual([])

    await request(test.app, confirmChange, { params: { changeId: body.id }, as: second.cookie }).expect(200)
    expect(await worklist(second)).toEqual([])
    expect(await worklist(world.admin)).toMatchObject([{ state: 'done', detail: 'Confirmed' }])
  })

  it('shows a vendor the invitations it has not accepted, and no other vendor', async () => {
    const { company, person } = world.vendors[0]!
    const customer = await buildCompany(test, 'buying', { name: 'Ternwick Instruments' })
    await linkVendor(test, customer, company, { accepted: false })
    const rival = await buildPerson(test, await buildCompany(test, 'vendor'), ['vendor'])

    expect(await worklist(person)).toMatchObject([{ id: `customer-${customer.id}`, title: 'Accept the invitation of Ternwick Instruments', link: { route: 'customers' } }])
    expect(await worklist(rival)).toEqual([])

    await request(test.app, acceptCustomer, { params: { customerId: customer.id }, as: person.cookie }).expect(200)
    expect(await worklist(person)).toEqual([])
  })
})

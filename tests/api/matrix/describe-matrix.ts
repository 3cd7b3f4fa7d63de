import type { Access, Role } from '#shared/contracts/endpoint'
import { allEndpoints, type NamedEndpoint } from '#shared/contracts/index'
import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { TestPerson } from '../../support/factories'
import { request, startTestApp, type CallParts } from '../../support/test-app'
import type { Expectation } from './expectation'
import { EXPECTATIONS } from './index'
import { buildMatrixWorld, EVERYBODY, type MatrixWorld } from './world'

const UUID = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/

const admits = (access: Access, who: Role | 'nobody') => access === 'public' || (who !== 'nobody' && (access === 'signed-in' || access.includes(who)))

/** Every endpoint as every role and as nobody, on the own object, on another's and on one that does not exist. */
export function describeMatrix(prepare: (world: MatrixWorld) => Promise<void> = async () => undefined): void {
  let world: MatrixWorld

  beforeAll(async () => {
    world = await buildMatrixWorld(await startTestApp())
    await prepare(world)
  })
  afterAll(() => world.test.stop())

  it('expects something of every endpoint, and of no other', () => {
    expect([...EXPECTATIONS.keys()].sort()).toEqual(allEndpoints.map(({ name }) => name).sort())
  })

  const callAs = (named: NamedEndpoint, who: Role | 'nobody', parts: CallParts) => {
    const as = parts.as ?? (who === 'nobody' ? null : world.personOf(who).cookie)
    // Callers of their own addresses, so that the limits on attempts do not decide.
    return request(world.test.app, named.endpoint, { ...parts, as }).set('x-forwarded-for', `198.51.100.${Math.floor(Math.random() * 250)}`)
  }
  const personOf = (who: Role | 'nobody') => world.personOf(who === 'nobody' ? 'buyer' : who)
  const made = new Map<string, Promise<CallParts>>()
  /** One object for all calls that change nothing: those that are refused or find nothing, and those that read. */
  const sharedParts = (key: string, who: Role | 'nobody', make: (person: TestPerson) => CallParts | Promise<CallParts>): Promise<CallParts> => {
    const of = `${key} ${personOf(who).companyKind}`
    const parts = made.get(of) ?? Promise.resolve(make(personOf(who)))
    made.set(of, parts)
    return parts
  }

  describe.each(allEndpoints.filter(({ name }) => EXPECTATIONS.has(name)).map((named) => [named.name, named] as const))('%s', (name, named) => {
    const expectation = EXPECTATIONS.get(name)!
    const { access, path } = named.endpoint

    it.each(EVERYBODY.filter((who) => !admits(access, who)))('refuses %s', async (who) => {
      const { as: _, ...parts } = await sharedParts(`${name} refused`, 'nobody', (person) => expectation.own(world, person))
      const answer = await callAs(named, who, parts)
      const refusal = who === 'nobody' ? [401, 'not-signed-in'] : [403, 'not-allowed']
      expect([answer.status, answer.body.code]).toEqual(refusal)
    })

    it.each(EVERYBODY.filter((who) => admits(access, who)))('answers %s about its own, and holds nothing of elsewhere', async (who) => {
      const make = (person: TestPerson) => expectation.own(world, person)
      const reads = named.endpoint.method === 'GET'
      const answer = await callAs(named, who, await (reads ? sharedParts(`${name} own`, who, make) : make(personOf(who))))
      expect(answer.status, answer.text).toBe(statusFor(expectation, who))
      if (who !== 'operator') expect(answer.text ?? '').not.toContain(world.foreignMark)
    })

    if (!path.includes(':')) return
    if (!expectation.foreign) {
      it('says why its objects are everybody’s', () => expect(expectation.shared).toMatch(/\w/))
      return
    }
    it.each(EVERYBODY.filter((who) => admits(access, who)))('answers %s about another’s as about one that does not exist', async (who) => {
      const parts = await sharedParts(`${name} foreign`, who, (person) => expectation.foreign!(world, person))
      const anothers = await callAs(named, who, parts)
      const absent = await callAs(named, who, { ...parts, params: mapUuids(parts.params ?? {}) })
      expect([anothers.status, anothers.body.code], anothers.text).toEqual([404, 'not-found'])
      expect(withoutId(anothers.body)).toEqual(withoutId(absent.body))
      expect(anothers.text).not.toContain(world.foreignMark)
    })
  })
}

function statusFor({ status }: Expectation, who: Role | 'nobody'): number {
  return typeof status === 'number' ? status : (status?.[who] ?? 200)
}

const mapUuids = (params: Record<string, string>) => Object.fromEntries(Object.entries(params).map(([key, value]) => [key, UUID.test(value) ? randomUUID() : value]))

const withoutId = ({ requestId: _, ...body }: Record<string, unknown>) => body

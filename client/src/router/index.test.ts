import { createPinia, setActivePinia } from 'pinia'
import { beforeEach, describe, expect, it } from 'vitest'
import { createMemoryHistory } from 'vue-router'
import type { Role } from '#shared/contracts/endpoint'
import type { SessionPerson } from '#shared/contracts/people'
import { useSessionStore } from '@/stores/session'
import { createAppRouter } from '.'
import { mayOpen } from './access'
import { SECTIONS } from './sections'

async function visit(path: string, roles: Role[] | null) {
  if (roles) useSessionStore().start({ id: 'p1', roles } as unknown as SessionPerson)
  const router = createAppRouter(createMemoryHistory())
  await router.push(path)
  return router.currentRoute.value
}

describe('the way to a sheet', () => {
  beforeEach(() => setActivePinia(createPinia()))

  it('leads nobody to sign-in and remembers where to', async () => {
    const route = await visit('/vendors?sort=name', null)
    expect(route.name).toBe('sign-in')
    expect(route.query.next).toBe('/vendors?sort=name')
  })

  it('shows nobody a mail link', async () => {
    expect((await visit('/link#token', null)).name).toBe('sign-in-link')
  })

  it('opens what one of the roles may open', async () => {
    expect((await visit('/vendors/invitation', ['admin'])).name).toBe('invite-vendor')
  })

  it('shows the same sheet for what is not allowed as for what does not exist, at the address typed', async () => {
    const refused = await visit('/companies/new', ['engineer'])
    const absent = await visit('/no/such/sheet', ['engineer'])
    expect([refused.name, refused.fullPath]).toEqual(['not-found', '/companies/new'])
    expect([absent.name, absent.fullPath]).toEqual(['not-found', '/no/such/sheet'])
  })
})

describe('mayOpen', () => {
  it.each([
    ['public', null, true],
    ['signed-in', null, false],
    ['signed-in', [], true],
    [['buyer', 'admin'], ['admin'], true],
    [['buyer'], ['vendor'], false],
    [['buyer'], null, false],
  ] as const)('%j for %j: %s', (access, roles, allowed) => {
    expect(mayOpen(access, roles)).toBe(allowed)
  })
})

describe('SECTIONS', () => {
  it('opens only routes that exist, to nobody whom the route itself refuses', () => {
    setActivePinia(createPinia())
    const router = createAppRouter(createMemoryHistory())
    for (const { route, access } of SECTIONS) {
      expect(router.hasRoute(route), route).toBe(true)
      const needed = router.resolve({ name: route }).meta.access
      const roles: Role[] = ['engineer', 'checker', 'quality', 'buyer', 'approver', 'admin', 'vendor', 'operator']
      for (const role of roles.filter((one) => mayOpen(access, [one]))) expect(mayOpen(needed, [role]), `${route} for ${role}`).toBe(true)
    }
  })
})

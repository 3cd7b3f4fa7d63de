import type { Actor } from '#server/db/as-actor'
import { describe, expect, it } from 'vitest'
import { canReadPart, canWriteParts } from './parts'

const actor = (companyKind: Actor['companyKind'], companyId: string, ...roles: Actor['roles']): Actor => ({ personId: 'p', companyId, companyKind, roles })
const shared = { companyId: null }
const own = { companyId: 'acme' }

describe('canReadPart', () => {
  it.each([
    { name: 'an engineer reads a shared row', who: actor('buying', 'acme', 'engineer'), row: shared, allowed: true },
    { name: 'an engineer reads a row of the own company', who: actor('buying', 'acme', 'engineer'), row: own, allowed: true },
    { name: 'a buyer reads a row of the own company', who: actor('buying', 'acme', 'buyer'), row: own, allowed: true },
    { name: 'an engineer of another company does not', who: actor('buying', 'other', 'engineer'), row: own, allowed: false },
    { name: 'who only manages accounts does not', who: actor('buying', 'acme', 'admin'), row: shared, allowed: false },
    { name: 'a vendor does not', who: actor('vendor', 'coils', 'vendor'), row: shared, allowed: false },
    { name: 'an operator does not', who: actor('operator', 'ops', 'operator'), row: shared, allowed: false },
  ])('$name', ({ who, row, allowed }) => {
    expect(canReadPart(who, row)).toBe(allowed)
  })
})

describe('canWriteParts', () => {
  it.each([
    { name: 'an engineer changes rows', who: actor('buying', 'acme', 'engineer'), allowed: true },
    { name: 'a checker does not', who: actor('buying', 'acme', 'checker'), allowed: false },
    { name: 'a buyer does not', who: actor('buying', 'acme', 'buyer', 'approver'), allowed: false },
    { name: 'a vendor does not', who: actor('vendor', 'coils', 'vendor'), allowed: false },
  ])('$name', ({ who, allowed }) => {
    expect(canWriteParts(who)).toBe(allowed)
  })
})

import type { Actor } from '#server/db/as-actor'
import type { Role } from '#shared/contracts/endpoint'
import { describe, expect, it } from 'vitest'
import { canManagePeople, canReadAgreement, canUpdateVendorRelation, mayConfirmChange, mayRefuseChange, secondPersons, type Member } from './people'

const actor = (personId: string, companyKind: Actor['companyKind'], ...roles: Role[]): Actor => ({ personId, companyId: companyKind === 'buying' ? 'brightmoor' : companyKind, companyKind, roles })
const member = (personId: string, ...roles: Role[]): Member => ({ personId, roles })

describe('canManagePeople', () => {
  it.each([
    { name: 'an administrator, of the own company', by: actor('a', 'buying', 'admin'), companyId: 'brightmoor', allowed: true },
    { name: 'an administrator, of a vendor', by: actor('a', 'buying', 'admin'), companyId: 'vendor', allowed: false },
    { name: 'a buyer, of the own company', by: actor('b', 'buying', 'buyer'), companyId: 'brightmoor', allowed: false },
    { name: 'a vendor, of the own company', by: actor('v', 'vendor', 'vendor'), companyId: 'vendor', allowed: true },
    { name: 'an operator, of a buying company', by: actor('o', 'operator', 'operator'), companyId: 'brightmoor', allowed: false },
  ])('$name: $allowed', ({ by, companyId, allowed }) => {
    expect(canManagePeople(by, { companyId })).toBe(allowed)
  })
})

describe('secondPersons', () => {
  const request = { requestedBy: 'asking', personId: 'concerned' }

  it('are the other administrators of a buying company', () => {
    const members = [member('asking', 'admin'), member('second', 'admin', 'engineer'), member('quality', 'quality'), member('concerned', 'admin')]
    expect(secondPersons('buying', request, members)).toEqual(['second'])
  })

  it('are quality and approvers where the only other administrator is the one concerned', () => {
    const members = [member('asking', 'admin'), member('concerned', 'admin'), member('q', 'quality'), member('p', 'approver'), member('b', 'buyer')]
    expect(secondPersons('buying', request, members)).toEqual(['q', 'p'])
  })

  it('are the colleagues in a vendor company', () => {
    expect(secondPersons('vendor', request, [member('asking', 'vendor'), member('concerned', 'vendor'), member('colleague', 'vendor')])).toEqual(['colleague'])
  })
})

describe('mayConfirmChange', () => {
  const request = { requestedBy: 'asking', personId: 'concerned' }
  const alone = [member('asking', 'admin'), member('concerned', 'engineer')]

  it('never lets who asked or whom it concerns, whatever they hold', () => {
    for (const person of ['asking', 'concerned']) {
      expect(mayConfirmChange(actor(person, 'buying', 'admin', 'quality'), 'buying', request, alone)).toBe(false)
      expect(mayConfirmChange(actor(person, 'operator', 'operator'), 'operator', request, alone)).toBe(false)
    }
  })

  it('lets the operator only where the company has nobody', () => {
    const operator = actor('o', 'operator', 'operator')
    expect(mayConfirmChange(operator, 'buying', request, alone)).toBe(true)
    expect(mayConfirmChange(operator, 'buying', request, [...alone, member('q', 'quality')])).toBe(false)
  })

  it('lets who asked take it back', () => {
    expect(mayRefuseChange(actor('asking', 'buying', 'admin'), 'buying', request, alone)).toBe(true)
    expect(mayRefuseChange(actor('concerned', 'buying', 'engineer'), 'buying', request, alone)).toBe(false)
  })
})

describe('what is kept about a vendor', () => {
  const relation = { buyingCompanyId: 'brightmoor' }
  it.each([
    { role: 'buyer', update: true, agreement: true },
    { role: 'quality', update: true, agreement: true },
    { role: 'approver', update: false, agreement: true },
    { role: 'engineer', update: false, agreement: false },
    { role: 'admin', update: false, agreement: false },
  ] as const)('as $role: update $update, agreement $agreement', ({ role, update, agreement }) => {
    expect(canUpdateVendorRelation(actor('x', 'buying', role), relation)).toBe(update)
    expect(canReadAgreement(actor('x', 'buying', role), relation)).toBe(agreement)
    expect(canUpdateVendorRelation({ ...actor('x', 'buying', role), companyId: 'other' }, relation)).toBe(false)
  })
})

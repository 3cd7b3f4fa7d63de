import { expect, it } from 'vitest'
import type { Vendor } from '#shared/contracts/people'
import { exampleRfq } from '../../../../tests/support/rfq-example'
import { recipientsOf } from './recipients'

const vendor = (values: Partial<Vendor>): Vendor => ({
  id: 'quillon',
  name: 'Quillon',
  contactName: 'C. Contact',
  contactEmail: 'contact@quillon.example',
  state: 'accepted',
  approval: 'approved',
  confidentialityAgreedOn: null,
  confidentialityExpiresOn: null,
  agreementFileName: null,
  notes: '',
  people: [],
  invitedAt: '2026-01-01T00:00:00.000Z',
  ...values,
})

it('names every person of an invited vendor, and nobody of another', () => {
  const people = [
    { id: '1', name: 'S. Sales', email: 'sales@quillon.example' },
    { id: '2', name: 'T. Test', email: 'test@quillon.example' },
  ]
  expect(recipientsOf(exampleRfq(), [vendor({ id: 'other', people: [] }), vendor({ people })])).toEqual([
    { vendor: 'Quillon Windings', people: ['S. Sales, sales@quillon.example', 'T. Test, test@quillon.example'], isNew: false },
  ])
})

it('names the contact of a vendor that has not accepted yet', () => {
  expect(recipientsOf(exampleRfq(), [vendor({ state: 'invited' })])).toEqual([{ vendor: 'Quillon Windings', people: ['C. Contact, contact@quillon.example'], isNew: true }])
})

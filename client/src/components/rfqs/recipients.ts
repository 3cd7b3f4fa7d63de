import type { Vendor } from '#shared/contracts/people'
import type { Rfq } from '#shared/contracts/rfqs'

export interface Recipient {
  vendor: string
  /** `Name, address` of each person; the contact alone while nobody has accepted the first invitation. */
  people: string[]
  isNew: boolean
}

/** Whom an issue would tell, by vendor. */
export function recipientsOf(rfq: Pick<Rfq, 'invitations'>, vendors: readonly Vendor[]): Recipient[] {
  return rfq.invitations.map(({ vendorCompanyId, vendorName }) => {
    const vendor = vendors.find(({ id }) => id === vendorCompanyId)
    const contact = vendor ? [{ name: vendor.contactName, email: vendor.contactEmail }] : []
    const people = vendor && vendor.people.length > 0 ? vendor.people : contact
    return { vendor: vendorName, people: people.map(({ name, email }) => `${name}, ${email}`), isNew: vendor?.state === 'invited' }
  })
}

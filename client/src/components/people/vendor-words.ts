import type { Vendor } from '#shared/contracts/people'

export const APPROVAL_WORDS: Readonly<Record<Vendor['approval'], string>> = {
  'not-assessed': 'Not assessed',
  approved: 'Approved for series',
  conditional: 'Approved on conditions',
  blocked: 'Blocked',
}

export const VENDOR_STATE_WORDS: Readonly<Record<Vendor['state'], string>> = {
  invited: 'Invited, not yet answered',
  accepted: 'Accepted',
}

/** What is agreed about confidentiality, in a few words with its date. */
export function confidentialityText({ confidentialityAgreedOn: agreed, confidentialityExpiresOn: expires }: Vendor): string {
  if (!agreed) return 'Not agreed'
  return expires ? `Until ${expires}` : `Since ${agreed}, without end`
}

import type { NO_BID_REASONS, VendorRfq, VendorRfqSummary } from '#shared/contracts/rfqs'

export const NO_BID_WORDS: Record<(typeof NO_BID_REASONS)[number], string> = {
  capacity: 'No capacity in the time asked for',
  'volume-too-small': 'The quantities are too small for us',
  'volume-too-large': 'The quantities are too large for us',
  'below-minimum-order-value': 'Below our minimum order value',
  'lead-time-impossible': 'The lead time cannot be kept',
  'target-price-unreachable': 'The target price cannot be reached',
  'wire-type-not-processed': 'We do not process this wire, litz or foil',
  'core-or-former-not-obtainable': 'The core or coil former cannot be obtained',
  'no-impregnation': 'No vacuum impregnation or potting here',
  'no-insulation-system': 'No insulation system for this thermal class',
  'test-voltage-beyond-equipment': 'The test voltage or partial discharge is beyond our equipment',
  'safety-responsibility-unclear': 'Responsibility for safety is not clear',
  'specification-contradictory': 'The winding specification is contradictory or incomplete',
  'test-beyond-equipment': 'A test is beyond our equipment (bias current, frequency)',
  'quality-level-not-offered': 'The quality level asked for is not offered',
  'commercial-terms': 'Commercial terms: payment, liability or delivery',
  'export-restriction': 'Country or export restriction',
  'conflict-with-customer': 'Conflict with an existing customer',
  other: 'Another reason',
}

export const ENQUIRY_STATE_WORDS: Record<VendorRfq['state'], string> = {
  open: 'Open for quotations',
  closed: 'Closed',
  opened: 'Quotations opened',
  decided: 'Decided',
  cancelled: 'Cancelled',
}

/** Why nothing can be answered any more; null while it can. */
export const CLOSED_SENTENCES: Record<VendorRfq['state'], string | null> = {
  open: null,
  closed: 'The due time has passed. The enquiry takes no quotation, revision or withdrawal any more; the quotations stay sealed until they are opened.',
  opened: 'The quotations have been opened and are being judged. Nothing can be changed any more.',
  decided: 'The customer has decided about this enquiry. Nothing can be changed any more.',
  cancelled: 'The customer has cancelled this enquiry. It takes no answers any more.',
}

const STEP_WORDS: Record<VendorRfq['invitationState'], string> = {
  invited: 'Not looked at yet',
  seen: 'Not answered yet',
  'terms-accepted': 'Confidentiality accepted',
  'intends-to-quote': 'Quoting',
  'no-bid': 'Declined',
}

type Answered = Pick<VendorRfqSummary, 'invitationState' | 'quotation'>

/** How far the own answer is, for the list and the head of the enquiry. */
export function ownAnswer({ invitationState, quotation }: Answered): string {
  if (invitationState === 'no-bid' || quotation === null) return STEP_WORDS[invitationState]
  return quotation.state === 'withdrawn' ? `Revision ${quotation.revision} withdrawn` : `Revision ${quotation.revision} submitted`
}

export const isAnswered = ({ invitationState, quotation }: Answered): boolean => invitationState === 'no-bid' || quotation?.state === 'submitted'

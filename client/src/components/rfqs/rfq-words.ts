import type { DELIVERY_RULES, INVITATION_STATES, NO_BID_REASONS, QUOTE_STATES, Rfq, RFQ_STATES } from '#shared/contracts/rfqs'

export const RFQ_STATE_WORDS: Record<(typeof RFQ_STATES)[number], string> = {
  preparing: 'Prepared',
  issued: 'Issued',
  closed: 'Closed, sealed',
  opened: 'Opened',
  awarded: 'Awarded',
  cancelled: 'Cancelled',
}

export const INVITATION_WORDS: Record<(typeof INVITATION_STATES)[number], string> = {
  invited: 'Invited',
  seen: 'Seen',
  'terms-accepted': 'Confidentiality accepted',
  'intends-to-quote': 'Quoted',
  'no-bid': 'Declined',
}

export const NO_BID_WORDS: Record<(typeof NO_BID_REASONS)[number], string> = {
  capacity: 'No capacity',
  'volume-too-small': 'Quantity too small',
  'volume-too-large': 'Quantity too large',
  'below-minimum-order-value': 'Below the minimum order value',
  'lead-time-impossible': 'Lead time impossible',
  'target-price-unreachable': 'Target price out of reach',
  'wire-type-not-processed': 'Wire, litz or foil type not processed',
  'core-or-former-not-obtainable': 'Core or coil former not obtainable',
  'no-impregnation': 'No vacuum impregnation or potting',
  'no-insulation-system': 'No approval or insulation system for the class',
  'test-voltage-beyond-equipment': 'Test voltage beyond our equipment',
  'safety-responsibility-unclear': 'Responsibility for safety unclear',
  'specification-contradictory': 'Specification contradictory or incomplete',
  'test-beyond-equipment': 'Test requirement beyond our equipment',
  'quality-level-not-offered': 'Quality level not offered',
  'commercial-terms': 'Terms: payment, liability, delivery',
  'export-restriction': 'Country or export restriction',
  'conflict-with-customer': 'Conflict with an existing customer',
  other: 'Another reason',
}

export const QUOTE_STATE_WORDS: Record<(typeof QUOTE_STATES)[number], string> = {
  submitted: 'the one that counts',
  superseded: 'replaced by a later revision',
  withdrawn: 'withdrawn',
}

/** What a vendor has answered; nothing was asked before the issue. */
export const answerText = ({ issuedAt }: Pick<Rfq, 'issuedAt'>, state: (typeof INVITATION_STATES)[number]): string =>
  issuedAt === null ? 'Not sent yet' : INVITATION_WORDS[state]

/** Incoterms® 2020: the rules with their names. */
export const DELIVERY_RULE_WORDS: Record<(typeof DELIVERY_RULES)[number], string> = {
  EXW: 'EXW, ex works',
  FCA: 'FCA, free carrier',
  FAS: 'FAS, free alongside ship',
  FOB: 'FOB, free on board',
  CFR: 'CFR, cost and freight',
  CIF: 'CIF, cost, insurance and freight',
  CPT: 'CPT, carriage paid to',
  CIP: 'CIP, carriage and insurance paid to',
  DAP: 'DAP, delivered at place',
  DPU: 'DPU, delivered at place unloaded',
  DDP: 'DDP, delivered duty paid',
}

export const deliveryRuleOptions = Object.entries(DELIVERY_RULE_WORDS).map(([value, label]) => ({ value, label }))

/** Beginning of a hash, enough to compare by eye. */
export const shortHash = (sha256: string): string => sha256.slice(0, 12)

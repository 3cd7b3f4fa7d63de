/** Life of one vendor's invitation to one RFQ. */
export type InvitationState =
  | { phase: 'invited' }
  | { phase: 'seen' }
  | { phase: 'terms-accepted' }
  | { phase: 'intends-to-quote' }
  | { phase: 'declined'; reason: NoBidReason; remark: string }
  | { phase: 'no-answer' }

/** Why a vendor does not quote. Codes are permanent: they are counted over years. */
export const NO_BID_REASONS = [
  'capacity',
  'volume-too-small',
  'volume-too-large',
  'below-minimum-order-value',
  'lead-time-impossible',
  'target-price-unreachable',
  'wire-type-not-processed',
  'core-or-former-not-obtainable',
  'no-impregnation-or-potting',
  'no-insulation-system-approval',
  'voltage-beyond-test-equipment',
  'safety-responsibility-unclear',
  'specification-contradictory',
  'test-beyond-equipment',
  'quality-level-not-offered',
  'commercial-terms',
  'export-restriction',
  'conflict-with-customer',
  'other',
] as const

export type NoBidReason = (typeof NO_BID_REASONS)[number]

export type InvitationEvent =
  | { type: 'seen' }
  | { type: 'terms-accepted' }
  | { type: 'intends-to-quote' }
  | { type: 'declined'; reason: NoBidReason; remark: string }
  /** The due time passed without a quotation and without a word. */
  | { type: 'due-without-answer' }

/**
 * The next state, or null when the event is not allowed in this phase. Confidentiality comes before the
 * drawing and so before any intention to quote; who declined may come back while the RFQ is open.
 * `due-without-answer` is for who neither quoted nor declined.
 */
export function nextInvitationState(state: InvitationState, event: InvitationEvent): InvitationState | null {
  switch (event.type) {
    case 'seen':
      return state.phase === 'invited' ? { phase: 'seen' } : null
    case 'terms-accepted':
      return state.phase === 'invited' || state.phase === 'seen' ? { phase: 'terms-accepted' } : null
    case 'intends-to-quote':
      return state.phase === 'terms-accepted' || state.phase === 'declined' ? { phase: 'intends-to-quote' } : null
    case 'declined':
      if (state.phase === 'declined' || state.phase === 'no-answer') return null
      if (event.reason === 'other' && event.remark.trim() === '') return null
      return { phase: 'declined', reason: event.reason, remark: event.remark }
    case 'due-without-answer':
      return state.phase === 'declined' || state.phase === 'no-answer' ? null : { phase: 'no-answer' }
  }
}

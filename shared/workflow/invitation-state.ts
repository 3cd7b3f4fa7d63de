/** Life of one vendor's invitation to one RFQ. */
export type InvitationState =
  | { phase: 'invited' }
  | { phase: 'seen' }
  | { phase: 'terms-accepted' }
  | { phase: 'intends-to-quote' }
  /** `reason` is one of the coded reasons of the enquiry's contract. */
  | { phase: 'no-bid'; reason: string; remark: string }
  | { phase: 'no-answer' }

export type InvitationEvent =
  | { type: 'seen' }
  | { type: 'terms-accepted' }
  | { type: 'intends-to-quote' }
  | { type: 'declined'; reason: string; remark: string }
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
      return state.phase === 'terms-accepted' || state.phase === 'no-bid' ? { phase: 'intends-to-quote' } : null
    case 'declined':
      if (state.phase === 'no-bid' || state.phase === 'no-answer') return null
      if (event.reason === 'other' && event.remark.trim() === '') return null
      return { phase: 'no-bid', reason: event.reason, remark: event.remark }
    case 'due-without-answer':
      return state.phase === 'no-bid' || state.phase === 'no-answer' ? null : { phase: 'no-answer' }
  }
}

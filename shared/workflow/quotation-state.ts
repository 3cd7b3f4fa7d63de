/** Life of one quotation revision of one vendor. */
export type QuotationState =
  | { phase: 'draft' }
  | { phase: 'submitted'; revision: number; validUntil: string }
  | { phase: 'superseded'; revision: number; by: number }
  | { phase: 'withdrawn'; revision: number }
  | { phase: 'expired'; revision: number; validUntil: string }

/** `rfqOpen` says whether the RFQ took quotations at the moment of the event, by the database's clock. */
export type QuotationEvent =
  | { type: 'submitted'; revision: number; validUntil: string; on: string; rfqOpen: boolean }
  | { type: 'superseded'; by: number }
  | { type: 'withdrawn'; rfqOpen: boolean }
  /** `on` is a calendar date; the last day of validity still counts. */
  | { type: 'validity-checked'; on: string }
  | { type: 'validity-extended'; until: string }

/**
 * The next state, or null when the event is not allowed in this phase. Each revision is complete; a later
 * one supersedes it and nothing overwrites it. An expired quotation lives again only by a stored extension.
 */
export function nextQuotationState(state: QuotationState, event: QuotationEvent): QuotationState | null {
  switch (event.type) {
    case 'submitted':
      if (state.phase !== 'draft' || !event.rfqOpen || event.validUntil < event.on) return null
      return { phase: 'submitted', revision: event.revision, validUntil: event.validUntil }
    case 'superseded':
      if (state.phase !== 'submitted' || event.by <= state.revision) return null
      return { phase: 'superseded', revision: state.revision, by: event.by }
    case 'withdrawn':
      return state.phase === 'submitted' && event.rfqOpen ? { phase: 'withdrawn', revision: state.revision } : null
    case 'validity-checked':
      return state.phase === 'submitted' && event.on > state.validUntil ? { ...state, phase: 'expired' } : null
    case 'validity-extended':
      if (state.phase !== 'submitted' && state.phase !== 'expired') return null
      return event.until > state.validUntil ? { phase: 'submitted', revision: state.revision, validUntil: event.until } : null
  }
}

/** Sealed until its RFQ is opened: nobody of the buying side reads it, whatever its phase. */
export const isSealed = (rfqPhase: 'preparing' | 'issued' | 'closed' | 'opened' | 'awarded' | 'cancelled'): boolean =>
  rfqPhase !== 'opened' && rfqPhase !== 'awarded'

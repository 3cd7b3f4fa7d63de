/** Life of one deviation that a vendor proposes with a quotation. */
export type DeviationState =
  | { phase: 'proposed' }
  /** `setHash` names the set of deviations that was recalculated together. */
  | { phase: 'recalculated'; setHash: string }
  | { phase: 'accepted'; setHash: string; condition: string | null }
  | { phase: 'rejected'; reason: string }

export type DeviationEvent =
  | { type: 'recalculated'; setHash: string }
  | { type: 'accepted'; setHash: string; condition: string | null }
  | { type: 'rejected'; reason: string }

/**
 * The next state, or null when the event is not allowed in this phase. A deviation is accepted only on the
 * calculation of the very set that is accepted with it: two single passes are no pass for both together.
 */
export function nextDeviationState(state: DeviationState, event: DeviationEvent): DeviationState | null {
  switch (event.type) {
    case 'recalculated':
      return state.phase === 'proposed' || state.phase === 'recalculated' ? { phase: 'recalculated', setHash: event.setHash } : null
    case 'accepted':
      if (state.phase !== 'recalculated' || state.setHash !== event.setHash) return null
      return { phase: 'accepted', setHash: event.setHash, condition: event.condition }
    case 'rejected':
      if ((state.phase !== 'proposed' && state.phase !== 'recalculated') || event.reason.trim() === '') return null
      return { phase: 'rejected', reason: event.reason }
  }
}

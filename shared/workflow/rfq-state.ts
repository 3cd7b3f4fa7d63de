/** Life of one request for quotation. Moments are ISO 8601 texts in UTC, so they compare as texts. */
export type RfqState =
  | { phase: 'preparing' }
  | { phase: 'issued'; amendment: number; dueAt: string }
  | { phase: 'closed'; amendment: number; dueAt: string }
  | { phase: 'opened'; openedBy: [string, string] }
  | { phase: 'awarded'; awardId: string }
  | { phase: 'cancelled'; reason: string }

export type RfqEvent =
  | { type: 'issued'; at: string; dueAt: string; lineCount: number; invitationCount: number }
  | { type: 'amended'; at: string; dueAt: string; reason: string }
  | { type: 'due'; at: string }
  /** Two persons open together; the moment is the database's. */
  | { type: 'opened'; at: string; by: [string, string] }
  | { type: 'awarded'; awardId: string }
  | { type: 'cancelled'; reason: string }

/**
 * The next state, or null when the event is not allowed in this phase: the due time only moves later and
 * only before it has passed, and quotations are opened after it by two different people.
 */
export function nextRfqState(state: RfqState, event: RfqEvent): RfqState | null {
  switch (event.type) {
    case 'issued':
      if (state.phase !== 'preparing' || event.lineCount < 1 || event.invitationCount < 1 || event.dueAt <= event.at) return null
      return { phase: 'issued', amendment: 0, dueAt: event.dueAt }
    case 'amended':
      if (state.phase !== 'issued' || event.at >= state.dueAt || event.dueAt < state.dueAt || event.reason.trim() === '') return null
      return { phase: 'issued', amendment: state.amendment + 1, dueAt: event.dueAt }
    case 'due':
      return state.phase === 'issued' && event.at >= state.dueAt ? { ...state, phase: 'closed' } : null
    case 'opened':
      return openedState(state, event.at, event.by)
    case 'awarded':
      return state.phase === 'opened' ? { phase: 'awarded', awardId: event.awardId } : null
    case 'cancelled':
      if (state.phase === 'awarded' || state.phase === 'cancelled' || event.reason.trim() === '') return null
      return { phase: 'cancelled', reason: event.reason }
  }
}

/** A due RFQ may be opened before the worker has marked it closed: only the clock counts. */
function openedState(state: RfqState, at: string, by: [string, string]): RfqState | null {
  if (state.phase !== 'issued' && state.phase !== 'closed') return null
  return at >= state.dueAt && by[0] !== by[1] ? { phase: 'opened', openedBy: by } : null
}

/** Whether quotations are accepted at a moment: issued, and the due time not reached. */
export const acceptsQuotations = (state: RfqState, at: string): boolean => state.phase === 'issued' && at < state.dueAt

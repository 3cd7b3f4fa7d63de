/** Life of one revision of a winding specification. */
export type RevisionState =
  | { phase: 'draft'; draft: string; authorId: string }
  | { phase: 'in-check'; draft: string; authorId: string }
  | { phase: 'released'; letter: string }
  | { phase: 'superseded'; letter: string; by: string }
  | { phase: 'withdrawn'; letter: string; reason: string }

export type RevisionEvent =
  | { type: 'sent-to-check' }
  /** The checker sends it back with a reason; the author goes on with the next draft. */
  | { type: 'sent-back'; reason: string; nextDraft: string }
  | { type: 'released'; checkerId: string; letter: string; openErrors: number }
  | { type: 'superseded'; by: string }
  | { type: 'withdrawn'; reason: string }

/**
 * The next state, or null when the event is not allowed in this phase: nobody releases their own draft,
 * a revision with open errors stays in check, and a released one only ever ends.
 */
export function nextRevisionState(state: RevisionState, event: RevisionEvent): RevisionState | null {
  switch (event.type) {
    case 'sent-to-check':
      return state.phase === 'draft' ? { ...state, phase: 'in-check' } : null
    case 'sent-back':
      if (state.phase !== 'in-check' || event.reason.trim() === '') return null
      return { phase: 'draft', draft: event.nextDraft, authorId: state.authorId }
    case 'released':
      if (state.phase !== 'in-check' || state.authorId === event.checkerId || event.openErrors > 0) return null
      return { phase: 'released', letter: event.letter }
    case 'superseded':
      return state.phase === 'released' ? { phase: 'superseded', letter: state.letter, by: event.by } : null
    case 'withdrawn':
      if (state.phase !== 'released' || event.reason.trim() === '') return null
      return { phase: 'withdrawn', letter: state.letter, reason: event.reason }
  }
}

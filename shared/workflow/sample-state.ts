/** What quality or engineering decides about a judged data set. */
export const DISPOSITIONS = ['accepted', 'accepted-with-concession', 'change-drawing', 'rework', 'rejected', 'on-hold'] as const
export type Disposition = (typeof DISPOSITIONS)[number]

export type SetVerdict = 'met' | 'not-met' | 'not-evidenced'

/** Life of one sample data set: a file of readings that a vendor hands in. */
export type SampleSetState =
  | { phase: 'uploaded' }
  | { phase: 'read'; openQuestions: number }
  | { phase: 'confirmed' }
  | { phase: 'judged'; verdict: SetVerdict }
  | { phase: 'disposed'; disposition: Disposition; verdict: SetVerdict }
  /** A corrected file of the same request took its place; the old one stays readable. */
  | { phase: 'superseded'; verdict: SetVerdict | null }

export type SampleSetEvent =
  | { type: 'read'; openQuestions: number }
  | { type: 'answered'; openQuestions: number }
  | { type: 'confirmed' }
  | { type: 'judged'; verdict: SetVerdict }
  | { type: 'disposed'; disposition: Disposition; reason: string; personId: string; uploadedById: string }
  | { type: 'superseded' }

/**
 * The next state, or null when the event is not allowed in this phase. Nothing is confirmed while a question
 * is open, an incomplete set is never accepted, and a disposition is final: what comes later is a new set.
 */
export function nextSampleSetState(state: SampleSetState, event: SampleSetEvent): SampleSetState | null {
  switch (event.type) {
    case 'read':
      return state.phase === 'uploaded' ? { phase: 'read', openQuestions: event.openQuestions } : null
    case 'answered':
      return state.phase === 'read' ? { phase: 'read', openQuestions: event.openQuestions } : null
    case 'confirmed':
      return state.phase === 'read' && state.openQuestions === 0 ? { phase: 'confirmed' } : null
    case 'judged':
      return state.phase === 'confirmed' ? { phase: 'judged', verdict: event.verdict } : null
    case 'disposed':
      return disposedState(state, event)
    case 'superseded':
      return supersededState(state)
  }
}

function disposedState(state: SampleSetState, event: Extract<SampleSetEvent, { type: 'disposed' }>): SampleSetState | null {
  if (state.phase !== 'judged' || event.reason.trim() === '' || event.personId === event.uploadedById) return null
  if (!dispositionsFor(state.verdict).includes(event.disposition)) return null
  return { phase: 'disposed', disposition: event.disposition, verdict: state.verdict }
}

function supersededState(state: SampleSetState): SampleSetState | null {
  if (state.phase === 'disposed' || state.phase === 'superseded') return null
  return { phase: 'superseded', verdict: state.phase === 'judged' ? state.verdict : null }
}

/**
 * Which dispositions fit a verdict. Missing evidence is no pass: such a set is held, reworked or rejected.
 * What meets its limits needs no concession, and what fails is accepted only with one or by a changed drawing.
 */
export function dispositionsFor(verdict: SetVerdict): readonly Disposition[] {
  switch (verdict) {
    case 'met':
      return ['accepted', 'change-drawing', 'rejected', 'on-hold']
    case 'not-met':
      return ['accepted-with-concession', 'change-drawing', 'rework', 'rejected', 'on-hold']
    case 'not-evidenced':
      return ['rework', 'rejected', 'on-hold']
  }
}

import { Decimal, type Money } from '#shared/money'

/** How a vendor answers a purchase order. */
export type Acknowledgement = { kind: 'accepted' } | { kind: 'accepted-with-changes'; changes: string } | { kind: 'refused'; reason: string }

/** Life of one award. The hash names the frozen comparison that the proposal rests on. */
export type AwardState =
  | { phase: 'proposed'; proposedBy: string; comparisonHash: string; total: Money }
  /** The comparison was made anew: approvals of the old one mean nothing. */
  | { phase: 'void'; reason: string }
  | { phase: 'rejected'; by: string; reason: string }
  | { phase: 'approved'; proposedBy: string; approvedBy: string; comparisonHash: string }
  | { phase: 'ordered'; orderId: string }
  | { phase: 'acknowledged'; orderId: string; answer: Acknowledgement }

export type AwardEvent =
  /** `limit` in the approver's own currency, `total` of the award in that same currency, one-time cost included. */
  | { type: 'approved'; by: string; comparisonHash: string; limit: Money | null; total: Money; offerValid: boolean; conflictOfInterest: boolean }
  | { type: 'rejected'; by: string; reason: string }
  | { type: 'comparison-changed'; reason: string }
  | { type: 'ordered'; orderId: string }
  | { type: 'acknowledged'; answer: Acknowledgement }

/** Why an approval is refused; in the order in which they are asked. */
export type ApprovalRefusal = 'not-proposed' | 'comparison-changed' | 'own-proposal' | 'conflict-of-interest' | 'offer-expired' | 'no-limit' | 'limit-currency' | 'over-limit'

/** The next state, or null when the event is not allowed in this phase. */
export function nextAwardState(state: AwardState, event: AwardEvent): AwardState | null {
  switch (event.type) {
    case 'approved':
      if (state.phase !== 'proposed' || approvalRefusal(state, event) !== null) return null
      return { phase: 'approved', proposedBy: state.proposedBy, approvedBy: event.by, comparisonHash: state.comparisonHash }
    case 'rejected':
      if (state.phase !== 'proposed' || state.proposedBy === event.by || event.reason.trim() === '') return null
      return { phase: 'rejected', by: event.by, reason: event.reason }
    case 'comparison-changed':
      return state.phase === 'proposed' || state.phase === 'approved' ? { phase: 'void', reason: event.reason } : null
    case 'ordered':
      return state.phase === 'approved' ? { phase: 'ordered', orderId: event.orderId } : null
    case 'acknowledged':
      if (state.phase !== 'ordered' || !saysEnough(event.answer)) return null
      return { phase: 'acknowledged', orderId: state.orderId, answer: event.answer }
  }
}

/** Why this approval would be refused, or null when it stands. The total counts one-time cost. */
export function approvalRefusal(state: AwardState, event: Extract<AwardEvent, { type: 'approved' }>): ApprovalRefusal | null {
  if (state.phase !== 'proposed') return 'not-proposed'
  if (state.comparisonHash !== event.comparisonHash) return 'comparison-changed'
  if (state.proposedBy === event.by) return 'own-proposal'
  if (event.conflictOfInterest) return 'conflict-of-interest'
  if (!event.offerValid) return 'offer-expired'
  if (event.limit === null) return 'no-limit'
  if (event.limit.currency !== event.total.currency) return 'limit-currency'
  return new Decimal(event.total.amount).gt(event.limit.amount) ? 'over-limit' : null
}

function saysEnough(answer: Acknowledgement): boolean {
  switch (answer.kind) {
    case 'accepted':
      return true
    case 'accepted-with-changes':
      return answer.changes.trim() !== ''
    case 'refused':
      return answer.reason.trim() !== ''
  }
}

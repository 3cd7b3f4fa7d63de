import { describe, expect, it } from 'vitest'
import { approvalRefusal, nextAwardState, type AwardEvent, type AwardState } from './award-state'

const eur = (amount: string) => ({ amount, currency: 'EUR' })
const proposed: AwardState = { phase: 'proposed', proposedBy: 'bea', comparisonHash: 'h1', total: eur('9500.000000') }
const approved: AwardState = { phase: 'approved', proposedBy: 'bea', approvedBy: 'hal', comparisonHash: 'h1' }
const ordered: AwardState = { phase: 'ordered', orderId: 'o1' }
const approval: Extract<AwardEvent, { type: 'approved' }> = {
  type: 'approved',
  by: 'hal',
  comparisonHash: 'h1',
  limit: eur('9500.000000'),
  total: eur('9500.000000'),
  offerValid: true,
  conflictOfInterest: false,
}

it('walks from the proposal to the acknowledgement; a limit covers its own amount', () => {
  const yes = nextAwardState(proposed, approval)!
  expect(yes).toEqual(approved)
  const order = nextAwardState(yes, { type: 'ordered', orderId: 'o1' })!
  expect(nextAwardState(order, { type: 'acknowledged', answer: { kind: 'accepted' } })?.phase).toBe('acknowledged')
})

it.each([proposed, approved])('makes a $phase award void when the comparison changes', (state) => {
  expect(nextAwardState(state, { type: 'comparison-changed', reason: 'rate' })).toEqual({ phase: 'void', reason: 'rate' })
})

describe('refuses an approval', () => {
  it.each([
    { why: 'comparison-changed', change: { comparisonHash: 'h0' } },
    { why: 'own-proposal', change: { by: 'bea' } },
    { why: 'conflict-of-interest', change: { conflictOfInterest: true } },
    { why: 'offer-expired', change: { offerValid: false } },
    { why: 'no-limit', change: { limit: null } },
    { why: 'limit-currency', change: { limit: { amount: '99999', currency: 'USD' } } },
    { why: 'over-limit', change: { limit: eur('9499.999999') } },
  ])('$why', ({ why, change }) => {
    expect(approvalRefusal(proposed, { ...approval, ...change })).toBe(why)
    expect(nextAwardState(proposed, { ...approval, ...change })).toBeNull()
  })

  it('of what is already approved', () => {
    expect(approvalRefusal(approved, approval)).toBe('not-proposed')
    expect(nextAwardState(approved, { ...approval, by: 'ida' })).toBeNull()
  })
})

describe('refuses', () => {
  it.each<{ name: string; state: AwardState; event: AwardEvent }>([
    { name: 'an order before approval', state: proposed, event: { type: 'ordered', orderId: 'o1' } },
    { name: 'a second order', state: ordered, event: { type: 'ordered', orderId: 'o2' } },
    { name: 'rejecting one’s own proposal', state: proposed, event: { type: 'rejected', by: 'bea', reason: 'x' } },
    { name: 'rejecting without a reason', state: proposed, event: { type: 'rejected', by: 'hal', reason: '' } },
    { name: 'rejecting what is approved', state: approved, event: { type: 'rejected', by: 'ida', reason: 'x' } },
    { name: 'voiding what is ordered', state: ordered, event: { type: 'comparison-changed', reason: 'rate' } },
    { name: 'an acknowledgement before the order', state: approved, event: { type: 'acknowledged', answer: { kind: 'accepted' } } },
    { name: 'changes that are not named', state: ordered, event: { type: 'acknowledged', answer: { kind: 'accepted-with-changes', changes: ' ' } } },
    { name: 'a refusal without a reason', state: ordered, event: { type: 'acknowledged', answer: { kind: 'refused', reason: '' } } },
  ])('$name', ({ state, event }) => {
    expect(nextAwardState(state, event)).toBeNull()
  })
})

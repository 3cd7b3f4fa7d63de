import { describe, expect, it } from 'vitest'
import { acceptsQuotations, nextRfqState, type RfqEvent, type RfqState } from './rfq-state'

const DUE = '2026-03-27T16:00:00.000Z'
const BEFORE = '2026-03-27T15:59:59.000Z'
const AFTER = '2026-03-27T16:00:01.000Z'
const preparing: RfqState = { phase: 'preparing' }
const issued: RfqState = { phase: 'issued', amendment: 0, dueAt: DUE }
const closed: RfqState = { phase: 'closed', amendment: 0, dueAt: DUE }
const opened: RfqState = { phase: 'opened', openedBy: ['bea', 'cy'] }
const awarded: RfqState = { phase: 'awarded', awardId: 'a1' }
const cancelled: RfqState = { phase: 'cancelled', reason: 'project stopped' }
const issue: RfqEvent = { type: 'issued', at: BEFORE, dueAt: DUE, lineCount: 1, invitationCount: 3 }

it('walks from preparing to awarded', () => {
  const out = nextRfqState(preparing, issue)!
  const shut = nextRfqState(out, { type: 'due', at: DUE })!
  const open = nextRfqState(shut, { type: 'opened', at: AFTER, by: ['bea', 'cy'] })!
  expect(nextRfqState(open, { type: 'awarded', awardId: 'a1' })).toEqual(awarded)
})

it('counts amendments and moves the due time later', () => {
  expect(nextRfqState(issued, { type: 'amended', at: BEFORE, dueAt: AFTER, reason: 'revision B' })).toEqual({ phase: 'issued', amendment: 1, dueAt: AFTER })
})

it('opens by the clock even before anything has marked it closed', () => {
  expect(nextRfqState(issued, { type: 'opened', at: DUE, by: ['bea', 'cy'] })?.phase).toBe('opened')
})

it.each([
  { at: BEFORE, accepted: true },
  { at: DUE, accepted: false },
  { at: AFTER, accepted: false },
])('accepts a quotation at $at: $accepted', ({ at, accepted }) => {
  expect(acceptsQuotations(issued, at)).toBe(accepted)
})

describe('refuses', () => {
  it.each<{ name: string; state: RfqState; event: RfqEvent }>([
    { name: 'issuing twice', state: issued, event: issue },
    { name: 'issuing without a line', state: preparing, event: { ...issue, lineCount: 0 } },
    { name: 'issuing to nobody', state: preparing, event: { ...issue, invitationCount: 0 } },
    { name: 'a due time in the past', state: preparing, event: { ...issue, at: AFTER } },
    { name: 'amending at the due time', state: issued, event: { type: 'amended', at: DUE, dueAt: AFTER, reason: 'x' } },
    { name: 'moving the due time earlier', state: issued, event: { type: 'amended', at: BEFORE, dueAt: BEFORE, reason: 'x' } },
    { name: 'amending without a reason', state: issued, event: { type: 'amended', at: BEFORE, dueAt: AFTER, reason: ' ' } },
    { name: 'amending what is closed', state: closed, event: { type: 'amended', at: BEFORE, dueAt: AFTER, reason: 'x' } },
    { name: 'closing before the due time', state: issued, event: { type: 'due', at: BEFORE } },
    { name: 'opening before the due time', state: issued, event: { type: 'opened', at: BEFORE, by: ['bea', 'cy'] } },
    { name: 'opening alone', state: closed, event: { type: 'opened', at: AFTER, by: ['bea', 'bea'] } },
    { name: 'opening twice', state: opened, event: { type: 'opened', at: AFTER, by: ['bea', 'cy'] } },
    { name: 'opening what is preparing', state: preparing, event: { type: 'opened', at: AFTER, by: ['bea', 'cy'] } },
    { name: 'awarding before opening', state: closed, event: { type: 'awarded', awardId: 'a1' } },
    { name: 'awarding twice', state: awarded, event: { type: 'awarded', awardId: 'a2' } },
    { name: 'cancelling what is awarded', state: awarded, event: { type: 'cancelled', reason: 'x' } },
    { name: 'cancelling twice', state: cancelled, event: { type: 'cancelled', reason: 'x' } },
    { name: 'cancelling without a reason', state: issued, event: { type: 'cancelled', reason: '' } },
  ])('$name', ({ state, event }) => {
    expect(nextRfqState(state, event)).toBeNull()
  })
})

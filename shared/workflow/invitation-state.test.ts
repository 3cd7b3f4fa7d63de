import { describe, expect, it } from 'vitest'
import { nextInvitationState, type InvitationEvent, type InvitationState } from './invitation-state'

const invited: InvitationState = { phase: 'invited' }
const seen: InvitationState = { phase: 'seen' }
const accepted: InvitationState = { phase: 'terms-accepted' }
const quoting: InvitationState = { phase: 'intends-to-quote' }
const declined: InvitationState = { phase: 'no-bid', reason: 'capacity', remark: '' }
const silent: InvitationState = { phase: 'no-answer' }
const decline: InvitationEvent = { type: 'declined', reason: 'capacity', remark: '' }

it('walks from invited to the intention to quote', () => {
  const s = nextInvitationState(invited, { type: 'seen' })!
  const t = nextInvitationState(s, { type: 'terms-accepted' })!
  expect(nextInvitationState(t, { type: 'intends-to-quote' })).toEqual(quoting)
})

it.each([invited, seen, accepted, quoting])('lets $phase decline', (state) => {
  expect(nextInvitationState(state, decline)).toEqual(declined)
})

it('lets who declined come back', () => {
  expect(nextInvitationState(declined, { type: 'intends-to-quote' })).toEqual(quoting)
})

it('keeps the reason of who declined when the due time passes', () => {
  expect(nextInvitationState(declined, { type: 'due-without-answer' })).toBeNull()
  expect(nextInvitationState(seen, { type: 'due-without-answer' })).toEqual(silent)
})

describe('refuses', () => {
  it.each<{ name: string; state: InvitationState; event: InvitationEvent }>([
    { name: 'being seen twice', state: seen, event: { type: 'seen' } },
    { name: 'accepting terms twice', state: accepted, event: { type: 'terms-accepted' } },
    { name: 'quoting before confidentiality', state: seen, event: { type: 'intends-to-quote' } },
    { name: 'declining twice', state: declined, event: decline },
    { name: 'declining after the due time', state: silent, event: decline },
    { name: 'another reason without a word', state: seen, event: { type: 'declined', reason: 'other', remark: ' ' } },
    { name: 'quoting after the due time', state: silent, event: { type: 'intends-to-quote' } },
  ])('$name', ({ state, event }) => {
    expect(nextInvitationState(state, event)).toBeNull()
  })
})

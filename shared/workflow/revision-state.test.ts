import { describe, expect, it } from 'vitest'
import { nextRevisionState, type RevisionEvent, type RevisionState } from './revision-state'

const draft: RevisionState = { phase: 'draft', draft: 'P1', authorId: 'ann' }
const inCheck: RevisionState = { phase: 'in-check', draft: 'P1', authorId: 'ann' }
const released: RevisionState = { phase: 'released', letter: 'A' }
const superseded: RevisionState = { phase: 'superseded', letter: 'A', by: 'B' }
const withdrawn: RevisionState = { phase: 'withdrawn', letter: 'A', reason: 'wrong core' }
const release: RevisionEvent = { type: 'released', checkerId: 'bo', letter: 'A', openErrors: 0 }

it('walks from draft to superseded', () => {
  const checked = nextRevisionState(draft, { type: 'sent-to-check' })!
  const out = nextRevisionState(checked, release)!
  expect(out).toEqual(released)
  expect(nextRevisionState(out, { type: 'superseded', by: 'B' })).toEqual(superseded)
})

it('goes on with the next draft after the checker sent it back', () => {
  expect(nextRevisionState(inCheck, { type: 'sent-back', reason: 'pins missing', nextDraft: 'P2' })).toEqual({ phase: 'draft', draft: 'P2', authorId: 'ann' })
})

describe('refuses', () => {
  it.each<{ name: string; state: RevisionState; event: RevisionEvent }>([
    { name: 'a check of what is in check', state: inCheck, event: { type: 'sent-to-check' } },
    { name: 'a check of a released revision', state: released, event: { type: 'sent-to-check' } },
    { name: 'sending back a draft', state: draft, event: { type: 'sent-back', reason: 'x', nextDraft: 'P2' } },
    { name: 'sending back without a reason', state: inCheck, event: { type: 'sent-back', reason: ' ', nextDraft: 'P2' } },
    { name: 'release of a draft nobody checked', state: draft, event: release },
    { name: 'release by the author', state: inCheck, event: { ...release, checkerId: 'ann' } },
    { name: 'release with an open error', state: inCheck, event: { ...release, openErrors: 1 } },
    { name: 'a second release', state: released, event: release },
    { name: 'superseding a draft', state: draft, event: { type: 'superseded', by: 'B' } },
    { name: 'superseding twice', state: superseded, event: { type: 'superseded', by: 'C' } },
    { name: 'withdrawing without a reason', state: released, event: { type: 'withdrawn', reason: '' } },
    { name: 'withdrawing what is superseded', state: superseded, event: { type: 'withdrawn', reason: 'x' } },
    { name: 'release of a withdrawn revision', state: withdrawn, event: release },
  ])('$name', ({ state, event }) => {
    expect(nextRevisionState(state, event)).toBeNull()
  })
})

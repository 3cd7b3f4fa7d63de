import { describe, expect, it } from 'vitest'
import { DISPOSITIONS, dispositionsFor, nextSampleSetState, type SampleSetEvent, type SampleSetState } from './sample-state'

const uploaded: SampleSetState = { phase: 'uploaded' }
const asked: SampleSetState = { phase: 'read', openQuestions: 2 }
const clear: SampleSetState = { phase: 'read', openQuestions: 0 }
const confirmed: SampleSetState = { phase: 'confirmed' }
const judged: SampleSetState = { phase: 'judged', verdict: 'not-met' }
const disposed: SampleSetState = { phase: 'disposed', disposition: 'rejected', verdict: 'not-met' }
const superseded: SampleSetState = { phase: 'superseded', verdict: null }
const reject: SampleSetEvent = { type: 'disposed', disposition: 'rejected', reason: 'leakage', personId: 'qe', uploadedById: 'tt' }

it('walks from the upload to the disposition', () => {
  const read = nextSampleSetState(uploaded, { type: 'read', openQuestions: 2 })!
  const answered = nextSampleSetState(read, { type: 'answered', openQuestions: 0 })!
  const sure = nextSampleSetState(answered, { type: 'confirmed' })!
  const done = nextSampleSetState(sure, { type: 'judged', verdict: 'not-met' })!
  expect(nextSampleSetState(done, reject)).toEqual(disposed)
})

it.each([
  { state: clear, verdict: null },
  { state: judged, verdict: 'not-met' },
])('keeps the verdict of a superseded set: $verdict', ({ state, verdict }) => {
  expect(nextSampleSetState(state, { type: 'superseded' })).toEqual({ phase: 'superseded', verdict })
})

it('accepts plainly only what meets its limits', () => {
  expect(dispositionsFor('met')).toContain('accepted')
  expect(dispositionsFor('not-met')).not.toContain('accepted')
})

it('never accepts a set whose evidence is missing', () => {
  expect(dispositionsFor('not-evidenced').filter((d) => d.startsWith('accepted') || d === 'change-drawing')).toEqual([])
  expect(DISPOSITIONS).toEqual(expect.arrayContaining([...dispositionsFor('not-evidenced')]))
})

describe('refuses', () => {
  it.each<{ name: string; state: SampleSetState; event: SampleSetEvent }>([
    { name: 'reading twice', state: clear, event: { type: 'read', openQuestions: 0 } },
    { name: 'answering what is confirmed', state: confirmed, event: { type: 'answered', openQuestions: 0 } },
    { name: 'confirming with open questions', state: asked, event: { type: 'confirmed' } },
    { name: 'confirming before reading', state: uploaded, event: { type: 'confirmed' } },
    { name: 'judging before confirmation', state: clear, event: { type: 'judged', verdict: 'met' } },
    { name: 'a disposition before judging', state: confirmed, event: reject },
    { name: 'a disposition without a reason', state: judged, event: { ...reject, reason: ' ' } },
    { name: 'a disposition by who handed it in', state: judged, event: { ...reject, personId: 'tt' } },
    { name: 'plain acceptance of what fails', state: judged, event: { ...reject, disposition: 'accepted' } },
    { name: 'acceptance of what is incomplete', state: { phase: 'judged', verdict: 'not-evidenced' }, event: { ...reject, disposition: 'accepted' } },
    { name: 'a second disposition', state: disposed, event: reject },
    { name: 'superseding what has its disposition', state: disposed, event: { type: 'superseded' } },
    { name: 'superseding twice', state: superseded, event: { type: 'superseded' } },
  ])('$name', ({ state, event }) => {
    expect(nextSampleSetState(state, event)).toBeNull()
  })
})

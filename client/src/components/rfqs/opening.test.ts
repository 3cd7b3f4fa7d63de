import { describe, expect, it } from 'vitest'
import { exampleRfq } from '../../../../tests/support/rfq-example'
import { openingAct, openingNote } from './opening'

const issued = exampleRfq({ state: 'issued', issuedAt: '2026-03-01T08:00:00.000Z' })
const asked = { ...issued, openingAskedAt: '2026-03-27T17:00:00.000Z', openingAskedBy: { id: 'b', name: 'B. Buyer' } }
const buyer = { id: 'b', roles: ['buyer'] as const }
const both = { id: 'b', roles: ['buyer', 'approver'] as const }
const quality = { id: 'q', roles: ['quality'] as const }
const checker = { id: 'c', roles: ['checker'] as const }

describe('openingAct', () => {
  it.each([
    { name: 'a buyer before the due time', rfq: issued, person: buyer, isDue: false, act: null },
    { name: 'a buyer after it', rfq: issued, person: buyer, isDue: true, act: 'ask' },
    { name: 'quality before a buyer has asked', rfq: issued, person: quality, isDue: true, act: null },
    { name: 'quality after a buyer has asked', rfq: asked, person: quality, isDue: true, act: 'open' },
    { name: 'the one who asked, whatever else the person is', rfq: asked, person: both, isDue: true, act: null },
    { name: 'a checker', rfq: asked, person: checker, isDue: true, act: null },
    { name: 'anybody at a cancelled enquiry', rfq: { ...asked, state: 'cancelled' as const }, person: quality, isDue: true, act: null },
  ])('$name: $act', ({ rfq, person, isDue, act }) => {
    expect(openingAct(rfq, person, isDue)).toBe(act)
  })
})

describe('openingNote', () => {
  it('says to the one who asked that somebody else opens', () => {
    expect(openingNote(asked, both, true)).toMatch(/^You asked for the opening\. Somebody else/)
  })

  it('says to a second person that it is theirs, and to others whose it is', () => {
    expect(openingNote(asked, quality, true)).toMatch(/^B\. Buyer asked for the opening\. You are the second person/)
    expect(openingNote(asked, checker, true)).toMatch(/^B\. Buyer asked for the opening\. Somebody who is approver/)
  })

  it('says nothing where nothing is sealed', () => {
    expect(openingNote({ ...asked, state: 'opened' }, quality, true)).toBe('')
  })
})

import { describe, expect, it } from 'vitest'
import { isSealed, nextQuotationState, type QuotationEvent, type QuotationState } from './quotation-state'

const draft: QuotationState = { phase: 'draft' }
const submitted: QuotationState = { phase: 'submitted', revision: 1, validUntil: '2026-06-30' }
const superseded: QuotationState = { phase: 'superseded', revision: 1, by: 2 }
const withdrawn: QuotationState = { phase: 'withdrawn', revision: 1 }
const expired: QuotationState = { phase: 'expired', revision: 1, validUntil: '2026-06-30' }
const submit: QuotationEvent = { type: 'submitted', revision: 1, validUntil: '2026-06-30', on: '2026-03-01', rfqOpen: true }

it('is submitted, superseded by a later revision, and never overwritten', () => {
  expect(nextQuotationState(draft, submit)).toEqual(submitted)
  expect(nextQuotationState(submitted, { type: 'superseded', by: 2 })).toEqual(superseded)
})

it('is valid on its last day and expired on the next', () => {
  expect(nextQuotationState(submitted, { type: 'validity-checked', on: '2026-06-30' })).toBeNull()
  expect(nextQuotationState(submitted, { type: 'validity-checked', on: '2026-07-01' })).toEqual(expired)
})

it('lives again by a stored extension', () => {
  expect(nextQuotationState(expired, { type: 'validity-extended', until: '2026-08-31' })).toEqual({ ...submitted, validUntil: '2026-08-31' })
})

it.each([
  ['preparing', true],
  ['issued', true],
  ['closed', true],
  ['cancelled', true],
  ['opened', false],
  ['awarded', false],
] as const)('is sealed while the RFQ is %s: %s', (phase, sealed) => {
  expect(isSealed(phase)).toBe(sealed)
})

describe('refuses', () => {
  it.each<{ name: string; state: QuotationState; event: QuotationEvent }>([
    { name: 'a late submission', state: draft, event: { ...submit, rfqOpen: false } },
    { name: 'a validity that ended before it began', state: draft, event: { ...submit, on: '2026-07-01' } },
    { name: 'submitting the same revision twice', state: submitted, event: submit },
    { name: 'superseding by an earlier revision', state: submitted, event: { type: 'superseded', by: 1 } },
    { name: 'superseding what is withdrawn', state: withdrawn, event: { type: 'superseded', by: 2 } },
    { name: 'withdrawing after the due time', state: submitted, event: { type: 'withdrawn', rfqOpen: false } },
    { name: 'withdrawing what is superseded', state: superseded, event: { type: 'withdrawn', rfqOpen: true } },
    { name: 'shortening the validity', state: submitted, event: { type: 'validity-extended', until: '2026-06-29' } },
    { name: 'extending what is withdrawn', state: withdrawn, event: { type: 'validity-extended', until: '2026-12-31' } },
  ])('$name', ({ state, event }) => {
    expect(nextQuotationState(state, event)).toBeNull()
  })
})

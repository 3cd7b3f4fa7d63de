import { describe, expect, it } from 'vitest'
import { offeredActions } from './revision-actions'

const inCheck = { state: 'in-check', editors: [{ id: 'eve' }], openElsewhere: false } as const

describe('offeredActions', () => {
  it('offers release to a checker who did not work on the draft', () => {
    expect(offeredActions({ id: 'chris', roles: ['checker'] }, inCheck)).toEqual({ actions: ['release', 'send-back', 'let-pass'], explanation: null })
  })

  it('tells a checker who did why nothing is offered', () => {
    const { actions, explanation } = offeredActions({ id: 'eve', roles: ['engineer', 'checker'] }, inCheck)
    expect(actions).toEqual([])
    expect(explanation).toMatch(/somebody else/)
  })

  it('lets quality only answer a check', () => {
    expect(offeredActions({ id: 'quinn', roles: ['quality'] }, inCheck).actions).toEqual(['let-pass'])
  })

  it('offers an engineer the next draft only while none is open', () => {
    const released = { state: 'released', editors: [], openElsewhere: false } as const
    expect(offeredActions({ id: 'eve', roles: ['engineer'] }, released).actions).toEqual(['next-draft'])
    expect(offeredActions({ id: 'eve', roles: ['engineer'] }, { ...released, openElsewhere: true }).explanation).toMatch(/open already/)
  })

  it('offers a buyer nothing at all', () => {
    for (const state of ['draft', 'in-check', 'released', 'superseded', 'withdrawn'] as const) {
      expect(offeredActions({ id: 'bea', roles: ['buyer'] }, { ...inCheck, state }).actions).toEqual([])
    }
  })
})

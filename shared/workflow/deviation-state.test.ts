import { describe, expect, it } from 'vitest'
import { nextDeviationState, type DeviationEvent, type DeviationState } from './deviation-state'

const proposed: DeviationState = { phase: 'proposed' }
const recalculated: DeviationState = { phase: 'recalculated', setHash: 'both' }
const accepted: DeviationState = { phase: 'accepted', setHash: 'both', condition: null }

it('is accepted on the calculation of the set it belongs to', () => {
  expect(nextDeviationState(proposed, { type: 'recalculated', setHash: 'both' })).toEqual(recalculated)
  expect(nextDeviationState(recalculated, { type: 'accepted', setHash: 'both', condition: null })).toEqual(accepted)
})

describe('refuses', () => {
  it.each<{ name: string; state: DeviationState; event: DeviationEvent }>([
    { name: 'acceptance without a calculation', state: proposed, event: { type: 'accepted', setHash: 'both', condition: null } },
    { name: 'acceptance on the calculation of another set', state: recalculated, event: { type: 'accepted', setHash: 'alone', condition: null } },
    { name: 'recalculating what is decided', state: accepted, event: { type: 'recalculated', setHash: 'x' } },
    { name: 'rejection without a reason', state: proposed, event: { type: 'rejected', reason: '' } },
    { name: 'rejection of what is accepted', state: accepted, event: { type: 'rejected', reason: 'x' } },
  ])('$name', ({ state, event }) => {
    expect(nextDeviationState(state, event)).toBeNull()
  })
})

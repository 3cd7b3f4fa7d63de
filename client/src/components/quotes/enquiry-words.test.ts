import { describe, expect, it } from 'vitest'
import { isAnswered, ownAnswer } from './enquiry-words'

describe('ownAnswer', () => {
  it.each([
    ['invited', null, 'Not looked at yet', false],
    ['terms-accepted', null, 'Confidentiality accepted', false],
    ['no-bid', { revision: 1, state: 'withdrawn' }, 'Declined', true],
    ['intends-to-quote', { revision: 2, state: 'submitted' }, 'Revision 2 submitted', true],
    ['intends-to-quote', { revision: 2, state: 'withdrawn' }, 'Revision 2 withdrawn', false],
  ] as const)('of an invitation that is %s with %j is “%s”', (invitationState, quotation, text, answered) => {
    const row = { invitationState, quotation: quotation && { ...quotation } }
    expect([ownAnswer(row), isAnswered(row)]).toEqual([text, answered])
  })
})

import { describe, expect, it } from 'vitest'
import { rfqInputSchema } from '#shared/contracts/rfqs'
import { exampleRfq } from '../../../../tests/support/rfq-example'
import { differences, emptyLine, entryOf, inputOf, isShownPath } from './rfq-form'

const ID = '0190b6a4-0000-7000-8000-000000000001'
const HOME = { currency: 'EUR' }
const stored = () => exampleRfq({ invitations: exampleRfq().invitations.map((row) => ({ ...row, vendorCompanyId: ID })), lines: exampleRfq().lines.map((line) => ({ ...line, release: { ...line.release, id: ID } })) })

describe('the form of an enquiry', () => {
  it('sends back what was stored when nothing was typed', () => {
    const rfq = stored()
    const input = inputOf(entryOf(rfq, HOME))
    expect(rfqInputSchema.parse(input)).toEqual(input)
    expect(input).toMatchObject({ title: rfq.title, dueAt: rfq.dueAt, dueZone: rfq.dueZone, terms: rfq.terms, vendorCompanyIds: [ID] })
    expect(input.lines).toEqual([{ releaseId: ID, quantities: [500, 5000], orderQuantity: 2000, annualQuantity: null, sampleQuantity: 5 }])
  })

  it('is refused at each entry left empty, in words, with the sentence at that entry', () => {
    const entry = { ...entryOf(null, HOME), validityDays: null, lines: [{ ...emptyLine(), quantities: [null], orderQuantity: null }] }
    const { issues } = rfqInputSchema.safeParse(inputOf(entry)).error!
    const found = Object.fromEntries(issues.map(({ path, message }) => [path.join('.'), message]))
    expect(Object.keys(found).every(isShownPath)).toBe(true)
    expect(found).toMatchObject({
      title: 'The title is missing.',
      dueAt: 'Give the due date and time with its zone.',
      deliveryPlace: 'The named place is missing.',
      'terms.validityDays': 'Enter at least one day.',
      'lines.0.releaseId': 'Choose a released revision.',
      'lines.0.quantities.0': 'Enter at least one piece.',
      'lines.0.orderQuantity': 'Enter at least one piece.',
    })
  })

  it('begins with the currency of the company', () => {
    expect(entryOf(null, { currency: 'GBP' }).currency).toBe('GBP')
  })
})

describe('differences', () => {
  it('names what a colleague changed, in the words of the form', () => {
    const mine = entryOf(stored(), HOME)
    const theirs = entryOf({ ...stored(), version: 4, title: 'Another', deliveryRule: 'DDP' }, HOME)
    expect(differences(mine, theirs)).toEqual(['title', 'delivery rule'])
  })

  it('takes the order of vendors and the keys of lines for no difference', () => {
    const mine = { ...entryOf(stored(), HOME), vendorCompanyIds: ['a', 'b'] }
    const theirs = { ...mine, vendorCompanyIds: ['b', 'a'], lines: mine.lines.map((line) => ({ ...line, key: 7 })) }
    expect(differences(mine, theirs)).toEqual([])
  })
})

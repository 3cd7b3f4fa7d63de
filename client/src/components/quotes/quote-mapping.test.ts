import { describe, expect, it } from 'vitest'
import { quoteDraftSchema, type Quote } from '#shared/contracts/quotes'
import { fromDraftForm, toDraftForm } from './quote-draft'
import { blankQuote, quoteEntryOf, type AskedEnquiry, type LineEntry, type QuoteEntry } from './quote-entry'
import { candidateOf, hintedOffer, readQuote, textsByPath } from './quote-input'

const [A, B] = ['0b7c1d1e-4a55-4c1f-9d7e-000000000001', '0b7c1d1e-4a55-4c1f-9d7e-000000000002']
const LINE_IDS = [A, B]

const askedLine = (id: string, sampleQuantity: number) => ({ id, quantities: [1000, 5000], sampleQuantity }) as AskedEnquiry['lines'][number]
const asked = { currency: 'EUR', deliveryRule: 'DAP', deliveryPlace: 'Brightmoor', terms: { paymentTerms: '30 days net', validityDays: 60 }, lines: [askedLine(A, 5), askedLine(B, 0)] } as unknown as AskedEnquiry

function filledLine(change: Partial<LineEntry> = {}): LineEntry {
  return {
    ...blankQuote(asked).lines[A]!,
    breaks: [{ fromQuantity: 1000, price: '118.50' }, { fromQuantity: 5000, price: '109' }],
    priceUnit: 100,
    oneTime: 'amount',
    oneTimeCost: '3500',
    oneTimeCostText: 'Mould',
    samples: 'included',
    sampleLeadTimeDays: 21,
    firstOrderLeadTimeDays: 42,
    minimumOrderQuantity: 1000,
    ...change,
  }
}

const filled = (line: Partial<LineEntry> = {}): QuoteEntry => ({
  ...blankQuote(asked),
  vendorReference: 'Q-1',
  validUntil: '2027-01-31',
  lines: { [A]: filledLine(line), [B]: { ...filledLine(), quoted: false } },
})

const fieldsOf = (entry: QuoteEntry, revision = 1) => {
  const reading = readQuote(entry, LINE_IDS, { revision })
  return reading.kind === 'problems' ? reading.fields : {}
}

describe('blankQuote', () => {
  it('begins with the quantities and terms that are asked for and leaves every price open', () => {
    const entry = blankQuote(asked)
    expect(entry.lines[A]!.breaks).toEqual([{ fromQuantity: 1000, price: null }, { fromQuantity: 5000, price: null }])
    expect([entry.currency, entry.deliveryRule, entry.deliveryPlace, entry.paymentTerms]).toEqual(['EUR', 'DAP', 'Brightmoor', '30 days net'])
    expect([entry.lines[A]!.samples, entry.lines[B]!.samples]).toEqual(['', 'not-quoted'])
  })
})

describe('readQuote', () => {
  it('hands over exactly what the contract takes, with the quoted parts only', () => {
    const reading = readQuote(filled(), LINE_IDS, { revision: 1 })
    expect(reading).toMatchObject({ kind: 'complete', input: { vendorReference: 'Q-1', validUntil: '2027-01-31' } })
    const { lines } = (reading as Extract<typeof reading, { kind: 'complete' }>).input
    expect(lines).toHaveLength(1)
    expect(lines[0]).toEqual({
      lineId: A,
      priceUnit: 100,
      priceBreaks: [{ fromQuantity: 1000, price: '118.50' }, { fromQuantity: 5000, price: '109' }],
      oneTimeCost: '3500',
      oneTimeCostText: 'Mould',
      samplesPrice: '0',
      sampleLeadTimeDays: 21,
      firstOrderLeadTimeDays: 42,
      repeatLeadTimeDays: null,
      minimumOrderQuantity: 1000,
      packQuantity: null,
      countryOfOrigin: null,
    })
  })

  it.each([
    ['an amount', { oneTime: 'amount', oneTimeCost: '3500' }, '3500'],
    ['included', { oneTime: 'included', oneTimeCost: '3500' }, '0'],
    ['not quoted', { oneTime: 'not-quoted', oneTimeCost: '3500' }, null],
  ] as const)('keeps %s apart from the other two answers about one-time cost', (_, change, sent) => {
    expect(candidateOf(filled(change), LINE_IDS).lines[0]!.oneTimeCost).toBe(sent)
  })

  it.each([
    ['no answer about one-time cost', { oneTime: '' }, 'lines.0.oneTimeCost', /included in the price or not quoted/],
    ['an amount without figure', { oneTime: 'amount', oneTimeCost: null }, 'lines.0.oneTimeCost', /missing/],
    ['no answer about samples', { samples: '' }, 'lines.0.samplesPrice', /free of charge/],
    ['a break without price', { breaks: [{ fromQuantity: 1000, price: null }] }, 'lines.0.priceBreaks.0.price', /missing/],
    ['breaks out of order', { breaks: [{ fromQuantity: 5000, price: '1' }, { fromQuantity: 1000, price: '2' }] }, 'lines.0.priceBreaks', /must rise/],
    ['no lead time', { firstOrderLeadTimeDays: null }, 'lines.0.firstOrderLeadTimeDays', /days/],
  ] as const)('says at its entry that there is %s', (_, change, path, sentence) => {
    expect(fieldsOf(filled(change as Partial<LineEntry>))[path]).toMatch(sentence)
  })

  it('counts the paths by the quoted parts, as the server does', () => {
    const entry = filled()
    const second = { ...entry, lines: { [A]: { ...entry.lines[A]!, quoted: false }, [B]: filledLine({ minimumOrderQuantity: null }) } }
    expect(Object.keys(fieldsOf(second))).toEqual(['lines.0.minimumOrderQuantity'])
  })

  it('wants a reason from the second revision on', () => {
    expect(fieldsOf(filled(), 2).reason).toMatch(/why/)
    expect(readQuote({ ...filled(), reason: 'Own error' }, LINE_IDS, { revision: 2 }).kind).toBe('complete')
  })
})

describe('the kept form', () => {
  it('is flat, fits the contract and comes back as it was typed', () => {
    const entry = filled({ samples: 'amount', samplesPrice: null, countryOfOrigin: 'DE' })
    const form = toDraftForm(entry)
    expect(quoteDraftSchema.safeParse({ form }).error).toBeUndefined()
    expect(fromDraftForm(JSON.parse(JSON.stringify(form)), blankQuote(asked))).toEqual(entry)
  })

  it('keeps added and removed price breaks', () => {
    const rows = [{ fromQuantity: 1, price: '9.85' }, { fromQuantity: null, price: null }, { fromQuantity: 10_000, price: '1.2' }]
    expect(fromDraftForm(toDraftForm(filled({ breaks: rows })), blankQuote(asked)).lines[A]!.breaks).toEqual(rows)
    expect(fromDraftForm(toDraftForm(filled({ breaks: rows.slice(2) })), blankQuote(asked)).lines[A]!.breaks).toEqual(rows.slice(2))
  })

  it('passes over what is of another kind or unknown', () => {
    const start = blankQuote(asked)
    const form = { currency: 7, [`lines.${A}.priceUnit`]: 12, [`lines.${A}.oneTime`]: 'free', [`lines.${A}.quoted`]: 'yes', 'lines.gone.quoted': true, colour: 'red' }
    expect(fromDraftForm(form, start)).toEqual(start)
  })
})

describe('quoteEntryOf', () => {
  const line = { id: 'q', lineId: A, priceUnit: 1, priceBreaks: [{ fromQuantity: 1000, price: '1.410000', unitPrice: '1.41' }], oneTimeCost: '0.000000', oneTimeCostText: '', samplesPrice: null, sampleLeadTimeDays: null, firstOrderLeadTimeDays: 42, repeatLeadTimeDays: null, minimumOrderQuantity: 1000, packQuantity: null, countryOfOrigin: null }
  const quote = { vendorReference: 'Q-9', reason: 'first', currency: 'USD', deliveryRule: 'FCA', deliveryPlace: 'Tamsen', paymentTerms: 'net', paymentDays: 30, validUntil: '2027-01-31', remarks: '', lines: [line] } as unknown as Quote

  it('begins the next revision with the one before, parts left out stay left out, the reason is open', () => {
    const entry = quoteEntryOf(quote, asked)
    expect(entry).toMatchObject({ vendorReference: 'Q-9', currency: 'USD', reason: '' })
    expect(entry.lines[A]).toMatchObject({ quoted: true, oneTime: 'included', samples: 'not-quoted', breaks: [{ fromQuantity: 1000, price: '1.41' }] })
    expect(entry.lines[B]!.quoted).toBe(false)
    expect(readQuote({ ...entry, reason: 'cheaper wire' }, LINE_IDS, { revision: 2 }).kind).toBe('complete')
  })
})

describe('hints while typing', () => {
  it('collect their sentences by entry', () => {
    const hint = (message: string) => ({ code: 'x', path: 'currency', message })
    expect(textsByPath([hint('one'), hint('two')])).toEqual({ currency: ['one', 'two'] })
    expect(hintedOffer(blankQuote(asked), LINE_IDS, '2026-12-01T00:00:00Z')).toMatchObject({ validUntil: null, lines: [{ minimumOrderQuantity: null }, {}] })
  })
})

import { mount, RouterLinkStub } from '@vue/test-utils'
import PrimeVue from 'primevue/config'
import { describe, expect, it } from 'vitest'
import type { Quote } from '#shared/contracts/quotes'
import type { QueryState } from '@/components/base/query-state'
import { exampleQuote, exampleRfq } from '../../../../tests/support/rfq-example'
import RfqSheet from './RfqSheet.vue'

const opened = exampleRfq({ state: 'opened', issuedAt: '2026-03-01T08:00:00.000Z', openedAt: '2026-03-27T17:10:00.000Z', openedBy: { id: 'q', name: 'Q. Quality' } })
const waiting: QueryState<Quote[]> = { status: 'pending', error: null }

const show = (quotes: QueryState<Quote[]>, { rfq = opened, readsPrices = true } = {}) =>
  mount(RfqSheet, {
    global: { plugins: [PrimeVue], stubs: { RouterLink: RouterLinkStub } },
    props: { rfq, isDue: true, note: '', zone: 'Europe/Berlin', readsPrices, quotes, busyQuote: null },
  })

describe('the quotations on an enquiry’s sheet', () => {
  it('wait', () => {
    expect(show(waiting).find('.winding-wait').exists()).toBe(true)
  })

  it('say what failed and are fetched again', async () => {
    const sheet = show({ status: 'error', error: new Error('The server could not be reached.') })
    expect(sheet.get('[role=alert]').text()).toContain('The server could not be reached.')
    await sheet.get('[role=alert] button').trigger('click')
    expect(sheet.emitted('retry')).toHaveLength(1)
  })

  it('say when none came', () => {
    expect(show({ status: 'success', error: null, data: [] }).text()).toContain('No quotation was submitted.')
  })

  it('stand side by side when they came', () => {
    const sheet = show({ status: 'success', error: null, data: [exampleQuote(), exampleQuote({ id: 'b', vendorName: 'Tamsen Coilwork', lines: [] })] })
    const prices = sheet.get('[aria-label="Quotations for BM-T-4711"]')
    expect(prices.text()).toMatch(/Unit price at 5000\spcs\s*1\.09\sUSD\s*not quoted/)
  })

  it('are not asked about and not shown to who reads no prices', () => {
    const sheet = show({ status: 'success', error: null, data: [exampleQuote()] }, { readsPrices: false })
    expect(sheet.text()).toContain('Prices are read by purchasing.')
    expect(sheet.text()).not.toMatch(/USD|Q-4711/)
  })

  it('stay sealed before the opening, whatever was fetched', () => {
    const sheet = show({ status: 'success', error: null, data: [exampleQuote()] }, { rfq: exampleRfq({ state: 'closed', issuedAt: '2026-03-01T08:00:00.000Z' }) })
    expect(sheet.text()).toContain('Quotations stay sealed until the opening')
    expect(sheet.text()).not.toMatch(/USD|Q-4711/)
  })
})

import { PiniaColada } from '@pinia/colada'
import { flushPromises, mount } from '@vue/test-utils'
import { createPinia, setActivePinia } from 'pinia'
import PrimeVue from 'primevue/config'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import type { Component } from 'vue'
import { createMemoryHistory, createRouter } from 'vue-router'
import type { SessionPerson } from '#shared/contracts/people'
import { useSessionStore } from '@/stores/session'
import EnquiriesView from './EnquiriesView.vue'
import EnquiryView from './EnquiryView.vue'

const ID = '0b7c1d1e-4a55-4c1f-9d7e-000000000001'
const LINE = '0b7c1d1e-4a55-4c1f-9d7e-000000000002'
const NOW = '2026-03-27T15:00:00.000Z'

const terms = { paymentTerms: '30 days net', packing: '', quality: '', compliance: '', awardBasis: '', general: '', validityDays: 60, samplesNeededOn: null, questionsUntil: null }
const release = { id: ID, specificationId: ID, current: true, revision: 'A', issuedOn: '2026-01-15', specificationSha256: 'ab', pdfSha256: 'cd', partNumber: 'BM-T-1', title: 'Transformer', engine: '1' }
const enquiry = {
  ...{ id: ID, invitationId: ID, number: 'RFQ-26-ABCDE', title: 'Transformers', customerName: 'Brightmoor Power Works', buyerName: 'B. Buyer', buyerEmail: 'buyer@brightmoor.example' },
  ...{ state: 'open', invitationState: 'terms-accepted', issueNumber: 1, issuedAt: NOW, dueAt: '2026-03-27T16:00:00.000Z', dueZone: 'Europe/Berlin', now: NOW, currency: 'EUR' },
  ...{ deliveryRule: 'DAP', deliveryPlace: 'Brightmoor', terms, confidentialityText: 'Keep it to yourselves.', termsAcceptedAt: NOW, noBidReason: null, noBidText: '', quotation: null },
  lines: [{ id: LINE, position: 1, release, quantities: [1000, 5000], orderQuantity: 5000, annualQuantity: null, sampleQuantity: 5 }],
}

const answers = new Map<string, () => Promise<Response>>()
const json = (body: unknown, status = 200) => async () => new Response(JSON.stringify(body), { status })

async function show(view: Component, props: object = {}) {
  const pinia = createPinia()
  setActivePinia(pinia)
  useSessionStore().start({ id: 'p1', roles: ['vendor'], company: { timeZone: 'Asia/Taipei' } } as unknown as SessionPerson)
  const router = createRouter({ history: createMemoryHistory(), routes: [{ path: '/', component: { template: '<i/>' } }, { path: '/enquiries/:rfqId', name: 'enquiry', component: { template: '<i/>' } }] })
  await router.push('/')
  return mount(view, { props, global: { plugins: [router, pinia, PiniaColada, PrimeVue] }, attachTo: document.body })
}

beforeEach(() => {
  sessionStorage.clear()
  answers.clear()
  vi.stubGlobal('fetch', (address: string) => answers.get(address)?.() ?? new Promise(() => undefined))
})
afterEach(() => {
  vi.unstubAllGlobals()
  document.body.innerHTML = ''
})

describe('the list of enquiries', () => {
  const LIST = '/api/vendor/rfqs'

  it('waits, then says that there is none', async () => {
    answers.set(LIST, json([]))
    const view = await show(EnquiriesView)
    expect(view.find('[role=status]').text()).toContain('Fetching')
    await flushPromises()
    expect(view.text()).toContain('No customer has sent your company an enquiry yet.')
  })

  it('says why it failed and can be asked again', async () => {
    answers.set(LIST, json({ code: 'internal', message: 'Something broke here.' }, 500))
    const view = await show(EnquiriesView)
    await flushPromises()
    expect(view.find('[role=alert]').text()).toContain('Something broke here.')
    answers.set(LIST, json([enquiry]))
    await view.find('[role=alert] button').trigger('click')
    await flushPromises()
    expect(view.text()).toContain('RFQ-26-ABCDE')
  })

  it('shows number, customer, due moment in the own zone and the own answer', async () => {
    answers.set(LIST, json([enquiry]))
    const view = await show(EnquiriesView)
    await flushPromises()
    for (const text of ['RFQ-26-ABCDE', 'Transformers', 'Brightmoor Power Works', '2026-03-28 00:00 +08:00', 'Open for quotations', 'Confidentiality accepted']) expect(view.text()).toContain(text)
  })
})

describe('one enquiry', () => {
  const ONE = `/api/vendor/rfqs/${ID}`
  const open = (change: object = {}) => {
    answers.set(ONE, json({ ...enquiry, ...change }))
    answers.set(`${ONE}/quote`, json({ draft: null, submitted: [] }))
    return show(EnquiryView, { rfqId: ID })
  }

  it('waits, and shows the same sentence for an absent one as the server gives', async () => {
    answers.set(ONE, json({ code: 'not-found', message: 'There is no such enquiry.' }, 404))
    const view = await show(EnquiryView, { rfqId: ID })
    expect(view.find('[role=status]').text()).toContain('Fetching')
    await flushPromises()
    expect(view.find('[role=alert]').text()).toBe('There is no such enquiry.')
  })

  it('shows the due moment in both zones and what is left by the server’s clock', async () => {
    const view = await open()
    await flushPromises()
    expect(view.text()).toContain('2026-03-28 00:00 +08:00 (Asia/Taipei)')
    expect(view.text()).toContain('2026-03-27 17:00 +01:00 (Europe/Berlin)')
    expect(view.find('[role=timer]').text()).toMatch(/^(1 h 0 min|59 min \d+ s)$/)
  })

  it('keeps parts and form shut until confidentiality is accepted', async () => {
    const view = await open({ termsAcceptedAt: null, terms: null, lines: [], invitationState: 'seen' })
    await flushPromises()
    expect(view.text()).toContain('Keep it to yourselves.')
    expect(view.text()).not.toContain('Your quotation')
  })

  it('offers the form while it is open, and a sentence instead once it is not', async () => {
    const view = await open()
    await flushPromises()
    expect(view.text()).toContain('Check and submit revision 1')
    view.unmount()
    const closed = await open({ state: 'closed' })
    await flushPromises()
    expect(closed.text()).toContain('The due time has passed.')
    expect(closed.text()).toContain('Your company submitted no quotation.')
    expect(closed.text()).not.toContain('Check and submit')
    expect(closed.text()).not.toContain('Decline with a reason')
  })

  it('says the reason of a declined one in words', async () => {
    const view = await open({ invitationState: 'no-bid', noBidReason: 'capacity', noBidText: 'Full until March' })
    await flushPromises()
    expect(view.text()).toContain('No capacity in the time asked for. Full until March')
    expect(view.text()).not.toContain('Check and submit')
  })
})

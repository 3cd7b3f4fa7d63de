import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { effectScope, nextTick, type EffectScope } from 'vue'
import { ApiError, noConnection } from '@/api/api-error'
import { toDraftForm } from '@/components/quotes/quote-draft'
import type { QuoteEntry } from '@/components/quotes/quote-entry'
import { useQuoteDraft } from './useQuoteDraft'

const start = (): QuoteEntry => ({ vendorReference: '', reason: '', currency: 'EUR', deliveryRule: 'DAP', deliveryPlace: 'Brightmoor', paymentTerms: '', paymentDays: null, validUntil: null, remarks: '', lines: {} })
const stored = (version: number, change: Partial<QuoteEntry> = {}) => ({ version, form: toDraftForm({ ...start(), ...change }), updatedAt: '2026-12-01T10:00:00Z' })
const stale = () => new ApiError({ code: 'stale-version', message: 'stale' })

let scope: EffectScope
const save = vi.fn()
const load = vi.fn()

function begin(initial: ReturnType<typeof stored> | null = null) {
  scope = effectScope()
  return scope.run(() => useQuoteDraft(start(), initial, { personId: 'p1', rfqId: 'r1' }, { save, load }))!
}
const pause = async () => {
  await nextTick()
  await vi.advanceTimersByTimeAsync(1500)
}

beforeEach(() => {
  vi.useFakeTimers()
  sessionStorage.clear()
  save.mockReset().mockImplementation(async (version: number, form) => ({ draft: { version: version + 1, form, updatedAt: '2026-12-01T11:00:00Z' } }))
  load.mockReset()
})
afterEach(() => {
  scope.stop()
  vi.useRealTimers()
})

describe('useQuoteDraft', () => {
  it('stores nothing before anything is typed', async () => {
    const draft = begin()
    await pause()
    expect(save).not.toHaveBeenCalled()
    expect(draft.state.value).toBe('untouched')
    expect(await draft.flush()).toBe(true)
  })

  it('stores after a pause, each time from the version before', async () => {
    const draft = begin(stored(4))
    draft.entry.value.remarks = 'a'
    await pause()
    draft.entry.value.remarks = 'ab'
    await pause()
    expect(save.mock.calls.map(([version, form]) => [version, form.remarks])).toEqual([[4, 'a'], [5, 'ab']])
    expect(draft.state.value).toBe('stored')
  })

  it('keeps in the tab what is not stored yet, for a reload', async () => {
    save.mockRejectedValue(noConnection())
    const draft = begin()
    draft.entry.value.remarks = 'typed'
    await pause()
    expect(draft.state.value).toBe('failed')
    scope.stop()
    save.mockReset().mockResolvedValue({ draft: stored(1, { remarks: 'typed' }) })
    const again = begin()
    expect(again.entry.value.remarks).toBe('typed')
    await pause()
    expect(save).toHaveBeenCalledTimes(1)
    expect(sessionStorage.length).toBe(0)
  })

  it('takes its own form on the server for stored, when only the answer was lost', async () => {
    save.mockRejectedValue(stale())
    load.mockResolvedValue({ draft: stored(3, { remarks: 'mine' }) })
    const draft = begin(stored(2))
    draft.entry.value.remarks = 'mine'
    await pause()
    expect(draft.state.value).toBe('stored')
  })

  it.each([
    ['theirs', 'theirs', 0],
    ['mine', 'mine', 1],
  ] as const)('asks when a colleague stored meanwhile, and goes on with %s', async (choice, remarks, saves) => {
    save.mockRejectedValueOnce(stale())
    load.mockResolvedValue({ draft: stored(7, { remarks: 'theirs' }) })
    const draft = begin(stored(2))
    draft.entry.value.remarks = 'mine'
    await pause()
    expect(draft.state.value).toBe('conflict')
    expect(await draft.flush()).toBe(false)
    expect(draft.entry.value.remarks).toBe('mine')
    save.mockClear()
    await draft.resolve(choice)
    await pause()
    expect(draft.entry.value.remarks).toBe(remarks)
    expect(draft.state.value).toBe('stored')
    expect(save.mock.calls.map(([version]) => version)).toEqual(saves === 1 ? [7] : [])
  })

  it('shows what a colleague stored where nothing of one’s own is at stake, and only there', async () => {
    const draft = begin(stored(2))
    draft.adopt(stored(3, { remarks: 'theirs' }))
    expect(draft.entry.value.remarks).toBe('theirs')
    draft.entry.value.remarks = 'mine'
    await nextTick()
    draft.adopt(stored(4, { remarks: 'theirs again' }))
    expect(draft.entry.value.remarks).toBe('mine')
  })
})

import { mount } from '@vue/test-utils'
import { createPinia, setActivePinia } from 'pinia'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { createMemoryHistory, createRouter, type Router } from 'vue-router'
import type { SessionPerson } from '#shared/contracts/people'
import { useSessionStore } from '@/stores/session'
import { forgetDrafts, useDraft } from './useDraft'

const form = { template: '<i />', setup: () => useDraft('new', () => ({ title: '', rows: [] as string[] })) }

async function open(path: string) {
  const router: Router = createRouter({ history: createMemoryHistory(), routes: [{ path: '/:path(.*)*', component: form }] })
  await router.push(path)
  const wrapper = mount(form, { global: { plugins: [router] } })
  return wrapper.vm as unknown as { draft: { title: string; rows: string[] }; restored: boolean; clear: () => void }
}

const signedIn = (id: string) => useSessionStore().start({ id } as SessionPerson)

describe('useDraft', () => {
  beforeEach(() => {
    setActivePinia(createPinia())
    signedIn('p1')
  })
  afterEach(() => sessionStorage.clear())

  it('gives back what was typed after a reload', async () => {
    const before = await open('/rfqs/new')
    before.draft.title = 'Buoy supply'
    before.draft.rows.push('1000')

    const after = await open('/rfqs/new')
    expect(after.draft).toEqual({ title: 'Buoy supply', rows: ['1000'] })
    expect(after.restored).toBe(true)
  })

  it('keeps the drafts of two sheets and of two persons apart', async () => {
    const mine = await open('/rfqs/1')
    mine.draft.title = 'mine'

    expect((await open('/rfqs/2')).draft.title).toBe('')
    signedIn('p2')
    expect((await open('/rfqs/1')).draft.title).toBe('')
  })

  it('leaves nothing behind when cleared, and stores again what is typed after that', async () => {
    const sheet = await open('/rfqs/new')
    sheet.draft.title = 'first'
    sheet.clear()
    expect(sheet.draft.title).toBe('')
    expect(sessionStorage.length).toBe(0)

    sheet.draft.title = 'second'
    expect((await open('/rfqs/new')).draft.title).toBe('second')
  })

  it('takes only the entries the form still has from an older draft, and survives a broken one', async () => {
    sessionStorage.setItem('draft:p1:/rfqs/new:new', JSON.stringify({ title: 'kept', gone: 1 }))
    expect((await open('/rfqs/new')).draft).toEqual({ title: 'kept', rows: [] })

    sessionStorage.setItem('draft:p1:/rfqs/new:new', '{broken')
    expect((await open('/rfqs/new')).draft).toEqual({ title: '', rows: [] })
  })

  it('is forgotten on signing out, other entries of the storage are not', async () => {
    const sheet = await open('/rfqs/new')
    sheet.draft.title = 'secret'
    sessionStorage.setItem('other', '1')
    forgetDrafts()
    expect(Object.keys(sessionStorage)).toEqual(['other'])
  })
})

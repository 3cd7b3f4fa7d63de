import { mount } from '@vue/test-utils'
import { createPinia, setActivePinia } from 'pinia'
import PrimeVue from 'primevue/config'
import { beforeEach, describe, expect, it } from 'vitest'
import { createMemoryHistory, createRouter } from 'vue-router'
import { materialDraftSchema, tapeDraftSchema } from '#shared/contracts/part-rows'
import type { LibraryKind } from '#shared/engine/library'
import { blankPart, type PartEntry } from './part-blank'
import PartForm from './PartForm.vue'

const tape = (): PartEntry => ({
  ...blankPart('tape'),
  id: 'film',
  name: 'Film',
  source: 'Data sheet',
  edition: '2024',
  use: 'margin',
  material: 'film',
  thicknessMm: 0.165,
  widthsMm: [3, 3.2],
  thermalClassC: 130,
})

async function show(entry: PartEntry, basedOn = 1) {
  const router = createRouter({ history: createMemoryHistory(), routes: [{ path: '/', component: { template: '<i/>' } }] })
  await router.push('/')
  return mount(PartForm, {
    props: { entry, basedOn, error: null, busy: false, submitLabel: 'Make the version' },
    global: { plugins: [router, createPinia(), PrimeVue] },
    attachTo: document.body,
  })
}

const entryOf = (form: Awaited<ReturnType<typeof show>>, label: string) => {
  const id = form.findAll('label').find((element) => element.text().startsWith(label))!.attributes('for')!
  return form.find(`[id="${id}"]`)
}

beforeEach(() => {
  sessionStorage.clear()
  setActivePinia(createPinia())
})

describe('PartForm', () => {
  it('hands over the row as it came, plus what was typed, in the kept units', async () => {
    const form = await show(tape())
    await entryOf(form, 'Thickness').setValue('0,2')
    await entryOf(form, 'Widths sold').setValue('3; 3,2; 4')
    await entryOf(form, 'Why').setValue('Measured.')
    await form.trigger('submit')
    const [row, reason, basedOn] = form.emitted<[PartEntry, string, number]>('submit')![0]!
    expect(row).toEqual({ ...tape(), thicknessMm: 0.2, widthsMm: [3, 3.2, 4] })
    expect([reason, basedOn]).toEqual(['Measured.', 1])
    expect(tapeDraftSchema.safeParse(row).error).toBeUndefined()
  })

  it('is not sent while an entry cannot be read', async () => {
    const form = await show(tape())
    await entryOf(form, 'Thickness').setValue('thick')
    await form.trigger('submit')
    expect(form.emitted('submit')).toBeUndefined()
    await entryOf(form, 'Thickness').setValue('0.1')
    await entryOf(form, 'Widths sold').setValue('3, 4, 5')
    await form.trigger('submit')
    expect(form.emitted('submit')).toBeUndefined()
    expect(form.text()).toContain('cannot be read as one figure')
  })

  it('says when somebody made a newer version of what is being typed, and keeps the typed version’s number', async () => {
    const first = await show(tape())
    await entryOf(first, 'Name').setValue('Film, measured')
    first.unmount()
    const form = await show({ ...tape(), name: 'Film of somebody else' }, 2)
    expect((entryOf(form, 'Name').element as HTMLInputElement).value).toBe('Film, measured')
    expect(form.text()).toContain('Somebody made version 2 while this was typed from version 1')
    await form.trigger('submit')
    expect(form.emitted<[PartEntry, string, number]>('submit')![0]![2]).toBe(1)
  })

  it('starts again from the newest version when asked to', async () => {
    const first = await show(tape())
    await entryOf(first, 'Name').setValue('Film, measured')
    first.unmount()
    const form = await show({ ...tape(), name: 'Film of somebody else' }, 2)
    await form.findAll('button').find((button) => button.text() === 'Start again')!.trigger('click')
    expect((entryOf(form, 'Name').element as HTMLInputElement).value).toBe('Film of somebody else')
    expect(form.text()).not.toContain('Somebody made version')
  })
})

describe('blankPart', () => {
  it.each(['core', 'former', 'material', 'wire', 'tape', 'sleeve'] satisfies LibraryKind[])('has every field of a %s, with nothing but figures and texts missing', (kind) => {
    const entry = blankPart(kind)
    expect(entry.kind).toBe(kind)
    expect(Object.values(entry).includes(undefined)).toBe(false)
  })

  it('leaves the contract nothing to refuse but what has to be entered', () => {
    const { error } = materialDraftSchema.safeParse(blankPart('material'))
    const paths = error!.issues.map((issue) => issue.path.join('.'))
    expect(paths.sort()).toEqual(
      ['densityKgPerM3', 'edition', 'frequencyRangeHz.maximum', 'frequencyRangeHz.minimum', 'id', 'initialPermeability', 'name', 'permeabilityTolerance', 'saturation', 'source'].sort(),
    )
  })
})

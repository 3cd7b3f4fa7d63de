import { enableAutoUnmount, mount } from '@vue/test-utils'
import PrimeVue from 'primevue/config'
import { afterEach, describe, expect, it } from 'vitest'
import { defineComponent, nextTick, ref } from 'vue'
import { useFormProblems } from '@/composables/useFormProblems'
import FigureInput from './FigureInput.vue'

enableAutoUnmount(afterEach)

const global = { plugins: [PrimeVue] }

function mountInput(props: Record<string, unknown> = {}, value: number | null = null) {
  const wrapper = mount(FigureInput, {
    global,
    attachTo: document.body,
    props: {
      label: 'Primary inductance',
      unit: 'µH',
      ...props,
      modelValue: value,
      'onUpdate:modelValue': (next: number | null) => wrapper.setProps({ modelValue: next }),
    },
  })
  const entry = wrapper.get('input')
  const type = async (text: string) => {
    await entry.setValue(text)
    await entry.trigger('blur')
  }
  return { wrapper, entry, type, value: () => wrapper.props('modelValue') }
}

describe('FigureInput', () => {
  it('shows the kept value in its unit', () => {
    expect(mountInput({}, 120e-6).entry.element.value).toBe('120')
  })

  it('takes a decimal comma and another prefix, and echoes what it understood', async () => {
    const { type, value, wrapper } = mountInput()
    await type('0,61 mH')
    expect(value()).toBe(610e-6)
    expect(wrapper.get('.field-echo').text()).toBe('Read as 610\u00a0µH')
  })

  it('offers both readings of an ambiguous text and takes the chosen one', async () => {
    const { type, value, wrapper } = mountInput()
    await type('1,250')
    const buttons = wrapper.findAll('.figure-question button')
    expect(buttons.map((button) => button.text())).toEqual(['1.25\u00a0µH', '1250\u00a0µH'])
    expect(value()).toBeNull()

    await buttons[1]!.trigger('click')
    expect(value()).toBe(1250e-6)
    expect(wrapper.find('.figure-question').exists()).toBe(false)
  })

  it('says at the entry what it cannot read, tied to it, and keeps the text', async () => {
    const { type, value, entry, wrapper } = mountInput()
    await type('5 V')
    expect(value()).toBeNull()
    expect(entry.element.value).toBe('5 V')
    const error = wrapper.get('.field-error')
    expect(error.text()).toContain('Give the value in µH.')
    expect(entry.attributes('aria-invalid')).toBe('true')
    expect(entry.attributes('aria-describedby')).toContain(error.attributes('id'))
  })

  it('names both limits with their unit when a value is outside', async () => {
    const { type, wrapper } = mountInput({ min: 1e-6, max: 1e-3 })
    await type('2000')
    expect(wrapper.get('.field-error').text()).toBe('Give a value from 1\u00a0µH to 1000\u00a0µH.')
  })

  it('shows a value that is set from outside', async () => {
    const { wrapper, entry } = mountInput({}, 120e-6)
    await wrapper.setProps({ modelValue: 85e-6 })
    expect(entry.element.value).toBe('85')
  })

  it('keeps a form from being sent while it cannot be read', async () => {
    const form = defineComponent({
      components: { FigureInput },
      setup: () => ({ turns: ref<number | null>(null), ...useFormProblems() }),
      template: '<FigureInput v-model="turns" label="Turns" unit="turns" whole />',
    })
    const wrapper = mount(form, { global, attachTo: document.body })
    await wrapper.get('input').setValue('12.5')
    await nextTick()
    expect(wrapper.vm.goToFirstProblem()).toBe(true)
    expect(document.activeElement).toBe(wrapper.get('input').element)

    await wrapper.get('input').setValue('12')
    await nextTick()
    expect(wrapper.vm.goToFirstProblem()).toBe(false)
  })
})

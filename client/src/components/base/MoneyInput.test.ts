import { mount } from '@vue/test-utils'
import PrimeVue from 'primevue/config'
import { describe, expect, it } from 'vitest'
import MoneyInput from './MoneyInput.vue'

function mountInput(value: string | null = null) {
  const wrapper = mount(MoneyInput, {
    global: { plugins: [PrimeVue] },
    props: {
      label: 'Unit price',
      currency: 'EUR',
      per: 'each',
      modelValue: value,
      'onUpdate:modelValue': (next: string | null) => wrapper.setProps({ modelValue: next }),
    },
  })
  const type = async (text: string) => {
    await wrapper.get('input').setValue(text)
    await wrapper.get('input').trigger('blur')
  }
  return { wrapper, type, value: () => wrapper.props('modelValue') }
}

describe('MoneyInput', () => {
  it('keeps exact decimal text and echoes it with currency and price unit', async () => {
    const { type, value, wrapper } = mountInput()
    await type('9,85')
    expect(value()).toBe('9.85')
    expect(wrapper.get('.field-echo').text()).toBe('Read as 9.85\u00a0EUR each')
  })

  it('asks about a point before three digits too, and does not ask again about the chosen amount', async () => {
    const { type, value, wrapper } = mountInput()
    await type('1.250')
    const buttons = wrapper.findAll('.figure-question button')
    expect(buttons.map((button) => button.text())).toEqual(['1.25\u00a0EUR each', '1250.00\u00a0EUR each'])

    await type('12,125')
    await wrapper.findAll('.figure-question button')[0]!.trigger('click')
    expect(value()).toBe('12.1250')
    expect(wrapper.find('.figure-question').exists()).toBe(false)
  })

  it('shows a stored amount without asking about it', () => {
    const { wrapper } = mountInput('12.125000')
    expect(wrapper.get('input').element.value).toBe('12.1250')
    expect(wrapper.find('.figure-question').exists()).toBe(false)
  })

  it.each([
    ['-3', 'A price cannot be negative.'],
    ['1.2345678', 'Give at most 6 decimals.'],
    ['1234567890123', 'Give at most 12 digits before the decimal sign.'],
  ])('refuses %s', async (text, sentence) => {
    const { type, value, wrapper } = mountInput()
    await type(text)
    expect(value()).toBeNull()
    expect(wrapper.get('.field-error').text()).toBe(sentence)
  })
})

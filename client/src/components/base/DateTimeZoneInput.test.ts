import { enableAutoUnmount, mount } from '@vue/test-utils'
import PrimeVue from 'primevue/config'
import { afterEach, describe, expect, it } from 'vitest'
import DateTimeZoneInput, { type ZonedMoment } from './DateTimeZoneInput.vue'

enableAutoUnmount(afterEach)

function mountInput(value: ZonedMoment | null = null) {
  const wrapper = mount(DateTimeZoneInput, {
    global: { plugins: [PrimeVue] },
    props: {
      label: 'Quotations due',
      zone: 'Europe/Berlin',
      modelValue: value,
      'onUpdate:modelValue': (next: ZonedMoment | null) => wrapper.setProps({ modelValue: next }),
    },
  })
  const enter = async (date: string, time: string) => {
    await wrapper.get('input[type=time]').setValue(time)
    await wrapper.get('input[type=date]').setValue(date)
  }
  return { wrapper, enter, value: () => wrapper.props('modelValue') }
}

describe('DateTimeZoneInput', () => {
  it('echoes the moment with its offset and keeps it in UTC with its zone', async () => {
    const { wrapper, enter, value } = mountInput()
    await enter('2026-12-09', '17:00')
    expect(value()).toEqual({ at: '2026-12-09T16:00:00.000Z', zone: 'Europe/Berlin' })
    expect(wrapper.get('.field-echo').text()).toBe('Read as 2026-12-09T17:00+01:00')
  })

  it('shows a stored moment in the zone it was given in', () => {
    const { wrapper } = mountInput({ at: '2026-07-01T09:30:00.000Z', zone: 'America/New_York' })
    expect(wrapper.get<HTMLInputElement>('input[type=time]').element.value).toBe('05:30')
  })

  it('asks which of two moments is meant when the clock is set back', async () => {
    const { wrapper, enter, value } = mountInput()
    await enter('2026-10-25', '02:30')
    expect(value()).toBeNull()
    const choices = wrapper.findAll('.figure-question button')
    expect(choices.map((choice) => choice.text())).toEqual(['02:30 +02:00', '02:30 +01:00'])
    await choices[1]!.trigger('click')
    expect(value()?.at).toBe('2026-10-25T01:30:00.000Z')
  })

  it('refuses a time that the clock skips', async () => {
    const { wrapper, enter, value } = mountInput()
    await enter('2026-03-29', '02:30')
    expect(value()).toBeNull()
    expect(wrapper.get('.field-error').text()).toContain('never shows this time')
  })
})

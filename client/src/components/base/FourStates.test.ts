import { mount } from '@vue/test-utils'
import PrimeVue from 'primevue/config'
import { describe, expect, it } from 'vitest'
import FourStates from './FourStates.vue'
import type { QueryState } from './query-state'

const show = (state: QueryState<string[]>) =>
  mount(FourStates, {
    global: { plugins: [PrimeVue] },
    props: { state, empty: 'No core fits.' },
    slots: { default: '<ul><li v-for="core in params.data" :key="core">{{ core }}</li></ul>' },
  })

describe('FourStates', () => {
  it('waits, and says so', () => {
    expect(show({ status: 'pending', error: null }).get('[role=status]').text()).toBe('Fetching …')
  })

  it('says what failed and offers to try again', async () => {
    const wrapper = show({ status: 'error', error: new Error('The server could not be reached.') })
    expect(wrapper.get('[role=alert]').text()).toContain('The server could not be reached.')
    await wrapper.get('button').trigger('click')
    expect(wrapper.emitted('retry')).toHaveLength(1)
  })

  it('offers no second try for what stays refused', () => {
    const refused = Object.assign(new Error('This link has expired.'), { code: 'link-expired' })
    expect(show({ status: 'error', error: refused }).find('button').exists()).toBe(false)
  })

  it('shows a sentence instead of an empty table', () => {
    expect(show({ status: 'success', error: null, data: [] }).text()).toBe('No core fits.')
  })

  it('keeps what was fetched before while a refresh fails', () => {
    expect(show({ status: 'error', error: new Error('lost'), data: ['ETD34'] }).text()).toBe('ETD34')
  })
})

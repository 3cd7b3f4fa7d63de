import { mount } from '@vue/test-utils'
import { describe, expect, it } from 'vitest'
import { drawSheets } from '#shared/drawing/sheets/index'
import { evaluate } from '#shared/engine/index'
import { mainsFlyback, sampleLibrary } from '../../../../tests/support/sample-specification'
import CoilSection from './CoilSection.vue'
import PinView from './PinView.vue'
import SchematicView from './SchematicView.vue'
import SheetView from './SheetView.vue'

const document = mainsFlyback()
const { specification } = document
const evaluation = evaluate(document, sampleLibrary)
const sheets = drawSheets({ specification, evaluation, library: sampleLibrary, revision: 'P1', release: null, specificationHash: null, status: 'draft' })

describe('CoilSection', () => {
  const wrapper = mount(CoilSection, { props: { layout: evaluation.layout, specification, library: sampleLibrary, activeStepId: 's5' } })
  const step = (name: string) => wrapper.findAll('g.step').find((group) => group.attributes('aria-label') === name)!

  it('draws one circle for each of the three wires of each secondary turn', () => {
    expect(step('Step 5: Winding S1').findAll('[data-tag="winding:w2 step:s5"][fill="#ffffff"]')).toHaveLength(18)
  })

  it('names the step under pointer and focus, and the chosen one', async () => {
    await step('Step 8: Winding P').trigger('focus')
    await step('Step 8: Winding P').trigger('blur')
    await step('Step 3: Interwinding tape').trigger('keydown', { key: 'Enter' })
    expect(wrapper.emitted('step')).toEqual([['s8'], [null]])
    expect(wrapper.emitted('choose')).toEqual([['s3']])
  })

  it('marks the active step only', () => {
    expect(wrapper.findAll('g.active').map((group) => group.attributes('aria-label'))).toEqual(['Step 5: Winding S1'])
  })
})

describe('SheetView', () => {
  it('turns pages by key and stays within the drawing', async () => {
    const wrapper = mount(SheetView, { props: { sheets } })
    await wrapper.get('.paper').trigger('keydown', { key: 'PageUp' })
    expect(wrapper.text()).toContain(`Sheet 1 of ${sheets.length}`)
    await wrapper.get('.paper').trigger('keydown', { key: 'PageDown' })
    expect(wrapper.text()).toContain(`Sheet 2 of ${sheets.length}`)
  })

  it('grows and fits again', async () => {
    const wrapper = mount(SheetView, { props: { sheets } })
    await wrapper.get('[aria-label="Larger"]').trigger('click')
    expect(wrapper.get('.drawing').attributes('style')).toContain('150%')
    await wrapper.get('.paper').trigger('keydown', { key: '0' })
    expect(wrapper.get('.drawing').attributes('style')).toContain('100%')
  })
})

describe('the search on the sheets', () => {
  const find = async (text: string) => {
    const wrapper = mount(SheetView, { props: { sheets } })
    await wrapper.get('input[type="search"]').setValue(text)
    return wrapper
  }

  it('turns to the sheet of a step, marks its place and goes on with Enter', async () => {
    const wrapper = await find('step 5')
    expect(wrapper.get('.message').text()).toMatch(/^1 of \d+: sheet \d+, winding step – /)
    const first = wrapper.get('.mark rect').attributes()
    await wrapper.get('input[type="search"]').trigger('keydown', { key: 'Enter' })
    expect(wrapper.get('.message').text()).toMatch(/^2 of /)
    expect(wrapper.get('.mark rect').attributes()).not.toEqual(first)
  })

  it('enlarges what it found so that it can be read', async () => {
    const wrapper = await find('pin 9')
    expect(wrapper.get('.message').text()).toContain('pin 9')
    expect(wrapper.get('.drawing').attributes('style')).toContain('200%')
  })

  it('says when nothing answers, and marks nothing', async () => {
    const wrapper = await find('pin 99')
    expect(wrapper.get('.message').text()).toBe('Not on these sheets')
    expect(wrapper.find('.mark').exists()).toBe(false)
  })
})

describe('SchematicView and PinView', () => {
  it('say the same pins in words', () => {
    const circuit = mount(SchematicView, { props: { specification, library: sampleLibrary } })
    const pins = mount(PinView, { props: { specification, view: 'bottom' } })
    expect(circuit.get('svg').attributes('aria-label')).toContain('S1: start 9, finish 12, 6 turns')
    expect(pins.get('svg').attributes('aria-label')).toContain('9: S1')
  })
})

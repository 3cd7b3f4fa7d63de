import { describe, expect, it } from 'vitest'
import { mainsFlyback } from '../../../../tests/support/sample-specification'
import { withValue } from './document-paths'
import { keepInStep } from './keep-in-step'

describe('keepInStep', () => {
  const document = mainsFlyback()
  const { windings, sequence } = document.specification
  const stepsOf = (windingId: string) => sequence.flatMap((step, index) => (step.kind === 'winding' && step.windingId === windingId ? [index] : []))
  const single = windings.findIndex(({ id }) => stepsOf(id).length === 1)
  const split = windings.findIndex(({ id }) => stepsOf(id).length > 1)

  it('carries turns over to the only step of a winding', () => {
    const [step] = stepsOf(windings[single]!.id)
    expect(keepInStep(document, { [`windings.${single}.turns`]: 9 })).toEqual({ [`windings.${single}.turns`]: 9, [`sequence.${step}.turns`]: 9 })
  })

  it('leaves the turns of a split winding to the person', () => {
    expect(keepInStep(document, { [`windings.${split}.turns`]: 40 })).toEqual({ [`windings.${split}.turns`]: 40 })
  })

  it('leaves a step alone that said otherwise before', () => {
    const [step] = stepsOf(windings[single]!.id)
    const apart = withValue(document, `specification.sequence.${step}.turns`, 3)
    expect(keepInStep(apart, { [`windings.${single}.turns`]: 9 })).toEqual({ [`windings.${single}.turns`]: 9 })
  })

  it('carries the start to the first step and the finish to the last', () => {
    const steps = stepsOf(windings[split]!.id)
    expect(keepInStep(document, { [`windings.${split}.finishTerminal`]: '9' })).toHaveProperty([`sequence.${steps.at(-1)}.finishTerminal`], '9')
    expect(keepInStep(document, { [`windings.${split}.startTerminal`]: '9' })).toHaveProperty([`sequence.${steps[0]}.startTerminal`], '9')
  })
})

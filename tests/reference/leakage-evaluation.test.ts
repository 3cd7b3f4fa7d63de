import { evaluate } from '#shared/engine/index'
import type { SpecificationDocument } from '#shared/engine/specification'
import { describe, expect, it } from 'vitest'
import { enter, roundWire, tape, tapeStep, turnsStep } from './design-documents'
import type { Example } from './design-documents'
import { expectWithin } from './relative'

const ETD34: Example['core'] = { areaMm2: 97.1, lengthMm: 78.6, legDiameterMm: 10.8, halfWindowMm: 12.1 }
const base: Example = {
  core: ETD34,
  former: { widthMm: 21, heightMm: 6, tubeDiameterMm: 13.1 },
  windings: [{ id: 'P', turns: 60, wire: 'w' }, { id: 'S', turns: 28, wire: 'w' }, { id: 'A', turns: 12, wire: 'w' }],
  wires: [roundWire('w', 0.6, 0.66)],
  tapes: [tape('film', 0.06)],
  sequence: [turnsStep('P', 60), tapeStep('film', 2), turnsStep('S', 28), tapeStep('film', 2), turnsStep('A', 12)],
  inductanceH: 600e-6,
  frequencyHz: 100e3,
}

const answerOf = (document: SpecificationDocument, library: ReturnType<typeof enter>['library']) => evaluate(document, library, { working: true })

describe('leakage of a specification', () => {
  const { document, library } = enter(base)
  const evaluation = answerOf(document, library)
  const of = (ids: string[]) => evaluation.leakages.find(({ shortedWindingIds }) => shortedWindingIds.join() === ids.join())!

  it('lies near the textbook’s for windings that nearly fill the breadth, far above it for one that fills less than half', () => {
    expectWithin(of(['S']).inductanceH!, of(['S']).oneDimensionalH!, 0.25)
    expect(of(['A']).inductanceH!).toBeGreaterThan(1.3 * of(['A']).oneDimensionalH!)
  })

  it('is with both secondaries shorted no more than with either', () => {
    expect(of(['S', 'A']).inductanceH!).toBeLessThanOrEqual(of(['S']).inductanceH! * (1 + 1e-9))
  })

  it('shows how both figures came about', () => {
    evaluation.leakages.forEach(({ inductanceH, oneDimensionalH }, index) => {
      expect(evaluation.working[`leakages.${index}.inductanceH`]!.value).toBe(inductanceH)
      expect(evaluation.working[`leakages.${index}.oneDimensionalH`]!.value).toBe(oneDimensionalH)
    })
  })

  it('answers for every group that a limit names, the same from either side when referred to the same turns', () => {
    const limit = { id: 'k1', status: 'mandatory' as const, origin: { kind: 'entered' as const }, frequencyHz: 100e3, levelV: 0.1, temperatureC: 25, model: 'series' as const, maximumH: 1e-3, minimumH: null }
    const asked = structuredClone(document)
    asked.specification.electrical.leakage = [{ ...limit, windingId: 'S', shortedWindingIds: ['P'] }]
    const { leakages } = answerOf(asked, library)
    const back = leakages.find(({ windingId }) => windingId === 'S')!
    expectWithin(back.inductanceH! * (60 / 28) ** 2, of(['S']).inductanceH!, 1e-9)
  })

  it('rises with margins at one winding', () => {
    const margins = enter({ ...base, sequence: [turnsStep('P', 60), tapeStep('film', 2), turnsStep('S', 28, 4), tapeStep('film', 2), turnsStep('A', 12)] })
    expect(answerOf(margins.document, margins.library).leakages[0]!.inductanceH!).toBeGreaterThan(1.1 * of(['S']).inductanceH!)
  })
})

describe('gap by the field of the window', () => {
  it('lies within a tenth of McLyman’s', () => {
    const { document, library } = enter(base)
    const { magnetics, working } = answerOf(document, library)
    expectWithin(magnetics.gapFieldMm!, magnetics.gapMm!, 0.1)
    expect(working['magnetics.gapFieldMm']!.value).toBe(magnetics.gapFieldMm)
  })
})

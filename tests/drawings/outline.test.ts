import { describe, expect, it } from 'vitest'
import { outline } from '#shared/drawing/figures/outline/outline'
import { bounds, projected } from '#shared/drawing/figures/outline/project'
import { partSolids } from '#shared/drawing/figures/outline/solids'
import type { LabelShape, Shape } from '#shared/drawing/model'
import { evaluate } from '#shared/engine/index'
import type { Library } from '#shared/engine/library'
import { buoySupply, coupledInductor, mainsFlyback, sampleLibrary } from '../support/sample-specification'

const texts = (shapes: readonly Shape[]) => shapes.filter((shape): shape is LabelShape => shape.kind === 'label').map(({ text }) => text)
const views = (make: typeof mainsFlyback, change: (document: ReturnType<typeof mainsFlyback>) => void = () => undefined, library: Library = sampleLibrary) => {
  const document = make()
  change(document)
  return outline({ specification: document.specification, library, layout: evaluate(document, library).layout, widthMm: 228, heightMm: 200 })
}

describe('the outline', () => {
  it('dimensions envelope, standoff, pin length, row spacing and pitch', () => {
    expect(texts(views(mainsFlyback)!.shapes)).toEqual(expect.arrayContaining(['31.6 max.', '33.28 max.', '25.8 max.', '0.6', '3.5', '25.4', '6 × 5.08 (= 30.48)']))
  })

  it('puts the bottom view above the front view in first-angle and below it in third-angle projection (ISO 5456-2)', () => {
    const order = (projection: 'first-angle' | 'third-angle') => {
      const { shapes } = views(mainsFlyback, ({ specification }) => Object.assign(specification.title.projection, { value: projection }))!
      const height = (start: string) => shapes.find((shape): shape is LabelShape => shape.kind === 'label' && shape.text.startsWith(start))!.anchor[1]
      return height('Bottom view') > height('Front view')
    }
    expect([order('first-angle'), order('third-angle')]).toEqual([true, false])
    expect(texts(views(mainsFlyback, ({ specification }) => Object.assign(specification.title.projection, { value: 'third-angle' }))!.shapes)).toContain('View from the right')
  })

  it('says what is not stated and what the library does not hold', () => {
    const bare = texts(views(buoySupply, ({ specification }) => Object.assign(specification.former.envelope, { value: null }))!.shapes).join(' ')
    expect(bare).toContain('Not stated: maximum envelope.')
    const empty = { cores: [], formers: [], materials: [], wires: [], tapes: [], sleeves: [] }
    expect(texts(views(buoySupply, undefined, empty)!.shapes).join(' ')).toContain('The core is not in the library')
  })

  it('draws nothing of a part without pins, envelope and library', () => {
    const empty = { cores: [], formers: [], materials: [], wires: [], tapes: [], sleeves: [] }
    const nothing = ({ specification }: ReturnType<typeof mainsFlyback>) => {
      specification.former.pins = []
      Object.assign(specification.former.envelope, { value: null })
    }
    expect(views(buoySupply, nothing, empty)).toBeNull()
  })
})

describe('the bodies of the outline', () => {
  it.each(Object.entries({ mainsFlyback, coupledInductor }))('stand on the seating plane and reach the height of the library row: %s', (_, make) => {
    const document = make()
    const { specification } = document
    const { solids } = partSolids(specification, sampleLibrary, null)
    const body = solids.filter(({ part }) => part !== 'pin').map(bounds)
    const former = sampleLibrary.formers.find(({ id }) => id === specification.former.former.value!.id)!
    expect(Math.max(...body.map(([, high]) => high[2]))).toBeCloseTo(former.envelopeMm.height, 6)
    expect(Math.min(...body.map(([low]) => low[2]))).toBeCloseTo(specification.former.standoffMm.value!, 6)
  })

  it('hold the dimensions A, B and C of the core', () => {
    const { specification } = mainsFlyback()
    const core = sampleLibrary.cores.find(({ id }) => id === specification.core.core.value!.id)!
    const halves = partSolids(specification, sampleLibrary, null).solids.filter(({ part }) => part === 'core').map(bounds)
    const span = (axis: 0 | 1 | 2) => Math.max(...halves.map(([, high]) => high[axis])) - Math.min(...halves.map(([low]) => low[axis]))
    expect([span(0) / 2, span(1), span(2)]).toEqual([core.dimensionsMm.b, core.dimensionsMm.a, core.dimensionsMm.c].map((value) => expect.closeTo(value!, 6)))
  })
})

it('mirrors what is seen from below about the length of the part', () => {
  expect([projected('above', [3, 5, 7]), projected('below', [3, 5, 7])]).toEqual([[3, 5], [3, -5]])
  expect([projected('left', [3, 5, 7]), projected('right', [3, 5, 7])]).toEqual([[-5, 7], [5, 7]])
})

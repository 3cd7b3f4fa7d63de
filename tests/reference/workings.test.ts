import { shippedLibrary } from '#server/db/seed/parts/library'
import { HARBOUR_SUPPLY } from '#server/db/seed/specifications/requirements'
import { evaluate, propose } from '#shared/engine/index'
import type { SpecificationDocument } from '#shared/engine/specification'
import { describe, expect, it } from 'vitest'

const library = shippedLibrary()
const proposed = propose(HARBOUR_SUPPLY, library).document

function changed(edit: (specification: SpecificationDocument['specification']) => void): SpecificationDocument {
  const document = structuredClone(proposed)
  edit(document.specification)
  return document
}

const workingOf = (document: SpecificationDocument, path: string, rows = library) => evaluate(document, rows, { working: true }).working[path]!
const inputOf = (document: SpecificationDocument, path: string, name: string, rows = library) => workingOf(document, path, rows).inputs.find((input) => input.name === name)!

describe('a working names what its figure was calculated with', () => {
  it('takes the material group of the coil former where none is stated', () => {
    const open = changed(({ insulation }) => (insulation.materialGroup.value = null))
    const better = { ...library, formers: library.formers.map((row) => ({ ...row, materialGroup: 'I' as const })) }
    expect(inputOf(open, 'boundaries.0.required.creepageMm', 'material group', better)).toMatchObject({ value: 'I', origin: expect.not.stringContaining('insulation.materialGroup') })
    const stated = changed(({ insulation }) => (insulation.materialGroup.value = 'II'))
    expect(inputOf(stated, 'boundaries.0.required.creepageMm', 'material group', better)).toMatchObject({ value: 'II', origin: 'insulation.materialGroup' })
  })

  it('counts the area of all sets in the flux', () => {
    const two = changed(({ core }) => (core.numberOfSets.value = 2))
    const { core } = two.specification
    const { effectiveAreaMm2 } = library.cores.find(({ id }) => id === core.core.value!.id)!
    for (const path of ['magnetics.fluxPeakT', 'magnetics.gapFieldMm']) expect(inputOf(two, path, 'A_e').value, path).toBeCloseTo(2 * effectiveAreaMm2, 9)
  })

  it('says of an inductance whether it is stated or follows from the gap', () => {
    expect(inputOf(proposed, 'magnetics.inductanceH', 'L').origin).toBe('electrical.inductance')
    const byGap = changed(({ electrical, core }) => {
      core.gap.lengthMm.value = 0.3
      core.gap.alH.value = null
      electrical.inductance.value = null
    })
    expect(inputOf(byGap, 'magnetics.inductanceH', 'A_L').origin).toContain('core.gap.lengthMm')
  })

  it('names the stated limit of temperature beside that of the class, by thermocouple 10 K higher', () => {
    const limited = changed(({ insulation }) => (insulation.maximumWindingC.value = { temperatureC: 95, method: 'thermocouple' }))
    expect(evaluate(limited, library).thermal.limitC).toBe(105)
    expect(inputOf(limited, 'thermal.limitC', 'thermocouple')).toMatchObject({ value: 95, origin: 'insulation.maximumWindingC' })
  })
})

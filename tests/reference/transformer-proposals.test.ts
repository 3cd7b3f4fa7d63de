import { describe, expect, it } from 'vitest'
import { shippedLibrary } from '#server/db/seed/parts/library'
import { requirementSheetSchema, specificationDocumentSchema } from '#shared/contracts/specification-document'
import { evaluate, propose } from '#shared/engine/index'
import { shownAt, shownFigures } from './shown-figures'
import { TRANSFORMER_SHEETS } from './topology-sheets'

const library = shippedLibrary()
const FULL_LOAD = ['minimum-input', 'nominal-input', 'maximum-input']

describe.each(TRANSFORMER_SHEETS.map((sheet) => ({ name: `${sheet.duty.topology}${'reset' in sheet.duty ? `, ${sheet.duty.reset}` : ''}${'control' in sheet.duty ? `, ${sheet.duty.control}` : ''}`, sheet })))('a sheet for $name', ({ sheet }) => {
  const { document, findings } = propose(sheet, library)
  const evaluation = evaluate(document, library, { working: true })

  it('is a sheet that the interface takes, and gives a whole document', () => {
    expect(requirementSheetSchema.safeParse(sheet).error).toBeUndefined()
    expect(specificationDocumentSchema.safeParse(document).error).toBeUndefined()
    expect(findings.filter(({ severity }) => severity === 'error')).toEqual([])
    expect(document.specification.windings.length).toBeGreaterThan(1)
  })

  it('reaches every output at full load over the whole input range', () => {
    const loaded = evaluation.corners.filter(({ name }) => FULL_LOAD.includes(name))
    expect(loaded.map(({ name }) => name)).toEqual(FULL_LOAD)
    if (!('outputs' in sheet.duty) || sheet.duty.topology === 'gate-drive') throw new Error('a sheet without outputs of their own voltage')
    for (const corner of loaded) {
      for (const { outputId, voltageV } of corner.outputs) {
        const asked = sheet.duty.outputs.find(({ id }) => id === outputId)!
        // Whole turns are a compromise for the outputs that nothing regulates.
        expect(Math.abs(voltageV / asked.voltageV - 1), `${corner.name} ${outputId}`).toBeLessThan(asked.role === 'main' ? 1e-6 : 0.15)
      }
    }
  })

  it('keeps the flux of the worst pulse below its share of saturation', () => {
    expect(evaluation.magnetics.fluxUtilisation).toBeLessThanOrEqual(0.8)
    expect(evaluation.magnetics.voltSecondsVs).toBeGreaterThan(0)
    expect(evaluation.magnetics.fluxSwingT).toBeGreaterThan(0)
  })

  it('settles below the limit of its insulation', () => {
    expect(evaluation.thermal.marginK).toBeGreaterThan(0)
  })

  it('says of every figure that it shows how it came about', () => {
    for (const path of shownFigures(evaluation)) {
      expect(evaluation.working[path], path).toBeDefined()
      expect(evaluation.working[path]!.value, path).toBe(shownAt(evaluation, path))
      expect(evaluation.working[path]!.source, path).not.toBe('')
    }
  })
})

import { describe, expect, it } from 'vitest'
import { shippedLibrary } from '#server/db/seed/parts/library'
import { BUOY_SUPPLY, COUPLED_INDUCTOR, HARBOUR_SUPPLY } from '#server/db/seed/specifications/requirements'
import { outlineDxf } from '#server/dxf/outline-dxf'
import { unprintable } from '#shared/drawing/text-metrics'
import { drawSheets } from '#shared/drawing/sheets/index'
import { evaluate, propose } from '#shared/engine/index'
import type { SpecificationDocument } from '#shared/engine/specification'
import { TRANSFORMER_SHEETS } from '../reference/topology-sheets'
import { lineOverlaps, textOverlaps } from '../support/overlaps'

const library = shippedLibrary()

/** The coupled inductor's windings on a ring without a coil former, each in a half of it. */
function ringPart(): SpecificationDocument {
  const { document } = propose(COUPLED_INDUCTOR, library)
  const { specification } = document
  specification.core.core.value = { kind: 'core', id: 'powder-ring-26.9', version: 1 }
  Object.assign(specification.former, { pins: [], envelope: { ...specification.former.envelope, value: null } })
  specification.former.former.value = null
  specification.sequence = specification.sequence.filter((step) => step.kind === 'winding').map((step, index) => ({ ...step, section: index + 1, marginLeftMm: 1.5, marginRightMm: 1.5 }))
  return document
}

const proposals = [BUOY_SUPPLY, HARBOUR_SUPPLY, { ...HARBOUR_SUPPLY, insulationMethod: 'margin-tape' as const }, COUPLED_INDUCTOR, ...TRANSFORMER_SHEETS].map((sheet): [string, () => SpecificationDocument] => [`${sheet.duty.topology}, ${sheet.insulationMethod}`, () => propose(sheet, library).document])

describe.each([...proposals, ['a ring without a coil former', ringPart] as [string, () => SpecificationDocument]])('the sheets of %s', (_, make) => {
  const document = make()
  const evaluation = evaluate(document, library)
  const sheets = drawSheets({ specification: document.specification, evaluation, library, revision: 'P1', release: null, specificationHash: null, status: 'draft' })

  it('have neither texts nor lines over a text, and every letter', () => {
    expect(sheets.flatMap((sheet) => [...textOverlaps(sheet), ...lineOverlaps(sheet)])).toEqual([])
    expect(unprintable(sheets)).toEqual([])
  })

  it('leave no letter out in the working either, which the calculation record prints', () => {
    const { working, checks, findings } = evaluate(document, library, { working: true })
    expect(unprintable({ working, checks, findings })).toEqual([])
  })

  it('come with a DXF', () => {
    expect(outlineDxf({ specification: document.specification, library, layout: evaluation.layout, revision: 'P1', specificationHash: null })).toMatch(/EOF\s*$/)
  })
})

import { describe, expect, it } from 'vitest'
import { shippedLibrary } from '#server/db/seed/parts/library'
import { COUPLED_INDUCTOR } from '#server/db/seed/specifications/requirements'
import { evaluate, propose } from '#shared/engine/index'
import type { SpecificationDocument } from '#shared/engine/specification'

const library = shippedLibrary()

/** The coupled inductor's windings on a powder ring, each in a half of it. */
function onRing(): SpecificationDocument {
  const { document } = propose(COUPLED_INDUCTOR, library)
  const { specification } = document
  const turns = specification.sequence.filter((step) => step.kind === 'winding').map((step, index) => ({ ...step, section: index + 1, marginLeftMm: 1.5, marginRightMm: 1.5 }))
  return {
    ...document,
    specification: {
      ...specification,
      core: { ...specification.core, core: { ...specification.core.core, value: { kind: 'core', id: 'powder-ring-26.9', version: 1 } } },
      former: { ...specification.former, former: { ...specification.former.former, value: null } },
      sequence: turns,
    },
  }
}

describe('a coupled inductor on a ring', () => {
  const document = onRing()
  const evaluation = evaluate(document, library, { working: true })

  it('is laid out without a coil former, both halves apart by their margins', () => {
    expect(evaluation.layout.form).toBe('ring')
    expect(evaluation.layout.ring!.sectorGapMm).toBeCloseTo(3, 9)
    expect(new Set(evaluation.layout.ring!.passes.map(({ windingId }) => windingId)).size).toBe(2)
  })

  it('has the resistance of its turns round the section, by hand', () => {
    // Coated section (27.5 − 14.1)/2 by 11.8 mm; one layer, the wire's middle half a diameter off it; two ends of 20 mm.
    const [first] = evaluation.windings
    const wire = library.wires.find(({ id }) => id === document.specification.windings[0]!.wire.wire.id)!
    const overallMm = evaluation.layout.ring!.passes[0]!.overallMm
    const turnMm = 2 * (6.7 + 11.8) + Math.PI * overallMm
    expect(first!.meanTurnLengthMm).toBeCloseTo(turnMm, 6)
    const lengthM = (document.specification.windings[0]!.turns * turnMm + 40) / 1000
    expect(first!.dcResistance20Ohm! / (wire.resistance20.nominalOhmPerM * lengthM)).toBeCloseTo(1, 6)
  })

  it('says how each figure of the ring came about', () => {
    for (const field of ['outsideMm', 'holeMm', 'heightMm', 'remainingHoleMm', 'overallOutsideMm', 'overallHeightMm', 'sectorGapMm'] as const) {
      expect(evaluation.working[`layout.ring.${field}`]).toMatchObject({ value: evaluation.layout.ring![field], unit: 'mm' })
    }
  })

  it('has a capacitance and a resonance, and couples its halves only by way of the core', () => {
    const between = evaluation.capacitances.find(({ windingIds }) => windingIds.length === 2)!.capacitanceF!
    const toCore = evaluation.boundaryCapacitances.flatMap(({ capacitanceF }) => capacitanceF ?? [])
    expect(between).toBeGreaterThan(1e-12)
    expect(Math.max(...toCore)).toBeGreaterThan(between)
    for (const { frequencyHz } of evaluation.selfResonance) expect(frequencyHz).toBeGreaterThan(1e6)
  })
})

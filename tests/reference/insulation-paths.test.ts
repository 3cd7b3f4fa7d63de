import { describe, expect, it } from 'vitest'
import { shippedLibrary } from '#server/db/seed/parts/library'
import { HARBOUR_SUPPLY } from '#server/db/seed/specifications/requirements'
import { evaluate, propose } from '#shared/engine/index'
import type { InsulationPath, PathPoint } from '#shared/engine/evaluation'
import type { InsulationBoundary, SequenceStep, SpecificationDocument } from '#shared/engine/specification'

const library = shippedLibrary()
const margin = propose({ ...HARBOUR_SUPPLY, insulationMethod: 'margin-tape' }, library).document
const insulated = propose(HARBOUR_SUPPLY, library).document

const drawnMm = (points: readonly PathPoint[]) => points.slice(1).reduce((sum, [x, y], index) => sum + Math.hypot(x - points[index]![0], y - points[index]![1]), 0)
const pathsOf = (document: SpecificationDocument, name: string): readonly InsulationPath[] => evaluate(document, library).boundaries.find((one) => one.name === name)!.provided.paths!
const pathOf = (document: SpecificationDocument, name: string, kind: InsulationPath['kind']) => pathsOf(document, name).find((path) => path.kind === kind)!

describe('the drawn path of a boundary', () => {
  it('runs along both margins round the end of the tape, as long as the distance that the build provides', () => {
    const path = pathOf(margin, 'PRI–SEC', 'creepage')
    const marginMm = margin.specification.sequence.flatMap((step) => (step.kind === 'margin' ? [step.leftMm] : []))[0]!
    expect(path.plane).toBe('window')
    expect(path.points).toHaveLength(4)
    expect(path.points.map(([x]) => x)).toEqual([marginMm, 0, 0, marginMm])
    expect(drawnMm(path.points)).toBeCloseTo(path.lengthMm, 9)
    expect(path.lengthMm).toBeGreaterThan(2 * marginMm)
  })

  it('crosses the tapes between the windings straight', () => {
    const path = pathOf(margin, 'PRI–SEC', 'through-insulation')
    expect(drawnMm(path.points)).toBeCloseTo(path.lengthMm, 9)
    expect(path.points[0]![0]).toBe(path.points[1]![0])
  })

  it('climbs the flange to the core', () => {
    const { points, lengthMm } = pathOf(margin, 'SEC–CORE', 'creepage')
    const { windowHeightMm } = evaluate(margin, library).layout
    expect(points[points.length - 1]).toEqual([0, windowHeightMm])
    expect(drawnMm(points)).toBeCloseTo(lengthMm, 9)
  })

  it('goes from pin to pin where the wire itself insulates the coil', () => {
    const path = pathOf(insulated, 'PRI–SEC', 'creepage')
    const pins = insulated.specification.former.pins
    expect(path.plane).toBe('pins')
    expect(path.points.every(([x, y]) => pins.some(({ xMm, yMm }) => xMm === x && yMm === y))).toBe(true)
    // From middle to middle, less one pin.
    expect(drawnMm(path.points)).toBeCloseTo(path.lengthMm + insulated.specification.former.pinSection.value!.sizeMm, 9)
  })
})

describe('a shield', () => {
  /** A shield under the first interwinding insulation, with the same tape below it or lying on the wire. */
  function shielded(widthMm: number, onTape = true): SpecificationDocument {
    const document = structuredClone(margin)
    const { sequence, windings, insulation } = document.specification
    const at = sequence.findIndex((step) => step.kind === 'tape' && step.purpose === 'interwinding' && step.layers === 3)
    const tape = sequence[at]! as Extract<SequenceStep, { kind: 'tape' }>
    const shield: SequenceStep = { id: 's90', kind: 'shield', status: 'mandatory', origin: { kind: 'entered' }, remark: '', windingId: 'sh', form: 'foil', thicknessMm: 0.05, widthMm, overlapMm: 4, overlapInsulation: 'two layers of tape', connectedTerminal: windings[0]!.startTerminal }
    sequence.splice(at, 0, ...(onTape ? [{ ...tape, id: 's91' }] : []), shield)
    windings.push({ ...structuredClone(windings[0]!), id: 'sh', name: 'SH', role: 'shield', side: 'floating', outputId: null, turns: 1, finishTerminal: '' })
    insulation.boundaries.push({ ...structuredClone(insulation.boundaries[0]!), id: 'b90', name: 'SH–SEC', between: [{ kind: 'winding', windingId: 'sh' }, { kind: 'side', side: 'secondary' }] } satisfies InsulationBoundary)
    return document
  }

  it('is a conductor of its own, with the margins that its width leaves', () => {
    const { windowWidthMm } = evaluate(margin, library).layout
    const result = evaluate(shielded(windowWidthMm - 4), library).boundaries.find(({ name }) => name === 'SH–SEC')!
    const marginMm = margin.specification.sequence.flatMap((step) => (step.kind === 'margin' ? [step.leftMm] : []))[0]!
    const tapesMm = result.provided.distanceThroughInsulationMm!
    expect(result.provided.creepageMm).toBeCloseTo(2 + marginMm + tapesMm, 9)
    expect(result.provided.layers).toBe(3)
  })

  it('counts into the mass of copper, with the overlap of its ends', () => {
    const { windowWidthMm } = evaluate(margin, library).layout
    const document = shielded(windowWidthMm - 4)
    const { mass, windings } = evaluate(document, library)
    const wiresG = windings.reduce((sum, { copperMassG }) => sum + (copperMassG ?? 0), 0)
    const shieldG = (overlapMm: number) => {
      const longer = structuredClone(document)
      for (const step of longer.specification.sequence) if (step.kind === 'shield') step.overlapMm = overlapMm
      return evaluate(longer, library).mass.copperG! - wiresG
    }
    expect(mass.copperG).toBeCloseTo(wiresG + shieldG(4), 9)
    // 0.05 mm of copper of 8.89 g/cm³ over the width, 10 mm longer.
    expect(shieldG(14) - shieldG(4)).toBeCloseTo(0.05 * (windowWidthMm - 4) * 10 * 8.89e-3, 6)
    expect(shieldG(4)).toBeGreaterThan(shieldG(14) - shieldG(4))
  })

  it('on the wire that reaches the flange takes the margin of that wire away', () => {
    const { windowWidthMm } = evaluate(margin, library).layout
    const marginMm = margin.specification.sequence.flatMap((step) => (step.kind === 'margin' ? [step.leftMm] : []))[0]!
    const path = pathOf(shielded(windowWidthMm, false), 'PRI–SEC', 'creepage')
    expect(path.how).toContain('shield')
    expect(path.lengthMm).toBeCloseTo(pathOf(margin, 'PRI–SEC', 'creepage').lengthMm - marginMm, 9)
  })
})

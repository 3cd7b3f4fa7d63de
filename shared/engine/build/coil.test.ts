import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { FormerRow, TapeRow } from '../library'
import type { LibraryReference, SequenceStep, Winding, WindingStep } from '../specification'
import { BULGE_RECTANGULAR_TUBE, BULGE_ROUND_TUBE, layOutCoil, mostTurnsPerLayer, turnLengthMm, turnsByLayer } from './index'
import type { BuildWire } from './index'

const entered = { status: 'mandatory' as const, origin: { kind: 'entered' as const } }
const tapeReference: LibraryReference = { kind: 'tape', id: 'tape', version: 1 }
const row = { version: 1, source: 'test', edition: '', confidence: 'high' as const, unverified: [], note: '' }

const tape: TapeRow = { ...row, kind: 'tape', id: 'tape', name: 'film 0.06', use: 'insulation', material: 'polyester film', thicknessMm: 0.06, widthsMm: [], thermalClassC: 130, layerWithstandVRms: null, materialGroup: 'IIIa' }

const former = (change: Partial<FormerRow> = {}): FormerRow => ({
  ...row, kind: 'former', id: 'former', name: 'former', coreId: 'core', windingWidthMm: 20, windingHeightMm: 6, sections: 1,
  tube: { shape: 'round', diameterMm: 13 }, tubeWallMm: 1, flangeThicknessMm: 1, meanTurnLengthMm: null, pins: [], pinRowSpacingMm: 25,
  pinPitchMm: 5, pinSection: { shape: 'round', sizeMm: 0.8 }, pinLengthMm: 3.5, standoffMm: 0.5, mounting: 'horizontal', material: 'phenolic',
  plastic: 'thermoset', flammability: 'V-0', materialGroup: 'IIIa', thermalClassC: 155, envelopeMm: { length: 36, width: 36, height: 30 }, ...change,
})

const winding = (id: string, parallel = 1): Winding => ({
  ...entered, id, name: id.toUpperCase(), role: 'primary', side: 'primary', outputId: null, startTerminal: '1', finishTerminal: '2', turns: 10,
  wire: { wire: { kind: 'wire', id: 'wire', version: 1 }, parallel, thermalClassC: 155, insulation: 'enamel-grade-1', certificate: null, lay: null },
  rmsCurrentA: null, peakCurrentA: null, dcCurrentA: null, dcResistance: null,
})

const turnsOf = (windingId: string, turns: number, change: Partial<WindingStep> = {}): WindingStep => ({
  ...entered, id: `s-${windingId}`, kind: 'winding', remark: '', windingId, startTerminal: '1', finishTerminal: '2', turns, section: 1,
  direction: 'clockwise', lay: 'close-wound', layers: null, marginLeftMm: 0, marginRightMm: 0, interlayerTape: null,
  leadExitStart: 'left', leadExitFinish: 'left', startSleeve: null, finishSleeve: null, ...change,
})

const tapeStep = (layers: number): SequenceStep => ({ ...entered, id: `t${layers}`, kind: 'tape', remark: '', tape: tapeReference, layers, widthMm: null, purpose: 'interwinding' })

const wire = (overallMm: number): BuildWire => ({ form: 'round', overallMm, conductorMm: overallMm * 0.9, copperAreaMm2: 0.5, widthMm: null })

const layOut = (windings: Winding[], sequence: SequenceStep[], overallMm: number, change: Partial<FormerRow> = {}) =>
  layOutCoil({ former: former(change), windings, sequence, wireOf: () => wire(overallMm), tapeOf: () => tape })

describe('turnLengthMm', () => {
  it.each([
    { name: 'round tube of 13 mm at its surface', tube: { shape: 'round' as const, diameterMm: 13 }, heightMm: 0, lengthMm: 40.8407 },
    { name: 'round tube of 13 mm, 1 mm up', tube: { shape: 'round' as const, diameterMm: 13 }, heightMm: 1, lengthMm: 47.1239 },
    { name: 'sharp rectangle of 9 by 9 mm, 1 mm up', tube: { shape: 'rectangular' as const, widthMm: 9, depthMm: 9, cornerRadiusMm: 0 }, heightMm: 1, lengthMm: 42.2832 },
    { name: 'rectangle of 9 by 7 mm with corners of 1 mm', tube: { shape: 'rectangular' as const, widthMm: 9, depthMm: 7, cornerRadiusMm: 1 }, heightMm: 0, lengthMm: 30.2832 },
  ])('$name', ({ tube, heightMm, lengthMm }) => {
    expect(turnLengthMm(tube, heightMm)).toBeCloseTo(lengthMm, 3)
  })
})

describe('layers', () => {
  it.each([
    { name: 'eleven diameters hold ten turns: the helix takes one more', availableMm: 6.6, bundleWidthMm: 0.6, most: 10 },
    { name: 'a hair less holds nine', availableMm: 6.59, bundleWidthMm: 0.6, most: 9 },
    { name: 'two wires side by side halve it', availableMm: 6.6, bundleWidthMm: 1.2, most: 4 },
    { name: 'narrower than two turns holds none', availableMm: 1, bundleWidthMm: 0.6, most: 0 },
  ])('$name', ({ availableMm, bundleWidthMm, most }) => {
    expect(mostTurnsPerLayer(availableMm, bundleWidthMm)).toBe(most)
  })

  it('fills each layer before the next unless the layers are stated', () => {
    const input = { turns: 25, bundleWidthMm: 0.6, availableMm: 6.6, lay: 'close-wound' as const }
    expect(turnsByLayer({ ...input, layers: null })).toEqual([10, 10, 5])
    expect(turnsByLayer({ ...input, layers: 3 })).toEqual([9, 9, 7])
    expect(turnsByLayer({ ...input, layers: 5 })).toEqual([5, 5, 5, 5, 5])
  })
})

describe('layOutCoil', () => {
  it('stacks layers, tapes and windings from the tube outward', () => {
    const coil = layOut([winding('p'), winding('s')], [turnsOf('p', 50), tapeStep(3), turnsOf('s', 10)], 0.5)
    // 20 mm / 0.5 mm less one turn for the helix: 39 turns in the first layer, 11 in the second.
    expect(coil.windings.get('p')!.turnsPerLayer).toEqual([39, 11])
    expect(coil.placements[1]!.bottomMm).toBeCloseTo(2 * 0.5 + 3 * 0.06, 12)
    expect(coil.layout.buildMm).toBeCloseTo((3 * 0.5 + 3 * 0.06) * BULGE_ROUND_TUBE, 12)
    expect(coil.windings.get('p')!.meanTurnLengthMm).toBeCloseTo((39 * Math.PI * 13.5 + 11 * Math.PI * 14.5) / 50, 9)
    expect(coil.findings).toEqual([])
  })

  it('lets the second layer begin where the first ended', () => {
    const coil = layOut([winding('p')], [turnsOf('p', 50)], 0.5)
    const second = coil.layout.items.filter((item) => item.kind === 'turn' && item.layer === 2)
    expect(Math.max(...second.map(({ xMm }) => xMm))).toBeCloseTo(20 - 0.5, 12)
  })

  it.each([
    { lay: 'close-wound-left' as const, firstMm: 0.5, lastMm: 2.5 },
    { lay: 'close-wound-right' as const, firstMm: 17.5, lastMm: 19.5 },
    { lay: 'centred' as const, firstMm: 9, lastMm: 11 },
    { lay: 'spread' as const, firstMm: 2.2, lastMm: 17.8 },
  ])('lays five turns of 0.5 mm $lay', ({ lay, firstMm, lastMm }) => {
    const { layout } = layOut([winding('p')], [turnsOf('p', 5, { lay })], 0.5)
    expect(layout.items[0]!.xMm).toBeCloseTo(firstMm, 9)
    expect(layout.items[4]!.xMm).toBeCloseTo(lastMm, 9)
  })

  it('builds margin tape up to the winding beside it', () => {
    const margin: SequenceStep = { ...entered, id: 'm', kind: 'margin', remark: '', tape: tapeReference, leftMm: 3, rightMm: 3, heightMm: null }
    const coil = layOut([winding('p')], [margin, turnsOf('p', 50, { marginLeftMm: 3, marginRightMm: 3 }), tapeStep(3)], 0.5)
    const margins = coil.layout.items.filter((item) => item.kind === 'margin')
    expect(margins).toEqual([
      { kind: 'margin', stepId: 'm', xMm: 0, yMm: 0, widthMm: 3, heightMm: 1 },
      { kind: 'margin', stepId: 'm', xMm: 17, yMm: 0, widthMm: 3, heightMm: 1 },
    ])
  })

  it('lays steps that are wound together turn beside turn in the same layers', () => {
    const coil = layOut([winding('a'), winding('b')], [turnsOf('a', 30), turnsOf('b', 30, { withPrevious: true }), tapeStep(1)], 0.5)
    // 20 mm hold 19 turns of two wires side by side.
    expect(coil.windings.get('a')!.turnsPerLayer).toEqual([19, 11])
    expect(coil.windings.get('b')!.turnsPerLayer).toEqual([19, 11])
    expect(coil.placements.map(({ togetherWith }) => togetherWith)).toEqual([['s-b'], ['s-a']])
    const first = coil.layout.items.flatMap((item) => (item.kind === 'turn' && item.layer === 1 ? [item] : [])).sort((one, other) => one.xMm - other.xMm)
    expect(first.slice(0, 4).map(({ windingId }) => windingId)).toEqual(['a', 'b', 'a', 'b'])
    expect(first.slice(1).every((item, index) => Math.abs(item.xMm - first[index]!.xMm - 0.5) < 1e-9)).toBe(true)
    expect(coil.layout.buildMm).toBeCloseTo((2 * 0.5 + 0.06) * BULGE_ROUND_TUBE, 9)
    expect(coil.findings).toEqual([])
  })

  it('lays one after the other what cannot be wound together, and says so', () => {
    const coil = layOut([winding('a'), winding('b')], [turnsOf('a', 10), turnsOf('b', 12, { withPrevious: true })], 0.5)
    expect(coil.findings).toMatchObject([{ code: 'cannot-be-wound-together', path: 'sequence.1', values: { turns: 12, otherTurns: 10 } }])
    expect(coil.placements[1]!.bottomMm).toBeCloseTo(0.5, 9)
  })

  it('says by how much the coil is too high and which step is too wide', () => {
    const coil = layOut([winding('p'), winding('s', 30)], [turnsOf('p', 200), turnsOf('s', 2)], 0.8, { windingHeightMm: 5, tube: { shape: 'rectangular', widthMm: 9, depthMm: 9, cornerRadiusMm: 0.5 } })
    const over = coil.findings.find(({ code }) => code === 'window-overfilled')!
    expect(over.values.overMm).toBeCloseTo(coil.plainBuildMm * BULGE_RECTANGULAR_TUBE - 5, 9)
    const wide = coil.findings.find(({ code }) => code === 'turn-wider-than-layer')!
    expect(wide.path).toBe('sequence.1')
    expect(wide.values.overMm).toBeCloseTo(2 * 30 * 0.8 - 20, 9)
  })

  const lay = fc.constantFrom('close-wound' as const, 'spread' as const, 'centred' as const, 'close-wound-left' as const, 'close-wound-right' as const)
  const step = fc.record({ turns: fc.integer({ min: 1, max: 90 }), parallel: fc.integer({ min: 1, max: 3 }), lay, layers: fc.option(fc.integer({ min: 1, max: 6 })), marginMm: fc.double({ min: 0, max: 4, noNaN: true }), tapes: fc.integer({ min: 0, max: 3 }), together: fc.boolean() })

  it('lays every turn once, none over another, all inside the window less the margins', () => {
    fc.assert(
      fc.property(fc.array(step, { minLength: 1, maxLength: 4 }), fc.double({ min: 0.1, max: 1.5, noNaN: true }), (drawn, overallMm) => {
        // What is wound together has the same turns and lies directly behind the step before.
        const steps = drawn.map((one, index) => ({ ...one, ...(one.together && index > 0 ? { turns: drawn[index - 1]!.turns, marginMm: drawn[index - 1]!.marginMm, together: !drawn[index - 1]!.together } : { together: false }), tapes: drawn[index + 1]?.together ? 0 : one.tapes }))
        const windings = steps.map(({ parallel }, index) => winding(`w${index}`, parallel))
        const sequence = steps.flatMap(({ turns, lay, layers, marginMm, tapes, together }, index) => [turnsOf(`w${index}`, turns, { lay, layers, marginLeftMm: marginMm, marginRightMm: marginMm, withPrevious: together }), ...(tapes > 0 ? [tapeStep(tapes)] : [])])
        const coil = layOut(windings, sequence, overallMm)
        const turns = coil.layout.items.filter((item) => item.kind === 'turn')
        steps.forEach(({ turns: count, parallel }, index) => {
          expect(turns.filter(({ windingId }) => windingId === `w${index}`)).toHaveLength(count * parallel)
        })
        if (coil.findings.length > 0) return
        const marginOf = (windingId: string) => steps[Number(windingId.slice(1))]!.marginMm
        const out = turns.filter(({ windingId, xMm, yMm }) => {
          const marginMm = marginOf(windingId)
          return xMm - overallMm / 2 < marginMm - 1e-9 || xMm + overallMm / 2 > 20 - marginMm + 1e-9 || yMm - overallMm / 2 < -1e-9 || yMm + overallMm / 2 > 6 + 1e-9
        })
        const leastSquare = (overallMm - 1e-9) ** 2
        const overlapping = turns.filter((one, index) => turns.some((other, place) => place > index && (one.xMm - other.xMm) ** 2 + (one.yMm - other.yMm) ** 2 < leastSquare))
        expect({ out, overlapping }).toEqual({ out: [], overlapping: [] })
      }),
      { numRuns: 60 },
    )
  })

  it('keeps each winding in its section of a former with walls', () => {
    const placed = fc.record({ turns: fc.integer({ min: 1, max: 40 }), section: fc.integer({ min: 1, max: 3 }), lay })
    fc.assert(
      fc.property(fc.array(placed, { minLength: 1, maxLength: 5 }), fc.double({ min: 0.1, max: 0.6, noNaN: true }), (steps, overallMm) => {
        const windings = steps.map((_, index) => winding(`w${index}`))
        const coil = layOut(windings, steps.map(({ turns, section, lay: own }, index) => turnsOf(`w${index}`, turns, { section, lay: own })), overallMm, { windingWidthMm: 6, sections: 3 })
        const strays = coil.layout.items.filter((item) => {
          if (item.kind !== 'turn') return false
          const leftMm = (steps[Number(item.windingId.slice(1))]!.section - 1) * 7
          return item.xMm - overallMm / 2 < leftMm - 1e-9 || item.xMm + overallMm / 2 > leftMm + 6 + 1e-9
        })
        expect(coil.layout.windowWidthMm).toBeCloseTo(3 * 6 + 2, 12)
        expect(strays).toEqual([])
        expect(coil.layout.items.filter(({ kind }) => kind === 'turn')).toHaveLength(steps.reduce((sum, { turns }) => sum + turns, 0))
      }),
      { numRuns: 60 },
    )
  })

  it('cuts foil without a width to the layer, less its edges', () => {
    const coil = layOutCoil({ former: former(), windings: [winding('f')], sequence: [turnsOf('f', 3, { marginLeftMm: 1, marginRightMm: 1, interlayerTape: tapeReference })], wireOf: () => ({ form: 'foil', overallMm: 0.1, conductorMm: 0.1, copperAreaMm2: 1, widthMm: null }), tapeOf: () => tape })
    const foils = coil.layout.items.filter((item) => item.kind === 'foil')
    expect(foils).toHaveLength(3)
    expect(foils[0]!.xMm).toBeCloseTo(1.2, 12)
    expect(foils[0]!.widthMm).toBeCloseTo(17.6, 12)
    expect(foils[2]!.yMm).toBeCloseTo(2 * 0.16, 12)
  })
})

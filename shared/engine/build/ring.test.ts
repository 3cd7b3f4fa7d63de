import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { CoreRow, TapeRow } from '../library'
import type { SequenceStep, Winding, WindingStep } from '../specification'
import { layOutRing, ringLayerCapacity } from './index'
import type { BuildWire } from './index'

const entered = { status: 'mandatory' as const, origin: { kind: 'entered' as const } }
const row = { version: 1, source: 'test', edition: '', confidence: 'high' as const, unverified: [], note: '' }

const core = (change: Partial<CoreRow> = {}): CoreRow => ({
  ...row, kind: 'core', id: 'ring', name: 'ring', shape: 'toroid', standard: '', dimensionsMm: { a: 25, b: 15, c: 10, d: null, e: null, f: null },
  effectiveAreaMm2: 48.9, minimumAreaMm2: 48.9, effectiveLengthMm: 60.2, effectiveVolumeMm3: 2944, massG: 15, centreLeg: null, ...change,
})

const winding = (id: string, turns: number, parallel = 1): Winding => ({
  ...entered, id, name: id.toUpperCase(), role: 'primary', side: 'primary', outputId: null, startTerminal: '1', finishTerminal: '2', turns,
  wire: { wire: { kind: 'wire', id: 'wire', version: 1 }, parallel, thermalClassC: 155, insulation: 'enamel-grade-1', certificate: null, lay: null },
  rmsCurrentA: null, peakCurrentA: null, dcCurrentA: null, dcResistance: null,
})

const turnsOf = (windingId: string, turns: number, change: Partial<WindingStep> = {}): WindingStep => ({
  ...entered, id: `s-${windingId}`, kind: 'winding', remark: '', windingId, startTerminal: '1', finishTerminal: '2', turns, section: 1,
  direction: 'clockwise', lay: 'close-wound', layers: null, marginLeftMm: 0, marginRightMm: 0, interlayerTape: null,
  leadExitStart: 'left', leadExitFinish: 'left', startSleeve: null, finishSleeve: null, ...change,
})

const tape: TapeRow = { ...row, kind: 'tape', id: 'tape', name: 'film', use: 'insulation', material: 'polyester film', thicknessMm: 0.06, widthsMm: [], thermalClassC: 130, layerWithstandVRms: null, materialGroup: 'IIIa' }
const wire = (overallMm: number): BuildWire => ({ form: 'round', overallMm, conductorMm: overallMm * 0.9, copperAreaMm2: 0.5, widthMm: null })

const layOut = (windings: Winding[], sequence: SequenceStep[], overallMm: number, change: Partial<CoreRow> = {}) =>
  layOutRing({ core: core(change), windings, sequence, wireOf: () => wire(overallMm), tapeOf: () => tape })!

describe('ringLayerCapacity', () => {
  // Usual hand formula of ring winding: N ≤ π·(ID − (2k − 1)·d)/d; McLyman, Transformer and Inductor Design Handbook, ch. 4.
  it.each([
    { holeMm: 15, overallMm: 0.544, layer: 1 },
    { holeMm: 15, overallMm: 0.544, layer: 3 },
    { holeMm: 7.62, overallMm: 1.062, layer: 1 },
    { holeMm: 35.6, overallMm: 0.2, layer: 5 },
  ])('agrees with the formula by hand within a turn: hole $holeMm mm, wire $overallMm mm, layer $layer', ({ holeMm, overallMm, layer }) => {
    const byHand = (Math.PI * (holeMm - (2 * layer - 1) * overallMm)) / overallMm
    const capacity = ringLayerCapacity({ radiusMm: holeMm / 2 - (layer - 0.5) * overallMm, overallMm, angleRad: 2 * Math.PI })
    expect(capacity).toBeLessThanOrEqual(byHand)
    expect(capacity).toBeGreaterThan(byHand - 2)
  })

  it.each([3, 4, 6, 12])('packs %d wires round a circle on which they just touch', (count) => {
    const radiusMm = 0.5 / Math.sin(Math.PI / count)
    if (radiusMm >= 1) expect(ringLayerCapacity({ radiusMm, overallMm: 1, angleRad: 2 * Math.PI })).toBe(count)
    else expect(ringLayerCapacity({ radiusMm, overallMm: 1, angleRad: 2 * Math.PI })).toBe(0)
  })
})

describe('layOutRing', () => {
  it('fills the hole layer by layer and says what is left of it', () => {
    const coil = layOut([winding('p', 100)], [turnsOf('p', 100)], 0.5)
    // Radius 7.25: ⌊2π/(2·arcsin(0.25/7.25))⌋ = 91, then 9.
    expect(coil.windings.get('p')!.turnsPerLayer).toEqual([91, 9])
    expect(coil.layout.ring!.remainingHoleMm).toBeCloseTo(15 - 4 * 0.5, 9)
    // Round the section of 5 by 10 mm with the wire's centre 0.25 and 0.75 mm off it.
    expect(coil.windings.get('p')!.meanTurnLengthMm).toBeCloseTo((91 * (30 + 2 * Math.PI * 0.25) + 9 * (30 + 2 * Math.PI * 0.75)) / 100, 9)
    // Outside 25 mm hold all hundred in one layer.
    expect(coil.layout.ring!.overallOutsideMm).toBeCloseTo(26, 9)
  })

  it('lays over the coating where its size is known', () => {
    const bare = layOut([winding('p', 10)], [turnsOf('p', 10)], 0.5)
    const coated = layOut([winding('p', 10)], [turnsOf('p', 10)], 0.5, { coatedMm: { outside: 25.6, inside: 14.4, height: 10.6 } })
    expect(coated.layout.ring!.remainingHoleMm).toBeCloseTo(bare.layout.ring!.remainingHoleMm - 0.6, 9)
  })

  it('keeps two windings in sectors apart by the margins of both', () => {
    const both = [turnsOf('a', 15, { marginLeftMm: 1.5, marginRightMm: 1.5, lay: 'spread' }), turnsOf('b', 15, { section: 2, marginLeftMm: 1.5, marginRightMm: 1.5, lay: 'spread' })]
    const coil = layOut([winding('a', 15), winding('b', 15)], both, 0.8)
    expect(coil.layout.ring!.sectorGapMm).toBeCloseTo(3, 9)
    for (const pass of coil.layout.ring!.passes) expect(pass.windingId === 'a' ? pass.innerYMm > 0 : pass.innerYMm < 0).toBe(true)
  })

  it('says how many turns find no place', () => {
    const coil = layOut([winding('p', 60)], [turnsOf('p', 60)], 2)
    const laid = coil.windings.get('p')!.turns
    expect(coil.findings).toMatchObject([{ code: 'ring-hole-full', path: 'sequence.0.turns', values: { turns: 60, laidTurns: laid, overTurns: 60 - laid } }])
  })

  it('makes the hole smaller by the tape round the ring', () => {
    const round: SequenceStep = { ...entered, id: 't', kind: 'tape', remark: '', tape: { kind: 'tape', id: 'tape', version: 1 }, layers: 3, widthMm: null, purpose: 'interwinding' }
    const coil = layOut([winding('p', 20), winding('s', 20)], [turnsOf('p', 20), round, turnsOf('s', 20)], 0.5)
    expect(coil.layout.ring!.remainingHoleMm).toBeCloseTo(15 - 2 * (0.5 + 3 * 0.06 + 0.5), 9)
    expect(coil.placements[1]!.bottomMm).toBeCloseTo(0.5 + 0.18, 9)
  })

  it('says what it does not lay as asked', () => {
    const coil = layOut([winding('a', 5), winding('b', 5)], [turnsOf('a', 5), turnsOf('b', 5, { withPrevious: true })], 0.5)
    expect(coil.findings).toMatchObject([{ code: 'step-not-for-a-ring', path: 'sequence.1.withPrevious' }])
    expect(coil.placements[1]!.bottomMm).toBeCloseTo(0.5, 9)
  })

  it('does without a size of the core', () => expect(layOutRing({ core: core({ dimensionsMm: { a: 25, b: null, c: 10, d: null, e: null, f: null } }), windings: [], sequence: [], wireOf: () => null, tapeOf: () => null })).toBeNull())

  const lay = fc.constantFrom('close-wound' as const, 'spread' as const, 'centred' as const)
  const step = fc.record({ turns: fc.integer({ min: 1, max: 60 }), parallel: fc.integer({ min: 1, max: 3 }), lay, section: fc.integer({ min: 1, max: 3 }), marginMm: fc.double({ min: 0, max: 2, noNaN: true }), layers: fc.option(fc.integer({ min: 1, max: 4 })) })

  it('lays every turn once or says so, none over another, all between the hole’s middle and the ring', () => {
    fc.assert(
      fc.property(fc.array(step, { minLength: 1, maxLength: 4 }), fc.double({ min: 0.2, max: 1.6, noNaN: true }), (steps, overallMm) => {
        const windings = steps.map(({ turns, parallel }, index) => winding(`w${index}`, turns, parallel))
        const coil = layOut(windings, steps.map(({ turns, lay: own, section, marginMm, layers }, index) => turnsOf(`w${index}`, turns, { lay: own, section, marginLeftMm: marginMm, marginRightMm: marginMm, layers })), overallMm)
        const { passes, holeMm, outsideMm } = coil.layout.ring!
        steps.forEach(({ turns, parallel }, index) => {
          const missing = Number(coil.findings.find(({ code, path }) => code === 'ring-hole-full' && path === `sequence.${index}.turns`)?.values.overTurns ?? 0)
          expect(passes.filter(({ windingId }) => windingId === `w${index}`)).toHaveLength((turns - missing) * parallel)
        })
        const out = passes.filter(({ innerXMm, innerYMm, outerXMm, outerYMm }) => Math.hypot(innerXMm, innerYMm) + overallMm / 2 > holeMm / 2 + 1e-9 || Math.hypot(outerXMm, outerYMm) - overallMm / 2 < outsideMm / 2 - 1e-9)
        const leastSquare = (overallMm - 1e-9) ** 2
        const near = (x: number, y: number) => x * x + y * y < leastSquare
        const overlapping = passes.filter((one, index) =>
          passes.some((other, place) => place > index && (near(one.innerXMm - other.innerXMm, one.innerYMm - other.innerYMm) || near(one.outerXMm - other.outerXMm, one.outerYMm - other.outerYMm))),
        )
        expect({ out, overlapping }).toEqual({ out: [], overlapping: [] })
      }),
      { numRuns: 80 },
    )
  })
})

import { describe, expect, it } from 'vitest'
import type { LayoutItem } from '../evaluation'
import { gapByFieldMm, gapFieldPermeance, gapKeepAwayMm, mmfProfile, turnFieldInput, turnFields } from './index'
import type { GapPlace, LaidCoil } from './index'

const row = (winding: string, turns: number, yMm: number, from = 0, to = 16): LayoutItem[] =>
  Array.from({ length: turns }, (_, n) => ({ kind: 'turn', stepId: `${winding}${yMm}`, windingId: winding, turn: n + 1, strand: 1, layer: 1, xMm: from + ((n + 0.5) * (to - from)) / turns, yMm, overallMm: 0.44, conductorMm: 0.4 }))

const foil = (winding: string, turn: number, yMm: number): LayoutItem => ({ kind: 'foil', stepId: 'f', windingId: winding, turn, xMm: 1, yMm, widthMm: 14, thicknessMm: 0.1 })

const centre: GapPlace = { position: 'centre-leg', lengthMm: 0.5, grinding: 'both-halves', joint: 'middle' }

const coilOf = (items: LayoutItem[], gap: GapPlace = centre): LaidCoil => ({
  layout: { windowWidthMm: 16, windowHeightMm: 5, items, buildMm: 0, buildRatio: 0, copperFill: 0, windowFill: 0 },
  windings: [...new Set(items.flatMap((item) => ('windingId' in item ? [item.windingId] : [])))].map((id) => ({ id, wire: { parallel: 1 } })),
  placed: { window: { breadthMm: 16, heightMm: 6.4, depth: { kind: 'straight', turnAtLegMm: 36, growthPerMm: 0 } }, axialOffsetMm: 0, radialOffsetMm: 1.2, fromCore: true },
  gap,
})

describe('mmfProfile', () => {
  const items = [...row('P', 20, 0.4), foil('S', 1, 1), foil('S', 2, 1.2), ...row('P', 12, 2)]

  it('falls from all ampere-turns at the leg to none beyond the coil, each layer by its own', () => {
    const { layers, windingIds } = mmfProfile(coilOf(items))
    expect(windingIds).toEqual(['P', 'S'])
    expect(layers.map(({ windingId, turns }) => [windingId, turns])).toEqual([['P', 20], ['S', 1], ['S', 1], ['P', 12]])
    expect(layers.map(({ inner }) => [...inner])).toEqual([[-32, -2], [-12, -2], [-12, -1], [-12, 0]])
    expect(layers.map(({ outer }) => [...outer].map((value) => value + 0))).toEqual([[-12, -2], [-12, -1], [-12, 0], [0, 0]])
  })

  it('lays half of it on either side with a spacer in all legs', () => {
    const { layers } = mmfProfile(coilOf(items, { ...centre, position: 'all-legs-spacer' }))
    expect(layers[0]!.inner[0]).toBe(-16)
    expect(layers.at(-1)!.outer[0]).toBe(16)
  })

  it('is the mean over the breadth of the two-dimensional field', () => {
    const coil = coilOf([...row('P', 20, 0.4), ...row('S', 16, 1.4, 3, 13), ...row('P', 12, 2)])
    const { hx, turns } = turnFields(turnFieldInput(coil))
    const { layers, breadthMm } = mmfProfile(coil)
    const outer = turns.flatMap((turn, index) => (turn.windingId === 'P' && index >= 36 ? [hx[index * 2 + 1]!] : []))
    expect(layers[2]!.inner[1]! + 0).toBe(0)
    expect(Math.abs(outer.reduce((sum, h) => sum + h, 0) / outer.length)).toBeLessThan(0.02 * (16 / (breadthMm * 1e-3)))
  })
})

describe('turnFieldInput', () => {
  it('gives each strand its share of the current and keeps the order of the layout', () => {
    const coil = coilOf([...row('P', 4, 0.4), foil('S', 1, 1)])
    const input = turnFieldInput({ ...coil, windings: [{ id: 'P', wire: { parallel: 2 } }, { id: 'S', wire: { parallel: 1 } }] })
    expect(input.turns.map(({ share, foilBreadthMm }) => [share, foilBreadthMm])).toEqual([[0.5, null], [0.5, null], [0.5, null], [0.5, null], [1, 14]])
    expect(input.turns[4]).toMatchObject({ axialMm: 8 })
    expect(input.turns[4]!.radialMm).toBeCloseTo(2.25, 12)
  })

  it('moves what lies outside the window to its edge', () => {
    const input = turnFieldInput(coilOf(row('P', 3, 9, 10, 40)))
    for (const { axialMm, radialMm } of input.turns) {
      expect(axialMm).toBeLessThanOrEqual(16)
      expect(radialMm).toBeLessThanOrEqual(6.4)
    }
    expect(() => turnFields(input)).not.toThrow()
  })
})

describe('gapKeepAwayMm', () => {
  it('is the distance from the mouth of the gap to the nearest copper', () => {
    const near = gapKeepAwayMm(coilOf([...row('P', 16, 0.4), foil('S', 1, 1)]))!
    // Turns stand at 7.5 and 8.5 mm, the gap reaches from 7.75 to 8.25 mm; 1.6 mm lie between leg and middle of the wire.
    expect(near.windingId).toBe('P')
    expect(near.distanceMm).toBeCloseTo(Math.hypot(0.25, 1.6) - 0.2, 12)
    expect(near.gapMm).toBeCloseTo(0.5, 12)
  })

  it('sees the outer legs of a spacer, and nothing without a gap', () => {
    const outer = gapKeepAwayMm(coilOf([foil('S', 1, 5)], { ...centre, position: 'all-legs-spacer' }))!
    expect(outer.distanceMm).toBeCloseTo(6.4 - 6.3, 12)
    expect(gapKeepAwayMm(coilOf([foil('S', 1, 5)], { ...centre, position: 'distributed' }))).toBeNull()
  })
})

describe('gapByFieldMm', () => {
  const permeance = gapFieldPermeance({
    window: { breadthMm: 20, heightMm: 6, depth: { kind: 'round', legRadiusMm: 5 } },
    rectangles: [{ group: 0, share: 1, radialFromMm: 1.5, radialToMm: 5, axialFromMm: 2, axialToMm: 18 }],
    legAreaMm2: 78.5, position: 'centre-leg', grinding: 'one-half', joint: 'middle',
  })

  it('gives the gap back whose permeance it is told', () => {
    for (const gapMm of [0.05, 0.3, 1, 4]) {
      const inductanceFactorH = 1 / (1 / 3e-6 + 1 / permeance(gapMm).permeanceH)
      expect(gapByFieldMm(permeance, { inductanceFactorH, corePermeanceH: 3e-6, longestMm: 10 })! / gapMm).toBeCloseTo(1, 6)
    }
  })

  it('takes a gap beside a yoke for half of one of twice the length in the middle of twice the window', () => {
    const window = { breadthMm: 20, heightMm: 6, depth: { kind: 'straight' as const, turnAtLegMm: 30, growthPerMm: 0 } }
    const rectangles = [{ group: 0, share: 1, radialFromMm: 0.5, radialToMm: 5, axialFromMm: 0, axialToMm: 20 }]
    const fringing = (joint: 'middle' | 'end', gapMm: number) => gapFieldPermeance({ window, rectangles, legAreaMm2: 50, position: 'centre-leg', grinding: null, joint })(gapMm).fringingFactor - 1
    // Two gaps of half the length in mirrored halves of a window of twice the breadth are one gap in its middle.
    const wide = gapFieldPermeance({ window: { ...window, breadthMm: 40 }, rectangles: [{ ...rectangles[0]!, axialToMm: 40 }], legAreaMm2: 50, position: 'centre-leg', grinding: null, joint: 'middle' })(0.8)
    expect(fringing('end', 0.4)).toBeCloseTo(wide.fringingFactor - 1, 5)
    expect(fringing('end', 0.4)).toBeGreaterThan(fringing('middle', 0.4))
  })

  it('gives none above the core without gap', () => {
    expect(gapByFieldMm(permeance, { inductanceFactorH: 4e-6, corePermeanceH: 3e-6, longestMm: 10 })).toBeNull()
  })

  it('falls with the gap, its fringing growing', () => {
    const [short, long] = [permeance(0.2), permeance(0.6)]
    expect(long.permeanceH).toBeLessThan(short.permeanceH)
    expect(long.fringingFactor).toBeGreaterThan(short.fringingFactor)
    expect(short.fringingFactor).toBeGreaterThan(1)
  })
})

import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { LayoutItem } from '../evaluation'
import { fieldsAt, turnFieldInput } from '../field'
import type { LaidCoil } from '../field'
import { groupLeakage, leakageAtH, leakageMatrix } from './leakage-matrix'
import { stackLeakageH } from './stack-leakage'

const expectBetween = (value: number, least: number, most: number) => {
  expect(value).toBeGreaterThanOrEqual(least)
  expect(value).toBeLessThanOrEqual(most)
}

interface Row {
  winding: string
  turns: number
  fromMm: number
  toMm: number
  yMm: number
}

const DIAMETER_MM = 0.4

const rowItems = ({ winding, turns, fromMm, toMm, yMm }: Row, step: number): LayoutItem[] =>
  Array.from({ length: turns }, (_, n) => ({ kind: 'turn', stepId: `t${step}`, windingId: winding, turn: n + 1, strand: 1, layer: 1, xMm: fromMm + ((n + 0.5) * (toMm - fromMm)) / turns, yMm, overallMm: 0.44, conductorMm: DIAMETER_MM }))

const BREADTH_MM = 16

function coilOf(rows: readonly Row[], round = true): LaidCoil {
  return {
    layout: { windowWidthMm: BREADTH_MM, windowHeightMm: 5, items: rows.flatMap(rowItems), buildMm: 0, buildRatio: 0, copperFill: 0, windowFill: 0 },
    windings: [...new Set(rows.map(({ winding }) => winding))].map((id) => ({ id, wire: { parallel: 1 } })),
    placed: { window: { breadthMm: 18, heightMm: 6.4, depth: round ? { kind: 'round', legRadiusMm: 5 } : { kind: 'straight', turnAtLegMm: 36, growthPerMm: 2 * Math.PI } }, axialOffsetMm: 1, radialOffsetMm: 1.2, fromCore: true },
    gap: { position: 'centre-leg', lengthMm: 0.5, grinding: null, joint: 'middle' },
  }
}

const row = (yMm: number) => fc.record({ turns: fc.integer({ min: 3, max: 30 }), left: fc.double({ min: 0, max: 5, noNaN: true }), right: fc.double({ min: 0, max: 5, noNaN: true }), yMm: fc.constant(yMm) })

/** Twice the energy of one ampere-turn in P and its return in S, over one pitch in the middle, even current inside the wires; H. */
function wireEnergyH(coil: LaidCoil): number {
  const { window } = coil.placed
  const input = turnFieldInput(coil)
  const wires = input.turns.map((turn) => ({ ...turn, share: turn.share / 16, radiusMm: DIAMETER_MM / 2, sense: turn.winding === 0 ? 1 : -1 }))
  const pitchMm = window.breadthMm / 16
  const [columns, rows] = [30, 200]
  const places = Array.from({ length: columns * rows }, (_, n) => ({ axialMm: 7 * pitchMm + ((n % columns) + 0.5) * (pitchMm / columns), radialMm: (Math.floor(n / columns) + 0.5) * (window.heightMm / rows) }))
  const { hx, hy } = fieldsAt({ ...input, turns: wires }, places)
  const sum = places.reduce((total, { axialMm, radialMm }, place) => {
    let [axial, radial] = [hx[place * 2]! - hx[place * 2 + 1]!, hy[place * 2]! - hy[place * 2 + 1]!]
    for (const { share, sense, radiusMm, ...at } of wires) {
      const [a, r] = [axialMm - at.axialMm, radialMm - at.radialMm]
      const square = a * a + r * r
      if (square >= radiusMm ** 2) continue
      const change = ((sense * share * 1000) / (2 * Math.PI)) * (1 / radiusMm ** 2 - 1 / square)
      axial += change * r
      radial -= change * a
    }
    return total + axial ** 2 + radial ** 2
  }, 0)
  return sum * 4e-7 * Math.PI * 16 * (pitchMm / columns) * (window.heightMm / rows) * 1e-6 * 40e-3
}

/** Three windings upon each other, each with its own margins. */
const coils = fc.tuple(row(0.4), row(1.4), row(2.6), fc.boolean()).map(([p, s, t, round]) =>
  coilOf([p, s, t].map(({ turns, left, right, yMm }, index) => ({ winding: ['P', 'S', 'T'][index]!, turns, fromMm: left, toMm: BREADTH_MM - right, yMm })), round))

describe('leakage by the energy of the field', () => {
  it('is the same seen from either group, when referred to the same turns', () => {
    fc.assert(fc.property(coils, (coil) => {
      const matrix = leakageMatrix(coil)
      for (const [first, second] of [[['P'], ['S']], [['P'], ['S', 'T']], [['S'], ['T', 'P']]]) {
        expect(groupLeakage(matrix, first!, second!)!.perTurnH / groupLeakage(matrix, second!, first!)!.perTurnH).toBeCloseTo(1, 8)
      }
    }), { numRuns: 40 })
  })

  it('has a positive energy for any currents', () => {
    const currents = fc.array(fc.double({ min: -3, max: 3, noNaN: true }), { minLength: 3, maxLength: 3 }).filter((list) => list.some((value) => Math.abs(value) > 0.1))
    fc.assert(fc.property(coils, currents, (coil, theta) => {
      const { perTurnH } = leakageMatrix(coil)
      expect(theta.reduce((sum, a, i) => sum + theta.reduce((part, b, j) => part + a * b * perTurnH[i * 3 + j]!, 0), 0)).toBeGreaterThan(0)
    }), { numRuns: 60 })
  })

  it('is least when more windings are shorted', () => {
    fc.assert(fc.property(coils, (coil) => {
      const matrix = leakageMatrix(coil)
      const both = groupLeakage(matrix, ['P'], ['S', 'T'])!.perTurnH
      expect(both).toBeLessThanOrEqual(groupLeakage(matrix, ['P'], ['S'])!.perTurnH * (1 + 1e-9))
      expect(both).toBeLessThanOrEqual(groupLeakage(matrix, ['P'], ['T'])!.perTurnH * (1 + 1e-9))
    }), { numRuns: 40 })
  })

  it('grows with the square of the turns', () => {
    const matrix = leakageMatrix(coilOf([{ winding: 'P', turns: 20, fromMm: 0, toMm: 16, yMm: 0.4 }, { winding: 'S', turns: 10, fromMm: 0, toMm: 16, yMm: 1.2 }]))
    const at = (turns: number) => leakageAtH(matrix, { windingId: 'P', turns }, ['S'])!
    expect(at(40) / at(20)).toBeCloseTo(4, 12)
  })

  it('falls when the secondary lies between two halves of the primary', () => {
    const plain = coilOf([0.4, 0.84].map((yMm) => ({ winding: 'P', turns: 30, fromMm: 0, toMm: 16, yMm })).concat([{ winding: 'S', turns: 20, fromMm: 0, toMm: 16, yMm: 1.4 }]))
    const sandwich = coilOf([{ winding: 'P', turns: 30, fromMm: 0, toMm: 16, yMm: 0.4 }, { winding: 'S', turns: 20, fromMm: 0, toMm: 16, yMm: 0.96 }, { winding: 'P', turns: 30, fromMm: 0, toMm: 16, yMm: 1.52 }])
    const of = (coil: LaidCoil) => groupLeakage(leakageMatrix(coil), ['P'], ['S'])!.perTurnH
    expect(of(sandwich)).toBeLessThan(0.5 * of(plain))
  })

  it('rises when a winding takes half the breadth only, most when it lies at one side', () => {
    const of = (fromMm: number, toMm: number) => groupLeakage(leakageMatrix(coilOf([{ winding: 'P', turns: 30, fromMm: 0, toMm: 16, yMm: 0.4 }, { winding: 'S', turns: 15, fromMm, toMm, yMm: 1.4 }])), ['P'], ['S'])!.perTurnH
    expect(of(4, 12) / of(0, 16)).toBeGreaterThan(1.5)
    expect(of(0, 8)).toBeGreaterThan(of(4, 12))
  })

  it.each([{ pitchMm: 0.44 }, { pitchMm: 0.6 }, { pitchMm: 0.8 }])('is that of single round wires at a pitch of $pitchMm mm: energy of their field, summed', ({ pitchMm }) => {
    const turns = 16
    const breadthMm = turns * pitchMm
    const coil = coilOf([{ winding: 'P', turns, fromMm: 0, toMm: breadthMm, yMm: 0.3 }, { winding: 'S', turns, fromMm: 0, toMm: breadthMm, yMm: 1.1 }], false)
    const placed: LaidCoil['placed'] = { ...coil.placed, window: { breadthMm, heightMm: 4, depth: { kind: 'straight', turnAtLegMm: 40, growthPerMm: 0 } }, axialOffsetMm: 0 }
    expectBetween(groupLeakage(leakageMatrix({ ...coil, placed }), ['P'], ['S'])!.perTurnH / wireEnergyH({ ...coil, placed }), 0.99, 1.01)
  }, 20_000)

  it('is the textbook’s where both windings fill the window from yoke to yoke', () => {
    const coil = coilOf([{ winding: 'P', turns: 36, fromMm: -1, toMm: 17, yMm: 0.4 }, { winding: 'S', turns: 36, fromMm: -1, toMm: 17, yMm: 1.4 }], false)
    const h = (DIAMETER_MM * Math.sqrt(Math.PI)) / 2
    const slab = (y: number) => [{ bottomMm: y - h / 2, topMm: y + h / 2, share: 1 }]
    const textbook = stackLeakageH({ turns: 1, meanTurnLengthMm: 36 + 2 * Math.PI * (1.2 + 0.9), breadthMm: 18, driven: slab(0.4), shorted: [slab(1.4)] })!
    // 36 wires of 0.4 mm at a pitch of 0.5 mm store 1 % more than bands.
    expectBetween(groupLeakage(leakageMatrix(coil), ['P'], ['S'])!.perTurnH / textbook, 1, 1.03)
  })

  it('knows windings beside each other in two sections, far above those upon each other', () => {
    const beside = coilOf([{ winding: 'P', turns: 15, fromMm: 0, toMm: 7.5, yMm: 0.4 }, { winding: 'S', turns: 15, fromMm: 8.5, toMm: 16, yMm: 0.4 }])
    const upon = coilOf([{ winding: 'P', turns: 30, fromMm: 0, toMm: 16, yMm: 0.4 }, { winding: 'S', turns: 30, fromMm: 0, toMm: 16, yMm: 1.2 }])
    const of = (coil: LaidCoil) => groupLeakage(leakageMatrix(coil), ['P'], ['S'])!.perTurnH
    expect(of(beside)).toBeGreaterThan(5 * of(upon))
  })

  it('says nothing of windings that lie turn beside turn in one layer', () => {
    const matrix = leakageMatrix(coilOf([{ winding: 'P', turns: 15, fromMm: 0, toMm: 15.5, yMm: 0.4 }, { winding: 'S', turns: 15, fromMm: 0.5, toMm: 16, yMm: 0.4 }, { winding: 'T', turns: 15, fromMm: 0, toMm: 16, yMm: 1.4 }]))
    expect(matrix.bifilar).toEqual([['P', 'S']])
    expect(groupLeakage(matrix, ['P'], ['S'])).toBeNull()
    expect(groupLeakage(matrix, ['P'], ['T'])).not.toBeNull()
  })
})

import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { fieldsAt, turnFields } from './turn-fields'
import type { FieldTurn, TurnFieldInput } from './turn-fields'
import { windowEnergyH } from './window-energy'
import type { CurrentRectangle } from './window-energy'
import { gapMmf, turnLengthAtMm } from './window'
import type { FieldWindow } from './window'

const plane: FieldWindow = { breadthMm: 20, heightMm: 7, depth: { kind: 'straight', turnAtLegMm: 40, growthPerMm: 0 } }

const wire = (axialMm: number, radialMm: number, share = 1, winding = 0): FieldTurn => ({ winding, turn: 1, strand: 1, share, foilBreadthMm: null, axialMm, radialMm })

/** A turn that carries no current only feels the field. */
const probe = (axialMm: number, radialMm: number) => wire(axialMm, radialMm, 0)

const uniformLeg = { kind: 'walls' as const, strips: [{ wall: 'leg' as const, fromMm: 0, toMm: 20, share: 1 }] }

/** ∮H·dl in ampere round a rectangle, by Gauss's rule on equal steps. */
function circulation(input: TurnFieldInput, box: { left: number; right: number; low: number; high: number }): number {
  const steps = 60
  const along = (from: number, to: number) => Array.from({ length: steps }, (_, step) => from + ((step + 0.5) * (to - from)) / steps)
  const sides = [
    ...along(box.low, box.high).map((radial) => ({ at: probe(box.left, radial), axis: 'hy' as const, length: (box.high - box.low) / steps, sign: -1 })),
    ...along(box.low, box.high).map((radial) => ({ at: probe(box.right, radial), axis: 'hy' as const, length: (box.high - box.low) / steps, sign: 1 })),
    ...along(box.left, box.right).map((axial) => ({ at: probe(axial, box.low), axis: 'hx' as const, length: (box.right - box.left) / steps, sign: 1 })),
    ...along(box.left, box.right).map((axial) => ({ at: probe(axial, box.high), axis: 'hx' as const, length: (box.right - box.left) / steps, sign: -1 })),
  ]
  const fields = fieldsAt(input, sides.map(({ at }) => at))
  // Axial, radial and the turn make a left-handed set, hence the sign.
  return -sides.reduce((sum, { axis, length, sign }, side) => sum + sign * length * 1e-3 * fields[axis][side]!, 0)
}

describe('turnFields', () => {
  it('satisfies Ampère’s law round any part of the window', () => {
    const place = fc.record({ axial: fc.double({ min: 7, max: 12, noNaN: true }), radial: fc.double({ min: 2.5, max: 4.5, noNaN: true }), share: fc.double({ min: 0.1, max: 2, noNaN: true }) })
    const depths: FieldWindow['depth'][] = [plane.depth, { kind: 'round', legRadiusMm: 4 }]
    fc.assert(fc.property(fc.array(place, { minLength: 1, maxLength: 12 }), fc.boolean(), fc.constantFrom(...depths), (places, gapped, depth) => {
      const turns = [...places.map(({ axial, radial, share }) => wire(axial, radial, share)), wire(15, 3, 0.7)]
      const input: TurnFieldInput = { window: { ...plane, depth }, gap: gapMmf(plane, { position: gapped ? 'centre-leg' : 'distributed', lengthMm: 0.8, grinding: 'both-halves', joint: 'middle' }), windingIds: ['w'], turns }
      const enclosed = places.reduce((sum, { share }) => sum + share, 0)
      expect(Math.abs(circulation(input, { left: 5, right: 13.5, low: 1, high: 6 }) / enclosed - 1)).toBeLessThan(0.01)
    }), { numRuns: 15 })
  }, 20_000)

  it('gives N·I/b between two layers that fill the breadth and half of it in each', () => {
    const row = (radial: number, winding: number) => Array.from({ length: 40 }, (_, n) => wire((n + 0.5) / 2, radial, winding === 0 ? 1 : -1))
    const turns = [...row(2, 0), ...row(4, 1), probe(10.25, 3), probe(10.25, 1), probe(10.25, 5.5)]
    const { hx, hy } = turnFields({ window: plane, gap: uniformLeg, windingIds: ['w'], turns })
    expect(hx[80]! / (40 / 0.02)).toBeCloseTo(1, 2)
    expect(Math.abs(hx[81]!)).toBeLessThan(5)
    expect(Math.abs(hx[82]!)).toBeLessThan(5)
    expect(hx[20]! / (40 / 0.02)).toBeCloseTo(0.5, 2)
    expect(Math.abs(hy[20]!)).toBeLessThan(10)
  })

  it.each([plane.depth, { kind: 'round' as const, legRadiusMm: 4 }])('gives N·I/b between two foils from yoke to yoke, $kind', (depth) => {
    const foil = (radialMm: number, share: number): FieldTurn => ({ winding: 0, turn: 1, strand: 1, share, foilBreadthMm: 20, radialMm, axialMm: 10 })
    const input: TurnFieldInput = { window: { ...plane, depth }, gap: uniformLeg, windingIds: ['w'], turns: [foil(2, 1), foil(2.6, -1), ...Array.from({ length: 100 }, () => wire(5, 5, 0))] }
    const { hx } = fieldsAt(input, [{ axialMm: 6, radialMm: 2.3 }, { axialMm: 6, radialMm: 1.5 }, { axialMm: 6, radialMm: 4 }])
    expect(hx[0]! / 50).toBeCloseTo(1, 3)
    expect(Math.abs(hx[1]!)).toBeLessThan(0.05)
    expect(Math.abs(hx[2]!)).toBeLessThan(0.05)
  })

  it.each([plane.depth, { kind: 'round' as const, legRadiusMm: 4 }])('has the energy, summed over the window, that the energy of rectangles gives, $kind', (depth) => {
    const window = { ...plane, depth }
    const block = (rows: number, columns: number, at: { axial: number; radial: number }, share: number) =>
      Array.from({ length: rows * columns }, (_, n) => wire(at.axial + (n % columns) / 10, at.radial + Math.floor(n / columns) / 10, share / (rows * columns)))
    const turns = [...block(8, 199, { axial: 0.1, radial: 1.5 }, 1), ...block(10, 99, { axial: 1.1, radial: 3 }, -1)]
    const step = 0.1
    const places = Array.from({ length: 200 * 70 }, (_, n) => ({ axialMm: ((n % 200) + 0.5) * step, radialMm: (Math.floor(n / 200) + 0.5) * step }))
    const { hx, hy } = fieldsAt({ window, gap: uniformLeg, windingIds: ['w'], turns }, places)
    const summed = places.reduce((sum, { radialMm }, index) => sum + (hx[index]! ** 2 + hy[index]! ** 2) * turnLengthAtMm(depth, radialMm), 0) * 4e-7 * Math.PI * step ** 2 * 1e-9
    const rectangles: CurrentRectangle[] = [
      { group: 0, share: 1, radialFromMm: 1.45, radialToMm: 2.25, axialFromMm: 0.05, axialToMm: 19.95 },
      { group: 0, share: -1, radialFromMm: 2.95, radialToMm: 3.95, axialFromMm: 1.05, axialToMm: 10.95 },
    ]
    expect(Math.abs(summed / windowEnergyH({ window, groups: 1, rectangles })[0]! - 1)).toBeLessThan(0.01)
  }, 20_000)

  it('takes the ampere-turns back through a gap spread over the leg: full field inside the layer, none outside', () => {
    const turns = [...Array.from({ length: 40 }, (_, n) => wire((n + 0.5) / 2, 3)), probe(10.25, 1.5), probe(10.25, 5)]
    const { hx } = turnFields({ window: plane, gap: uniformLeg, windingIds: ['w'], turns })
    expect(hx[40]! / (-40 / 0.02)).toBeCloseTo(1, 2)
    expect(Math.abs(hx[41]!)).toBeLessThan(5)
  })

  it('agrees with itself however the field is split between waves and near wires', () => {
    const turns = [wire(9, 2), wire(9.4, 2.3), wire(12, 4), probe(9.2, 2.6), probe(11, 3)]
    const gap = gapMmf(plane, { position: 'centre-leg', lengthMm: 0.5, grinding: 'both-halves', joint: 'middle' })
    const coarse = turnFields({ window: plane, gap, windingIds: ['w'], turns })
    // Places without current shift the split to narrower Gaussians.
    const fine = turnFields({ window: plane, gap, windingIds: ['w'], turns: [...turns, ...Array.from({ length: 400 }, (_, n) => probe(n / 20, 6))] })
    for (const turn of turns.keys()) {
      const size = Math.hypot(coarse.hx[turn]!, coarse.hy[turn]!)
      expect(Math.hypot(coarse.hx[turn]! - fine.hx[turn]!, coarse.hy[turn]! - fine.hy[turn]!) / size).toBeLessThan(2e-3)
    }
  })

  it('lies near the plane field where the leg is wide', () => {
    const turns = [wire(9, 2), wire(9.6, 2), wire(12, 4, -1), probe(10, 3)]
    const gap = gapMmf(plane, { position: 'centre-leg', lengthMm: 0.5, grinding: 'both-halves', joint: 'middle' })
    const flat = turnFields({ window: plane, gap, windingIds: ['w'], turns })
    const round = turnFields({ window: { ...plane, depth: { kind: 'round', legRadiusMm: 2000 } }, gap, windingIds: ['w'], turns })
    for (const turn of turns.keys()) expect(round.hx[turn]! / flat.hx[turn]!).toBeCloseTo(1, 2)
  })

  it('sums the proximity matrices over the turns of each winding, symmetric and of positive diagonal', () => {
    const turns = [wire(9, 2), wire(9.6, 2), wire(12, 4, 1, 1), wire(12, 5, 1, 1)]
    const { proximity, hx, hy } = turnFields({ window: plane, gap: uniformLeg, windingIds: ['p', 's'], turns })
    const q = proximity.get('s')!
    expect(q[1]).toBe(q[2])
    expect(q[0]).toBeCloseTo(hx[4]! ** 2 + hy[4]! ** 2 + hx[6]! ** 2 + hy[6]! ** 2, 3)
    expect(q[0]! * q[3]! - q[1]! ** 2).toBeGreaterThan(0)
  })

  it('refuses a turn outside the window', () => {
    expect(() => turnFields({ window: plane, gap: uniformLeg, windingIds: ['w'], turns: [wire(21, 2)] })).toThrow(RangeError)
  })
})

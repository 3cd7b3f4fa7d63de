import type { CurrentRectangle } from '#shared/engine/field/window-energy'
import { windowEnergyH } from '#shared/engine/field/window-energy'
import type { FieldWindow } from '#shared/engine/field/index'
import { groupLeakage } from '#shared/engine/parasitics/leakage-matrix'
import type { LeakageMatrix } from '#shared/engine/parasitics/leakage-matrix'
import { describe, expect, it } from 'vitest'
import { SOURCE, fieldCases, ratioLine } from './field-cases'
import type { FieldCase } from './field-cases'

// Source of every expected figure: finite elements, see `SOURCE`.
const TOLERANCE = { planar: 0.02, axisymmetric: 0.05 }

type Box = { x0: number; x1: number; y0: number; y1: number }

const mm = (value: unknown) => (value as number) * 1000

function windowOf({ coords, geometry }: FieldCase): FieldWindow {
  const depth: FieldWindow['depth'] = coords === 'planar' ? { kind: 'straight', turnAtLegMm: 1000, growthPerMm: 0 } : { kind: 'round', legRadiusMm: mm(geometry.centre_leg_radius_or_half_width) }
  return { breadthMm: mm(geometry.window_breadth), heightMm: mm(geometry.window_height), depth }
}

/** Leakage matrix of the case: `P1` and `P2` are halves of one winding in series. */
function matrixOf(one: FieldCase): LeakageMatrix {
  const boxes = Object.entries(one.geometry.windings as Record<string, Box>)
  const nameOf = (part: string) => (part === 'P1' || part === 'P2' ? 'P' : part)
  const windingIds = [...new Set(boxes.map(([part]) => nameOf(part)))]
  const rectangles = boxes.map(([part, { x0, x1, y0, y1 }]): CurrentRectangle => ({
    group: windingIds.indexOf(nameOf(part)), share: nameOf(part) === part ? 1 : 0.5,
    radialFromMm: mm(x0), radialToMm: mm(x1), axialFromMm: mm(y0), axialToMm: mm(y1),
  }))
  return { windingIds, perTurnH: windowEnergyH({ window: windowOf(one), groups: windingIds.length, rectangles }), bifilar: [], model: '' }
}

function judge(name: string, own: number, elements: number, tolerance: number): void {
  console.info(ratioLine(name, own, elements, tolerance))
  expect(Math.abs(own / elements - 1), name).toBeLessThan(tolerance)
}

describe(`leakage of two windings (${SOURCE})`, () => {
  it.each(fieldCases(/^A[1235]/))('$id', (one) => {
    const matrix = matrixOf(one)
    const leakage = groupLeakage(matrix, ['P'], ['S'])!
    judge(one.id, leakage.perTurnH, (one.results.L_per_turn2_H_per_m ?? one.results.L_per_turn2_H) as number, TOLERANCE[one.coords])
  })

  it.each(fieldCases(/^A5/))('$id: a secondary of half the breadth has 2 to 4.7 times the textbook’s leakage', (one) => {
    const textbook = (one as unknown as { closed_form: { textbook_L_per_turn2: number } }).closed_form.textbook_L_per_turn2
    const times = groupLeakage(matrixOf(one), ['P'], ['S'])!.perTurnH / textbook
    expect(times).toBeGreaterThan(1.9)
    expect(times).toBeLessThan(4.8)
  })
})

describe(`several shorted windings share the current (${SOURCE})`, () => {
  const [one] = fieldCases(/^A4/)
  const matrix = matrixOf(one!)
  const { results } = one!

  it.each([
    { name: 'S1 shorted', groups: [['P'], ['S1']], key: 'L_P_S1_short_per_turn2_H_per_m' },
    { name: 'S2 shorted', groups: [['P'], ['S2']], key: 'L_P_S2_short_per_turn2_H_per_m' },
    { name: 'S1 to S2', groups: [['S1'], ['S2']], key: 'L_S1_S2_per_turn2_H_per_m' },
    { name: 'both shorted', groups: [['P'], ['S1', 'S2']], key: 'L_P_both_short_per_turn2_H_per_m' },
  ])('$name', ({ name, groups: [first, second], key }) => judge(`${one!.id}, ${name}`, groupLeakage(matrix, first!, second!)!.perTurnH, results[key] as number, TOLERANCE.planar))

  it('S1 carries 1.147 of the ampere-turns, S2 0.147 in reverse', () => {
    const { ampereTurns } = groupLeakage(matrix, ['P'], ['S1', 'S2'])!
    expect(-ampereTurns.get('S1')!).toBeCloseTo(results.S1_share_of_ampere_turns_both_short as number, 4)
    expect(-ampereTurns.get('S2')!).toBeCloseTo(results.S2_share as number, 4)
  })
})

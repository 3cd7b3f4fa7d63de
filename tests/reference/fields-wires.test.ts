import { turnFields } from '#shared/engine/field/index'
import type { FieldTurn, FieldWindow, TurnFieldInput, TurnFields } from '#shared/engine/field/index'
import { describe, expect, it } from 'vitest'
import { SOURCE, fieldCases, ratioLine } from './field-cases'
import type { FieldCase } from './field-cases'
import { dcResistanceOhmPerM, skinFactor, transverseLossWPerM } from './round-wire'

// Source of every expected figure: finite elements, see `SOURCE`. Wires beside a gap and flyback windows: within 20 %.
const TOLERANCE = 0.2

const mm = (value: unknown) => (value as number) * 1000

function windowOf({ coords, geometry }: FieldCase): FieldWindow {
  const legRadiusMm = mm(geometry.centre_leg_radius_or_half_width)
  const depth: FieldWindow['depth'] = coords === 'planar' ? { kind: 'straight', turnAtLegMm: 1000, growthPerMm: 0 } : { kind: 'round', legRadiusMm }
  return { breadthMm: mm(geometry.window_breadth), heightMm: mm(geometry.window_height), depth }
}

interface Row {
  winding: number
  wires: number
  pitchMm: number
  radialMm: number
  share: number
}

const rowTurns = ({ winding, wires, pitchMm, radialMm, share }: Row, breadthMm: number): FieldTurn[] =>
  Array.from({ length: wires }, (_, wire) => ({ winding, turn: wire + 1, strand: 1, share, foilBreadthMm: null, radialMm, axialMm: breadthMm / 2 + (wire - (wires - 1) / 2) * pitchMm }))

function fieldsOf(one: FieldCase, windingIds: string[], rows: readonly Row[]): { input: TurnFieldInput; fields: TurnFields } {
  const window = windowOf(one)
  const [middle, half] = [window.breadthMm / 2, mm(one.geometry.gap) / 2]
  const input: TurnFieldInput = {
    window,
    gap: { kind: 'walls', strips: [{ wall: 'leg', fromMm: middle - half, toMm: middle + half, share: 1 }] },
    windingIds,
    turns: rows.flatMap((row) => rowTurns(row, window.breadthMm)),
  }
  return { input, fields: turnFields(input) }
}

/** Square of the field at a turn per ampere of a winding, (A/m)². */
const squareAt = ({ hx, hy, windingIds }: TurnFields, turn: number, winding: number) => hx[turn * windingIds.length + winding]! ** 2 + hy[turn * windingIds.length + winding]! ** 2

const wireRow = ({ geometry }: FieldCase): Row => ({
  winding: 0, wires: geometry.wires as number, pitchMm: mm(geometry.wire_pitch), share: 1,
  radialMm: mm(geometry.leg_surface_to_wire_surface) + mm(geometry.wire_diameter) / 2,
})

describe(`wires beside a gap (${SOURCE})`, () => {
  it.each(fieldCases(/^C4/))('$id: resistance of an inductor’s layer', (one) => {
    const { fields } = fieldsOf(one, ['w'], [wireRow(one)])
    const [diameter, frequency] = [one.geometry.wire_diameter as number, one.excitation.frequency as number]
    const skin = skinFactor(diameter, frequency)
    const proximity = transverseLossWPerM(diameter, frequency) / (dcResistanceOhmPerM(diameter) / 2)
    const factors = fields.turns.map((_, turn) => skin + proximity * squareAt(fields, turn, 0))
    const mean = factors.reduce((sum, factor) => sum + factor, 0) / factors.length
    const published = one.results.Rac_over_Rdc as number
    console.info(ratioLine(one.id, mean, published, TOLERANCE))
    expect(Math.abs(mean / published - 1)).toBeLessThan(TOLERANCE)
    const single = one.results.Rac_over_Rdc_per_wire_from_gap_outwards as number[]
    single.forEach((value, wire) => expect(Math.abs(factors[factors.length / 2 + wire]! / value - 1), `wire ${wire}`).toBeLessThan(TOLERANCE))
  })

  it.each(fieldCases(/^C3/))('$id: loss of an idle layer', (one) => {
    const coil = one.geometry.driving_coil as { x0: number; x1: number; half_breadth: number }
    const legMm = mm(one.geometry.centre_leg_radius_or_half_width)
    const driven = [0.125, 0.375, 0.625, 0.875].map((part): Row => ({ winding: 1, wires: 40, pitchMm: (2 * mm(coil.half_breadth)) / 40, radialMm: mm(coil.x0 + (coil.x1 - coil.x0) * part) - legMm, share: 1 / 160 }))
    const { input, fields } = fieldsOf(one, ['idle', 'driven'], [wireRow(one), ...driven])
    const axi = one.coords === 'axisymmetric'
    const lossPerSquare = transverseLossWPerM(one.geometry.wire_diameter as number, one.excitation.frequency as number) * (one.results.gap_mmf_peak_A as number) ** 2
    const lengthM = (turn: number) => (axi ? 2 * Math.PI * (legMm + input.turns[turn]!.radialMm) * 1e-3 : 2)
    const wires = one.geometry.wires as number
    const total = Array.from({ length: wires }, (_, turn) => lossPerSquare * squareAt(fields, turn, 1) * lengthM(turn)).reduce((sum, loss) => sum + loss, 0)
    const published = (axi ? one.results.loss_total_W : one.results.loss_total_W_per_m) as number
    console.info(ratioLine(one.id, total, published, TOLERANCE))
    expect(Math.abs(total / published - 1)).toBeLessThan(TOLERANCE)
  })
})

describe(`flyback windows, secondary open (${SOURCE})`, () => {
  it.each(fieldCases(/^B6/))('$id', (one) => {
    const layers = one.geometry.layers_inner_to_outer as { name: string; leg_face_to_wire: number; wire_diameter: number; pitch: number; turns: number }[]
    const rows = layers.map(({ name, leg_face_to_wire, wire_diameter, pitch, turns }): Row => ({ winding: name.startsWith('P') ? 0 : 1, wires: turns, pitchMm: mm(pitch), radialMm: mm(leg_face_to_wire + wire_diameter / 2), share: 1 }))
    const { input, fields } = fieldsOf(one, ['P', 'S'], rows)
    const axi = one.coords === 'axisymmetric'
    const frequency = one.excitation.frequency as number
    const losses = [0, 0]
    input.turns.forEach(({ winding, radialMm }, turn) => {
      const layer = layers.find(({ name }) => name.startsWith(winding === 0 ? 'P' : 'S'))!
      const own = winding === 0 ? (skinFactor(layer.wire_diameter, frequency) * dcResistanceOhmPerM(layer.wire_diameter)) / 2 : 0
      const lengthM = axi ? 2 * Math.PI * (mm(one.geometry.centre_leg_radius_or_half_width) + radialMm) * 1e-3 : 2
      losses[winding]! += lengthM * (own + transverseLossWPerM(layer.wire_diameter, frequency) * squareAt(fields, turn, 0))
    })
    const published = (one.results.loss_W_per_winding ?? one.results.loss_W_per_m_per_winding) as { P: number; S: number }
    console.info(ratioLine(`${one.id}, P`, losses[0]!, published.P, TOLERANCE))
    console.info(ratioLine(`${one.id}, S`, losses[1]!, published.S, TOLERANCE))
    expect(Math.abs(losses[0]! / published.P - 1)).toBeLessThan(TOLERANCE)
    expect(Math.abs(losses[1]! / published.S - 1)).toBeLessThan(TOLERANCE)
  })
})

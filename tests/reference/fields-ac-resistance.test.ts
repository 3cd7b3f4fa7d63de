import { copperLoss } from '#shared/engine/losses/copper-loss'
import type { CopperModel } from '#shared/engine/losses/copper-loss'
import type { Conductor } from '#shared/engine/losses/conductor'
import { turnFields } from '#shared/engine/field/index'
import type { FieldTurn, FieldWindow, GapMmf } from '#shared/engine/field/index'
import { rowInverseSquares } from '#shared/engine/losses/conductor'
import { inConductorFields, inFlatField } from '#shared/engine/losses/layers'
import type { LaidLayer } from '#shared/engine/losses/layers'
import { phasorSpectrum } from '#shared/engine/losses/spectrum'
import { describe, expect, it } from 'vitest'
import reference from './data/fields-ac-resistance.json'

/**
 * Ac resistance and loss of windings against two-dimensional finite elements (second order, gmsh meshes, a sample checked with
 * GetDP): the ratio of this engine's figure to theirs, each within the tolerance of its row. Copper of 58 m/(Ω·mm²), 20 °C.
 */
const TEMPERATURE_C = 20

const caseOf = (id: string) => reference.cases.find((one) => one.id.startsWith(id))!

/** Layers that fill a strip of a window by its breadth, one turn for each conductor, one metre of depth. */
interface StripLayer {
  winding: number
  conductor: Conductor
  perStrip: number
  middleMm: number
}

function stripModel(strip: StripLayer[], breadthMm: number, innerShare: number): CopperModel {
  const windings = Math.max(...strip.map(({ winding }) => winding)) + 1
  const layers = strip.map(({ winding, conductor, perStrip, middleMm }, index): LaidLayer => ({
    winding, stepId: String(index), layer: 1, section: 1, middleMm, turns: perStrip, parallel: 1, turnLengthM: 1, conductor, carries: true,
    // The strip is repeated without end.
    inverseSquaresPerMm2: conductor.kind === 'foil' ? 0 : (Math.PI * perStrip) ** 2 / (3 * breadthMm ** 2),
  }))
  return { field: 'flat', resistance20Ohm: resistances(strip, windings), layers: inFlatField(layers, windings, { breadthMm, innerShare }) }
}

const areaMm2 = (conductor: Conductor) => {
  if (conductor.kind === 'foil') return conductor.thicknessMm * conductor.breadthMm
  return conductor.kind === 'round' ? (Math.PI / 4) * conductor.diameterMm ** 2 : (Math.PI / 4) * conductor.strands * conductor.strandDiameterMm ** 2
}
const resistances = (strip: readonly StripLayer[], windings: number) =>
  Array.from({ length: windings }, (_, w) => strip.filter(({ winding }) => winding === w).reduce((sum, { conductor, perStrip }) => sum + perStrip / (58 * areaMm2(conductor)), 0))

/** Loss in W/m of each winding; currents are peak phasors as in the cases. */
function lossesW(model: CopperModel, peakA: readonly (readonly number[])[], frequencyHz: number): number[] {
  const rms = peakA.map(([re, im]) => ({ re: re! / Math.SQRT2, im: im! / Math.SQRT2 }))
  return copperLoss(model, phasorSpectrum(rms, frequencyHz), TEMPERATURE_C).windings.map(({ skinW, proximityW }) => skinW + proximityW)
}

describe('foils that fill the breadth', () => {
  it('two foils of 1.5 skin depths: exact', () => {
    const { results, geometry } = caseOf('B1_foil')
    const foil: Conductor = { kind: 'foil', thicknessMm: geometry.foil_thickness! * 1e3, breadthMm: 1 }
    const layers = [0, 1].map((winding): StripLayer => ({ winding, conductor: foil, perStrip: 1, middleMm: winding + 1 }))
    const [first, second] = lossesW(stripModel(layers, 1, 0), [[1, 0], [1, 0]], 100e3)
    const dcW = 1 / (2 * 58 * areaMm2(foil))
    const published = results.Rac_over_Rdc_layers as number[]
    expect(first! / dcW / published[0]!).toBeCloseTo(1, 4)
    expect(second! / dcW / published[1]!).toBeCloseTo(1, 4)
    expect((first! + second!) / (2 * dcW) / (results.Rac_over_Rdc_total as number)).toBeCloseTo(1, 4)
  })
})

// Tolerance 1 % up to d/δ = 2 and 3 % up to 6; 10 % were asked.
describe('layers of round wire in a strip', () => {
  const rows = ['B2_wire_d0.2_fill0.6_m3', 'B2_wire_d0.4_fill0.8_m1', 'B2_wire_d0.4_fill0.8_m2', 'B2_wire_d0.4_fill0.8_m3'].flatMap((id) =>
    caseOf(id).excitation.frequencies!.map((frequencyHz, index) => ({ id, frequencyHz, index, ratio: (caseOf(id).results.d_over_delta as number[])[index]! })))

  it.each(rows)('$id at $frequencyHz Hz, d/δ = $ratio', ({ id, frequencyHz, index, ratio }) => {
    const { geometry, results } = caseOf(id)
    const diameterMm = geometry.wire_diameter! * 1e3
    const conductor: Conductor = { kind: 'round', diameterMm }
    const layers = Array.from({ length: geometry.layers! }, (_, layer): StripLayer => ({ winding: layer, conductor, perStrip: 1, middleMm: layer + 1 }))
    const losses = lossesW(stripModel(layers, geometry.pitch! * 1e3, 0), layers.map(() => [1, 0]), frequencyHz)
    const dcW = 1 / (2 * 58 * areaMm2(conductor))
    const tolerance = ratio < 2 ? 0.01 : 0.03
    const whole = losses.reduce((sum, loss) => sum + loss, 0) / (layers.length * dcW)
    expect(Math.abs(whole / (results.Rac_over_Rdc as number[])[index]! - 1)).toBeLessThan(tolerance)
    losses.forEach((loss, layer) => {
      expect(Math.abs(loss / dcW / (results.Rac_over_Rdc_layers as number[][])[index]![layer]! - 1)).toBeLessThan(tolerance + 0.005)
    })
  })
})

const mapped = ({ P, S }: { P: number[]; S: number[] }, index: number) => ({ P: P[index]!, S: S[index]! })

// Tolerance 1 % up to d/δ = 2 (0.5 mm wire: 109 kHz) and 4 % up to 1 MHz; 10 % were asked.
describe('two windings in their phases', () => {
  const rows = ['B3_wire_PSP_antiphase', 'B4_wire_PS_Sopen_gap_centre', 'B5_wire_PSP_90deg'].flatMap((id) =>
    caseOf(id).excitation.frequencies!.map((frequencyHz, index) => ({ id, frequencyHz, index })))

  it.each(rows)('$id at $frequencyHz Hz', ({ id, frequencyHz, index }) => {
    const { geometry, excitation, results } = caseOf(id)
    const laid = geometry.layers_inner_to_outer as { name: string; winding: string; n: number; x: number; d: number }[]
    const strip = laid.map(({ winding, n, x, d }): StripLayer => ({ winding: winding === 'P' ? 0 : 1, conductor: { kind: 'round', diameterMm: d * 1e3 }, perStrip: n, middleMm: x * 1e3 }))
    const perConductor = excitation.current_peak_per_conductor as unknown as Record<string, number[]>
    const current = (winding: string) => perConductor[laid.find((layer) => layer.winding === winding)!.name]!
    const losses = lossesW(stripModel(strip, geometry.strip_breadth! * 1e3, 1), [current('P'), current('S')], frequencyHz)
    const published = mapped(results.loss_W_per_m_per_winding as { P: number[]; S: number[] }, index)
    const tolerance = frequencyHz <= 100e3 ? 0.01 : 0.04
    expect(Math.abs(losses[0]! / published.P - 1)).toBeLessThan(tolerance)
    if (published.S > 1e-6) expect(Math.abs(losses[1]! / published.S - 1)).toBeLessThan(tolerance)
    // The open winding lies where the ampere-turns are balanced.
    else expect(losses[1]).toBeLessThan(1e-9)
  })
})


/** A row of wires or one foil in a window, in mm. */
interface Row {
  winding: number
  conductor: Conductor
  radialMm: number
  axialMm: number[]
}

const evenly = (count: number, pitchMm: number, middleMm: number) => Array.from({ length: count }, (_, n) => middleMm + (n - (count - 1) / 2) * pitchMm)

/** Single wires in the field of the window; one metre of depth unless the turn's length is told. */
function windowModel({ window, gap, rows, blocks = [] }: { window: FieldWindow; gap: GapMmf; rows: Row[]; blocks?: FieldTurn[] }, lengthOf: (row: Row) => number = () => 1): CopperModel {
  const windings = Math.max(...rows.map(({ winding }) => winding), ...blocks.map(({ winding }) => winding)) + 1
  const wires = rows.flatMap(({ winding, conductor, radialMm, axialMm }) => axialMm.map((place): FieldTurn => ({ winding, turn: 1, strand: 1, share: 1, axialMm: place, radialMm, foilBreadthMm: conductor.kind === 'foil' ? conductor.breadthMm : null })))
  const { hx, hy } = turnFields({ window, gap, windingIds: Array.from({ length: windings }, (_, w) => String(w)), turns: [...wires, ...blocks] })
  const layers = rows.map((row, index): LaidLayer => ({
    winding: row.winding, stepId: String(index), layer: 1, section: 1, middleMm: row.radialMm, turns: row.axialMm.length, parallel: 1, turnLengthM: lengthOf(row), conductor: row.conductor, carries: true,
    inverseSquaresPerMm2: row.conductor.kind === 'foil' ? 0 : rowInverseSquares(row.axialMm),
  }))
  const layerOf = Int32Array.from([...rows.flatMap(({ axialMm }, index) => axialMm.map(() => index)), ...blocks.map(() => -1)])
  const resistance20Ohm = Array.from({ length: windings }, (_, w) => rows.filter(({ winding }) => winding === w).reduce((sum, row) => sum + (row.axialMm.length * lengthOf(row)) / (58 * areaMm2(row.conductor)), 0))
  return { field: 'local', resistance20Ohm, layers: inConductorFields(layers, windings, { layerOf, stride: windings, along: hx, across: hy }) }
}

/** A return block of even current as lines, −1 A of its winding in all. */
function block(winding: number, { fromMm, thicknessMm, breadthMm, middleMm }: { fromMm: number; thicknessMm: number; breadthMm: number; middleMm: number }, amperes: number): FieldTurn[] {
  const [deep, wide] = [6, 60]
  return Array.from({ length: deep * wide }, (_, index): FieldTurn => ({
    winding, turn: 1, strand: 1, share: -amperes / (deep * wide), foilBreadthMm: null,
    radialMm: fromMm + ((Math.floor(index / wide) + 0.5) * thicknessMm) / deep,
    axialMm: middleMm + (((index % wide) + 0.5) / wide - 0.5) * breadthMm,
  }))
}

const plane = (breadthMm: number, heightMm: number): FieldWindow => ({ breadthMm, heightMm, depth: { kind: 'straight', turnAtLegMm: 1000, growthPerMm: 0 } })
const centreGap = (breadthMm: number, gapMm: number): GapMmf => ({ kind: 'walls', strips: [{ wall: 'leg', fromMm: (breadthMm - gapMm) / 2, toMm: (breadthMm + gapMm) / 2, share: 1 }] })
const open = { kind: 'all-round' as const }

// Tolerance 2 % at d/δ = 2.4 and 6 % at 5.3; 10 % were asked up to 2.
describe('layers with margins', () => {
  it.each([{ frequencyHz: 100e3, index: 0, tolerance: 0.02 }, { frequencyHz: 500e3, index: 1, tolerance: 0.06 }])('B2w at $frequencyHz Hz', ({ frequencyHz, index, tolerance }) => {
    const { geometry, results } = caseOf('B2w')
    const mm = (metres: number) => metres * 1e3
    const breadthMm = mm(geometry.window_breadth!)
    const pitchMm = mm(geometry.pitch!)
    const conductor: Conductor = { kind: 'round', diameterMm: mm(geometry.wire_diameter!) }
    const first = mm(geometry.first_layer_centre_x!)
    const rows = [0, 1].map((layer): Row => ({ winding: 0, conductor, radialMm: first + layer * pitchMm, axialMm: evenly(16, pitchMm, breadthMm / 2) }))
    const back = block(0, { fromMm: first + 1.5 * pitchMm + 0.3, thicknessMm: 1, breadthMm: 10, middleMm: breadthMm / 2 }, 32)
    const [loss] = lossesW(windowModel({ window: plane(breadthMm, mm(geometry.window_height!)), gap: open, rows, blocks: back }), [[1, 0]], frequencyHz)
    const dcW = 32 / (2 * 58 * areaMm2(conductor))
    expect(Math.abs(loss! / dcW / (results.Rac_over_Rdc as number[])[index]! - 1)).toBeLessThan(tolerance)
  })

  // How current moves along a foil towards its ends no one-dimensional foil shows: 1.08 times the finite elements, where Dowell has
  // 1.09 by the foil's own breadth and 0.94 by the window's.
  it('B1e, foils with ends free of the yokes, are met within 10 %', () => {
    const { geometry, results } = caseOf('B1e')
    const foil: Conductor = { kind: 'foil', thicknessMm: geometry.foil_thickness! * 1e3, breadthMm: geometry.foil_breadth! * 1e3 }
    const rows = [0, 1].map((layer): Row => ({ winding: 0, conductor: foil, radialMm: 1 + foil.thicknessMm / 2 + layer * (foil.thicknessMm + 0.1), axialMm: [11.8] }))
    const back = block(0, { fromMm: 1 + 2 * foil.thicknessMm + 0.1 + 0.3, thicknessMm: 1.5, breadthMm: foil.breadthMm, middleMm: 11.8 }, 2)
    const [loss] = lossesW(windowModel({ window: plane(23.6, 7.5), gap: open, rows, blocks: back }), [[1, 0]], 100e3)
    const ratio = loss! / (2 / (2 * 58 * areaMm2(foil))) / (results.Rac_over_Rdc_total as number)
    expect(Math.abs(ratio - 1)).toBeLessThan(0.1)
  })
})

// Tolerance 3 %; 20 % were asked. The one-dimensional field is low by factors of 2 to 6 here.
describe('flyback windings beside a gap', () => {
  it('B6, planar, gap of 0.5 mm', () => {
    const { results } = caseOf('B6_flyback_PS')
    const rows: Row[] = [
      { winding: 0, conductor: { kind: 'round', diameterMm: 0.4 }, radialMm: 1.5 + 0.2, axialMm: evenly(44, 0.5, 11.8) },
      { winding: 1, conductor: { kind: 'round', diameterMm: 0.5 }, radialMm: 2.1 + 0.25, axialMm: evenly(36, 0.6, 11.8) },
    ]
    // Go and return: two metres of wire for each turn and metre of depth.
    const losses = lossesW(windowModel({ window: plane(23.6, 7.5), gap: centreGap(23.6, 0.5), rows }, () => 2), [[1, 0], [0, 0]], 100e3)
    const published = results.loss_W_per_m_per_winding as { P: number; S: number }
    expect(Math.abs(losses[0]! / published.P - 1)).toBeLessThan(0.03)
    expect(Math.abs(losses[1]! / published.S - 1)).toBeLessThan(0.03)
  })

  it('B6, round leg, gap of 1 mm', () => {
    const { results } = caseOf('B6_flyback_SP')
    const rows: Row[] = [
      { winding: 1, conductor: { kind: 'round', diameterMm: 0.5 }, radialMm: 1.5 + 0.25, axialMm: evenly(36, 0.6, 11.8) },
      { winding: 0, conductor: { kind: 'round', diameterMm: 0.4 }, radialMm: 2.2 + 0.2, axialMm: evenly(44, 0.5, 11.8) },
    ]
    const window: FieldWindow = { breadthMm: 23.6, heightMm: 7.5, depth: { kind: 'round', legRadiusMm: 5.4 } }
    const losses = lossesW(windowModel({ window, gap: centreGap(23.6, 1), rows }, ({ radialMm }) => 2 * Math.PI * (5.4 + radialMm) * 1e-3), [[1, 0], [0, 0]], 100e3)
    const published = results.loss_W_per_winding as { P: number; S: number }
    expect(Math.abs(losses[0]! / published.P - 1)).toBeLessThan(0.03)
    expect(Math.abs(losses[1]! / published.S - 1)).toBeLessThan(0.03)
  })
})

import { copperLoss } from '#shared/engine/losses/copper-loss'
import type { CopperModel } from '#shared/engine/losses/copper-loss'
import type { Conductor } from '#shared/engine/losses/conductor'
import { inFlatField } from '#shared/engine/losses/layers'
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


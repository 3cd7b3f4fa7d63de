import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { acRms, mean, rms } from '../waveforms/statistics'
import { constantWaveform, waveformFromRamps } from '../waveforms/waveform'
import { coreLoss, igseLossWPerM3, steinmetzFromIgse, igseCoefficient, steinmetzLossWPerM3 } from './core-loss'
import type { CoreLossFit } from './core-loss'
import { conductorResponse, inLayer, rowInverseSquares } from './conductor'
import type { Conductor } from './conductor'
import { copperLoss } from './copper-loss'
import type { CopperModel } from './copper-loss'
import { dowellFactor, litzLayers, roundWireLayer } from './dowell'
import { foilProximityLossPerMetre, foilSkinFactor, layerLossWPerM2 } from './layer-loss'
import { inFlatField } from './layers'
import { currentSpectrum, phasorSpectrum } from './spectrum'
import { gamma } from './gamma'

describe('gamma', () => {
  it.each([
    { name: 'Γ(½) = √π', x: 0.5, value: Math.sqrt(Math.PI) },
    { name: 'Γ(5) = 24', x: 5, value: 24 },
    { name: 'Γ(1.5) = √π/2', x: 1.5, value: Math.sqrt(Math.PI) / 2 },
  ])('$name', ({ x, value }) => expect(gamma(x) / value).toBeCloseTo(1, 13))
  it('keeps Γ(x + 1) = x·Γ(x)', () => {
    fc.assert(fc.property(fc.double({ min: 0.5, max: 20, noNaN: true }), (x) => {
      expect(gamma(x + 1) / (x * gamma(x))).toBeCloseTo(1, 11)
    }))
  })
})

describe('dowellFactor', () => {
  it('is 1 for thin layers and grows as x for one thick layer', () => {
    expect(dowellFactor({ heightInSkinDepths: 0.01, layers: 5 })).toBeCloseTo(1, 6)
    expect(dowellFactor({ heightInSkinDepths: 500, layers: 1 })).toBeCloseTo(500, 9)
  })
  it('does not jump where the hyperbolic functions are replaced by their limit', () => {
    for (const x of [20, 40]) {
      const ratio = dowellFactor({ heightInSkinDepths: x * 1.0000001, layers: 4 }) / dowellFactor({ heightInSkinDepths: x, layers: 4 })
      expect(ratio).toBeCloseTo(1, 6)
    }
  })
  it('refuses less than half a layer', () => expect(() => dowellFactor({ heightInSkinDepths: 1, layers: 0.4 })).toThrow(RangeError))
})

describe('equivalent layers', () => {
  it('refuses more wires than the breadth holds', () => {
    expect(() => roundWireLayer({ conductorDiameterMm: 0.5, wiresPerLayer: 40, breadthMm: 15 })).toThrow(/porosity/)
  })
  it('takes 100 strands for ten layers in one', () => {
    const litz = litzLayers({ strandCount: 100, strandDiameterMm: 0.05, wiresPerLayer: 10, breadthMm: 15, layers: 3 })
    expect(litz.layers).toBe(30)
    expect(litz.layer.porosity).toBeCloseTo((100 * 0.05 * Math.sqrt(Math.PI)) / 2 / 15, 12)
  })
})

describe('foil between two fields', () => {
  const foil = { heightMm: 0.3, skinDepthMm: 0.2, resistivityOhmM: 2e-8 }
  it('loses what current and mean field lose apart', () => {
    const [innerA, outerA] = [{ re: 300, im: -120 }, { re: -40, im: 500 }]
    const mean = { re: (innerA.re + outerA.re) / 2, im: (innerA.im + outerA.im) / 2 }
    const perM = { re: outerA.re - innerA.re, im: outerA.im - innerA.im }
    const skinW = (foilSkinFactor(foil.heightMm, foil.skinDepthMm) * foil.resistivityOhmM * (perM.re ** 2 + perM.im ** 2)) / (foil.heightMm * 1e-3)
    const proximityW = foilProximityLossPerMetre({ ...foil, breadthMm: 1 }) * 1000 * (mean.re ** 2 + mean.im ** 2)
    expect(layerLossWPerM2({ ...foil, innerA, outerA }) / (skinW + proximityW)).toBeCloseTo(1, 12)
  })
  it('is Dowell’s m-th layer with fields m − 1 and m', () => {
    const x = foil.heightMm / foil.skinDepthMm
    const dcW = foil.resistivityOhmM / (foil.heightMm * 1e-3)
    const layers = [1, 2, 3].map((m) => layerLossWPerM2({ ...foil, innerA: { re: m - 1, im: 0 }, outerA: { re: m, im: 0 } }))
    expect(layers.reduce((sum, loss) => sum + loss, 0) / (3 * dcW)).toBeCloseTo(dowellFactor({ heightInSkinDepths: x, layers: 3 }), 12)
  })
  it('loses on both faces alone when thick', () => {
    const thick = { heightMm: 100, skinDepthMm: 0.2, resistivityOhmM: 2e-8, innerA: { re: 3, im: 4 }, outerA: { re: 1, im: 0 } }
    expect(layerLossWPerM2(thick)).toBeCloseTo((2e-8 / 0.2e-3) * 26, 12)
    expect(layerLossWPerM2({ ...thick, heightMm: 7.9 }) / layerLossWPerM2(thick)).toBeCloseTo(1, 9)
  })
  it('refuses a foil without height', () => expect(() => foilSkinFactor(0, 1)).toThrow(RangeError))
})

describe('conductor', () => {
  const point = { frequencyHz: 100e3, temperatureC: 100 }
  it('a litz of one strand as thick as its bundle has the field inside a wire twice: once by skin, once by the bundle', () => {
    const wire = inLayer(conductorResponse({ kind: 'round', diameterMm: 0.1 }, point), 0)
    const litz = inLayer(conductorResponse({ kind: 'litz', strandDiameterMm: 0.1, strands: 1, bundleDiameterMm: 0.1 }, point), 0)
    expect(litz.alongWPerM).toBeCloseTo(wire.alongWPerM, 15)
    expect(litz.ownFactor).toBeGreaterThan(wire.ownFactor)
  })
  // Source: C. Sullivan (1999): n strands in the field of a bundle, loss relative to dc π²·ω²·µ0²·n²·d⁶·k/(768·ρ²·b²)-like; here the closed integral.
  it('the field inside a bundle adds n·G·½·(I/(π·D))² to the dc loss', () => {
    const litz: Conductor = { kind: 'litz', strandDiameterMm: 0.05, strands: 200, bundleDiameterMm: 1 }
    const response = conductorResponse(litz, point)
    const resistivityOhmM = (1 / 58e6) * 1.3144
    const dcOhmPerM = resistivityOhmM / (200 * (Math.PI / 4) * 0.05e-3 ** 2)
    expect((inLayer(response, 0).ownFactor - response.skinFactor) * dcOhmPerM).toBeCloseTo((response.proximityWPerM * 0.5) / (Math.PI * 1e-3) ** 2, 9)
  })
  it('sums the inverse squares of a row to π²/(3·p²) in the long run', () => {
    const row = (count: number) => Array.from({ length: count }, (_, k) => 0.5 * k)
    expect(rowInverseSquares(row(1))).toBe(0)
    expect(rowInverseSquares(row(2))).toBeCloseTo(4, 12)
    expect(rowInverseSquares(row(200)) / (Math.PI ** 2 / (3 * 0.25))).toBeGreaterThan(0.97)
    expect(rowInverseSquares(row(1000))).toBeCloseTo(Math.PI ** 2 / (3 * 0.25), 9)
  })
})

const current = waveformFromRamps([
  { durationS: 0.1e-6, from: 0, to: 1 },
  { durationS: 3.9e-6, from: 1, to: 3 },
  { durationS: 0.1e-6, from: 3, to: 0 },
  { durationS: 5.9e-6, from: 0, to: 0 },
])
const idle = constantWaveform(current.periodS, 0)

/** Two windings of ten turns in a window of 10 mm, one layer each. */
function model(diameterMm: number, turns = 10): CopperModel {
  const conductor: Conductor = { kind: 'round', diameterMm }
  const layers = [0, 1].map((winding) => ({ winding, stepId: String(winding), layer: 1, section: 1, middleMm: winding, turns, parallel: 1, turnLengthM: 0.05, conductor, inverseSquaresPerMm2: 3, carries: true }))
  return { field: 'flat', resistance20Ohm: [0.1, 0.1], layers: inFlatField(layers, 2, { breadthMm: 10, innerShare: 1 }) }
}
const lossOf = (diameterMm: number, currents = [current, idle]) => copperLoss(model(diameterMm), currentSpectrum(currents, current.periodS), 100)

describe('copper loss', () => {
  it('is R·I² for thin wire', () => {
    const [own] = lossOf(0.001).windings
    expect(own!.dcW / (0.1 * 1.3144 * mean(current) ** 2)).toBeCloseTo(1, 9)
    expect((own!.dcW + own!.skinW) / (0.1 * 1.3144 * rms(current) ** 2)).toBeCloseTo(1, 6)
    expect(own!.acFactor).toBeCloseTo(1, 4)
  })
  it('leaves a rest of at most one percent, and less when told to', () => {
    const asked = lossOf(0.4)
    expect(asked.tailShare).toBeLessThanOrEqual(0.01)
    const finer = copperLoss(model(0.4), currentSpectrum([current, idle], current.periodS), 100, { tailShare: 1e-4, mostOrders: 5000 })
    expect(finer.orders).toBeGreaterThan(asked.orders)
    expect(asked.totalW / finer.totalW).toBeCloseTo(1, 2)
  })
  it('stops at its most orders with ideal jumps and says what is left', () => {
    const jump = waveformFromRamps([{ durationS: 4e-6, from: 1, to: 3 }, { durationS: 6e-6, from: 0, to: 0 }])
    const loss = copperLoss(model(0.4), currentSpectrum([jump, null], jump.periodS), 100)
    expect(loss.orders).toBeGreaterThanOrEqual(256)
    expect(loss.tailShare).toBeGreaterThan(0.01)
    const far = copperLoss(model(0.4), currentSpectrum([jump, null], jump.periodS), 100, { mostOrders: 20_000 })
    expect(loss.totalW / far.totalW).toBeCloseTo(1, 2)
  })
  it('has no ac loss with direct current', () => {
    const direct = constantWaveform(1e-5, 2)
    expect(copperLoss(model(0.4), currentSpectrum([direct, null], 1e-5), 100).windings[0]).toMatchObject({ acFactor: null, skinW: 0, proximityW: 0 })
  })
  it('charges an idle winding what the field of the other loses in it', () => {
    const [, other] = lossOf(0.4, [current, idle]).windings
    expect(other!.dcW + other!.skinW).toBe(0)
    // Beyond the winding that carries current the field of its gap has ended.
    expect(other!.proximityW).toBeLessThan(1e-12)
    const [inner] = lossOf(0.4, [idle, current]).windings
    expect(inner!.proximityW).toBeGreaterThan(0)
    expect(inner!.idleW).toBeCloseTo(inner!.proximityW, 12)
  })
  it('counts phases: opposite currents lose less in the field than equal ones', () => {
    const opposite = waveformFromRamps(current.points.slice(1).map(([endS, to], index) => ({ durationS: endS - current.points[index]![0], from: -current.points[index]![1], to: -to })))
    const total = (currents: (typeof current)[]) => copperLoss(model(0.4), currentSpectrum(currents, current.periodS), 100).totalW
    expect(total([current, { ...opposite, periodS: current.periodS, points: current.points.map(([t, value]) => [t, -value] as const) }])).toBeLessThan(total([current, current]))
  })
  it('grows as the square of the current', () => {
    const twice = { ...current, points: current.points.map(([t, value]) => [t, 2 * value] as const) }
    expect(lossOf(0.4, [twice, idle]).totalW / lossOf(0.4).totalW).toBeCloseTo(4, 9)
  })
  it('twice the turns in the same breadth have eight times the proximity loss, twice the frequency four times in thin wire', () => {
    const proximity = (turns: number, frequencyHz = 100e3) => copperLoss(model(0.02, turns), phasorSpectrum([{ re: 0, im: 0 }, { re: 1, im: 0 }], frequencyHz), 100).windings[0]!.proximityW
    expect(proximity(20) / proximity(10)).toBeCloseTo(8, 6)
    expect(proximity(10, 200e3) / proximity(10)).toBeCloseTo(4, 4)
  })
  it('weighs the orders by the mean square that Parseval leaves', () => {
    const { dcA, acProductsA2 } = currentSpectrum([current, null], current.periodS)
    expect(Math.sqrt(acProductsA2[0]!) / acRms(current)).toBeCloseTo(1, 12)
    expect(dcA[0]! / mean(current)).toBeCloseTo(1, 12)
  })
})

const triangle = (swingT: number, rise: number) =>
  waveformFromRamps([
    { durationS: rise * 1e-5, from: 0, to: swingT },
    { durationS: (1 - rise) * 1e-5, from: swingT, to: 0 },
  ])

const fit: CoreLossFit = {
  k: 3.2, alpha: 1.46, beta: 2.75, temperature: { ct0: 2.45, ct1: 3.1e-2, ct2: 1.65e-4 }, frequencyRangeHz: [20e3, 200e3],
  fluxRangeT: [0.01, 0.3], temperatureRangeC: [20, 120], source: 'Ferroxcube, Design of Planar Power Transformers',
}

describe('core loss', () => {
  it('goes from k to k_i and back', () => {
    const set = { k: 3.2, alpha: 1.46, beta: 2.75 }
    expect(steinmetzFromIgse({ ki: igseCoefficient(set), alpha: 1.46, beta: 2.75 }).k).toBeCloseTo(3.2, 12)
  })

  it('does not depend on bias or on corners along a ramp', () => {
    const bent = waveformFromRamps([
      { durationS: 2e-6, from: 0.1, to: 0.18 },
      { durationS: 3e-6, from: 0.18, to: 0.3 },
      { durationS: 5e-6, from: 0.3, to: 0.1 },
    ])
    expect(igseLossWPerM3(fit, bent)).toBeCloseTo(igseLossWPerM3(fit, triangle(0.2, 0.5)), 3)
  })

  it('is zero without swing', () => expect(igseLossWPerM3(fit, constantWaveform(1e-5, 0.2))).toBe(0))

  it('approaches the sine for a fine polygon of a sine', () => {
    const count = 400
    const value = (i: number) => 0.1 * Math.sin((2 * Math.PI * i) / count)
    const polygon = waveformFromRamps(Array.from({ length: count }, (_, i) => ({ durationS: 1e-5 / count, from: value(i), to: value(i + 1) })))
    expect(igseLossWPerM3(fit, polygon) / steinmetzLossWPerM3(fit, { frequencyHz: 100e3, peakFluxDensityT: 0.1 })).toBeCloseTo(1, 4)
  })

  it('takes the fit of its frequency', () => {
    const high = { ...fit, k: 99, frequencyRangeHz: [200e3, 500e3] as const }
    const loss = coreLoss({ fits: [high, fit], fluxDensityT: triangle(0.2, 0.5), temperatureC: 100, path: 'core.material' })
    expect(loss.state === 'known' && loss.value.fit).toBe(fit)
    expect(loss.state === 'known' && loss.value.findings).toEqual([])
  })

  it('reports what lies outside the fit', () => {
    const far = { ...triangle(0.8, 0.5), periodS: 1e-5 }
    const loss = coreLoss({ fits: [{ ...fit, frequencyRangeHz: [200e3, 400e3] }], fluxDensityT: far, temperatureC: 130, path: 'core.material' })
    expect(loss.state === 'known' && loss.value.findings.map(({ code }) => code)).toEqual([
      'core-loss-frequency-out-of-range', 'core-loss-flux-out-of-range', 'core-loss-temperature-out-of-range',
    ])
  })

  it('is not checkable without a fit', () => {
    expect(coreLoss({ fits: [], fluxDensityT: triangle(0.2, 0.5), temperatureC: 100, path: 'core.material' })).toMatchObject({ state: 'not-checkable', reason: 'no-data' })
  })
})

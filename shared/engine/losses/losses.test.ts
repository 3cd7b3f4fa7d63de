import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { rms } from '../waveforms/statistics'
import { constantWaveform, waveformFromRamps } from '../waveforms/waveform'
import { coreLoss, igseLossWPerM3, steinmetzFromIgse, igseCoefficient, steinmetzLossWPerM3 } from './core-loss'
import type { CoreLossFit } from './core-loss'
import { dowellFactor, isolatedRoundWireFactor, litzLayers, roundWireLayer } from './dowell'
import { gamma } from './gamma'
import { windingLoss } from './winding-loss'

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
  it('tends to r/(2δ) + 1/4 for a thick wire alone', () => expect(isolatedRoundWireFactor(20) - (5 + 0.25)).toBeLessThan(0.02))
})

const current = waveformFromRamps([
  { durationS: 4e-6, from: 1, to: 3 },
  { durationS: 6e-6, from: 0, to: 0 },
])

describe('windingLoss', () => {
  const layer = roundWireLayer({ conductorDiameterMm: 0.5, wiresPerLayer: 20, breadthMm: 15 })
  const input = { currentA: current, dcResistanceOhm: 0.1, layer, layers: 2, temperatureC: 100, harmonicsCount: 50 }

  it('is R·I² for thin wire', () => {
    const thin = windingLoss({ ...input, layer: { heightMm: 0.001, porosity: 0.001 } })
    expect(thin.totalLossW).toBeCloseTo(0.1 * rms(current) ** 2, 9)
    expect(thin.acResistanceFactor).toBeCloseTo(1, 9)
  })
  it('exceeds the factor of the fundamental, since harmonics lose more', () => {
    const loss = windingLoss(input)
    expect(loss.acResistanceFactor).toBeGreaterThan(loss.fundamentalFactor)
    expect(loss.restFraction).toBeLessThan(0.02)
  })
  it('has no ac loss with direct current', () => {
    expect(windingLoss({ ...input, currentA: constantWaveform(1e-5, 2) })).toMatchObject({ acResistanceFactor: 1, restFraction: 0 })
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

import { dowellFactor, heightInSkinDepths, litzLayers, roundWireLayer } from '#shared/engine/losses/dowell'
import { skinDepthMm } from '#shared/engine/wires/skin-depth'
import { describe, expect, it } from 'vitest'
import { expectWithin } from './relative'

const LAYERS = [0.5, 1, 2, 3, 4, 5, 6, 8, 10]

// Source: exact one-dimensional solution after P. Dowell, Proc. IEE 113 (1966) 1387, own arbitrary-precision table.
const TABLE: readonly (readonly number[])[] = [
  [0.25, 1.0, 1.0003, 1.0016, 1.0038, 1.0069, 1.0108, 1.0155, 1.0277, 1.0433],
  [0.3, 1.0, 1.0007, 1.0034, 1.0079, 1.0142, 1.0223, 1.0322, 1.0574, 1.0898],
  [0.4, 1.0001, 1.0023, 1.0108, 1.025, 1.0449, 1.0705, 1.1017, 1.1813, 1.2836],
  [0.5, 1.0003, 1.0055, 1.0263, 1.061, 1.1094, 1.1718, 1.248, 1.4419, 1.6913],
  [0.6, 1.0007, 1.0115, 1.0544, 1.1261, 1.2263, 1.3553, 1.5128, 1.9139, 2.4296],
  [0.75, 1.0018, 1.0278, 1.1319, 1.3055, 1.5485, 1.8609, 2.2427, 3.2146, 4.4643],
  [0.8, 1.0023, 1.0359, 1.1702, 1.394, 1.7074, 2.1103, 2.6028, 3.8563, 5.468],
  [1.0, 1.0055, 1.0856, 1.406, 1.94, 2.6875, 3.6486, 4.8233, 7.8135, 11.658],
  [1.25, 1.0135, 1.1987, 1.9394, 3.1739, 4.9022, 7.1243, 9.8403, 16.7536, 25.6421],
  [1.5, 1.0278, 1.3781, 2.7793, 5.1147, 8.3842, 12.5878, 17.7256, 30.8036, 47.6182],
  [2.0, 1.0856, 1.8978, 5.1465, 10.561, 18.1412, 27.8873, 39.7991, 70.1201, 109.1043],
  [3.0, 1.3781, 3.0101, 9.5383, 20.4186, 35.651, 55.2355, 79.1721, 140.1016, 218.4396],
  [4.0, 1.8978, 4.0023, 12.4201, 26.4498, 46.0914, 71.3449, 102.2103, 180.7767, 281.7906],
  [6.0, 3.0101, 6.0, 17.9596, 37.8921, 65.7978, 101.6764, 145.5281, 257.1505, 400.6651],
]

describe('Dowell table', () => {
  it.each(TABLE)('x = %d', (x, ...factors) => {
    factors.forEach((factor, index) => expectWithin(dowellFactor({ heightInSkinDepths: x!, layers: LAYERS[index]! }), factor, 6e-5))
  })
})

// Source: L. Dixon, SLUP127, Fig. 5 as read by the author; a chart is read to about 10 %.
describe('readings from the published chart', () => {
  it.each([
    { x: 5.88, layers: 5, read: 100, exact: 99.7 },
    { x: 0.625, layers: 6, read: 1.6, exact: 1.603 },
    { x: 1.6, layers: 1, read: 1.5, exact: 1.468 },
    { x: 0.375, layers: 8, read: 1.2, exact: 1.14 },
    { x: 0.375, layers: 4, read: 1, exact: 1.035 },
  ])('x $x, $layers layers: read $read, exact $exact', ({ x, layers, read, exact }) => {
    const factor = dowellFactor({ heightInSkinDepths: x, layers })
    expectWithin(factor, exact, 1e-3)
    expectWithin(factor, read, 0.1)
  })

  it.each([
    { x: 1.6, layers: 2, read: 2.5, exact: 3.2 },
    { x: 0.225, layers: 36, read: 1.6, exact: 1.369 },
  ])('x $x, $layers layers: the reading $read is not confirmed, exact $exact', ({ x, layers, read, exact }) => {
    const factor = dowellFactor({ heightInSkinDepths: x, layers })
    expectWithin(factor, exact, 2e-3)
    expect(Math.abs(factor / read - 1)).toBeGreaterThan(0.1)
  })
})

// Source: own calculation: 0.5 mm wire, 20 turns in 15 mm, 100 kHz, 100 °C.
describe('round wire as foil', () => {
  const layer = roundWireLayer({ conductorDiameterMm: 0.5, wiresPerLayer: 20, breadthMm: 15 })
  const x = heightInSkinDepths(layer, skinDepthMm({ frequencyHz: 100e3, temperatureC: 100 }))
  it('h 0.44311 mm, η 0.59082, x 1.42158', () => {
    expect(layer.heightMm).toBeCloseTo(0.44311, 5)
    expect(layer.porosity).toBeCloseTo(0.59082, 5)
    expectWithin(x, 1.42158, 2e-5)
  })
  it.each([[1, 1.3146], [2, 2.4832], [3, 4.4309]])('%i layers: %d', (layers, factor) => expectWithin(dowellFactor({ heightInSkinDepths: x, layers }), factor, 1e-4))
  it('foil of 0.15 mm in six layers: x 0.62607, 1.6073', () => {
    const foil = heightInSkinDepths({ heightMm: 0.15, porosity: 1 }, skinDepthMm({ frequencyHz: 100e3, temperatureC: 100 }))
    expectWithin(foil, 0.62607, 2e-5)
    expectWithin(dowellFactor({ heightInSkinDepths: foil, layers: 6 }), 1.6073, 1e-4)
  })
  it('150 strands of AWG 40 in three layers count as 36.7 layers', () => {
    const litz = litzLayers({ strandCount: 150, strandDiameterMm: 0.07987, wiresPerLayer: 10, breadthMm: 15, layers: 3 })
    expectWithin(litz.layers, 36.7, 2e-3)
  })
})

// Source: own calculation after P. Dowell (1966): h = d·√(π/4), η = 0.8, 100 kHz, 100 °C.
describe('design table, porosity 0.8', () => {
  const depthMm = skinDepthMm({ frequencyHz: 100e3, temperatureC: 100 })
  it.each([
    [0.25, 1.04, 1.19, 1.45, 1.81],
    [0.3, 1.08, 1.39, 1.91, 2.64],
    [0.4, 1.24, 2.15, 3.67, 5.79],
    [0.5, 1.52, 3.44, 6.63, 11.1],
    [0.7, 2.27, 6.74, 14.2, 24.6],
  ])('%d mm', (diameterMm, ...factors) => {
    const x = heightInSkinDepths({ heightMm: diameterMm * Math.sqrt(Math.PI / 4), porosity: 0.8 }, depthMm)
    factors.forEach((factor, index) => expectWithin(dowellFactor({ heightInSkinDepths: x, layers: index + 1 }), factor, 6e-3))
  })
})

// Source: own calculation from the law; asymptote (15/(5m² − 1))^¼.
describe('optimum height of a foil', () => {
  it.each([
    { layers: 1, x: 1.5708, factor: 1.4407 },
    { layers: 2, x: 0.9613, factor: 1.3487 },
    { layers: 3, x: 0.7704, factor: 1.3397 },
    { layers: 10, x: 0.4167, factor: 1.3339 },
  ])('$layers layers: x $x', ({ layers, x, factor }) => {
    const perHeight = (at: number) => dowellFactor({ heightInSkinDepths: at, layers }) / at
    expectWithin(dowellFactor({ heightInSkinDepths: x, layers }), factor, 1e-4)
    expect(perHeight(x)).toBeLessThan(perHeight(x * 1.01))
    expect(perHeight(x)).toBeLessThan(perHeight(x * 0.99))
  })
})

import { awgDiameterMm } from '#shared/engine/wires/awg'
import { layeredWireDiameterMm, litzResistanceOhmPerM } from '#shared/engine/wires/insulated-diameter'
import {
  iecWireResistance, resistanceFactor, roundAreaMm2, temperatureByResistanceC, windingLengthM, windingResistanceOhm,
} from '#shared/engine/wires/resistance'
import { skinDepthMm } from '#shared/engine/wires/skin-depth'
import { describe, expect, it } from 'vitest'
import awg from './data/awg-wire.json'
import iec from './data/iec-60317-wire.json'
import { expectWithin } from './relative'

// Source: IEC 60317-0-1, resistance annex, with the conductor tolerances of its Table 1.
describe('IEC 60317-0-1 resistances', () => {
  it.each(iec.rows)('$diameterMm mm', ({ diameterMm, toleranceMm, nominal, minimum, maximum }) => {
    const limits = iecWireResistance({ diameterMm, toleranceMm: toleranceMm ?? undefined })
    // Five printed digits: half of the last one is at most 5e-5.
    expectWithin(limits.nominalOhmPerM, nominal, 5e-5)
    expectWithin(limits.minimumOhmPerM, minimum, 5e-5)
    expectWithin(limits.maximumOhmPerM, maximum, 5e-5)
  })
})

// Source: ASTM B258; McLyman, Handbook, 3rd ed. 2004, Tables 4-9 and 4-16.
describe('AWG', () => {
  it.each(awg.rows)('AWG $gauge', ({ gauge, diameterMm, areaMm2, resistance, tripleInsulatedMm }) => {
    expect(awgDiameterMm(gauge)).toBeCloseTo(diameterMm, 5)
    expectWithin(roundAreaMm2(awgDiameterMm(gauge)), areaMm2, 1e-5)
    expectWithin(windingResistanceOhm({ lengthM: 1, strandAreaMm2: areaMm2, temperatureC: 20 }), resistance, 1e-5)
    // The table starts from diameters rounded to 0.0001 in.
    if (tripleInsulatedMm !== null) expect(Math.abs(layeredWireDiameterMm({ conductorDiameterMm: diameterMm }) - tripleInsulatedMm)).toBeLessThan(0.003)
  })

  it('30 turns of 61 mm in AWG 22 at 100 °C have 127.38 mΩ', () => {
    const lengthM = windingLengthM({ turns: 30, meanTurnLengthMm: 61 })
    expectWithin(windingResistanceOhm({ lengthM, strandAreaMm2: roundAreaMm2(awgDiameterMm(22)), temperatureC: 100 }), 0.12738, 2e-4)
  })
})

// Source: resistivity 1/58 Ω·mm²/m and 0.00393 /K (IEC 60028); own table in mm at 20, 60 and 100 °C.
describe('skin depth of copper', () => {
  it.each([
    [20000, 0.4673, 0.5027, 0.5357],
    [25000, 0.418, 0.4496, 0.4792],
    [50000, 0.2955, 0.3179, 0.3388],
    [100000, 0.209, 0.2248, 0.2396],
    [132000, 0.1819, 0.1957, 0.2085],
    [200000, 0.1478, 0.159, 0.1694],
    [500000, 0.0935, 0.1005, 0.1071],
    [1000000, 0.0661, 0.0711, 0.0758],
  ])('%i Hz: %d, %d, %d mm', (frequencyHz, at20, at60, at100) => {
    for (const [temperatureC, depthMm] of [[20, at20], [60, at60], [100, at100]] as const) {
      expect(Math.abs(skinDepthMm({ frequencyHz, temperatureC }) - depthMm)).toBeLessThan(6e-5)
    }
  })

  it.each([[50, 0.296, 0.339], [65, 0.259, 0.297], [100, 0.209, 0.24], [130, 0.183, 0.21], [200, 0.148, 0.169], [300, 0.121, 0.138], [500, 0.093, 0.107], [1000, 0.066, 0.076]])(
    '%i kHz: %d and %d mm, rounded to micrometres', (kHz, at20, at100) => {
      expect(Math.abs(skinDepthMm({ frequencyHz: kHz * 1000, temperatureC: 20 }) - at20)).toBeLessThan(6e-4)
      expect(Math.abs(skinDepthMm({ frequencyHz: kHz * 1000, temperatureC: 100 }) - at100)).toBeLessThan(6e-4)
    },
  )

  it.each([
    { name: 'McLyman, 0.0209 cm at 100 kHz and 20 °C', frequencyHz: 100e3, temperatureC: 20, publishedMm: 0.209 },
    { name: 'Dixon, 0.024 cm at 100 kHz and 100 °C', frequencyHz: 100e3, temperatureC: 100, publishedMm: 0.24 },
    { name: 'Dixon, 0.017 cm at 200 kHz and 100 °C', frequencyHz: 200e3, temperatureC: 100, publishedMm: 0.17 },
    { name: 'Ferroxcube, 223 µm at 100 kHz and 60 °C', frequencyHz: 100e3, temperatureC: 60, publishedMm: 0.223 },
  ])('$name', ({ publishedMm, ...input }) => expectWithin(skinDepthMm(input), publishedMm, 0.01))
})

// Source: IEC 60028 law; own calculation.
describe('resistance and temperature', () => {
  it.each([[90, 1.2751], [100, 1.3144], [120, 1.393], [25, 1.01965]])('factor at %i °C: %d', (temperatureC, factor) => {
    expect(resistanceFactor(temperatureC)).toBeCloseTo(factor, 4)
  })
  it('25 to 100 °C: × 1.289', () => expectWithin(resistanceFactor(100) / resistanceFactor(25), 1.289, 1e-3))
  it('a ratio of 1.20 from 25 °C is 76.9 °C', () => expect(temperatureByResistanceC({ resistanceRatio: 1.2, coldTemperatureC: 25 })).toBeCloseTo(76.9, 6))
  it.each([[0.28, 0.25, 1.254], [0.3, 0.28, 1.148]])('%d mm to %d mm: × %d', (thick, thin, factor) => {
    expectWithin(roundAreaMm2(thick) / roundAreaMm2(thin), factor, 1e-3)
  })
})

// Source: maker's table of litz wire, 10 × 0.020 mm.
it('litz of 10 × 0.020 mm has 5.5500 Ω/m', () => {
  // Ten strands of 0.020 mm: the published figure is 1/58.5 over the area, times 1.02.
  expectWithin(litzResistanceOhmPerM({ strandCount: 10, strandDiameterMm: 0.02 }), 5.55, 1e-4)
})

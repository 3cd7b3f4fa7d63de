import { apparentInductanceRatio, capacitiveTestCurrentA } from '#shared/engine/parasitics/capacitance'
import { concentricLeakageH } from '#shared/engine/parasitics/leakage'
import { temperatureRiseK, volumeThermalResistanceKPerW } from '#shared/engine/thermal/temperature-rise'
import { describe, expect, it } from 'vitest'
import { expectWithin } from './relative'

// Source: own calculation by the closed form of E. Snelling, Soft Ferrites; ±40 % is its honest accuracy.
describe('leakage of concentric windings', () => {
  const thirty = { turns: 30, meanTurnLengthMm: 61, breadthMm: 15 }
  const sixty = { turns: 60, meanTurnLengthMm: 52, breadthMm: 9.3, windingHeightsMm: [0.6, 0.5] }
  it.each([
    { name: '30 turns, one interface', input: { ...thirty, windingHeightsMm: [2, 1.5], interfaceGapsMm: [0.15], interfaces: 1 }, microhenry: 6.056 },
    { name: '30 turns, sandwich', input: { ...thirty, windingHeightsMm: [2, 1.5], interfaceGapsMm: [0.15, 0.15], interfaces: 2 }, microhenry: 1.686 },
    { name: '60 turns, one interface', input: { ...sixty, interfaceGapsMm: [0.18], interfaces: 1 }, microhenry: 13.8 },
    { name: '60 turns, two interfaces', input: { ...sixty, interfaceGapsMm: [0.18, 0.18], interfaces: 2 }, microhenry: 4.6 },
  ])('$name: $microhenry µH', ({ input, microhenry }) => expectWithin(concentricLeakageH(input) * 1e6, microhenry, 5e-3))
})

// Source: own calculation.
describe('test current and self-resonance', () => {
  it.each([
    { pF: 30, kV: 3, Hz: 50, mA: 0.028 }, { pF: 100, kV: 3, Hz: 50, mA: 0.094 }, { pF: 300, kV: 3, Hz: 50, mA: 0.283 },
    { pF: 30, kV: 4, Hz: 60, mA: 0.045 }, { pF: 100, kV: 4, Hz: 60, mA: 0.151 }, { pF: 300, kV: 4, Hz: 60, mA: 0.452 },
  ])('$pF pF at $kV kV, $Hz Hz: $mA mA', ({ pF, kV, Hz, mA }) => {
    const currentA = capacitiveTestCurrentA({ capacitanceF: pF * 1e-12, testVoltageV: kV * 1000, frequencyHz: Hz })
    expect(Math.abs(currentA * 1000 - mA)).toBeLessThan(6e-4)
  })
  it.each([[3, 12.5], [5, 4.17], [10, 1.01], [20, 0.25]])('1/%i of self-resonance reads %d %% high', (ratio, percent) => {
    expect((apparentInductanceRatio({ frequencyHz: 1, selfResonanceHz: ratio }) - 1) * 100).toBeCloseTo(percent, 1)
  })
})

describe('temperature rise', () => {
  // Source: C. McLyman, Handbook, ch. 6.
  it.each([[0.03, 24.8], [0.07, 50], [0.04, 31.5]])('McLyman: %d W/cm² rises %d K', (load, riseK) => {
    expectWithin(temperatureRiseK({ kind: 'mclyman-surface', surfaceMm2: 100 }, load), riseK, 3e-3)
  })
  // Source: powder-core catalogues.
  it.each([[100, 46.3], [36.6, 20.1], [60, 30.3]])('powder catalogues: %d mW/cm² rises %d K', (load, riseK) => {
    expectWithin(temperatureRiseK({ kind: 'powder-catalogue-surface', surfaceMm2: 100 }, load / 1000), riseK, 3e-3)
  })
  // Source: S. Mulder, ferrite handbook. L. Dixon (SLUP127) gives 19 K/W for ETD 34.
  it.each([['ETD 34', 7640, 17.7], ['ETD 29', 5470, 21.2]] as const)('%s has %d mm³: %d K/W', (_core, volumeMm3, kPerW) => {
    expectWithin(volumeThermalResistanceKPerW('ferrite-volume', volumeMm3), kPerW, 3e-3)
  })
  it('Dixon’s 19 K/W for ETD 34 lies 8 % above the volume law', () => expectWithin(19 / volumeThermalResistanceKPerW('ferrite-volume', 7640), 1.075, 0.01))
  // Source: Ferroxcube, Design of Planar Power Transformers: 12·ΔT/√V_e mW/cm³ for the core's half; 470 and 429 mW/cm³ at 35 K.
  it.each([[800, 469.6], [960, 428.7]])('planar core of %d mm³ may lose %d mW/cm³ at 35 K', (volumeMm3, allowed) => {
    const totalW = 35 / volumeThermalResistanceKPerW('planar-volume', volumeMm3)
    expectWithin((totalW / 2 / (volumeMm3 * 1e-3)) * 1000, allowed, 2e-3)
  })
})

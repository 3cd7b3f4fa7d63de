import { describe, expect, it } from 'vitest'
import { apparentInductanceRatio } from './capacitance'
import { clampLossW, concentricLeakageH } from './leakage'

const input = { turns: 30, meanTurnLengthMm: 61, breadthMm: 15, windingHeightsMm: [2, 1.5], interfaceGapsMm: [0.15], interfaces: 1 }

describe('concentricLeakageH', () => {
  it('grows with the square of the turns', () => expect(concentricLeakageH({ ...input, turns: 60 }) / concentricLeakageH(input)).toBeCloseTo(4, 12))
  it('refuses a winding without height', () => expect(() => concentricLeakageH({ ...input, windingHeightsMm: [2, 0] })).toThrow(/windingHeightsMm\.1/))
})

describe('clampLossW', () => {
  const clamp = { leakageInductanceH: 6e-6, peakCurrentA: 2, frequencyHz: 1e5, clampVoltageV: 150, reflectedVoltageV: 100 }
  it('takes energy from the input while the leakage empties', () => expect(clampLossW(clamp)).toBeCloseTo(1.2 * 3, 12))
  it('refuses a clamp at the reflected voltage', () => expect(() => clampLossW({ ...clamp, clampVoltageV: 100 })).toThrow(/clampVoltageV/))
})

describe('apparentInductanceRatio', () => {
  it('refuses a frequency at resonance', () => expect(() => apparentInductanceRatio({ frequencyHz: 1e6, selfResonanceHz: 1e6 })).toThrow(RangeError))
})

import { describe, expect, it } from 'vitest'
import { scaleWaveform, sumWaveforms } from '../waveforms/combine'
import { integralOverPeriod, maximum, mean, minimum, peak, rms } from '../waveforms/statistics'
import { commonModeChokeState, differentialFluxDensityT, inductiveImpedanceOhm } from './common-mode-choke'

const line = { turns: 20, inductanceH: 10e-3, differentialLeakageH: 60e-6, lineRmsA: 2, linePeakA: 2 * Math.SQRT2, lineFrequencyHz: 50 }

describe('common-mode choke at its line current', () => {
  it.each([1, Math.SQRT2, 2, 3])('keeps rms and peak at a crest factor of %d', (crest) => {
    const { windings, conductingShare } = commonModeChokeState({ ...line, linePeakA: 2 * crest })
    expect(rms(windings[0].currentA)).toBeCloseTo(2, 9)
    expect(mean(windings[0].currentA)).toBeCloseTo(0, 9)
    if (crest > 1.5) expect(peak(windings[0].currentA)).toBeCloseTo(2 * crest, 9)
    if (crest > 1.5) expect(conductingShare).toBeCloseTo(2 / crest ** 2, 1)
  })

  it('the ampere-turns of both windings cancel and each voltage balances', () => {
    const { windings: [there, back], differentialFluxLinkageWb } = commonModeChokeState({ ...line, linePeakA: 5 })
    const sum = sumWaveforms([scaleWaveform(there.currentA, 20), scaleWaveform(back.currentA, 20)])
    expect(Math.max(maximum(sum), -minimum(sum))).toBeLessThan(1e-12)
    expect(integralOverPeriod(there.voltageV)).toBeCloseTo(0, 12)
    expect(peak(differentialFluxLinkageWb)).toBeCloseTo(60e-6 * 5, 12)
  })

  it('carries a direct current as it is', () => {
    const { windings } = commonModeChokeState({ ...line, lineFrequencyHz: 0, linePeakA: 2 })
    expect(mean(windings[0].currentA)).toBeCloseTo(2, 12)
    expect(mean(windings[1].currentA)).toBeCloseTo(-2, 12)
  })

  it('flux of the leakage L·Î/(N·A) and impedance 2π·f·L', () => {
    expect(differentialFluxDensityT({ differentialLeakageH: 60e-6, peakA: 5, turns: 20, areaMm2: 50 })).toBeCloseTo(0.3, 12)
    expect(inductiveImpedanceOhm(10e-3, 150e3)).toBeCloseTo(9424.78, 2)
  })

  it('refuses a peak below the rms value', () => expect(() => commonModeChokeState({ ...line, linePeakA: 1 })).toThrow(RangeError))
})

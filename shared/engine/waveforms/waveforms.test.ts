import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { differenceOfWaveforms, runningIntegral, scaleWaveform, steadyNode, sumWaveforms, workingVoltage } from './combine'
import { harmonicTailMeanSquareBound, harmonics } from './fourier'
import { acRms, integralOverPeriod, maximum, mean, meanSquare, minimum, peak, peakToPeak, positiveVoltSeconds, rms, totalVariation } from './statistics'
import { createWaveform, valueAt, waveformFromRamps } from './waveform'
import type { Waveform } from './waveform'

const trapezium = waveformFromRamps([
  { durationS: 4e-6, from: 1, to: 3 },
  { durationS: 6e-6, from: 0, to: 0 },
])

const square = createWaveform(2, [[0, 1], [1, 1], [1, -1], [2, -1]])
const triangle = createWaveform(2, [[0, -1], [1, 1], [2, -1]])

describe('statistics of a waveform', () => {
  it.each([
    { name: 'mean of a trapezium 1…3 A over 40 %', got: mean(trapezium), want: 0.8 },
    { name: 'rms of it, √(0.4·(9+3+1)/3)', got: rms(trapezium), want: 1.3165611772 },
    { name: 'ac rms of it', got: acRms(trapezium), want: 1.0456258094 },
    { name: 'rms of a triangle, 1/√3', got: rms(triangle), want: 0.5773502692 },
    { name: 'peak-to-peak', got: peakToPeak(trapezium), want: 3 },
    { name: 'maximum', got: maximum(trapezium), want: 3 },
    { name: 'minimum', got: minimum(square), want: -1 },
    { name: 'peak of a negative swing', got: peak(scaleWaveform(trapezium, -2)), want: 6 },
    { name: 'positive volt-seconds of a ramp through zero', got: positiveVoltSeconds(triangle), want: 0.5 },
    { name: 'total variation of a square', got: totalVariation(square), want: 4 },
    { name: 'value on a ramp', got: valueAt(trapezium, 2e-6), want: 2 },
    { name: 'value one period on', got: valueAt(trapezium, 12e-6), want: 2 },
  ])('$name', ({ got, want }) => expect(got).toBeCloseTo(want, 9))
})

describe('createWaveform', () => {
  it.each([
    { name: 'no period', periodS: 0, points: [[0, 1], [0, 1]] as const },
    { name: 'a start after zero', periodS: 1, points: [[0.1, 1], [1, 1]] as const },
    { name: 'an end before the period', periodS: 1, points: [[0, 1], [0.9, 1]] as const },
    { name: 'time going back', periodS: 1, points: [[0, 1], [0.5, 1], [0.4, 1], [1, 1]] as const },
    { name: 'a value that is no number', periodS: 1, points: [[0, Number.NaN], [1, 1]] as const },
  ])('refuses $name', ({ periodS, points }) => expect(() => createWaveform(periodS, points)).toThrow(RangeError))
})

describe('harmonics', () => {
  it.each([
    { name: 'square, 4/(π n) for odd orders', waveform: square, amplitudes: [4 / Math.PI, 0, 4 / (3 * Math.PI)] },
    { name: 'triangle, 8/(π n)² for odd orders', waveform: triangle, amplitudes: [8 / Math.PI ** 2, 0, 8 / (9 * Math.PI ** 2)] },
  ])('$name', ({ waveform, amplitudes }) => {
    harmonics(waveform, 3).forEach(({ amplitude }, index) => expect(amplitude).toBeCloseTo(amplitudes[index]!, 12))
  })

  it('puts the triangle that starts at its trough on the cosine', () => {
    const [first] = harmonics(triangle, 1)
    expect(first!.cosine).toBeCloseTo(-8 / Math.PI ** 2, 12)
    expect(first!.sine).toBeCloseTo(0, 12)
  })
})

describe('sums', () => {
  it('keeps the jump of one part', () => {
    const sum = sumWaveforms([square, triangle])
    expect(valueAt(sum, 0.5)).toBeCloseTo(1, 12)
    expect(valueAt(sum, 1)).toBeCloseTo(0, 12)
    expect(maximum(sum)).toBeCloseTo(2, 12)
  })

  it('refuses parts of different periods', () => {
    expect(() => sumWaveforms([square, trapezium])).toThrow(RangeError)
  })

  it('integrates a square voltage into a triangle', () => {
    const flux = runningIntegral(square, -0.5)
    expect(flux.points).toEqual([[0, -0.5], [1, 0.5], [2, -0.5]])
  })

  it('takes the worst pair of nodes as the working voltage', () => {
    const sw = createWaveform(2, [[0, 0], [1, 0], [1, 400], [2, 400]])
    const worst = workingVoltage([sw, steadyNode(2, 300)], [steadyNode(2, 0), steadyNode(2, -12)])
    expect(worst.recurringPeakV).toBeCloseTo(412, 9)
    expect(worst.rmsV).toBeCloseTo(312, 9)
  })
})

const ramps = fc.array(
  fc.record({ durationS: fc.double({ min: 1e-7, max: 1e-5, noNaN: true }), from: fc.double({ min: -50, max: 50, noNaN: true }), to: fc.double({ min: -50, max: 50, noNaN: true }) }),
  { minLength: 1, maxLength: 8 },
)
const anyWaveform = ramps.map((list): Waveform => waveformFromRamps(list))

describe('laws of waveforms', () => {
  it('Parseval: mean², all harmonics and a bounded tail make the mean square', () => {
    fc.assert(
      fc.property(anyWaveform, (waveform) => {
        const count = 60
        const sum = mean(waveform) ** 2 + harmonics(waveform, count).reduce((s, h) => s + h.rms ** 2, 0)
        const rest = meanSquare(waveform) - sum
        expect(rest).toBeGreaterThan(-1e-8)
        expect(rest).toBeLessThanOrEqual(harmonicTailMeanSquareBound(waveform, count) + 1e-8)
      }),
    )
  })

  it('a voltage without mean leads the flux back to its start', () => {
    fc.assert(
      fc.property(anyWaveform, (waveform) => {
        const balanced = differenceOfWaveforms(waveform, { periodS: waveform.periodS, points: [[0, mean(waveform)], [waveform.periodS, mean(waveform)]] })
        const flux = runningIntegral(balanced)
        expect(flux.points[flux.points.length - 1]![1]).toBeCloseTo(0, 12)
        expect(positiveVoltSeconds(balanced)).toBeCloseTo(positiveVoltSeconds(scaleWaveform(balanced, -1)), 12)
      }),
    )
  })

  it('mean and rms of a sum follow from its parts', () => {
    fc.assert(
      fc.property(ramps, fc.double({ min: -3, max: 3, noNaN: true }), (list, factor) => {
        const waveform = waveformFromRamps(list)
        const doubled = sumWaveforms([waveform, scaleWaveform(waveform, factor)])
        expect(integralOverPeriod(doubled)).toBeCloseTo((1 + factor) * integralOverPeriod(waveform), 9)
        expect(rms(doubled)).toBeCloseTo(Math.abs(1 + factor) * rms(waveform), 6)
        expect(acRms(waveform) ** 2 + mean(waveform) ** 2).toBeCloseTo(meanSquare(waveform), 7)
      }),
    )
  })
})

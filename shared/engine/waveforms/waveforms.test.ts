import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { differenceOfWaveforms, meanProduct, runningIntegral, scaleWaveform, sumWaveforms } from './combine'
import { edgeOrder, fourierSeries, harmonicTailMeanSquareBound, tailGrowth } from './fourier'
import { acRms, integralOverPeriod, maximum, mean, meanSquare, minimum, peak, peakToPeak, positiveVoltSeconds, rms, totalVariation } from './statistics'
import { constantWaveform, createWaveform, valueAt, waveformFromRamps } from './waveform'
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
    const { re, im } = fourierSeries(waveform, 3)
    amplitudes.forEach((amplitude, index) => expect(Math.hypot(re[index]!, im[index]!)).toBeCloseTo(amplitude, 12))
  })

  it('puts the triangle that starts at its trough on the cosine', () => {
    const { re, im } = fourierSeries(triangle, 1)
    expect(re[0]).toBeCloseTo(-8 / Math.PI ** 2, 12)
    expect(im[0]).toBeCloseTo(0, 12)
  })

  it('turns the phase by −n·2π·t/T for a delay t', () => {
    const delayed = createWaveform(2, [[0, -1], [0.25, -1], [0.25, 1], [1.25, 1], [1.25, -1], [2, -1]])
    const { re, im } = fourierSeries(square, 5)
    const later = fourierSeries(delayed, 5)
    for (let n = 1; n <= 5; n++) {
      const angle = (-n * 2 * Math.PI * 0.25) / 2
      expect(later.re[n - 1]).toBeCloseTo(re[n - 1]! * Math.cos(angle) - im[n - 1]! * Math.sin(angle), 12)
      expect(later.im[n - 1]).toBeCloseTo(im[n - 1]! * Math.cos(angle) + re[n - 1]! * Math.sin(angle), 12)
    }
  })

  it('goes on where a first part ended', () => {
    const whole = fourierSeries(trapezium, 300)
    const part = fourierSeries(trapezium, 200, 101)
    for (let index = 0; index < 200; index++) {
      expect(part.re[index]).toBeCloseTo(whole.re[100 + index]!, 13)
      expect(part.im[index]).toBeCloseTo(whole.im[100 + index]!, 13)
    }
  })

  it('keeps the digits of an edge of a picosecond', () => {
    const edge = createWaveform(2, [[0, 1], [1 - 1e-12, 1], [1, -1], [2 - 1e-12, -1], [2, 1]])
    const { re, im } = fourierSeries(edge, 101)
    expect(Math.hypot(re[100]!, im[100]!) / (4 / (101 * Math.PI))).toBeCloseTo(1, 9)
  })
})

describe('tail of a series', () => {
  it.each([
    { name: 'a jump has no end of its edge', waveform: square, order: Infinity },
    { name: 'a triangle falls as 1/n² from the start: T/(π·t) of half a period', waveform: triangle, order: 2 / Math.PI },
    { name: 'ramps of a hundredth of the period', waveform: createWaveform(1, [[0, 0], [0.01, 1], [0.5, 1], [0.51, 0], [1, 0]]), order: 100 / Math.PI },
  ])('$name', ({ waveform, order }) => expect(edgeOrder(waveform) / order || 1).toBeCloseTo(1, 12))

  it.each([
    { name: 'factors that do not grow', edge: 1, power: 0, growth: 1 },
    { name: 'n² on amplitudes of 1/n²', edge: 1, power: 2, growth: 3 },
    { name: '√n on amplitudes of 1/n', edge: Infinity, power: 0.5, growth: 2 },
    { name: 'n on amplitudes of 1/n has no end', edge: Infinity, power: 1, growth: Infinity },
  ])('$name', ({ edge, power, growth }) => expect(tailGrowth({ lastOrder: 10, edge, power })).toBeCloseTo(growth, 12))

  it('matches the sum over a trapezoid of short edges', () => {
    const waveform = createWaveform(1, [[0, 0], [0.01, 1], [0.37, 1], [0.38, 0], [1, 0]])
    const { re, im } = fourierSeries(waveform, 4000)
    const squares = Array.from(re, (value, index) => value ** 2 + im[index]! ** 2)
    for (const power of [0.5, 1, 1.5]) {
      const [plain, weighted] = squares.slice(20).reduce(([a, b], square, index) => [a! + square, b! + square * ((index + 21) / 20) ** power], [0, 0])
      const growth = tailGrowth({ lastOrder: 20, edge: edgeOrder(waveform), power })
      expect(growth / (weighted! / plain!)).toBeGreaterThan(0.85)
      expect(growth / (weighted! / plain!)).toBeLessThan(1.5)
    }
  })

  it('refuses no orders', () => expect(() => tailGrowth({ lastOrder: 0, edge: 1, power: 1 })).toThrow(RangeError))
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

  it('takes one potential from another', () => {
    const between = differenceOfWaveforms(createWaveform(2, [[0, 0], [1, 0], [1, 400], [2, 400]]), constantWaveform(2, -12))
    expect(peak(between)).toBe(412)
    expect(rms(between)).toBeCloseTo(Math.sqrt((12 ** 2 + 412 ** 2) / 2), 9)
  })
})

const ramps = fc.array(
  fc.record({ durationS: fc.double({ min: 1e-7, max: 1e-5, noNaN: true }), from: fc.double({ min: -50, max: 50, noNaN: true }), to: fc.double({ min: -50, max: 50, noNaN: true }) }),
  { minLength: 1, maxLength: 8 },
)
const anyWaveform = ramps.map((list): Waveform => waveformFromRamps(list))

describe('laws of waveforms', () => {
  it('mean product: of a waveform with itself the mean square, of two half of what their sum adds', () => {
    fc.assert(
      fc.property(anyWaveform, anyWaveform, (first, other) => {
        const scaled = waveformFromRamps(other.points.slice(1).flatMap(([endS, to], index) => {
          const [startS, from] = other.points[index]!
          return endS > startS ? [{ durationS: ((endS - startS) * first.periodS) / other.periodS, from, to }] : []
        }))
        const second: Waveform = { periodS: first.periodS, points: [...scaled.points.slice(0, -1), [first.periodS, scaled.points.at(-1)![1]]] }
        expect(meanProduct(first, first)).toBeCloseTo(meanSquare(first), 7)
        expect(meanProduct(first, second)).toBeCloseTo((meanSquare(sumWaveforms([first, second])) - meanSquare(first) - meanSquare(second)) / 2, 6)
      }),
    )
  })

  it('Parseval: mean², all harmonics and a bounded tail make the mean square', () => {
    fc.assert(
      fc.property(anyWaveform, (waveform) => {
        const count = 60
        const { re, im } = fourierSeries(waveform, count)
        const sum = mean(waveform) ** 2 + re.reduce((s, value, index) => s + (value ** 2 + im[index]! ** 2) / 2, 0)
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

import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { acRms, integralOverPeriod, maximum, mean, minimum, rms } from '../waveforms/statistics'
import { boostInductorState, buckInductorState, lineBoostAt, lineBoostState, singleInductorState } from './inductor'

const duty = fc.record({
  frequencyHz: fc.double({ min: 2e4, max: 1e6, noNaN: true }),
  inductanceH: fc.double({ min: 1e-7, max: 1e-2, noNaN: true }),
  onVoltageV: fc.double({ min: 0.5, max: 400, noNaN: true }),
  offVoltageV: fc.double({ min: 0.5, max: 400, noNaN: true }),
  meanCurrentA: fc.double({ min: 0.01, max: 50, noNaN: true }),
})

describe('a single inductor', () => {
  it('balances its volt-seconds, keeps its mean current and follows v = L·di/dt in every mode', () => {
    fc.assert(
      fc.property(duty, (one) => {
        const state = singleInductorState(one)
        const scale = (one.onVoltageV * state.dutyCycle) / one.frequencyHz
        expect(Math.abs(integralOverPeriod(state.voltageV))).toBeLessThan(1e-9 * scale)
        expect(mean(state.currentA)).toBeCloseTo(one.meanCurrentA, 6)
        expect((maximum(state.currentA) - minimum(state.currentA)) * one.inductanceH).toBeCloseTo(scale, 9)
        expect(state.dutyCycle + state.rectifierFraction).toBeLessThanOrEqual(1 + 1e-9)
        expect(minimum(state.currentA)).toBeGreaterThanOrEqual(0)
      }),
    )
  })

  it('meets both modes at the boundary of conduction', () => {
    const at = (meanCurrentA: number) => singleInductorState({ frequencyHz: 1e5, inductanceH: 1e-5, onVoltageV: 10, offVoltageV: 5, meanCurrentA })
    const ripple = 10 / 3 / (1e-5 * 1e5)
    expect(at(ripple / 2).mode).toBe('boundary')
    expect(at((ripple / 2) * 0.999).mode).toBe('discontinuous')
    expect(at((ripple / 2) * 0.9999).dutyCycle).toBeCloseTo(1 / 3, 4)
  })
})

describe('buck and boost', () => {
  const buck = { inputVoltageV: 24, switchDropV: 0.2, outputVoltageV: 5, rectifierDropV: 0.5, outputCurrentA: 3, frequencyHz: 2e5, inductanceH: 1e-5 }
  it('buck: mean is the output current, energy in equals energy out and in the drops', () => {
    for (const outputCurrentA of [3, 0.1]) {
      const { currentA, voltageV, dutyCycle, rectifierFraction } = buckInductorState({ ...buck, outputCurrentA })
      expect(mean(currentA)).toBeCloseTo(outputCurrentA, 9)
      const on = dutyCycle / (dutyCycle + rectifierFraction)
      const inW = 24 * outputCurrentA * on
      expect(inW).toBeCloseTo(5 * outputCurrentA + 0.2 * outputCurrentA * on + 0.5 * outputCurrentA * (1 - on), 9)
      expect(integralOverPeriod(voltageV)).toBeCloseTo(0, 12)
    }
  })

  it('boost: the rectifier passes the output current in both modes', () => {
    for (const outputCurrentA of [2, 0.02]) {
      const { currentA, dutyCycle, rectifierFraction } = boostInductorState({ inputVoltageV: 12, switchDropV: 0.1, outputVoltageV: 48, rectifierDropV: 0.7, outputCurrentA, frequencyHz: 1e5, inductanceH: 1e-4 })
      expect((mean(currentA) * rectifierFraction) / (dutyCycle + rectifierFraction)).toBeCloseTo(outputCurrentA, 9)
    }
  })

  it.each([
    { name: 'a buck whose input is below its output', act: () => buckInductorState({ ...buck, inputVoltageV: 5 }) },
    { name: 'a boost whose output is below its input', act: () => boostInductorState({ ...buck, outputVoltageV: 12 }) },
    { name: 'no current', act: () => buckInductorState({ ...buck, outputCurrentA: 0 }) },
    { name: 'a line whose crest exceeds the output', act: () => lineBoostState({ lineVoltageV: 300, outputVoltageV: 400, rectifierDropV: 1, inputPowerW: 300, frequencyHz: 1e5, inductanceH: 1e-3 }) },
  ])('refuses $name', ({ act }) => expect(act).toThrow(RangeError))
})

describe('boost inductor over the half-wave of the line', () => {
  const line = { lineVoltageV: 90, outputVoltageV: 400, rectifierDropV: 1, inputPowerW: 300, frequencyHz: 1e5, inductanceH: 1e-3 }
  const state = lineBoostState(line)

  it('draws the power at the crest and over the half-wave', () => {
    expect(mean(state.crest.currentA)).toBeCloseTo((Math.SQRT2 * 300) / 90, 9)
    expect(Math.sqrt(state.rmsA ** 2 - state.rippleRmsA ** 2)).toBeCloseTo(300 / 90, 3)
  })

  it('ripple is V·D/(L·f) at each angle, greatest where the line is nearest to half the output', () => {
    const lineV = 90 * Math.SQRT2
    expect(state.crest.rippleA).toBeCloseTo((lineV * (401 - lineV)) / 401 / 100, 9)
    expect(state.greatestRippleAngle).toBeCloseTo(Math.PI / 2, 9)
    const high = lineBoostState({ ...line, lineVoltageV: 230 })
    expect(230 * Math.SQRT2 * Math.sin(high.greatestRippleAngle)).toBeCloseTo(200.5, -1)
    expect(high.greatestRippleA).toBeCloseTo(401 / 4 / 100, 3)
  })

  it('the equivalent period has the half-wave’s rms and ripple rms, and balances', () => {
    expect(rms(state.equivalent.currentA)).toBeCloseTo(state.rmsA, 9)
    expect(acRms(state.equivalent.currentA)).toBeCloseTo(state.rippleRmsA, 9)
    expect(integralOverPeriod(state.equivalent.voltageV)).toBeCloseTo(0, 12)
  })

  it('rms over the half-wave equals that of a sum over finely spaced switching periods', () => {
    const count = 5000
    let sum = 0
    for (let i = 0; i < count; i++) sum += rms(lineBoostAt(line, ((i + 0.5) / count) * Math.PI).currentA) ** 2
    expect(Math.sqrt(sum / count)).toBeCloseTo(state.rmsA, 4)
  })
})

import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { sumWaveforms, scaleWaveform } from '../waveforms/combine'
import { integralOverPeriod, maximum, mean, minimum, peakToPeak } from '../waveforms/statistics'
import type { Waveform } from '../waveforms/waveform'
import { alternatingSenseState, pulseSenseState } from './current-sense'
import type { CurrentSenseState } from './current-sense'

const pulse = { primaryTurns: 1, secondaryTurns: 100, secondaryInductanceH: 2e-3, burdenOhm: 10, rectifierDropV: 0.6, primaryCurrentA: 10, dutyCycle: 0.4, frequencyHz: 1e5, resetVoltageV: 10 }

/** Ampere-turns of both windings, and those of the magnetising current, which must be alike at every corner. */
function expectAmpereTurns(state: CurrentSenseState, turns: { primaryTurns: number; secondaryTurns: number }, biasA = 0): void {
  const sum = sumWaveforms([scaleWaveform(state.primary.currentA, turns.primaryTurns), scaleWaveform(state.secondary.currentA, turns.secondaryTurns), scaleWaveform(state.magnetisingCurrentA, -turns.secondaryTurns)])
  expect(Math.max(maximum(sum), -minimum(sum))).toBeLessThan(1e-6 * (1 + turns.secondaryTurns * (maximum(state.magnetisingCurrentA) + biasA)))
}

const expectBalance = (voltageV: Waveform, relative: number, scale: number) => expect(Math.abs(integralOverPeriod(voltageV))).toBeLessThan(relative * scale)

describe('current transformer, pulses with reset', () => {
  it('volt-seconds balance but for the chords of the exponential, ampere-turns add up to the core’s', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.05, max: 0.6, noNaN: true }), fc.double({ min: 2e-4, max: 2e-2, noNaN: true }), fc.double({ min: 1, max: 50, noNaN: true }), (dutyCycle, secondaryInductanceH, burdenOhm) => {
        const state = pulseSenseState({ ...pulse, dutyCycle, secondaryInductanceH, burdenOhm, resetVoltageV: 60 })
        expectBalance(state.secondary.voltageV, 2e-2, state.voltSecondsVs)
        expectAmpereTurns(state, pulse)
        expect(peakToPeak(state.magnetisingCurrentA) * secondaryInductanceH).toBeCloseTo(state.voltSecondsVs, 9)
      }),
    )
  })

  it('takes longer to reset than there is time where the pulse is long', () => {
    const state = pulseSenseState({ ...pulse, dutyCycle: 0.95, rectifierDropV: 5 })
    expect(state.resetS!).toBeGreaterThan(state.resetAvailableS!)
  })

  it.each(['burdenOhm', 'resetVoltageV', 'secondaryInductanceH', 'dutyCycle', 'frequencyHz'] as const)('refuses %s of zero', (name) =>
    expect(() => pulseSenseState({ ...pulse, [name]: 0 })).toThrow(RangeError))
})

describe('current transformer, both directions', () => {
  const sine = { waveform: 'sine' as const, primaryTurns: 1, secondaryTurns: 200, secondaryInductanceH: 20e-3, burdenOhm: 50, primaryCurrentA: 20, frequencyHz: 5e4 }

  it('sine: i_m = (I/n)·R/√(R² + ω²L²)', () => {
    const state = alternatingSenseState(sine)
    const reactance = 2 * Math.PI * 5e4 * 20e-3
    expect(state.magnetisingError).toBeCloseTo(50 / Math.hypot(50, reactance), 12)
    expect(maximum(state.burdenVoltageV)).toBeCloseTo(5 * reactance / Math.hypot(50, reactance), 2)
    expectAmpereTurns(state, sine)
    expect(state.voltSecondsVs).toBeCloseTo(2 * state.magnetisingError * 0.1 * 20e-3, 9)
  })

  it('a direct component stays in the primary and shifts the flux by I_dc/n', () => {
    const state = alternatingSenseState({ ...sine, directCurrentA: 2 })
    expect(mean(state.secondary.currentA)).toBeCloseTo(0, 9)
    expect(mean(state.magnetisingCurrentA)).toBeCloseTo(2 / 200, 9)
    expectAmpereTurns(state, sine)
  })

  it('pulses: the magnetising current is odd about half a period, balances and sums up', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.05, max: 0.5, noNaN: true }), fc.double({ min: 0, max: 2, noNaN: true }), fc.double({ min: 1, max: 500, noNaN: true }), (dutyCycle, rectifierDropV, burdenOhm) => {
        const state = alternatingSenseState({ ...sine, waveform: 'bipolar-pulse', dutyCycle, rectifierDropV, burdenOhm })
        expect(mean(state.magnetisingCurrentA)).toBeCloseTo(0, 9)
        expect(integralOverPeriod(state.secondary.voltageV)).toBeCloseTo(0, 9)
        expectAmpereTurns(state, sine)
        expect(peakToPeak(state.magnetisingCurrentA)).toBeCloseTo(2 * state.magnetisingError * 0.1, 9)
      }),
    )
  })

  it('with half the period each, i_m swings by (V_F/R + I/n)·tanh(T/4τ) to each side', () => {
    const state = alternatingSenseState({ ...sine, waveform: 'bipolar-pulse', dutyCycle: 0.5, rectifierDropV: 0.7 })
    expect(state.magnetisingError * 0.1).toBeCloseTo((0.7 / 50 + 0.1) * Math.tanh(1 / (4 * 5e4 * (20e-3 / 50))), 12)
  })
})

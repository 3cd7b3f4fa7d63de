import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { acRms, maximum, mean, minimum, peakToPeak, rms } from '../waveforms/statistics'
import { sumWaveforms, scaleWaveform } from '../waveforms/combine'
import { currentSlopesAPerS, seriesCapacitorInductorState, twoWindingChokeState } from './coupled-inductor'
import { flybackState } from './flyback'
import type { FlybackDuty } from './flyback'
import { flybackBoundaryInductanceH, flybackInductanceH, worstCaseCurrentLimitA } from './flyback-design'
import { bulkCapacitanceF, bulkMaximumV, bulkMinimum } from './mains-bulk'

const buoy: FlybackDuty = {
  inputVoltageV: 24,
  frequencyHz: 100e3,
  primaryTurns: 24,
  primaryInductanceH: 80e-6,
  outputs: [
    { turns: 8, voltageV: 5, rectifierDropV: 0.5, currentA: 4 },
    { turns: 18, voltageV: -12, rectifierDropV: 0.5, currentA: 0.5 },
  ],
  regulatedOutput: 0,
  losses: { kind: 'ideal' },
}

describe('flybackState', () => {
  it('finds discontinuous conduction when the load falls', () => {
    const light = { ...buoy, outputs: buoy.outputs.map((output) => ({ ...output, currentA: output.currentA / 100 })) }
    const state = flybackState(light)
    expect(flybackState(buoy).mode).toBe('continuous')
    expect(state.mode).toBe('discontinuous')
    expect(state.dutyCycle + state.secondaryFraction).toBeLessThan(1)
    expect(minimum(state.magnetisingCurrentA)).toBe(0)
  })

  it('calls the mode boundary at the boundary inductance', () => {
    const dutyCycle = 16.5 / (24 + 16.5)
    const powerW = (5.5 / 8) * (4 * 8 + 0.5 * 18)
    const primaryInductanceH = flybackBoundaryInductanceH({ inputVoltageV: 24, dutyCycle, powerW, frequencyHz: 100e3 })
    const state = flybackState({ ...buoy, primaryInductanceH })
    expect(state.mode).toBe('boundary')
    expect(state.minimumCurrentA).toBe(0)
    expect(state.outputs[0]!.currentA.points.at(-1)![1]).toBeCloseTo(0, 9)
  })

  it('gives a negative output a negative voltage and a positive winding current', () => {
    const [, negative] = flybackState(buoy).outputs
    expect(negative!.loadVoltageV).toBeCloseTo(-(18 * 5.5) / 8 + 0.5, 9)
    expect(mean(negative!.currentA)).toBeCloseTo(0.5, 9)
  })

  it('transfers the losses to the secondaries when told so', () => {
    const state = flybackState({ ...buoy, losses: { kind: 'losses-transferred', efficiency: 0.8 } })
    const loadPowerW = 5 * 4 + ((18 * 5.5) / 8 - 0.5) * 0.5
    expect(state.transferredPowerW).toBeCloseTo(loadPowerW / 0.8, 9)
    expect(mean(state.outputs[0]!.currentA)).toBeGreaterThan(4)
  })

  it.each([
    { name: 'no input voltage', change: { inputVoltageV: 0 } },
    { name: 'a switch drop above the input', change: { switchDropV: 25 } },
    { name: 'no regulated output', change: { regulatedOutput: 2 } },
    { name: 'no load at all', change: { outputs: [{ turns: 8, voltageV: 5, rectifierDropV: 0.5, currentA: 0 }] } },
    { name: 'an efficiency above one', change: { losses: { kind: 'losses-transferred', efficiency: 1.1 } as const } },
  ])('refuses $name', ({ change }) => expect(() => flybackState({ ...buoy, ...change })).toThrow(RangeError))

  it('obeys its laws for any duty', () => {
    fc.assert(
      fc.property(
        fc.record({
          inputVoltageV: fc.double({ min: 8, max: 400, noNaN: true }),
          primaryInductanceH: fc.double({ min: 2e-6, max: 2e-3, noNaN: true }),
          primaryTurns: fc.integer({ min: 5, max: 120 }),
          currentA: fc.double({ min: 0.01, max: 20, noNaN: true }),
        }),
        ({ currentA, ...change }) => {
          const outputs = buoy.outputs.map((output, index) => (index === 0 ? { ...output, currentA } : output))
          const state = flybackState({ ...buoy, ...change, outputs })
          const windings = [state.primary, ...state.outputs]
          for (const { voltageV } of windings) expect(mean(voltageV) / maximum(voltageV)).toBeCloseTo(0, 9)
          state.outputs.forEach((output, index) => expect(mean(output.currentA) / outputs[index]!.currentA).toBeCloseTo(1, 9))
          const sum = sumWaveforms([
            scaleWaveform(state.primary.currentA, change.primaryTurns),
            ...state.outputs.map((output, index) => scaleWaveform(output.currentA, outputs[index]!.turns)),
          ])
          expect(rms(sum) / rms(state.ampereTurnsA)).toBeCloseTo(1, 9)
          const stored = (change.primaryInductanceH * (state.peakCurrentA ** 2 - state.minimumCurrentA ** 2) * 100e3) / 2
          expect(stored / state.transferredPowerW).toBeCloseTo(1, 6)
          expect(mean(state.primary.currentA) * change.inputVoltageV / state.transferredPowerW).toBeCloseTo(1, 9)
          expect(peakToPeak(state.fluxWb) / state.fluxSwingWb).toBeCloseTo(1, 6)
        },
      ),
    )
  })
})

describe('flyback design', () => {
  it('adds tolerance and delay to the current limit', () => {
    const limit = worstCaseCurrentLimitA({ thresholdA: 1, toleranceFraction: 0.1, delayS: 200e-9, inputVoltageV: 375, inductanceH: 750e-6 })
    expect(limit).toBeCloseTo(1.2, 12)
  })

  it('needs half the inductance at twice the ripple ratio', () => {
    const at = (rippleRatio: number) => flybackInductanceH({ inputVoltageV: 24, dutyCycle: 0.4, powerW: 28, frequencyHz: 100e3, rippleRatio })
    expect(at(0.2) / at(0.4)).toBeCloseTo(2, 12)
  })
})

describe('mains bulk capacitor', () => {
  const mains = { mainsVoltageV: 85, mainsFrequencyHz: 50, inputPowerW: 20, capacitanceF: 47e-6 }

  it('inverts the capacitance formula in both angle models', () => {
    for (const model of ['exact-angle', 'published-arcsine'] as const) {
      const capacitanceF = bulkCapacitanceF({ ...mains, minimumV: 80, model })
      const minimum = bulkMinimum({ ...mains, capacitanceF, charging: { kind: model } })
      expect(minimum).toMatchObject({ state: 'held', model })
      expect(minimum.state === 'held' && minimum.minimumV).toBeCloseTo(80, 6)
    }
  })

  it('says so when the capacitor runs empty', () => {
    for (const charging of [{ kind: 'charging-time', chargingTimeS: 3e-3 }, { kind: 'exact-angle' }] as const) {
      expect(bulkMinimum({ ...mains, capacitanceF: 4.7e-6, charging }).state).toBe('capacitor-too-small')
    }
  })

  it('refuses a charging time longer than half a cycle', () => {
    expect(() => bulkMinimum({ ...mains, charging: { kind: 'charging-time', chargingTimeS: 11e-3 } })).toThrow(/chargingTimeS/)
  })

  it('rises to the peak of the mains', () => expect(bulkMaximumV(264)).toBeCloseTo(373.352, 3))
})

describe('coupled inductor', () => {
  const pair = { turns: [20, 20], inductanceH: 22e-6, coupling: 0.98 } as const
  const duty = { pair, inputVoltageV: 12, outputVoltageV: 12, rectifierDropV: 0.5, outputCurrentA: 2, frequencyHz: 300e3 }

  it('shares the ripple evenly between two equal windings, so each sees nearly twice its inductance', () => {
    const [first, second] = currentSlopesAPerS({ ...pair, coupling: 1 }, [12, 12])
    expect(first).toBeCloseTo(12 / 44e-6, 3)
    expect(second).toBeCloseTo(first, 3)
  })

  it('matches the inductance matrix where the volts per turn differ', () => {
    const [slope1, slope2] = currentSlopesAPerS({ turns: [10, 30], inductanceH: 10e-6, coupling: 0.9 }, [5, 9])
    const l2 = 90e-6
    const m = 0.9 * Math.sqrt(10e-6 * l2)
    expect(10e-6 * slope1 + m * slope2).toBeCloseTo(5, 9)
    expect(m * slope1 + l2 * slope2).toBeCloseTo(9, 9)
  })

  it('carries the input current in one winding and the output current in the other', () => {
    const state = seriesCapacitorInductorState(duty)
    expect(state.mode).toBe('continuous')
    expect(state.dutyCycle).toBeCloseTo(12.5 / 24.5, 12)
    expect(mean(state.windings[0].currentA)).toBeCloseTo((2 * 12.5) / 12, 9)
    expect(mean(state.windings[1].currentA)).toBeCloseTo(2, 9)
    expect(peakToPeak(state.fluxWb[0]) * 20).toBeCloseTo((12 * state.dutyCycle) / 300e3, 9)
  })

  it('falls into discontinuous conduction at light load and keeps the load current', () => {
    const state = seriesCapacitorInductorState({ ...duty, outputCurrentA: 0.02 })
    expect(state.mode).toBe('discontinuous')
    expect(mean(state.windings[1].currentA)).toBeCloseTo(0.02, 12)
    const sum = sumWaveforms([state.windings[0].currentA, state.windings[1].currentA])
    expect(sum.points.at(-1)![1]).toBeCloseTo(0, 9)
    expect(mean(state.windings[0].voltageV)).toBeCloseTo(0, 9)
  })

  it('stands at the boundary where the sum of both currents just touches zero', () => {
    // (slope1 + slope2)·D/(2f) = I_1 + I_2, solved for the output current.
    const [slope1, slope2] = currentSlopesAPerS(pair, [12, 12])
    const dutyCycle = 12.5 / 24.5
    const outputCurrentA = ((slope1 + slope2) * dutyCycle) / (2 * 300e3 * (1 + 12.5 / 12))
    expect(seriesCapacitorInductorState({ ...duty, outputCurrentA }).mode).toBe('boundary')
  })

  it('describes any two-winding choke with its direct currents', () => {
    const state = twoWindingChokeState({
      pair, frequencyHz: 200e3, dutyCycle: 0.25, onVoltageV: [9, 9], offVoltageV: [-3, -3], directCurrentA: [4, 4],
    })
    expect(acRms(state.windings[0].currentA)).toBeCloseTo((9 * 0.25) / (200e3 * 22e-6 * 1.98) / Math.sqrt(12), 9)
    expect(mean(state.ampereTurnsA)).toBeCloseTo(160, 9)
  })

  it('refuses full coupling with unequal volts per turn, and voltages that do not balance', () => {
    expect(() => currentSlopesAPerS({ ...pair, coupling: 1 }, [12, 6])).toThrow(RangeError)
    expect(() =>
      twoWindingChokeState({ pair, frequencyHz: 1e5, dutyCycle: 0.5, onVoltageV: [9, 9], offVoltageV: [-3, -9], directCurrentA: [1, 1] }),
    ).toThrow(/balance/)
  })
})

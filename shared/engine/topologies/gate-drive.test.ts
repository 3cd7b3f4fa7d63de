import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { scaleWaveform, sumWaveforms } from '../waveforms/combine'
import { integralOverPeriod, maximum, mean, minimum, peakToPeak } from '../waveforms/statistics'
import { gateDriveState } from './gate-drive'
import type { GateDriveStageDuty } from './gate-drive'

const unipolar: GateDriveStageDuty = {
  drive: 'unipolar-dc-restored', driverVoltageV: 12, frequencyHz: 1e5, dutyCycle: 0.5, primaryTurns: 20, primaryInductanceH: 1e-3,
  driverResistanceOhm: 5, couplingCapacitanceF: 1e-7, transitionS: 50e-9, gates: [{ turns: 20, gateChargeC: 60e-9 }, { turns: 24, gateChargeC: 60e-9 }],
}
const bipolar: GateDriveStageDuty = { ...unipolar, drive: 'bipolar', dutyCycle: 0.4, couplingCapacitanceF: null }

describe('gate-drive transformer', () => {
  it('volt-seconds balance, i_m is L·di/dt and the ampere-turns add up to the core’s', () => {
    fc.assert(
      fc.property(fc.constantFrom(unipolar, bipolar), fc.double({ min: 0.05, max: 0.5, noNaN: true }), fc.double({ min: 1e-4, max: 1e-2, noNaN: true }), (base, dutyCycle, primaryInductanceH) => {
        const state = gateDriveState({ ...base, dutyCycle, primaryInductanceH })
        expect(Math.abs(integralOverPeriod(state.primary.voltageV))).toBeLessThan(1e-9 * state.voltSecondsVs)
        expect(peakToPeak(state.magnetisingCurrentA) * primaryInductanceH).toBeCloseTo(state.voltSecondsVs, 12)
        const sum = sumWaveforms([scaleWaveform(state.primary.currentA, 20), scaleWaveform(state.gates[0]!.currentA, 20), scaleWaveform(state.gates[1]!.currentA, 24), scaleWaveform(state.magnetisingCurrentA, -20)])
        expect(Math.max(maximum(sum), -minimum(sum))).toBeLessThan(1e-6)
        expect(mean(state.gates[0]!.currentA)).toBeCloseTo(0, 9)
      }),
    )
  })

  it('unipolar with dc restored: V·D·(1 − D)/f in steady state, V·D/f in the first pulse', () => {
    const state = gateDriveState(unipolar)
    expect(state.voltSecondsVs).toBeCloseTo((12 * 0.25) / 1e5, 15)
    expect(state.firstPulseVs).toBeCloseTo((12 * 0.5) / 1e5, 15)
    expect(state.capacitorRippleV).toBeCloseTo((60e-9 * 2.2 + (state.peakMagnetisingA * 1e-5) / 4) / 1e-7, 9)
  })

  it('each edge carries the gate’s charge, and the driver gives Q·V·f for it', () => {
    const state = gateDriveState(unipolar)
    const { points } = state.gates[0]!.currentA
    const charge = points.slice(1).reduce((sum, [tS, value], index) => sum + Math.max(0, -((value + points[index]![1]) / 2)) * (tS - points[index]![0]), 0)
    expect(charge).toBeCloseTo(60e-9, 15)
    expect(state.gatePowerW).toBeCloseTo(60e-9 * 2.2 * 12 * 1e5, 9)
  })

  it('bipolar: rests between its pulses and uses V·D/f', () => {
    const state = gateDriveState(bipolar)
    expect(state.voltSecondsVs).toBeCloseTo((12 * 0.4) / 1e5, 15)
    expect(state.capacitorRippleV).toBeNull()
    expect(state.droop).toBeCloseTo(1 - Math.exp((-5 * 4e-6) / 1e-3), 12)
  })

  it.each([
    { name: 'a bipolar duty above one half', change: { ...bipolar, dutyCycle: 0.6 } },
    { name: 'no inductance', change: { ...bipolar, primaryInductanceH: 0 } },
    { name: 'a gate without turns', change: { ...bipolar, gates: [{ turns: 0, gateChargeC: 1e-9 }] } },
  ])('refuses $name', ({ change }) => expect(() => gateDriveState(change)).toThrow(RangeError))
})

import { describe, expect, it } from 'vitest'
import type { FullBridgeDuty } from '#shared/engine/duties/bridges'
import type { ForwardDuty } from '#shared/engine/duties/forward'
import type { LlcDuty } from '#shared/engine/duties/llc'
import type { Duty } from '#shared/engine/specification'
import { turnsForFlux } from '#shared/engine/magnetics/flux'
import { topologyOf } from '#shared/engine/topologies/index'
import type { CircuitWinding } from '#shared/engine/topologies/topology'
import { acRms, mean, peakToPeak, rms } from '#shared/engine/waveforms/statistics'
import { expectWithin } from './relative'

const winding = (id: string, turns: number, role: CircuitWinding['role'], outputId: string | null = null): CircuitWinding => ({ id, name: id, role, side: 'primary', outputId, turns })
const output = { name: 'S', rectifierDropV: 0, lightLoadCurrentA: 0, side: 'secondary' as const }
const ideal = { efficiency: 1, switchDropV: 0, currentLimit: null, clampSpikeV: null, switchRatingV: null }
const dc = (voltageV: number) => ({ kind: 'dc', minimumV: voltageV, nominalV: voltageV, maximumV: voltageV }) as const
/** Filters so large that the textbook's ripple-free currents come out. */
const smooth = { filterInductanceH: 1, rippleRatio: 0.01 }
const stateOf = <D extends Duty>(duty: D, windings: CircuitWinding[], inputV: number, inductanceH: number) => topologyOf(duty).circuit({ duty, primary: windings[0]!, windings, inductanceH, leakageH: () => null }).solve!({ inputV, load: 'full', loadFactor: 1 })

// Source: Ferroxcube, Design of planar power transformers, forward example: 48 or 24 V to 5 or 3.3 V, 18 W, D 0.46, 530 kHz, swing 2 × 0.1 T, E14 with 14.5 mm².
describe('planar forward transformer', () => {
  const frequencyHz = 530e3
  const areaMm2 = 14.5
  it.each([{ inputV: 48, turns: 14.37, chosen: 14, primaryH: 690e-6, magnetisingA: 60.4e-3 }, { inputV: 24, turns: 7.18, chosen: 7, primaryH: 172e-6, magnetisingA: 121e-3 }])('$inputV V: turns and magnetising current', ({ inputV, turns, chosen, primaryH, magnetisingA }) => {
    const voltSecondsVs = (inputV * 0.46) / frequencyHz
    expectWithin(turnsForFlux({ inductanceH: 1, currentA: voltSecondsVs, fluxDensityT: 0.2, areaMm2 }), turns, 1e-3)
    const duty: ForwardDuty = { topology: 'forward', ...ideal, reset: 'reset-winding', supply: dc(inputV), switchingFrequencyHz: frequencyHz, maximumDutyRatio: 0.5, outputs: [{ ...output, ...smooth, id: 'o', role: 'main', voltageV: (inputV * 0.46 * 3) / chosen, fullLoadCurrentA: 3 }] }
    const state = stateOf(duty, [winding('p', chosen, 'primary'), winding('r', chosen, 'reset'), winding('s', 3, 'secondary', 'o')], inputV, primaryH)
    expectWithin(state.dutyRatio, 0.46, 1e-6)
    expectWithin(peakToPeak(state.fluxWb) * chosen, voltSecondsVs, 1e-9)
    // The source's magnetising current is the half swing over the inductance, as an effective value of the triangle's pulse is not.
    expectWithin((peakToPeak(state.fluxWb) * chosen) / primaryH, magnetisingA, 0.01)
  })

  it.each([{ voltageV: 5, secondaryA: 2.441 }, { voltageV: 3.3, secondaryA: 3.699 }])('$voltageV V: rms of the secondary', ({ voltageV, secondaryA }) => {
    const turns = (voltageV / 0.46 / 48) * 14
    const duty: ForwardDuty = { topology: 'forward', ...ideal, reset: 'reset-winding', supply: dc(48), switchingFrequencyHz: frequencyHz, maximumDutyRatio: 0.5, outputs: [{ ...output, ...smooth, id: 'o', role: 'main', voltageV, fullLoadCurrentA: 18 / voltageV }] }
    const state = stateOf(duty, [winding('p', 14, 'primary'), winding('r', 14, 'reset'), winding('s', turns, 'secondary', 'o')], 48, 690e-6)
    expectWithin(rms(state.windings.get('s')!.currentA), secondaryA, 5e-4)
  })
})

// Source: Erickson and Maksimović, Fundamentals of Power Electronics, 15.3.2, from memory, recomputed: 160 V to 5 V/100 A and 15 V/15 A, 110:5:15, D 0.75, 150 kHz.
describe('full-bridge transformer of a textbook', () => {
  const duty: FullBridgeDuty = {
    topology: 'full-bridge', ...ideal, control: 'pulse-width', supply: dc(160), switchingFrequencyHz: 75e3, maximumDutyRatio: 0.5,
    outputs: [
      { ...output, ...smooth, id: 'o1', role: 'main', voltageV: (160 * 5 * 0.75) / 110, fullLoadCurrentA: 100, rectifier: 'centre-tapped' },
      { ...output, ...smooth, id: 'o2', role: 'auxiliary', voltageV: (160 * 15 * 0.75) / 110, fullLoadCurrentA: 15, rectifier: 'centre-tapped' },
    ],
  }
  const windings = [winding('p', 110, 'primary'), winding('a', 5, 'secondary', 'o1'), winding('b', 5, 'secondary', 'o1'), winding('c', 15, 'secondary', 'o2'), winding('d', 15, 'secondary', 'o2')]
  const state = stateOf(duty, windings, 160, 1)
  const of = (id: string) => rms(state.windings.get(id)!.currentA)

  it('currents of the windings, referred to the primary too', () => {
    expectWithin(of('p'), 5.707, 1e-3)
    expectWithin(of('a'), 66.14, 1e-3)
    expectWithin(of('b'), 66.14, 1e-3)
    expectWithin(of('c'), 9.92, 1e-3)
    expectWithin(of('p') + (5 / 110) * (of('a') + of('b')) + (15 / 110) * (of('c') + of('d')), 14.43, 1e-3)
  })

  // The book's period is that of the pulses, 6.667 µs; the flux has half their frequency.
  it('volt-seconds of 800 V·µs', () => expectWithin(peakToPeak(state.fluxWb) * 110, 800e-6, 1e-6))
  it('carries no direct current in the primary', () => expect(Math.abs(mean(state.windings.get('p')!.currentA))).toBeLessThan(1e-9 * acRms(state.windings.get('p')!.currentA)))
})

// Source: Infineon ICE2HS01G design example, LLC half bridge 300 W: 12 V with 0.1 V of drop, 30 kHz at least, ratio 16.5, 161 mm², swing 0.62 T.
describe('LLC transformer of an application note', () => {
  it('turns from the swing at the least frequency', () => {
    const duty = { topology: 'llc', ...ideal, supply: dc(400), outputs: [{ ...output, id: 'o', role: 'main', voltageV: 12, rectifierDropV: 0.1, fullLoadCurrentA: 25, rectifier: 'centre-tapped' }], minimumFrequencyHz: 30e3 } as unknown as LlcDuty
    const windings = [winding('p', 33, 'primary'), winding('a', 2, 'secondary', 'o'), winding('b', 2, 'secondary', 'o')]
    const { voltSecondsVs } = topologyOf(duty).worstPulse!({ duty, primary: windings[0]!, windings })
    // From zero flux to the peak: half the swing.
    expectWithin(turnsForFlux({ inductanceH: 1, currentA: voltSecondsVs, fluxDensityT: 0.31, areaMm2: 161 }), 33.3, 2e-3)
  })
  it('turns of the resonant choke', () => expectWithin(turnsForFlux({ inductanceH: 40e-6, currentA: 3.49, fluxDensityT: 0.08, areaMm2: 90 }), 19.4, 1e-3))
})

// Source: TI SN6507 data sheet, volt-second product of a push-pull driver: 24 V + 10 %, 780 kHz.
describe('push-pull driver', () => {
  it('volt-second product of half a period', () => {
    const duty = { topology: 'push-pull', ...ideal, supply: dc(26.4), switchingFrequencyHz: 780e3, maximumDutyRatio: 0.5, outputs: [] } as never
    const primary = winding('p', 1, 'primary')
    expectWithin(topologyOf<Duty>(duty).worstPulse!({ duty, primary, windings: [primary] }).voltSecondsVs, 16.92e-6, 1e-3)
  })
})

import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { dutyTraits, topologyOf } from './index'
import type { BridgeOutput, FullBridgeDuty, HalfBridgeDuty, PushPullDuty } from '../duties/bridges'
import type { ForwardDuty } from '../duties/forward'
import type { Duty } from '../specification'
import { scaleWaveform, sumWaveforms } from '../waveforms/combine'
import { integralOverPeriod, mean, peak, peakToPeak } from '../waveforms/statistics'
import { waveformSegments } from '../waveforms/waveform'
import type { Waveform } from '../waveforms/waveform'
import type { CircuitState, CircuitWinding, OperatingPoint } from './topology'

const winding = (id: string, turns: number, role: CircuitWinding['role'], outputId: string | null = null): CircuitWinding => ({ id, name: id, role, side: role === 'secondary' ? 'secondary' : 'primary', outputId, turns })
const output = (id: string, voltageV: number, fullLoadCurrentA: number, more: Partial<BridgeOutput> = {}): BridgeOutput => ({
  id, name: id, role: id === 'o1' ? 'main' : 'auxiliary', voltageV, rectifierDropV: 0.5, fullLoadCurrentA, lightLoadCurrentA: fullLoadCurrentA / 20, side: 'secondary', filterInductanceH: null, rippleRatio: 0.3, rectifier: 'centre-tapped', ...more,
})
const common = { efficiency: 0.9, switchDropV: 0.2, currentLimit: null, clampSpikeV: null, switchRatingV: null, switchingFrequencyHz: 100e3 }

interface Case {
  name: string
  duty: Duty
  windings: CircuitWinding[]
  inputsV: [number, number]
}

const supply = (minimumV: number, maximumV: number) => ({ kind: 'dc', minimumV, nominalV: (minimumV + maximumV) / 2, maximumV }) as const
const forward = (reset: ForwardDuty['reset']): Case => ({
  name: `forward, ${reset}`,
  duty: { topology: 'forward', ...common, supply: supply(36, 72), maximumDutyRatio: 0.5, reset, outputs: [output('o1', 5, 10), output('o2', -12, 1)] } as ForwardDuty,
  windings: [winding('p', 24, 'primary'), winding('r', 24, 'reset'), winding('s1', 8, 'secondary', 'o1'), winding('s2', 18, 'secondary', 'o2')],
  inputsV: [36, 72],
})
const halves = [winding('s1', 2, 'secondary', 'o1'), winding('s1b', 2, 'secondary', 'o1'), winding('s2', 5, 'secondary', 'o2')]
const bridgeOutputs = [output('o1', 12, 20), output('o2', 36, 1, { rectifier: 'full-wave' })]
const CASES: readonly Case[] = [
  forward('reset-winding'),
  forward('two-switch'),
  forward('active-clamp'),
  { name: 'half-bridge', duty: { topology: 'half-bridge', ...common, supply: supply(300, 400), maximumDutyRatio: 0.48, outputs: bridgeOutputs } as HalfBridgeDuty, windings: [winding('p', 18, 'primary'), ...halves], inputsV: [300, 400] },
  { name: 'full-bridge, pulse width', duty: { topology: 'full-bridge', control: 'pulse-width', ...common, supply: supply(300, 400), maximumDutyRatio: 0.48, outputs: bridgeOutputs } as FullBridgeDuty, windings: [winding('p', 36, 'primary'), ...halves], inputsV: [300, 400] },
  { name: 'full-bridge, phase shift', duty: { topology: 'full-bridge', control: 'phase-shift', ...common, supply: supply(300, 400), maximumDutyRatio: 0.48, outputs: bridgeOutputs } as FullBridgeDuty, windings: [winding('p', 36, 'primary'), ...halves], inputsV: [300, 400] },
  { name: 'push-pull', duty: { topology: 'push-pull', ...common, supply: supply(20, 32), maximumDutyRatio: 0.48, outputs: bridgeOutputs } as PushPullDuty, windings: [winding('p', 2.5, 'primary'), winding('pb', 2.5, 'primary'), ...halves], inputsV: [20, 32] },
]

const circuitOf = ({ duty, windings }: Case, inductanceH: number, leakageH: number | null = null) => topologyOf(duty).circuit({ duty, primary: windings[0]!, windings, inductanceH, leakageH: () => leakageH })
const stateAt = (one: Case, point: OperatingPoint, { inductanceH = 1e-3, leakageH = null as number | null } = {}): CircuitState => circuitOf(one, inductanceH, leakageH).solve!(point)

/** Greatest distance of two waveforms of one period at the ends of every piece. */
const distance = (one: Waveform, other: Waveform) => peak(sumWaveforms([one, scaleWaveform(other, -1)]))

const points = fc.record({ at: fc.double({ min: 0, max: 1, noNaN: true }), load: fc.constantFrom('full' as const, 'light' as const), loadFactor: fc.double({ min: 0.02, max: 1.5, noNaN: true }), inductanceH: fc.double({ min: 1e-5, max: 1e-2, noNaN: true }), leakageH: fc.option(fc.double({ min: 1e-9, max: 1e-6, noNaN: true })) })
const solved = (one: Case, { at, load, loadFactor, inductanceH, leakageH }: typeof points extends fc.Arbitrary<infer T> ? T : never) => ({
  state: stateAt(one, { inputV: one.inputsV[0] + at * (one.inputsV[1] - one.inputsV[0]), load, loadFactor }, { inductanceH, leakageH }),
  inputV: one.inputsV[0] + at * (one.inputsV[1] - one.inputsV[0]),
})

describe.each(CASES)('$name', (one) => {
  const turnsOf = (id: string) => one.windings.find((other) => other.id === id)!.turns

  it('balances the volt-seconds of every winding', () => {
    fc.assert(fc.property(points, (point) => {
      for (const { voltageV } of solved(one, point).state.windings.values()) expect(Math.abs(integralOverPeriod(voltageV))).toBeLessThan(1e-9 * peak(voltageV) * voltageV.periodS)
    }))
  })

  it('has the ampere-turns of the flux at every instant, and none jumps', () => {
    fc.assert(fc.property(points, (point) => {
      const { state } = solved(one, point)
      const mmf = sumWaveforms([...state.windings].map(([id, { currentA }]) => scaleWaveform(currentA, turnsOf(id))))
      const largest = Math.max(...[...state.windings].map(([id, { currentA }]) => peak(currentA) * turnsOf(id)))
      const ofFlux = scaleWaveform(state.fluxWb, turnsOf('p') ** 2 / point.inductanceH)
      expect(distance(mmf, ofFlux)).toBeLessThan(1e-9 * Math.max(largest, peak(ofFlux)))
    }))
  })

  it('has the flux that its voltages make', () => {
    fc.assert(fc.property(points, (point) => {
      const { state } = solved(one, point)
      const { voltageV } = state.windings.get('p')!
      for (const { startS, endS, from } of waveformSegments(voltageV)) {
        const rise = waveformSegments(state.fluxWb).filter((piece) => piece.startS >= startS - 1e-15 && piece.endS <= endS + 1e-15).reduce((sum, piece) => sum + piece.to - piece.from, 0)
        expect(Math.abs(rise * turnsOf('p') - from * (endS - startS))).toBeLessThan(1e-9 * peakToPeak(state.fluxWb) * turnsOf('p'))
      }
    }))
  })

  it('takes from the supply what outputs, drops and losses need', () => {
    const full = stateAt(one, { inputV: one.inputsV[0], load: 'full', loadFactor: 1 })
    const { duty } = one
    if (!('outputs' in duty)) throw new Error('a case without outputs')
    const traits = dutyTraits(duty)
    const outW = full.outputs.reduce((sum, { voltageV, rectifiedA }) => sum + Math.abs(voltageV) * mean(rectifiedA), 0)
    expect(full.inputPowerW).toBeGreaterThan(outW)
    expect(full.inputPowerW / (outW / traits.efficiency!)).toBeCloseTo(1, 2)
  })

  it('carries each load behind the filter, in whatever mode that is', () => {
    fc.assert(fc.property(points, (point) => {
      const { state } = solved(one, point)
      for (const { outputId, rectifiedA } of state.outputs) {
        const asked = dutyTraits(one.duty).outputs.find(({ id }) => id === outputId)!
        const loadA = (point.load === 'full' ? asked.fullLoadCurrentA : asked.lightLoadCurrentA) * point.loadFactor
        expect(mean(rectifiedA) / loadA).toBeCloseTo(1, 8)
      }
    }))
  })

  it('finds discontinuous conduction at light load', () => {
    const modeAt = (load: 'full' | 'light') => stateAt(one, { inputV: one.inputsV[1], load, loadFactor: 1 }).mode
    expect([modeAt('full'), modeAt('light')]).toEqual(['continuous', 'discontinuous'])
  })
})

import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { scaleWaveform, sumWaveforms } from '../waveforms/combine'
import { integralOverPeriod, mean, peak, peakToPeak } from '../waveforms/statistics'
import { waveformSegments } from '../waveforms/waveform'
import type { LlcDuty } from '../duties/llc'
import { topologyOf } from './index'
import { llcAfter, llcAtFrequency, llcForOutput, seriesResonanceHz } from './llc'
import type { LlcTank } from './llc'
import type { CircuitWinding } from './topology'
import { UnreachablePoint } from './unreachable'

/** Tanks as they are built: inductances in a ratio of 2 to 12, loads up to what the resonance carries well. */
const tanks = fc.record({ lr: fc.double({ min: 5e-6, max: 3e-4, noNaN: true }), ratio: fc.double({ min: 2, max: 12, noNaN: true }), resonanceHz: fc.double({ min: 4e4, max: 5e5, noNaN: true }), load: fc.double({ min: 1e-3, max: 0.5, noNaN: true }) })
type Drawn = typeof tanks extends fc.Arbitrary<infer T> ? T : never
const tankOf = ({ lr, ratio, resonanceHz }: Drawn, sourceV = 200): LlcTank => ({ sourceV, resonantInductanceH: lr, resonantCapacitanceF: 1 / ((2 * Math.PI * resonanceHz) ** 2 * lr), magnetisingInductanceH: ratio * lr })
const scaleA = ({ sourceV, resonantInductanceH, resonantCapacitanceF }: LlcTank) => sourceV / Math.sqrt(resonantInductanceH / resonantCapacitanceF)

describe('the series-resonant half bridge', () => {
  it('is half-wave symmetric, carries its load and joins its modes without a jump', () => {
    fc.assert(
      fc.property(tanks, fc.double({ min: 0.75, max: 2, noNaN: true }), (drawn, x) => {
        const tank = tankOf(drawn)
        const outputA = drawn.load * scaleA(tank)
        const state = llcAtFrequency(tank, { frequencyHz: x * drawn.resonanceHz, outputA })
        expect(state.residual).toBeLessThan(1e-9)
        state.segments.forEach((segment, index) => {
          const next = state.segments[index + 1]?.from
          const end = llcAfter(tank, state.outputV, segment, segment.durationS)
          if (next) expect(Math.abs(end.resonantA - next.resonantA)).toBeLessThan(1e-9 * scaleA(tank))
        })
        // Without loss the power from the source is the power of the output.
        const inW = (2 * state.frequencyHz) * state.segments.reduce((sum, segment) => sum + tank.sourceV * tank.resonantCapacitanceF * (llcAfter(tank, state.outputV, segment, segment.durationS).capacitorV - segment.from.capacitorV), 0)
        expect(inW / (state.outputV * outputA)).toBeCloseTo(1, 6)
      }),
      { numRuns: 60 },
    )
  })

  it('finds the frequency of an output voltage, and says how far the gain goes where there is none', () => {
    fc.assert(
      fc.property(tanks, fc.double({ min: 0.9, max: 1.12, noNaN: true }), (drawn, gain) => {
        const tank = tankOf(drawn)
        const answer = llcForOutput(tank, { outputV: gain * tank.sourceV, outputA: drawn.load * scaleA(tank) })
        if (answer.state === 'found') expect(answer.llc.outputV / tank.sourceV / gain).toBeCloseTo(1, 6)
        else expect(answer.nearestGain).toBeGreaterThan(0)
      }),
      { numRuns: 60 },
    )
    const tank = tankOf({ lr: 60e-6, ratio: 5, resonanceHz: 100e3, load: 0.3 })
    const answer = llcForOutput(tank, { outputV: 3 * tank.sourceV, outputA: 2 * scaleA(tank) })
    expect(answer.state).toBe('not-reached')
  })

  it('has a gain of 1 at its series resonance whatever the load', () => {
    const tank = tankOf({ lr: 60e-6, ratio: 5, resonanceHz: 100e3, load: 0.3 })
    for (const load of [0.2, 0.5, 1]) expect(llcAtFrequency(tank, { frequencyHz: seriesResonanceHz(tank), outputA: load * scaleA(tank) }).outputV).toBeCloseTo(tank.sourceV, 6)
  })

  it('refuses a tank without inductance, naming the value', () => {
    expect(() => llcAtFrequency({ ...tankOf({ lr: 60e-6, ratio: 5, resonanceHz: 100e3, load: 0.3 }), resonantInductanceH: 0 }, { frequencyHz: 1e5, outputA: 1 })).toThrow(/resonantInductanceH must be positive: 0/)
  })
})

const winding = (id: string, turns: number, role: CircuitWinding['role'], outputId: string | null = null): CircuitWinding => ({ id, name: id, role, side: 'primary', outputId, turns })
const WINDINGS = [winding('p', 33, 'primary'), winding('a', 4, 'secondary', 'o1'), winding('b', 4, 'secondary', 'o1'), winding('c', 8, 'secondary', 'o2')]
const output = { name: 'O', role: 'main' as const, rectifierDropV: 0.5, lightLoadCurrentA: 1, side: 'secondary' as const }
const DUTY: LlcDuty = {
  topology: 'llc', supply: { kind: 'dc', minimumV: 360, nominalV: 390, maximumV: 420 }, efficiency: 0.95, switchDropV: 0, currentLimit: null, clampSpikeV: null, switchRatingV: null,
  outputs: [{ ...output, id: 'o1', voltageV: 23.5, fullLoadCurrentA: 8, rectifier: 'centre-tapped' }, { ...output, id: 'o2', role: 'auxiliary', voltageV: -47.5, fullLoadCurrentA: 1, rectifier: 'full-wave' }],
  resonantInductanceH: 60e-6, resonantCapacitanceF: 42e-9, resonantInductor: 'separate', minimumFrequencyHz: 60e3, maximumFrequencyHz: 250e3, deadTimeS: 300e-9, bridgeCapacitanceF: 300e-12,
}
const LM = 300e-6
const stateAt = (duty: LlcDuty, inputV: number, loadFactor: number) => topologyOf(duty).circuit({ duty, primary: WINDINGS[0]!, windings: WINDINGS, inductanceH: LM, leakageH: () => null }).solve!({ inputV, load: 'full', loadFactor })

const points = fc.record({ inputV: fc.double({ min: 360, max: 420, noNaN: true }), loadFactor: fc.double({ min: 0.05, max: 1.2, noNaN: true }), resonantInductor: fc.constantFrom('separate' as const, 'leakage' as const) })
const solved = ({ inputV, loadFactor, resonantInductor }: typeof points extends fc.Arbitrary<infer T> ? T : never) => {
  try {
    return stateAt({ ...DUTY, resonantInductor }, inputV, loadFactor)
  } catch (error) {
    if (error instanceof UnreachablePoint) return null
    throw error
  }
}

describe('the transformer of an LLC converter', () => {
  const turnsOf = (id: string) => WINDINGS.find((one) => one.id === id)!.turns

  it('balances volt-seconds, has the ampere-turns of its flux at every instant and none of its currents jumps but where a rectifier commutates', () => {
    let reached = 0
    fc.assert(
      fc.property(points, (point) => {
        const state = solved(point)
        if (!state) return
        reached += 1
        for (const { voltageV } of state.windings.values()) expect(Math.abs(integralOverPeriod(voltageV))).toBeLessThan(1e-9 * peak(voltageV) * voltageV.periodS)
        const mmf = sumWaveforms([...state.windings].map(([id, { currentA }]) => scaleWaveform(currentA, turnsOf(id))))
        const ofFlux = scaleWaveform(state.fluxWb, turnsOf('p') ** 2 / LM)
        expect(peak(sumWaveforms([mmf, scaleWaveform(ofFlux, -1)]))).toBeLessThan(1e-9 * peak(state.windings.get('p')!.currentA) * turnsOf('p'))
      }),
      { numRuns: 60 },
    )
    expect(reached).toBeGreaterThan(30)
  })

  it('swings its flux by the volt-seconds of its magnetising inductance and by L_m·i_m alike', () => {
    fc.assert(
      fc.property(points, (point) => {
        const state = solved(point)
        if (!state) return
        const { voltageV } = state.windings.get('c')!
        const positiveVs = waveformSegments(voltageV).reduce((sum, { durationS, from, to }) => sum + (durationS * (Math.max(0, from) + Math.max(0, to))) / 2, 0)
        // Between rectifier pulses the voltage is a sine, which chords follow to 0.05 %.
        expect(positiveVs / turnsOf('c') / peakToPeak(state.fluxWb)).toBeCloseTo(1, 2)
      }),
      { numRuns: 40 },
    )
  })

  it('takes the power of outputs and efficiency from the supply, and shares it in proportion to load', () => {
    const state = stateAt(DUTY, 390, 1)
    const outW = 23.5 * 8 + 47.5
    expect(state.inputPowerW / (outW / 0.95)).toBeCloseTo(1, 2)
    const [first, second] = state.outputs
    expect(mean(first!.rectifiedA) / mean(second!.rectifiedA)).toBeCloseTo(8, 6)
    expect(second!.voltageV).toBeCloseTo(-47.5, 6)
  })

  it('finds its mode from the input and says when the range of the controller does not suffice', () => {
    expect(stateAt(DUTY, 362, 1).mode).toBe('below-resonance')
    expect(stateAt(DUTY, 420, 1).mode).toBe('above-resonance')
    expect(stateAt({ ...DUTY, minimumFrequencyHz: 150e3 }, 362, 1).findings).toMatchObject([{ code: 'frequency-out-of-range' }])
    expect(() => stateAt(DUTY, 120, 1)).toThrow(UnreachablePoint)
  })
})

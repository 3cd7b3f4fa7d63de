import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { FlybackDuty as Duty } from '../specification'
import { integralOverPeriod, maximum, mean, rms } from '../waveforms/statistics'
import { valueAt } from '../waveforms/waveform'
import { solveSymmetric, stepNetwork } from './diode-network'
import { FLYBACK } from './flyback-circuit'
import { flybackState } from './flyback'
import { leakageFlybackState, leakageMatrixH } from './flyback-leakage'
import type { LeakageFlybackDuty } from './flyback-leakage'
import { valleyPoint } from './flyback-valley'
import type { CircuitWinding } from './topology'

const L = 80e-6
const TURNS = [24, 8, 18] as const

/** Pair leakages at the primary's turns, by their indices. */
const leakages = (p1: number, p2: number, s12: number) => (one: number, other: number) => [[0, p1, p2], [p1, 0, s12], [p2, s12, 0]][one]![other]! / TURNS[0] ** 2

function twoOutputs({ currents, leak, inputVoltageV = 24, spikeV = 25 }: { currents: readonly [number, number]; leak: readonly [number, number, number]; inputVoltageV?: number; spikeV?: number }): LeakageFlybackDuty {
  const branches = [{ turns: 8, voltageV: 5.5, currentA: currents[0] }, { turns: 18, voltageV: 12.375, currentA: currents[1] }]
  const start = flybackState({ inputVoltageV, frequencyHz: 1e5, primaryTurns: 24, primaryInductanceH: L, outputs: branches.map(({ turns, voltageV, currentA }) => ({ turns, voltageV, rectifierDropV: 0, currentA })), regulatedOutput: 0, losses: { kind: 'ideal' } })
  return {
    inputVoltageV, switchDropV: 0, frequencyHz: 1e5, primaryTurns: 24, branches, regulatedBranch: 0, clampVoltageV: 16.5 + spikeV, start,
    inductanceH: leakageMatrixH({ turns: TURNS, inductanceH: L, unitLeakageH: leakages(...leak) }),
  }
}

describe('inductance matrix from pair leakages', () => {
  it('shows the inductance at the primary open and each pair’s leakage with the other shorted', () => {
    const matrix = leakageMatrixH({ turns: TURNS, inductanceH: L, unitLeakageH: leakages(1.2e-6, 1.6e-6, 0.7e-6) })
    expect(matrix[0]![0]).toBeCloseTo(L, 12)
    expect(matrix[0]![0]! - matrix[0]![1]! ** 2 / matrix[1]![1]!).toBeCloseTo(1.2e-6, 12)
    expect(matrix[0]![0]! - matrix[0]![2]! ** 2 / matrix[2]![2]!).toBeCloseTo(1.6e-6, 12)
    expect(matrix[1]![2]).toBe(matrix[2]![1])
    // Between secondaries the magnetising path carries a little: within the leakage over the inductance.
    expect(((matrix[1]![1]! - matrix[1]![2]! ** 2 / matrix[2]![2]!) * (24 / 8) ** 2) / 0.7e-6).toBeCloseTo(1, 1)
  })

  it('refuses windings coupled without leakage when they are stepped', () => {
    expect(() => solveSymmetric([[1, 1], [1, 1]], [1, 0])).toThrow(RangeError)
  })
})

describe('a flyback with leakage', () => {
  const load = fc.tuple(fc.double({ min: 0.2, max: 5, noNaN: true }), fc.double({ min: 0.05, max: 1.5, noNaN: true }))
  // Each winding's own part of a star; a pair shows the sum of its two.
  const own = fc.double({ min: 0.1e-6, max: 1.2e-6, noNaN: true })
  const leak = fc.tuple(own, own, own).map(([p, one, two]): [number, number, number] => [p + one, p + two, one + two])

  it('balances volt-seconds and energy, gives each load its current and keeps the flux continuous', () => {
    fc.assert(
      fc.property(load, leak, (currents, leaks) => {
        const duty = twoOutputs({ currents, leak: leaks })
        const state = leakageFlybackState(duty)
        state.voltagesV.forEach((voltageV, index) => expect(Math.abs(integralOverPeriod(voltageV))).toBeLessThan(1e-6 * (index === 0 ? 24 : 12) * 1e-5))
        duty.branches.forEach(({ currentA }, index) => expect(mean(state.currentsA[index + 1]!) / currentA).toBeCloseTo(1, 6))
        const clampA = state.clampPowerW / duty.clampVoltageV
        const inputW = 24 * (mean(state.currentsA[0]!) - clampA)
        const outputW = duty.branches.reduce((sum, { currentA }, index) => sum + currentA * state.branchVoltagesV[index]!, 0)
        expect(inputW / (outputW + state.clampPowerW)).toBeCloseTo(1, 6)
        // Flux by the ampere-turns at each corner against its integral from the voltage.
        const flux = (tS: number) => state.currentsA.reduce((sum, current, index) => sum + TURNS[index]! * valueAt(current, tS), 0)
        const { points } = state.voltagesV[0]!
        const at = points.map(([tS]) => flux(Math.max(0, tS - 1e-15)))
        for (let i = 1; i < points.length; i++) {
          const [before, after] = [points[i - 1]!, points[i]!]
          if (after[0] - before[0] < 1e-12) expect(Math.abs(at[i]! - at[i - 1]!)).toBeLessThan(1e-3 * Math.max(...at))
        }
      }),
      { numRuns: 40 },
    )
  })

  it('clamp loss is ½·L·Î²·f·V_c/(V_c − V_R) for one secondary, but for leakage over magnetising inductance', () => {
    const inductanceH = leakageMatrixH({ turns: [24, 8], inductanceH: L, unitLeakageH: () => 1e-6 / 576 })
    const state = leakageFlybackState({ ...twoOutputs({ currents: [4, 0.5], leak: [1e-6, 1e-6, 1e-6] }), inductanceH, branches: [{ turns: 8, voltageV: 5.5, currentA: 4 }] })
    const expected = (0.5 * 1e-6 * state.peakCurrentA ** 2 * 1e5 * 41.5) / 25
    expect(state.clampPowerW / expected).toBeCloseTo(1, 1)
    expect((state.turnOffS * 25) / (1e-6 * state.peakCurrentA)).toBeCloseTo(1, 1)
  })

  it('comes to the ideal flyback as the leakage vanishes', () => {
    const inductanceH = leakageMatrixH({ turns: [24, 8], inductanceH: L, unitLeakageH: () => 1e-10 / 576 })
    const duty = twoOutputs({ currents: [4, 0.5], leak: [1e-6, 1e-6, 1e-6] })
    const ideal = flybackState({ inputVoltageV: 24, frequencyHz: 1e5, primaryTurns: 24, primaryInductanceH: L, outputs: [{ turns: 8, voltageV: 5.5, rectifierDropV: 0, currentA: 4 }], regulatedOutput: 0, losses: { kind: 'ideal' } })
    const state = leakageFlybackState({ ...duty, inductanceH, branches: [{ turns: 8, voltageV: 5.5, currentA: 4 }], start: ideal })
    expect(state.peakCurrentA / ideal.peakCurrentA).toBeCloseTo(1, 3)
    expect(rms(state.currentsA[1]!) / rms(ideal.outputs[0]!.currentA)).toBeCloseTo(1, 3)
  })

  it('a lightly loaded output takes a short pulse: its rms differs by a tenth and more, its peak by half', () => {
    const duty = twoOutputs({ currents: [4, 0.05], leak: [1.2e-6, 1.2e-6, 0.7e-6] })
    const state = leakageFlybackState(duty)
    const even = flybackState({ inputVoltageV: 24, frequencyHz: 1e5, primaryTurns: 24, primaryInductanceH: L, outputs: duty.branches.map(({ turns, voltageV, currentA }) => ({ turns, voltageV, rectifierDropV: 0, currentA })), regulatedOutput: 0, losses: { kind: 'ideal' } }).outputs[1]!
    expect(rms(state.currentsA[2]!) / rms(even.currentA)).toBeGreaterThan(1.1)
    expect(maximum(state.currentsA[2]!) / maximum(even.currentA)).toBeGreaterThan(1.5)
    expect(state.branchVoltagesV[1]!).toBeGreaterThan(12.375)
  })

  it('steps a single rectified inductance to zero and keeps it there', () => {
    const segments = stepNetwork({ inductanceH: [[1e-3]] }, { durationS: 1e-3, sourceV: [-2], closed: [false] }, [1])
    expect(segments[0]!.durationS).toBeCloseTo(0.5e-3, 12)
    expect(segments[1]!.durationS).toBeCloseTo(0.5e-3, 12)
    expect(segments[1]!.toA).toEqual([0])
  })
})

describe('quasi-resonant flyback', () => {
  const valley = { primaryVoltageV: 300, reflectedVoltageV: 100, transferredPowerW: 60, primaryInductanceH: 500e-6, nodeCapacitanceF: 150e-12, maximumFrequencyHz: 1e6 }

  it('period is on time, off time and the way to the valley; ½·L·Î²·f is the power', () => {
    const { frequencyHz, deadS, valley: number } = valleyPoint(valley)
    expect(number).toBe(1)
    expect(deadS).toBeCloseTo(Math.PI * Math.sqrt(500e-6 * 150e-12), 12)
    const peakA = Math.sqrt((2 * 60) / (500e-6 * frequencyHz))
    expect(500e-6 * peakA * (1 / 300 + 1 / 100) + deadS).toBeCloseTo(1 / frequencyHz, 12)
  })

  it('skips valleys to stay below the greatest frequency, and refuses where none is slow enough', () => {
    const light = valleyPoint({ ...valley, transferredPowerW: 3, maximumFrequencyHz: 130e3 })
    expect(light.valley).toBeGreaterThan(1)
    expect(light.frequencyHz).toBeLessThanOrEqual(130e3)
    expect(() => valleyPoint({ ...valley, transferredPowerW: 0.01, maximumFrequencyHz: 20e3 })).toThrow(RangeError)
  })
})

describe('the flyback circuit', () => {
  const winding = (id: string, turns: number, role: CircuitWinding['role'], outputId: string | null): CircuitWinding => ({ id, name: id, role, side: role === 'primary' ? 'primary' : 'secondary', outputId, turns })
  const output = (id: string, voltageV: number, fullLoadCurrentA: number) => ({ id, name: id, role: 'main' as const, voltageV, rectifierDropV: 0.5, fullLoadCurrentA, lightLoadCurrentA: fullLoadCurrentA / 50, side: 'secondary' as const })
  const duty: Duty = {
    topology: 'flyback', supply: { kind: 'dc', minimumV: 18, nominalV: 24, maximumV: 32 }, outputs: [output('o1', 5, 4), output('o2', 12, 0.5)], switchingFrequencyHz: 1e5,
    conduction: { kind: 'continuous', rippleRatio: 0.4 }, efficiency: 0.85, maximumDutyRatio: 0.45, reflectedVoltageV: null, switchDropV: 0.2, currentLimit: null, clampSpikeV: 25, switchRatingV: 100,
  }
  const windings = [winding('p', 24, 'primary', null), winding('s1', 8, 'secondary', 'o1'), winding('s2', 18, 'secondary', 'o2')]
  const solve = (changed: Partial<Duty>, own = windings, leakageH: number | null = 1e-6, load: 'full' | 'light' = 'full') => {
    const circuit = FLYBACK.circuit({ duty: { ...duty, ...changed }, primary: own[0]!, windings: own, inductanceH: L, leakageH: (id) => leakageH && leakageH * (own.find((one) => one.id === id)!.turns / 24) ** 2 })
    return { findings: circuit.findings, state: circuit.solve!({ inputV: 24, load, loadFactor: 1 }) }
  }
  const current = (state: ReturnType<typeof solve>['state'], id: string) => state.windings.get(id)!.currentA

  it('takes the commutation from leakage and clamp, and the efficiency’s losses once', () => {
    const ideal = solve({ clampSpikeV: null }).state
    const real = solve({}).state
    expect(ideal.commutationS).toBeNull()
    expect((real.commutationS! * 25) / (1e-6 * real.switchPeakA!)).toBeCloseTo(1, 1)
    // The clamp's power is part of the losses that the efficiency states, so the input power is the same.
    expect(real.inputPowerW / ideal.inputPowerW).toBeCloseTo(1, 3)
    expect(mean(current(real, 's1'))).toBeLessThan(mean(current(ideal, 's1')))
    expect(mean(current(real, 's1'))).toBeGreaterThanOrEqual(4 - 1e-6)
  })

  it('shares by the leakages where asked, and says what it lacks for that', () => {
    const shared = solve({ sharing: 'from-leakages' })
    expect(shared.findings).toEqual([])
    expect(mean(current(shared.state, 's2')) / mean(current(shared.state, 's1'))).toBeCloseTo(0.5 / 4, 6)
    expect(solve({ sharing: 'from-leakages', clampSpikeV: null }).findings.map(({ code }) => code)).toEqual(['sharing-not-known'])
    expect(solve({ sharing: 'from-leakages' }, windings, null).findings.map(({ code }) => code)).toEqual(['sharing-not-known'])
  })

  it.each(['winding', 'output'] as const)('an output stacked on another’s %s gives it its voltage and the lower one its current', (at) => {
    const upper = { ...output('o2', 12, 0.5), stackedOn: { outputId: 'o1', at } }
    const turns = at === 'winding' ? 10 : 11
    const { state, findings } = solve({ outputs: [output('o1', 5, 4), upper], clampSpikeV: null, efficiency: 1 }, [windings[0]!, windings[1]!, winding('s2', turns, 'secondary', 'o2')])
    expect(findings).toEqual([])
    expect(state.outputs[1]!.voltageV).toBeCloseTo(at === 'winding' ? (5.5 / 8) * 18 - 0.5 : 5 + (5.5 / 8) * 11 - 0.5, 9)
    expect(mean(current(state, 's2'))).toBeCloseTo(0.5, 9)
    expect(mean(current(state, 's1'))).toBeCloseTo(4.5, 9)
    // The ampere-turns of all windings make the flux.
    const sum = (tS: number) => windings.map(({ id }) => (id === 's2' ? turns : id === 's1' ? 8 : 24) * valueAt(current(state, id), tS)).reduce((a, b) => a + b, 0)
    expect((valueAt(state.fluxWb, 6e-6) * 24 * 24) / L).toBeCloseTo(sum(6e-6), 6)
  })

  it('takes an output that stands on itself by way of another as standing on its return', () => {
    const { findings } = solve({ outputs: [{ ...output('o1', 5, 4), stackedOn: { outputId: 'o2', at: 'output' } }, { ...output('o2', 12, 0.5), stackedOn: { outputId: 'o1', at: 'output' } }], clampSpikeV: null })
    expect(findings.map(({ code }) => code)).toContain('stacked-output-not-found')
  })

  it.each([null, 25])('quasi-resonant with a clamp of %s V: rises in frequency at light load, closes at the valley, balances', (clampSpikeV) => {
    const own = { clampSpikeV, conduction: { kind: 'quasi-resonant', maximumFrequencyHz: 400e3, nodeCapacitanceF: 500e-12 } as const }
    const full = solve(own).state
    const light = solve(own, windings, 1e-6, 'light').state
    expect(light.frequencyHz).toBeGreaterThan(full.frequencyHz)
    expect(light.frequencyHz).toBeLessThanOrEqual(400e3)
    for (const { windings: waves, frequencyHz } of [full, light]) {
      for (const { voltageV } of waves.values()) expect(Math.abs(integralOverPeriod(voltageV)) * frequencyHz).toBeLessThan(1e-3)
    }
    const { voltageV, currentA } = full.windings.get('p')!
    expect(voltageV.points[voltageV.points.length - 1]![1]).toBeCloseTo(5.5 * 3, 6)
    expect(currentA.points[currentA.points.length - 1]![1]).toBeCloseTo(0, 6)
  })

  it('names the slope that peak-current control needs above half the period', () => {
    const { state } = solve({ clampSpikeV: null }, [windings[0]!, winding('s1', 4, 'secondary', 'o1'), winding('s2', 9, 'secondary', 'o2')])
    const [found] = state.findings
    expect(found!.code).toBe('slope-compensation-needed')
    expect(found!.values.usualAPerS).toBeCloseTo((5.5 * 6) / L / 2, 0)
    expect(found!.values.leastAPerS).toBeCloseTo((5.5 * 6 - 23.8) / L / 2, 0)
  })
})

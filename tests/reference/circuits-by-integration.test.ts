import integrate from 'ode45-cash-karp'
import { describe, expect, it } from 'vitest'
import { flybackState } from '#shared/engine/topologies/flyback'
import { llcAtFrequency } from '#shared/engine/topologies/llc'
import type { LlcTank } from '#shared/engine/topologies/llc'
import { rms } from '#shared/engine/waveforms/statistics'
import { llcInstants, llcWaveform } from '#shared/engine/topologies/llc-waves'
import { expectWithin } from './relative'

/** Integrates from 0 to a time with the general-purpose Cash–Karp solver; returns the state there. */
function integrated(start: readonly number[], derivative: (change: number[], state: ArrayLike<number>, tS: number) => void, endS: number, tolerance = 1e-9): number[] {
  const solver = integrate([...start], derivative, 0, endS / 1000, { tol: tolerance, maxIncreaseFactor: 4 })
  solver.steps(Infinity, endS)
  return Array.from(solver.y)
}

// The solver knows nothing of modes: the rectifier is a resistance that limits at the output voltage, so steep that what it leaks does not count.
describe('an LLC corner by numeric integration of its circuit', () => {
  const tank: LlcTank = { sourceV: 200, resonantInductanceH: 60e-6, resonantCapacitanceF: 42.2172e-9, magnetisingInductanceH: 300e-6 }
  const outputA = 1.2
  const RECTIFIER_OHM = 2e4
  it.each([{ frequencyHz: 75e3 }, { frequencyHz: 130e3 }])('$frequencyHz Hz', ({ frequencyHz }) => {
    const state = llcAtFrequency(tank, { frequencyHz, outputA })
    const { resonantA, capacitorV, magnetisingA } = state.segments[0]!.from
    const halfS = 1 / (2 * frequencyHz)
    const end = integrated([resonantA, capacitorV, magnetisingA, 0, 0], (change, now) => {
      const [i, v, m] = [now[0]!, now[1]!, now[2]!]
      const clampV = Math.max(-state.outputV, Math.min(state.outputV, (i - m) * RECTIFIER_OHM))
      change[0] = (tank.sourceV - v - clampV) / tank.resonantInductanceH
      change[1] = i / tank.resonantCapacitanceF
      change[2] = clampV / tank.magnetisingInductanceH
      change[3] = Math.abs(i - m)
      change[4] = i * i
    }, halfS, 1e-8)
    const scaleA = tank.sourceV / Math.sqrt(tank.resonantInductanceH / tank.resonantCapacitanceF)
    expect(Math.abs(end[0]! + resonantA) / scaleA).toBeLessThan(0.01)
    expect(Math.abs(end[1]! + capacitorV) / tank.sourceV).toBeLessThan(0.01)
    expectWithin(end[3]! / halfS, outputA, 0.01)
    const wave = llcWaveform(state, llcInstants(state), (one) => one.resonantA)
    expectWithin(rms(wave), Math.sqrt(end[4]! / halfS), 0.005)
  })
})

describe('a flyback corner by numeric integration of its circuit', () => {
  it.each([{ name: 'continuous', inductanceH: 200e-6 }, { name: 'discontinuous', inductanceH: 20e-6 }])('$name', ({ name, inductanceH }) => {
    const state = flybackState({ inputVoltageV: 48, switchDropV: 0, frequencyHz: 100e3, primaryTurns: 24, primaryInductanceH: inductanceH, outputs: [{ turns: 8, voltageV: 12, rectifierDropV: 0.6, currentA: 2 }], regulatedOutput: 0, losses: { kind: 'ideal' } })
    expect(state.mode).toBe(name)
    const onS = state.dutyCycle / 100e3
    const offS = state.secondaryFraction / 100e3
    const on = integrated([state.minimumCurrentA, 0], (change, now) => {
      change[0] = 48 / inductanceH
      change[1] = now[0]! ** 2
    }, onS)
    const off = integrated([on[0]!, 0, 0], (change, now) => {
      change[0] = -(12.6 * 3) / inductanceH
      change[1] = (now[0]! * 3) ** 2
      change[2] = now[0]! * 3
    }, offS)
    expectWithin(on[0]!, state.peakCurrentA, 1e-9)
    expect(Math.abs(off[0]! - state.minimumCurrentA)).toBeLessThan(1e-9 * state.peakCurrentA)
    expectWithin(rms(state.primary.currentA), Math.sqrt(on[1]! * 100e3), 1e-9)
    expectWithin(rms(state.outputs[0]!.currentA), Math.sqrt(off[1]! * 100e3), 1e-9)
    expectWithin(off[2]! * 100e3, 2, 1e-9)
  })
})

import { flybackState } from '#shared/engine/topologies/flyback'
import { pulseSenseState } from '#shared/engine/topologies/current-sense'
import { fourierSeries } from '#shared/engine/waveforms/fourier'
import { acRms, maximum, mean, minimum, peakToPeak, rms } from '#shared/engine/waveforms/statistics'
import type { Waveform } from '#shared/engine/waveforms/waveform'
import { valueAt } from '#shared/engine/waveforms/waveform'
import jstat from 'jstat'
import { describe, expect, it } from 'vitest'
import circuits from './data/current-sense-circuits.json'
import { expectWithin } from './relative'

const HALF_PERCENT = 0.005

/** The simulation reads the burden this long after the first and before the second edge of the pulse. */
const READ_S = 20e-9

// Source: circuit simulation of an ideal current transformer at steady state; figures in the fixture.
describe.each(circuits.cases)('simulated circuit: $title', ({ inputs, results }) => {
  const state = pulseSenseState({
    primaryTurns: inputs.n_primary,
    secondaryTurns: inputs.n_secondary,
    secondaryInductanceH: inputs.l_secondary,
    burdenOhm: inputs.r_burden,
    rectifierDropV: results.vf_eff,
    primaryCurrentA: inputs.i_primary,
    dutyCycle: inputs.duty,
    frequencyHz: inputs.frequency,
    // The clamp's rectifier drops less at the small magnetising current: as the simulation has it.
    resetVoltageV: -results.windings.s.vmin,
  })
  const near = (actual: number, simulated: number) => expectWithin(actual, simulated, HALF_PERCENT)

  it.each([
    // The primary current is positive into the dot, the secondary's out of it: with its sign turned it is the simulated one.
    { name: 'primary', of: state.primary.currentA, sign: 1, figures: results.windings.p },
    { name: 'secondary', of: state.secondary.currentA, sign: -1, figures: results.windings.s },
    { name: 'magnetising', of: state.magnetisingCurrentA, sign: 1, figures: results.magnetising_current_secondary },
    { name: 'burden voltage', of: state.burdenVoltageV, sign: 1, figures: results.burden_v },
  ])('$name: mean, rms, ac rms and peaks', ({ of, sign, figures }) => {
    near(sign * mean(of), figures.mean)
    near(rms(of), figures.rms)
    near(acRms(of), figures.acrms)
    near(sign > 0 ? maximum(of) : -minimum(of), figures.peak)
    const low = sign > 0 ? minimum(of) : -maximum(of)
    if (Math.abs(figures.min) > 1e-6) near(low, figures.min)
    else expect(Math.abs(low)).toBeLessThan(1e-9)
  })

  it('voltages, flux and volt-seconds per turn', () => {
    near(maximum(state.secondary.voltageV), results.windings.s.vmax)
    near(maximum(state.primary.voltageV), results.windings.p.vmax)
    near(minimum(state.primary.voltageV), results.windings.p.vmin)
    near(maximum(state.fluxWb), results.flux_peak_Wb)
    near(peakToPeak(state.fluxWb), results.flux_swing_Wb)
    near(state.voltSecondsVs / inputs.n_secondary, results.volt_seconds_per_turn_Vs)
  })

  it('burden at the beginning and the end of the pulse, and its droop', () => {
    const onS = inputs.duty / inputs.frequency
    const burden = (waveform: Waveform, tS: number) => valueAt(waveform, tS)
    near(burden(state.burdenVoltageV, READ_S), results.burden_v_start_of_pulse)
    near(burden(state.burdenVoltageV, onS - READ_S), results.burden_v_end_of_pulse)
    // Between the two readings, which lie inside the pulse by 20 ns at each end.
    const read = 1 - burden(state.burdenVoltageV, onS - READ_S) / burden(state.burdenVoltageV, READ_S)
    near(read, results.droop_fraction)
    expectWithin(state.droop, results.droop_fraction, 0.015)
  })
})

// Source: jstat, a general-purpose library, integrates the currents of v = L·di/dt between the switching instants by Simpson's rule.
describe.each([
  { name: 'continuous', inputVoltageV: 24, currentA: 4 },
  { name: 'discontinuous', inputVoltageV: 32, currentA: 0.3 },
])('a flyback corner against numeric quadrature: $name', ({ name, inputVoltageV, currentA }) => {
  const inductanceH = 80e-6
  const frequencyHz = 100e3
  const [n, secondaryV] = [3, 5.5]
  const state = flybackState({ inputVoltageV, frequencyHz, primaryTurns: 24, primaryInductanceH: inductanceH, outputs: [{ turns: 8, voltageV: 5, rectifierDropV: 0.5, currentA }], regulatedOutput: 0, losses: { kind: 'ideal' } })
  // The circuit by itself: instants from volt-second balance, currents from their rates, the level from the load.
  const periodS = 1 / frequencyHz
  const riseAPerS = inputVoltageV / inductanceH
  const fallAPerS = (n * secondaryV) / inductanceH
  const discontinuous = name === 'discontinuous'
  const onS = discontinuous ? Math.sqrt((2 * inductanceH * currentA * secondaryV * periodS) / inputVoltageV ** 2) : (periodS * fallAPerS) / (riseAPerS + fallAPerS)
  const offS = (onS * riseAPerS) / fallAPerS
  const lowA = discontinuous ? 0 : (currentA * periodS) / (n * offS) - (riseAPerS * onS) / 2
  const primary = (tS: number) => lowA + riseAPerS * tS
  const secondary = (tS: number) => n * (lowA + riseAPerS * onS - fallAPerS * (tS - onS))
  // Over 0 … 1, where the library's steps add up without rounding.
  const integral = (of: (tS: number) => number, from: number, to: number) => (to - from) * jstat.simpson((u) => of(from + (to - from) * u), 0, 1, 1024)
  const currents = [
    { winding: 'primary', waveform: state.primary.currentA, of: primary, from: 0, to: onS },
    { winding: 'secondary', waveform: state.outputs[0]!.currentA, of: secondary, from: onS, to: onS + offS },
  ]

  it('is in the mode that its name says', () => expect(state.mode).toBe(name))

  it.each(currents)('$winding: mean and rms', ({ waveform, of, from, to }) => {
    expectWithin(mean(waveform), integral(of, from, to) / periodS, 1e-9)
    expectWithin(rms(waveform), Math.sqrt(integral((tS) => of(tS) ** 2, from, to) / periodS), 1e-9)
  })

  it.each(currents)('$winding: amplitudes of the first five harmonics', ({ waveform, of, from, to }) => {
    const { re, im } = fourierSeries(waveform, 5)
    re.forEach((value, index) => {
      const order = index + 1
      const [cosine, sine] = [value, -im[index]!]
      const omega = 2 * Math.PI * frequencyHz * order
      expect(cosine).toBeCloseTo((2 / periodS) * integral((tS) => of(tS) * Math.cos(omega * tS), from, to), 7)
      expect(sine).toBeCloseTo((2 / periodS) * integral((tS) => of(tS) * Math.sin(omega * tS), from, to), 7)
    })
  })
})

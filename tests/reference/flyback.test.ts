import { flybackState } from '#shared/engine/topologies/flyback'
import type { FlybackDuty } from '#shared/engine/topologies/flyback'
import { acRms, maximum, mean, minimum, peak, peakToPeak, positiveVoltSeconds, rms } from '#shared/engine/waveforms/statistics'
import { describe, expect, it } from 'vitest'
import circuits from './data/flyback-circuits.json'
import { expectWithin } from './relative'

const HALF_PERCENT = 0.005

type Circuit = (typeof circuits.cases)[number]

function dutyOf({ inputs, results }: Circuit): FlybackDuty {
  const drops = results.vf_eff as Record<string, number>
  return {
    inputVoltageV: inputs.vin,
    switchDropV: results.vsw_eff,
    frequencyHz: inputs.frequency,
    primaryTurns: inputs.n_primary,
    primaryInductanceH: inputs.l_primary,
    outputs: inputs.outputs.map((output, index) => ({
      turns: output.turns,
      voltageV: output.vout_target ?? (output.negative ? -1 : 1),
      rectifierDropV: drops[`o${index}`]!,
      currentA: output.iout,
    })),
    regulatedOutput: 0,
    losses: { kind: 'ideal' },
  }
}

// Source: circuit simulations of ideal flybacks at steady state, time step halved without change; figures in the fixture.
describe.each(circuits.cases)('simulated circuit: $title', (circuit) => {
  const state = flybackState(dutyOf(circuit))
  const { results } = circuit
  const windings = results.windings as Record<string, Record<string, number>>
  const near = (actual: number, simulated: number) => expectWithin(actual, simulated, HALF_PERCENT)

  it('duty, conduction mode, switch voltage and input power', () => {
    near(state.dutyCycle, results.duty)
    expect(state.mode).toBe(circuit.inputs.mode === 'CCM' ? 'continuous' : 'discontinuous')
    near(state.switchStressV, results.switch_vmax)
    near(mean(state.primary.currentA) * circuit.inputs.vin, results.input_power_W)
  })

  it('magnetising current and flux', () => {
    const simulated = results.magnetising_current_primary
    near(mean(state.magnetisingCurrentA), simulated.mean)
    near(rms(state.magnetisingCurrentA), simulated.rms)
    near(state.peakCurrentA, simulated.peak)
    near(acRms(state.magnetisingCurrentA), simulated.acrms)
    if (state.mode === 'continuous') near(minimum(state.magnetisingCurrentA), simulated.min)
    near(peakToPeak(state.fluxWb), results.flux_swing_Wb)
    near(state.fluxSwingWb, results.flux_swing_Wb)
    near(peak(state.fluxWb), results.flux_peak_Wb)
    near(positiveVoltSeconds(state.primary.voltageV) / circuit.inputs.n_primary, results.volt_seconds_per_turn_Vs)
  })

  it.each(Object.keys(windings))('winding %s: mean, rms, ac rms, peak and voltages', (name) => {
    const simulated = windings[name]!
    const winding = name === 'p' ? state.primary : state.outputs[Number(name.slice(1))]!
    near(mean(winding.currentA), simulated.mean!)
    near(rms(winding.currentA), simulated.rms!)
    near(acRms(winding.currentA), simulated.acrms!)
    near(maximum(winding.currentA), simulated.peak!)
    near(maximum(winding.voltageV), simulated.vmax!)
    near(minimum(winding.voltageV), simulated.vmin!)
  })

  it('output voltages, the unregulated negative one included', () => {
    Object.values(results.vout as Record<string, number>).forEach((simulated, index) => near(state.outputs[index]!.loadVoltageV, simulated))
  })

  it('agrees with the closed form to its printed digits', () => {
    expectWithin(state.dutyCycle, circuit.closed_form.duty, 1e-5)
    expectWithin(rms(state.primary.currentA), circuit.closed_form.windings.p.rms, 1e-5)
  })
})

it('shares the ampere-turns as the simulation with matched rectifiers does', () => {
  const circuit = circuits.cases.find(({ id }) => id.startsWith('04d'))!
  const shares = (circuit.results as unknown as { share_of_ampere_turns: Record<string, Record<string, number>> }).share_of_ampere_turns.at_50pct!
  flybackState(dutyOf(circuit)).outputs.forEach(({ ampereTurnShare }, index) => expect(ampereTurnShare).toBeCloseTo(shares[`s${index}`]!, 5))
})

// Source: own exact calculation from the energy balance, formulas of L. Dixon, SLUP127, 5-13…5-19.
it('discontinuous check point: 24 V, D 0.5, 100 kHz, 35 µH', () => {
  const state = flybackState({
    inputVoltageV: 24, frequencyHz: 100e3, primaryTurns: 10, primaryInductanceH: 35e-6,
    outputs: [{ turns: 10, voltageV: 47.5, rectifierDropV: 0.5, currentA: 20.571428571 / 48 }], regulatedOutput: 0, losses: { kind: 'ideal' },
  })
  expect(state.mode).toBe('discontinuous')
  expect(state.dutyCycle).toBeCloseTo(0.5, 6)
  expect(state.peakCurrentA).toBeCloseTo(3.4286, 4)
  expect(rms(state.primary.currentA)).toBeCloseTo(1.3997, 4)
})

import { describe, expect, it } from 'vitest'
import { topologyOf } from '#shared/engine/topologies/index'
import type { LlcDuty } from '#shared/engine/duties/llc'
import type { ForwardDuty } from '#shared/engine/duties/forward'
import { firstHarmonicGain, llcForOutput, llcAtFrequency, seriesResonanceHz } from '#shared/engine/topologies/llc'
import type { CircuitState, CircuitWinding } from '#shared/engine/topologies/topology'
import { acRms, maximum, mean, minimum, peak, peakToPeak, rms } from '#shared/engine/waveforms/statistics'
import { scaleWaveform } from '#shared/engine/waveforms/combine'
import circuits from './data/forward-llc-circuits.json'
import { expectWithin } from './relative'

const HALF_PERCENT = 0.005

const winding = (id: string, turns: number, role: CircuitWinding['role'], outputId: string | null = null): CircuitWinding => ({ id, name: id, role, side: 'primary', outputId, turns })
const converter = { efficiency: 1, currentLimit: null, clampSpikeV: null, switchRatingV: null }
const output = (voltageV: number, rectifierDropV: number, fullLoadCurrentA: number) => ({ id: 'o', name: 'S', role: 'main' as const, voltageV, rectifierDropV, fullLoadCurrentA, lightLoadCurrentA: 0, side: 'secondary' as const })

type Figures = Record<string, number>

/** The simulation's secondary currents are positive out of the dot. */
function expectWinding(state: CircuitState, id: string, figures: Figures, sign: 1 | -1, except: readonly string[] = []): void {
  const currentA = scaleWaveform(state.windings.get(id)!.currentA, sign)
  const { voltageV } = state.windings.get(id)!
  const found: Figures = { mean: mean(currentA), rms: rms(currentA), acrms: acRms(currentA), peak: maximum(currentA), vmax: maximum(voltageV), vmin: minimum(voltageV) }
  for (const [name, value] of Object.entries(found)) if (!except.includes(name)) expectWithin(value, figures[name]!, HALF_PERCENT)
}

// Source: circuit simulation of an ideal forward converter at steady state, time step halved without change; figures in the fixture.
describe(`simulated circuit: ${circuits.forward.title}`, () => {
  const { inputs, results } = circuits.forward
  const duty: ForwardDuty = {
    topology: 'forward', ...converter, reset: 'reset-winding', supply: { kind: 'dc', minimumV: inputs.vin, nominalV: inputs.vin, maximumV: inputs.vin }, switchDropV: results.vsw_eff,
    switchingFrequencyHz: inputs.frequency, maximumDutyRatio: 0.5, outputs: [{ ...output(results.vout, results.vf_eff_forward, inputs.iout), filterInductanceH: inputs.l_output, rippleRatio: 0.3 }],
  }
  const windings = [winding('p', inputs.n_primary, 'primary'), winding('r', inputs.n_reset, 'reset'), winding('s', inputs.n_secondary, 'secondary', 'o')]
  const state = topologyOf(duty).circuit({ duty, primary: windings[0]!, windings, inductanceH: inputs.l_magnetising_primary, leakageH: () => null }).solve!({ inputV: inputs.vin, load: 'full', loadFactor: 1 })

  it('duty ratio, switch voltage, flux and output inductor', () => {
    expectWithin(state.dutyRatio, results.duty, HALF_PERCENT)
    expectWithin(state.switchPeakV!, results.switch_vmax, HALF_PERCENT)
    expectWithin(peakToPeak(state.fluxWb), results.flux_swing_Wb, HALF_PERCENT)
    expectWithin(peak(state.fluxWb), results.flux_peak_Wb, HALF_PERCENT)
    const [first] = state.outputs
    expectWithin(peakToPeak(first!.rectifiedA), results.output_inductor.ripple_pp, HALF_PERCENT)
    expectWithin(rms(first!.rectifiedA), results.output_inductor.rms, HALF_PERCENT)
    expectWithin(acRms(first!.rectifiedA), results.output_inductor.acrms, HALF_PERCENT)
  })

  it('primary winding', () => expectWinding(state, 'p', results.windings.p, 1))
  it('secondary winding', () => expectWinding(state, 's', results.windings.s, -1))
  it('reset winding', () => expectWinding(state, 'r', results.windings.r, 1))
})

// Source: circuit simulation of an ideal LLC half bridge at steady state, at its series resonance; figures in the fixture.
describe(`simulated circuit: ${circuits.llc.title}`, () => {
  const { inputs, results } = circuits.llc
  const duty: LlcDuty = {
    topology: 'llc', ...converter, supply: { kind: 'dc', minimumV: inputs.vin, nominalV: inputs.vin, maximumV: inputs.vin }, switchDropV: 0, resonantInductanceH: inputs.l_resonant, resonantCapacitanceF: inputs.c_resonant, resonantInductor: 'separate',
    minimumFrequencyHz: 50e3, maximumFrequencyHz: 200e3, deadTimeS: null, bridgeCapacitanceF: null,
    outputs: [{ ...output(inputs.vin / 2 / (inputs.n_primary / inputs.n_secondary) - results.vf_eff, results.vf_eff, results.iout), rectifier: 'centre-tapped' }],
  }
  const windings = [winding('p', inputs.n_primary, 'primary'), winding('s', inputs.n_secondary, 'secondary', 'o'), winding('s2', inputs.n_secondary, 'secondary', 'o')]
  const state = topologyOf(duty).circuit({ duty, primary: windings[0]!, windings, inductanceH: inputs.l_magnetising_primary, leakageH: () => null }).solve!({ inputV: inputs.vin, load: 'full', loadFactor: 1 })

  it('is solved at the frequency of the simulation, with its flux and output voltage', () => {
    expectWithin(state.frequencyHz, inputs.frequency, HALF_PERCENT)
    expect(state.mode).toBe('at-resonance')
    expectWithin(peakToPeak(state.fluxWb), results.flux_swing_Wb, HALF_PERCENT)
    expectWithin(peak(state.fluxWb), results.flux_peak_Wb, HALF_PERCENT)
    expectWithin(state.outputs[0]!.voltageV, results.vout, HALF_PERCENT)
  })

  it('primary winding', () => expectWinding(state, 'p', results.windings.p, 1, ['mean']))
  it.each(['s', 's2'] as const)('half %s of the secondary', (id) => expectWinding(state, id, results.windings[id], id === 's' ? -1 : 1))

  it('rectified current', () => {
    const { rectifiedA } = state.outputs[0]!
    for (const [found, simulated] of [[mean(rectifiedA), results.rectified_secondary_current.mean], [rms(rectifiedA), results.rectified_secondary_current.rms], [maximum(rectifiedA), results.rectified_secondary_current.peak], [acRms(rectifiedA), results.rectified_secondary_current.acrms]] as const) expectWithin(found, simulated, HALF_PERCENT)
  })

  it('the first harmonic is exact at the resonance and told apart from the time domain away from it', () => {
    const tank = { sourceV: inputs.vin / 2, resonantInductanceH: inputs.l_resonant, resonantCapacitanceF: inputs.c_resonant, magnetisingInductanceH: inputs.l_magnetising_primary }
    const outputA = results.iout / 8
    expect(firstHarmonicGain(tank, { frequencyHz: seriesResonanceHz(tank), loadOhm: tank.sourceV / outputA })).toBeCloseTo(1, 12)
    const below = llcAtFrequency(tank, { frequencyHz: 60e3, outputA })
    const byHarmonic = firstHarmonicGain(tank, { frequencyHz: 60e3, loadOhm: below.outputV / outputA }) * tank.sourceV
    // Below the resonance the rectifier rests for part of the period, which the harmonic does not know.
    expect(below.outputV / byHarmonic).toBeGreaterThan(1.05)
    const answer = llcForOutput(tank, { outputV: below.outputV, outputA })
    if (answer.state !== 'found') throw new Error('not reached')
    expectWithin(answer.llc.frequencyHz, 60e3, 1e-6)
  })
})

import { shippedLibrary } from '#server/db/seed/parts/library'
import type { CommonModeChokeDuty } from '#shared/engine/duties/common-mode-choke'
import type { CurrentSenseDuty } from '#shared/engine/duties/current-sense'
import type { GateDriveDuty } from '#shared/engine/duties/gate-drive'
import type { InductorDuty } from '#shared/engine/duties/inductor'
import { evaluate, propose } from '#shared/engine/index'
import type { Duty, FlybackDuty, RequirementSheet } from '#shared/engine/specification'
import { describe, expect, it } from 'vitest'
import { expectWithin } from './relative'

const library = shippedLibrary()
const sheet = (duty: Duty): RequirementSheet => ({ duty, ambientC: 50, permittedRiseK: 50, fluxUtilisation: 0.8, targetCurrentDensityAPerMm2: 5, insulationMethod: 'functional', maximumHeightMm: null })

const buck: InductorDuty = {
  topology: 'inductor', use: 'buck', supply: { kind: 'dc', minimumV: 18, nominalV: 24, maximumV: 32 }, outputVoltageV: 5, outputDropV: 0.5, outputCurrentA: 3, lightLoadCurrentA: 0.3,
  switchingFrequencyHz: 200e3, rippleRatio: 0.4, efficiency: 0.92, switchDropV: 0.1, currentLimit: { nominalA: 4.2, tolerance: 0.1, delayS: 100e-9 },
}
const gate: GateDriveDuty = {
  topology: 'gate-drive', drive: 'unipolar-dc-restored', supply: { kind: 'dc', minimumV: 11, nominalV: 12, maximumV: 13 }, switchingFrequencyHz: 100e3, dutyRatio: { minimum: 0.05, maximum: 0.6 },
  outputs: [{ id: 'o1', name: 'G1', side: 'secondary', gateVoltageV: 12, gateChargeC: 50e-9 }], driverResistanceOhm: 5, couplingCapacitanceF: 220e-9, transitionS: 50e-9, magnetisingCurrentA: 0.05,
}
const choke: CommonModeChokeDuty = {
  topology: 'common-mode-choke', ratedVoltageV: 230, lineCurrentA: 1, linePeakA: 3, lineFrequencyHz: 50, switchingFrequencyHz: 100e3, impedance: [{ frequencyHz: 100e3, minimumOhm: 1000 }],
}
const sense: CurrentSenseDuty = {
  topology: 'current-sense', waveform: 'unipolar-pulse', switchingFrequencyHz: 100e3, nominalCurrentA: 5, maximumCurrentA: 10, dutyRatio: 0.45, ratio: 100, burdenOhm: 10,
  rectifierDropV: 0.6, resetVoltageV: 10, directCurrentA: 0, permittedDroop: 0.02, permittedError: 0.02,
}

const flyback: FlybackDuty = {
  topology: 'flyback', supply: { kind: 'dc', minimumV: 18, nominalV: 24, maximumV: 32 },
  outputs: [
    { id: 'o1', name: '5 V', role: 'main', voltageV: 5, rectifierDropV: 0.5, fullLoadCurrentA: 3, lightLoadCurrentA: 0.3, side: 'secondary' },
    { id: 'o2', name: '12 V', role: 'main', voltageV: 12, rectifierDropV: 0.5, fullLoadCurrentA: 0.5, lightLoadCurrentA: 0.05, side: 'secondary' },
  ],
  switchingFrequencyHz: 100e3, conduction: { kind: 'continuous', rippleRatio: 0.6 }, efficiency: 0.85, maximumDutyRatio: 0.45, reflectedVoltageV: null, switchDropV: 0.2,
  currentLimit: { nominalA: 5, tolerance: 0.1, delayS: 100e-9 }, clampSpikeV: 25, switchRatingV: 150,
}

const figure = (corner: { figures: readonly { code: string; value: number | null }[] } | undefined, code: string) => corner?.figures.find((one) => one.code === code)?.value ?? null

describe('what is proposed beside transformers of converters', () => {
  it('a buck inductor: the ripple asked, the flux within its share, light load found discontinuous', () => {
    const { document, findings } = propose(sheet(buck), library)
    const evaluation = evaluate(document, library)
    const highest = evaluation.corners.find(({ name }) => name === 'maximum-input')!
    expect(document.specification.windings).toHaveLength(1)
    expectWithin(figure(highest, 'ripple-current')! / 3, 0.4, 0.02)
    expect(evaluation.magnetics.fluxUtilisation!).toBeLessThanOrEqual(0.8)
    expect(findings.map(({ code }) => code)).toContain('light-load-changes-mode')
  })

  it('a gate-drive transformer: no gap, magnetising current below the permitted, first pulse within its share of saturation', () => {
    const { document } = propose(sheet(gate), library)
    const evaluation = evaluate(document, library, { working: true })
    const highest = evaluation.corners.find(({ name }) => name === 'maximum-input')!
    expect(document.specification.core.gap.control.value).toBe('none')
    expect(figure(highest, 'magnetising-peak-current')!).toBeLessThanOrEqual(0.05)
    expectWithin(figure(highest, 'first-pulse-volt-seconds')!, (13 * 0.6) / 100e3, 1e-9)
    expect(evaluation.magnetics.fluxUtilisation!).toBeLessThanOrEqual(0.8)
    highest.figures.forEach(({ value }, index) => expect(evaluation.working[`corners.${evaluation.corners.indexOf(highest)}.figures.${index}`]!.value).toBe(value))
  })

  it('a common-mode choke: equal turns that give the impedance, flux of the line current by its leakage L_dm·Î/(N·A)', () => {
    const { document } = propose(sheet(choke), library)
    const evaluation = evaluate(document, library)
    const [corner] = evaluation.corners
    const [one, other] = document.specification.windings
    expect(one!.turns).toBe(other!.turns)
    expect(figure(corner, 'common-mode-impedance')!).toBeGreaterThanOrEqual(1000)
    const core = library.cores.find(({ id }) => id === document.specification.core.core.value!.id)!
    const leakageH = figure(corner, 'differential-leakage')!
    expectWithin(corner!.fluxPeakT!, (leakageH * 3) / (one!.turns * core.effectiveAreaMm2 * 1e-6), 0.01)
  })

  it('a current-sense transformer is entered by a person: its duty is kept, and a finding says so', () => {
    const { document, findings } = propose(sheet(sense), library)
    expect(findings.map(({ code }) => code)).toEqual(['duty-without-proposal'])
    expect(document.requirement!.duty).toEqual(sense)
    expect(document.specification.electrical.topology.value).toBe('current-sense')
  })

  it('an output stacked on another’s winding: the turns that are left, and both currents below', () => {
    const { outputs, ...rest } = flyback
    const { document } = propose(sheet({ ...rest, outputs: [outputs[0]!, { ...outputs[1]!, stackedOn: { outputId: 'o1', at: 'winding' } }] }), library)
    const [, lower, upper] = document.specification.windings
    expectWithin((lower!.turns + upper!.turns) / lower!.turns, 12.5 / 5.5, 0.06)
    const [corner] = evaluate(document, library).corners
    expectWithin(corner!.outputs[1]!.voltageV, 12, 0.06)
    expect(corner!.windings.find(({ windingId }) => windingId === lower!.id)!.dcA).toBeGreaterThanOrEqual(3.5 - 1e-6)
  })
})

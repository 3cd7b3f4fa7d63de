import { gapForInductance, gappedInductanceFactorH } from '#shared/engine/magnetics/gap'
import { fluxDensitySwingT, peakFluxDensityT, turnsForFlux } from '#shared/engine/magnetics/flux'
import { concentricLeakageH } from '#shared/engine/parasitics/leakage'
import { flybackState } from '#shared/engine/topologies/flyback'
import type { FlybackDuty } from '#shared/engine/topologies/flyback'
import {
  applicationNoteSecondaryRmsA, flybackBoundaryInductanceH, flybackContinuousDuty, flybackInductanceH, flybackTurnsRatio, rectifierStressV, switchStressV,
} from '#shared/engine/topologies/flyback-design'
import { bulkCapacitanceF, bulkMaximumV, bulkMinimum } from '#shared/engine/topologies/mains-bulk'
import { acRms, maximum, mean, minimum, rms } from '#shared/engine/waveforms/statistics'
import { describe, expect, it } from 'vitest'
import { expectWithin } from './relative'

/** Stated values of worked examples are printed to two or three digits. */
const PRINTED = 0.005

// Source: L. Dixon, Unitrode/TI SLUP127, section 5, pp. 5-13 to 5-15: 28 V bus to 5 V, 10 A, 100 kHz, ETD 34.
describe('Dixon, continuous flyback', () => {
  const turnsRatio = flybackTurnsRatio({ inputVoltageV: 28, secondaryVoltageV: 5.6, dutyCycle: 0.5 })
  const duty: FlybackDuty = {
    inputVoltageV: 24, frequencyHz: 100e3, primaryTurns: 30, primaryInductanceH: 170e-6,
    outputs: [{ turns: 6, voltageV: 5, rectifierDropV: 0.6, currentA: 10 }], regulatedOutput: 0, losses: { kind: 'ideal' },
  }
  const state = flybackState(duty)
  const [secondary] = state.outputs

  it('ratio 5 and duty 0.538 at 24 V', () => {
    expect(turnsRatio).toBeCloseTo(5, 12)
    expect(flybackContinuousDuty({ inputVoltageV: 24, reflectedVoltageV: 28 })).toBeCloseTo(0.53846, 5)
    expect(state.dutyCycle).toBeCloseTo(0.53846, 5)
  })

  it('mean currents 21.65 A and 4.33 A while conducting, 2.33 A and 10 A over the period', () => {
    expectWithin(mean(secondary!.currentA) / state.secondaryFraction, 21.65, PRINTED)
    expectWithin(mean(state.primary.currentA) / state.dutyCycle, 4.33, PRINTED)
    expectWithin(mean(state.primary.currentA), 2.33, PRINTED)
    expectWithin(mean(secondary!.currentA), 10, 1e-9)
  })

  it('rms 14.7 A and 3.18 A, ac 10.77 A and 2.16 A, printed without the ripple', () => {
    // 14.7 A and 3.18 A are without ripple; with it 14.731 A, from 1 − D rounded to 0.462 (unrounded 14.738 A).
    expectWithin(rms(secondary!.currentA), 14.731, 1e-3)
    expectWithin(rms(secondary!.currentA), 14.7, PRINTED)
    expectWithin(rms(state.primary.currentA), 3.18, PRINTED)
    // 10.77 A is without ripple too; the ripple adds 0.4 %.
    expectWithin(acRms(secondary!.currentA), 10.77, 0.006)
    expectWithin(acRms(state.primary.currentA), 2.16, PRINTED)
  })

  it('peak 23.55 A and valley 19.74 A of the secondary', () => {
    expectWithin(maximum(secondary!.currentA), 23.55, 1e-3)
    expectWithin(state.minimumCurrentA * 5, 19.74, 2e-3)
  })

  it('5.84 turns on the secondary for 0.06 T of swing', () => {
    expectWithin(turnsForFlux({ inductanceH: 6.8e-6, currentA: 5, fluxDensityT: 0.06, areaMm2: 97 }), 5.842, 1e-3)
  })

  it('gap 0.0736 cm: the printed 0.080 cm does not follow from six turns', () => {
    // The printed line uses 5² where six turns were chosen; the own line of the source, L = µ0·N²·A/l·(1 + l/D)², gives 0.736 mm.
    const dixon = { effectiveAreaMm2: 97, effectiveLengthMm: 79, permeability: 1e9, legDiameterMm: 10.8, fringing: 'dixon-round-leg' } as const
    const solution = gapForInductance(dixon, 6.8e-6, 6)
    expect(solution.state === 'found' && solution.gapMm).toBeCloseTo(0.736, 3)
    const straight = gapForInductance({ ...dixon, fringing: 'none' }, 6.8e-6, 6)
    expect(straight.state === 'found' && straight.gapMm).toBeCloseTo(0.645, 3)
  })

  it('0.292 T at the current limit of 25 A, 0.275 T at the peak of full load', () => {
    expectWithin(peakFluxDensityT({ inductanceH: 6.8e-6, currentA: 25, turns: 6, areaMm2: 97 }), 0.292, PRINTED)
    expectWithin(peakFluxDensityT({ inductanceH: 6.8e-6, currentA: maximum(secondary!.currentA), turns: 6, areaMm2: 97 }), 0.275, PRINTED)
  })

  it('inductance for 5 A of ripple is 5.6 µH, not the 6.8 µH printed', () => {
    // 6.8 µH leaves 4.39 A of ripple at 32 V; the ripple target of 5 A at D = 0.5 gives V·(1 − D)/(f·ΔI) = 5.6 µH.
    expectWithin((5.6 * 0.5) / (100e3 * 5), 5.6e-6, 1e-9)
    const at32 = flybackState({ ...duty, inputVoltageV: 32 })
    expectWithin((at32.peakCurrentA - at32.minimumCurrentA) * 5, 4.39, PRINTED)
  })

  it('leakage by the closed form 8.6 µH, where the source states about 5 µH', () => {
    // The honest accuracy of the closed form is ±40 %; 170 µH primary, three layers and six foils of 1.5 cm breadth.
    const leakage = concentricLeakageH({ turns: 30, meanTurnLengthMm: 61, breadthMm: 15, windingHeightsMm: [3 * 1.27, 1.3], interfaceGapsMm: [0.15], interfaces: 1 })
    expectWithin(leakage, 8.6e-6, 0.05)
  })
})

// Source: R. Erickson and D. Maksimović, Fundamentals of Power Electronics, 2nd ed., section 14.3.2 (figures recalled, all recomputed).
describe('Erickson and Maksimović, continuous flyback', () => {
  const inductanceH = 200 * 0.4 / (150e3 * 2 * 0.25)
  const state = flybackState({
    inputVoltageV: 200, frequencyHz: 150e3, primaryTurns: 1, primaryInductanceH: inductanceH,
    outputs: [{ turns: 0.15, voltageV: 20, rectifierDropV: 0, currentA: 5 }], regulatedOutput: 0, losses: { kind: 'ideal' },
  })

  it('magnetising current 1.25 A ± 0.25 A at duty 0.4', () => {
    expectWithin(state.dutyCycle, 0.4, 1e-9)
    expectWithin(mean(state.magnetisingCurrentA), 1.25, 1e-9)
    expectWithin(maximum(state.magnetisingCurrentA), 1.5, 1e-9)
    expectWithin(inductanceH, 1.07e-3, PRINTED)
  })

  it('rms 0.796 A and 6.50 A', () => {
    expectWithin(rms(state.primary.currentA), 0.796, PRINTED)
    expectWithin(rms(state.outputs[0]!.currentA), 6.5, PRINTED)
    expectWithin(rms(state.primary.currentA) + 0.15 * rms(state.outputs[0]!.currentA), 1.77, PRINTED)
  })

  it('58.7 turns, 0.44 mm of gap and 0.0415 T of ac flux on EE30', () => {
    expectWithin(turnsForFlux({ inductanceH, currentA: 1.5, fluxDensityT: 0.25, areaMm2: 109 }), 58.7, PRINTED)
    // The source's gap µ0·L·I²/(B²·A) neglects the core and keeps the unrounded turns.
    const core = { effectiveAreaMm2: 109, effectiveLengthMm: 57.7, permeability: 1e9, fringing: 'none' } as const
    const solution = gapForInductance(core, inductanceH, turnsForFlux({ inductanceH, currentA: 1.5, fluxDensityT: 0.25, areaMm2: 109 }))
    expectWithin(solution.state === 'found' ? solution.gapMm : Number.NaN, 0.4427, 1e-3)
    expectWithin(fluxDensitySwingT({ fluxSwingWb: (200 * 0.4) / (150e3 * 59), areaMm2: 109 }) / 2, 0.0415, PRINTED)
  })
})

// Source: TI UC3842/UCC28C4x data sheet, design procedure, 85–265 V a.c. to 12 V, 4 A (inputs recalled, every result recomputed).
describe('UC3842 data sheet, off-line flyback', () => {
  const state = flybackState({
    inputVoltageV: 75, frequencyHz: 110e3, primaryTurns: 10, primaryInductanceH: 1.5e-3,
    outputs: [{ turns: 1, voltageV: 12, rectifierDropV: 0, currentA: 4 }], regulatedOutput: 0, losses: { kind: 'losses-transferred', efficiency: 0.85 },
  })

  it('input power 56.47 W and duty 0.61538', () => {
    expectWithin(state.transferredPowerW, 56.47, 1e-4)
    expect(state.dutyCycle).toBeCloseTo(0.61538, 5)
  })

  it('peak 1.3634 A, valley 1.0837 A, rms 0.9619 A; the recalled 0.97 A is 1 % high', () => {
    expect(state.peakCurrentA).toBeCloseTo(1.3634, 4)
    expect(state.minimumCurrentA).toBeCloseTo(1.0837, 4)
    expect(state.peakCurrentA - state.minimumCurrentA).toBeCloseTo(0.27972, 4)
    expect(rms(state.primary.currentA)).toBeCloseTo(0.9619, 4)
    expectWithin(rms(state.primary.currentA), 0.97, 0.01)
  })

  it('secondary peak 13.634 A, rms 7.6045 A, mean 4.7059 A with the losses in it', () => {
    const { currentA } = state.outputs[0]!
    expect(maximum(currentA)).toBeCloseTo(13.634, 3)
    expectWithin(rms(currentA), 7.6045, 1e-4)
    expect(mean(currentA)).toBeCloseTo(4.7059, 4)
  })

  it('1.7146 mH for continuous conduction at a tenth of the load', () => {
    expectWithin(flybackBoundaryInductanceH({ inputVoltageV: 75, dutyCycle: 120 / 195, powerW: 5.647, frequencyHz: 110e3 }), 1.7146e-3, 1e-3)
  })

  it.each([
    { mainsFrequencyHz: 47, microfarad: 126.5 },
    { mainsFrequencyHz: 50, microfarad: 118.9 },
    { mainsFrequencyHz: 60, microfarad: 99.1 },
  ])('$microfarad µF at $mainsFrequencyHz Hz by the published formula', ({ mainsFrequencyHz, microfarad }) => {
    const input = { mainsVoltageV: 85, mainsFrequencyHz, inputPowerW: 48 / 0.85, minimumV: 75 }
    expectWithin(bulkCapacitanceF({ ...input, model: 'published-arcsine' }) * 1e6, microfarad, 1e-3)
    // The published discharge time 0.25 + arcsin(r)/π exceeds half a cycle as r nears 1; the sine itself gives arcsin(r)/(2π).
    expectWithin(bulkCapacitanceF({ ...input, model: 'exact-angle' }) * 1e6, microfarad * 0.7691, 1e-3)
  })

  it('rectifier 49.5 V and switch 494.8 V', () => {
    const inputVoltageV = bulkMaximumV(265)
    expectWithin(rectifierStressV({ inputVoltageV, turnsRatio: 10, outputVoltageV: 12 }), 49.48, 1e-3)
    expectWithin(switchStressV({ inputVoltageV, reflectedVoltageV: 120 }), 494.8, 1e-3)
  })
})

// Source: Fairchild AN-4137, five-output supply of 46.9 W (inputs and formulas recalled; all results recomputed).
describe('AN-4137, five outputs', () => {
  // The outputs add up to 46.9 W; the example goes on with 47 W and, from the bulk voltage on, with 92 V.
  const inputPowerW = 47 / 0.7
  const efficiency = 46.9 / inputPowerW
  const bulk = { mainsVoltageV: 85, mainsFrequencyHz: 60, inputPowerW, capacitanceF: 150e-6, charging: { kind: 'charging-fraction', chargingFraction: 0.2 } as const }
  const minimumOf = (change: Partial<typeof bulk>) => {
    const result = bulkMinimum({ ...bulk, ...change })
    return result.state === 'held' ? result.minimumV : Number.NaN
  }
  const inputVoltageV = 92
  const outputs = [
    { voltageV: 3.3, rectifierDropV: 0.5, currentA: 2, noteA: 3.511, exactA: 2.824, ratio: 22.37 },
    { voltageV: 5, rectifierDropV: 0.5, currentA: 2, noteA: 3.675, exactA: 2.824, ratio: 15.45 },
    { voltageV: 12, rectifierDropV: 1, currentA: 1.5, noteA: 2.799, exactA: 2.118, ratio: 6.538 },
    { voltageV: 18, rectifierDropV: 1, currentA: 0.5, noteA: 0.9575, exactA: 0.706, ratio: 4.474 },
    { voltageV: 33, rectifierDropV: 1, currentA: 0.1, noteA: 0.1962, exactA: 0.1412, ratio: 2.5 },
  ]
  const dutyCycle = flybackContinuousDuty({ inputVoltageV, reflectedVoltageV: 85 })
  const primaryInductanceH = flybackInductanceH({ inputVoltageV, dutyCycle, powerW: inputPowerW, frequencyHz: 66e3, rippleRatio: 0.33 })

  it('minimum bulk 92.10 V; 85.4 V at 50 Hz; 74.1 V with 100 µF', () => {
    expectWithin(minimumOf({}), 92.1, 1e-4)
    expectWithin(minimumOf({ mainsFrequencyHz: 50 }), 85.4, 1e-3)
    expectWithin(minimumOf({ capacitanceF: 100e-6 }), 74.1, 1e-3)
  })

  it('duty 0.4802 and 667.4 µH', () => {
    expect(dutyCycle).toBeCloseTo(0.4802, 4)
    expectWithin(primaryInductanceH, 667.4e-6, 1e-3)
  })

  // Outputs with turns that meet every voltage exactly, as the note's ratios before rounding.
  const state = flybackState({
    inputVoltageV, frequencyHz: 66e3, primaryTurns: 85, primaryInductanceH,
    outputs: outputs.map(({ voltageV, rectifierDropV, currentA }) => ({ turns: voltageV + rectifierDropV, voltageV, rectifierDropV, currentA })),
    regulatedOutput: 0, losses: { kind: 'losses-transferred', efficiency },
  })

  it('peak 2.0212 A, valley 1.0182 A, primary rms 1.0721 A', () => {
    expectWithin(state.peakCurrentA, 2.0212, 1e-3)
    expectWithin(state.minimumCurrentA, 1.0182, 1e-3)
    expectWithin(rms(state.primary.currentA), 1.0721, 1e-3)
  })

  it.each(outputs)('$voltageV V: $noteA A by the note, $exactA A without loss, ratio $ratio', (output) => {
    const noteA = applicationNoteSecondaryRmsA({
      primaryRmsA: rms(state.primary.currentA), dutyCycle, reflectedVoltageV: 85, powerShare: (output.voltageV * output.currentA) / 46.9,
      outputVoltageV: output.voltageV, rectifierDropV: output.rectifierDropV,
    })
    expectWithin(noteA, output.noteA, 2e-3)
    const scale = state.transferredPowerW / outputs.reduce((sum, o) => sum + o.currentA * (o.voltageV + o.rectifierDropV), 0)
    const exactA = rms(state.outputs[outputs.indexOf(output)]!.currentA) / scale
    expectWithin(exactA, output.exactA, 1e-3)
    expectWithin(85 / (output.voltageV + output.rectifierDropV), output.ratio, 1e-3)
    // The note's formula is conservative by V_o/(η·(V_o + V_F)).
    expectWithin(noteA / exactA, output.voltageV / (efficiency * (output.voltageV + output.rectifierDropV)), 2e-3)
  })
})

// Source: Power Integrations AN-17, 15 W from 85 V a.c.
it('AN-17: minimum bulk 93 V with 33 µF and 3.2 ms of charging; maximum 375 V', () => {
  const result = bulkMinimum({ mainsVoltageV: 85, mainsFrequencyHz: 60, inputPowerW: 15 / 0.8, capacitanceF: 33e-6, charging: { kind: 'charging-time', chargingTimeS: 3.2e-3 } })
  expectWithin(result.state === 'held' ? result.minimumV : Number.NaN, 92.83, 1e-4)
  expectWithin(bulkMaximumV(265), 375, 1e-3)
})

// Source: TI LM5002 data sheet, 16 V to 5 V.
it('LM5002: ratio 0.375 gives a duty of 0.4545 at 16 V', () => {
  expectWithin(flybackContinuousDuty({ inputVoltageV: 16, reflectedVoltageV: 5 / 0.375 }), 0.4545, 1e-3)
  expectWithin(1 / flybackTurnsRatio({ inputVoltageV: 16, secondaryVoltageV: 5, dutyCycle: 0.5 }), 0.313, PRINTED)
})

// Source: TI SNVA866A, LM5155 from 18 V (inputs only; ratios recomputed without loss).
it.each([{ dutyCycle: 0.4, ratio: 2.4 }, { dutyCycle: 0.45, ratio: 2.95 }, { dutyCycle: 0.5, ratio: 3.6 }])('LM5155: duty $dutyCycle needs a ratio of $ratio', ({ dutyCycle, ratio }) => {
  expectWithin(flybackTurnsRatio({ inputVoltageV: 18, secondaryVoltageV: 5, dutyCycle }), ratio, PRINTED)
})

// Source: Ferroxcube, Design of Planar Power Transformers, flyback example.
describe('Ferroxcube planar flyback', () => {
  // The brochure states a duty of 0.48; its table follows from 0.50 only.
  const primaryInductanceH = flybackBoundaryInductanceH({ inputVoltageV: 70, dutyCycle: 0.5, powerW: 8, frequencyHz: 120e3 })
  it('638 µH and 186 mA rms', () => {
    expectWithin(primaryInductanceH, 638e-6, 1e-3)
    const state = flybackState({
      inputVoltageV: 70, frequencyHz: 120e3, primaryTurns: 70, primaryInductanceH,
      outputs: [{ turns: 8.2, voltageV: 8.2, rectifierDropV: 0, currentA: 8 / 8.2 }], regulatedOutput: 0, losses: { kind: 'ideal' },
    })
    expectWithin(state.dutyCycle, 0.5, 1e-6)
    // A text passage of the brochure says 0.24 A; its own table and this say 186.6 mA.
    expectWithin(rms(state.primary.currentA), 0.1866, 1e-3)
    expectWithin(rms(state.outputs[0]!.currentA), 1.593, 1e-3)
    expect(minimum(state.magnetisingCurrentA)).toBeCloseTo(0, 6)
  })
  it.each([
    { core: 'E14', areaMm2: 14.5, turns: 62.86, gapUm: 113.4 },
    { core: 'E18', areaMm2: 39.5, turns: 23.07, gapUm: 41.2 },
  ])('$core: $turns turns and a gap of $gapUm µm', ({ areaMm2, turns, gapUm }) => {
    expectWithin(turnsForFlux({ inductanceH: primaryInductanceH, currentA: (70 * 0.5) / (120e3 * primaryInductanceH), fluxDensityT: 0.32, areaMm2 }), turns, 1e-3)
    const core = { effectiveAreaMm2: areaMm2, effectiveLengthMm: 20, permeability: 1e9, fringing: 'none' } as const
    const rounded = Math.round(turns)
    const solution = gapForInductance(core, primaryInductanceH, rounded)
    expectWithin(solution.state === 'found' ? solution.gapMm * 1000 : Number.NaN, gapUm, PRINTED)
    expect(gappedInductanceFactorH(core, gapUm / 1000) * rounded ** 2).toBeCloseTo(primaryInductanceH, 5)
  })
})

import { shippedLibrary } from '#server/db/seed/parts/library'
import { HARBOUR_SUPPLY } from '#server/db/seed/specifications/requirements'
import type { CommonModeChokeDuty } from '#shared/engine/duties/common-mode-choke'
import type { CurrentSenseDuty } from '#shared/engine/duties/current-sense'
import { evaluate, propose } from '#shared/engine/index'
import type { Duty, SpecificationDocument } from '#shared/engine/specification'
import { describe, expect, it } from 'vitest'

/** Current transformers and common-mode chokes: the checks take what the solved circuit gives, where a duty is at hand. */

const library = shippedLibrary()
const flyback = propose({ ...HARBOUR_SUPPLY, insulationMethod: 'functional' }, library).document

const sense: CurrentSenseDuty = {
  topology: 'current-sense', waveform: 'unipolar-pulse', switchingFrequencyHz: 100e3, nominalCurrentA: 5, maximumCurrentA: 10, dutyRatio: 0.45, ratio: 100, burdenOhm: 10,
  rectifierDropV: 0.6, resetVoltageV: 10, directCurrentA: 0, permittedDroop: 0.02, permittedError: 0.02,
}
const choke: CommonModeChokeDuty = {
  topology: 'common-mode-choke', ratedVoltageV: 230, lineCurrentA: 1, linePeakA: 3, lineFrequencyHz: 50, switchingFrequencyHz: 100e3, impedance: [{ frequencyHz: 100e3, minimumOhm: 1000 }],
}

/** A core of the library with one turn and a hundred, for a duty; what the drawing states of it is left out. */
function transformer(duty: Duty, inductanceH: number): SpecificationDocument {
  const document = structuredClone(flyback)
  const { specification } = document
  const [primary, secondary] = [specification.windings[0]!, specification.windings.find(({ role }) => role === 'secondary')!]
  specification.windings = [primary, secondary]
  Object.assign(primary, { turns: 1, outputId: null })
  Object.assign(secondary, { turns: 100, outputId: null })
  specification.sequence = specification.sequence.filter((step) => step.kind !== 'winding' || step.windingId === primary.id || step.windingId === secondary.id)
  specification.electrical.topology.value = duty.topology
  Object.assign(specification.electrical.inductance.value!, { windingId: secondary.id, nominalH: inductanceH })
  specification.core.gap.alH.value = inductanceH / 100 ** 2
  document.requirement = { ...document.requirement!, duty }
  return document
}

const outcomes = (document: SpecificationDocument, code: string) => evaluate(document, library).checks.filter((check) => check.code === code)
const ofRow = (document: SpecificationDocument, code: string, row: string) => outcomes(document, code).find(({ values }) => values.row === row)

describe('a current transformer', () => {
  it('is judged by the error and the droop that its circuit gives, against those that its duty permits', () => {
    const document = transformer(sense, 5e-3)
    // R·t/L with the rectifier's drop: (10 Ω·0.1 A + 0.6 V)·4.5 µs/(5 mH·0.1 A).
    const expected = ((10 * 0.1 + 0.6) * 4.5e-6) / (5e-3 * 0.1)
    const droop = ofRow(document, 'E25', 'predicted droop')!
    expect(droop.state).toBe('met')
    // At half the current the drop weighs twice as much; that corner is the worse one.
    expect(droop.value!).toBeGreaterThan(expected)
    expect(ofRow(transformer({ ...sense, permittedDroop: 0.01 }, 5e-3), 'E25', 'predicted droop')).toMatchObject({ state: 'not-met', limit: 0.01 })
    expect(ofRow(transformer({ ...sense, permittedError: 0.01 }, 5e-3), 'E25', 'magnetising error')).toMatchObject({ state: 'not-met', limit: 0.01 })
    expect(ofRow(transformer({ ...sense, permittedDroop: 0.05 }, 5e-3), 'E25', 'predicted droop')).toMatchObject({ state: 'met', limit: 0.05 })
  })

  it('without a duty falls by R·t/L of the winding across the burden, wherever the inductance is stated', () => {
    const document = transformer(sense, 5e-3)
    document.requirement = null
    const { electrical, windings } = document.specification
    electrical.currentSense.value = { burdenOhm: 10, ratioError: 0.01, droop: 0.02, bandwidthHz: { minimum: 1e3, maximum: 1e6 }, maximumPrimaryCurrentA: 10, maximumDcA: 0 }
    electrical.switchingFrequencyHz.value = { minimum: 100e3, maximum: 100e3 }
    electrical.dutyRatio.value = { minimum: 0, maximum: 0.45 }
    electrical.inductance.value!.lowerTolerance = -0.1
    const atSecondary = ofRow(document, 'E25', 'predicted against stated droop')!.value!
    expect(atSecondary).toBeCloseTo((10 * 4.5e-6) / (5e-3 * 0.9), 9)
    Object.assign(electrical.inductance.value!, { windingId: windings[0]!.id, nominalH: 5e-3 / 100 ** 2 })
    expect(ofRow(document, 'E25', 'predicted against stated droop')!.value!).toBeCloseTo(atSecondary, 9)
  })

  it('is magnetised by the direct current of its duty, over all its cores', () => {
    const alternating: CurrentSenseDuty = { ...sense, waveform: 'sine', directCurrentA: 2 }
    const document = transformer(alternating, 5e-3)
    const [result] = outcomes(document, 'E26')
    const core = library.cores.find(({ id }) => id === document.specification.core.core.value!.id)!
    // A_L·N·I/A with one turn.
    expect(result!.value!).toBeCloseTo((5e-3 / 100 ** 2) * 2 / (core.minimumAreaMm2 * 1e-6), 6)
    document.specification.core.numberOfSets.value = 2
    expect(outcomes(document, 'E26')[0]!.value!).toBeCloseTo(result!.value! / 2, 6)
  })

  it('is reset before the next pulse', () => {
    expect(ofRow(transformer(sense, 5e-3), 'E26', 'reset')).toMatchObject({ state: 'met', unit: 's' })
    expect(ofRow(transformer({ ...sense, resetVoltageV: 0.7 }, 5e-3), 'E26', 'reset')!.state).toBe('not-met')
  })
})

describe('a common-mode choke', () => {
  const proposed = propose({ ...HARBOUR_SUPPLY, insulationMethod: 'functional', duty: choke }, library).document
  const impedance = (document: SpecificationDocument) => outcomes(document, 'E29').filter(({ values }) => values.row === 'impedance').map(({ state, severity, path }) => ({ state, severity, path }))

  it('reaches the impedance that its duty asks for, by its least inductance', () => {
    const [own] = outcomes(proposed, 'E29').filter(({ values }) => values.row === 'impedance')
    const { magnetics } = evaluate(proposed, library)
    expect(own!.path).toBe('requirement.duty.impedance')
    expect(own!.value!).toBeGreaterThanOrEqual(2 * Math.PI * 100e3 * magnetics.inductanceMinimumH! * (1 - 1e-12))
    expect(impedance({ ...proposed, requirement: { ...proposed.requirement!, duty: { ...choke, impedance: [{ frequencyHz: 100e3, minimumOhm: 1e6 }] } } })[0]).toEqual({ state: 'not-met', severity: 'M', path: 'requirement.duty.impedance' })
  })

  it('is not taken for one above the range in which the permeability is known', () => {
    const document = { ...proposed, requirement: { ...proposed.requirement!, duty: { ...choke, impedance: [{ frequencyHz: 30e6, minimumOhm: 1 }] } } }
    expect(impedance(document)[0]!.state).toBe('not-checkable')
  })
})

import { describe, expect, it } from 'vitest'
import { shippedLibrary } from '#server/db/seed/parts/library'
import { BUOY_SUPPLY, COUPLED_INDUCTOR, HARBOUR_SUPPLY } from '#server/db/seed/specifications/requirements'
import { propose } from '#shared/engine/index'
import type { FlybackDuty, RequirementSheet, SpecificationDocument, TestRow } from '#shared/engine/specification'

const library = shippedLibrary()
const flyback = ({ duty }: RequirementSheet) => duty as FlybackDuty
const HARBOUR_MARGIN: RequirementSheet = { ...HARBOUR_SUPPLY, insulationMethod: 'margin-tape' }
/** 180 V from the battery: more turns on the secondary than on the primary. */
const STEP_UP: RequirementSheet = {
  ...BUOY_SUPPLY,
  duty: {
    ...flyback(BUOY_SUPPLY),
    outputs: [{ ...flyback(BUOY_SUPPLY).outputs[0]!, name: '180 V', voltageV: 180, fullLoadCurrentA: 0.1, lightLoadCurrentA: 0.01 }],
    currentLimit: { nominalA: 5, tolerance: 0.08, delayS: 150e-9 },
  },
}

const SHEETS = { 'buoy supply': BUOY_SUPPLY, 'harbour supply': HARBOUR_SUPPLY, 'coupled inductor': COUPLED_INDUCTOR, 'harbour supply with margins': HARBOUR_MARGIN, 'step-up': STEP_UP }
const documents = Object.entries(SHEETS).map(([name, sheet]) => ({ name, document: propose(sheet, library).document }))
const documentOf = (name: keyof typeof SHEETS) => documents.find((one) => one.name === name)!.document
const rowsOf = ({ specification }: SpecificationDocument, characteristic: TestRow['characteristic']) => specification.tests.filter((row) => row.characteristic === characteristic)

const digitsOf = (value: number) => value.toExponential().split('e')[0]!.replace(/[-.]/g, '').length

function figuresIn(value: unknown, path = ''): [path: string, figure: number][] {
  if (typeof value === 'number') return [[path, value]]
  if (typeof value !== 'object' || value === null) return []
  return Object.entries(value).flatMap(([key, entry]) => figuresIn(entry, `${path}.${key}`))
}

describe.each(documents)('the figures on the drawing of the $name', ({ document }) => {
  const { specification } = document
  const { nominalH, lowerTolerance, upperTolerance } = specification.electrical.inductance.value!

  it('carry no noise of binary fractions', () => {
    const noisy = figuresIn(specification).filter(([, figure]) => figure !== Number(figure.toPrecision(12)))
    expect(noisy).toEqual([])
  })

  it('give inductance and A_L with three digits at most, in agreement', () => {
    expect(digitsOf(nominalH)).toBeLessThanOrEqual(3)
    expect(digitsOf(specification.core.gap.alH.value!)).toBeLessThanOrEqual(3)
    expect(Math.abs((specification.core.gap.alH.value! * specification.windings[0]!.turns ** 2) / nominalH - 1)).toBeLessThanOrEqual(0.01)
  })

  it('give inductance limits of the rounded nominal with four digits, none looser than the tolerance', () => {
    const [row] = rowsOf(document, 'inductance')
    expect(row!.nominal).toBe(nominalH)
    expect(row!.minimum! / nominalH).toBeGreaterThanOrEqual(1 + lowerTolerance! - 1e-12)
    expect(row!.maximum! / nominalH).toBeLessThanOrEqual(1 + upperTolerance! + 1e-12)
    expect([digitsOf(row!.minimum!), digitsOf(row!.maximum!)].every((digits) => digits <= 4)).toBe(true)
  })

  it('give ratio limits with four digits, none looser than the tolerance', () => {
    for (const row of rowsOf(document, 'turns-ratio')) {
      const ratio = specification.electrical.turnsRatios.find(({ denominatorWindingId }) => denominatorWindingId === row.windingId)!
      const turnsOf = (id: string) => specification.windings.find((winding) => winding.id === id)!.turns
      const exact = turnsOf(ratio.numeratorWindingId) / turnsOf(ratio.denominatorWindingId)
      expect(row.minimum! / exact - 1).toBeGreaterThanOrEqual(-ratio.tolerance - 1e-12)
      expect(row.maximum! / exact - 1).toBeLessThanOrEqual(ratio.tolerance + 1e-12)
      expect(row.minimum).toBeLessThan(row.nominal!)
      expect(row.nominal).toBeLessThan(row.maximum!)
      expect([row.minimum!, row.nominal!, row.maximum!].every((limit) => digitsOf(limit) <= 4)).toBe(true)
    }
  })

  it('give resistance, leakage and bias limits with two or three digits', () => {
    for (const { dcResistance } of specification.windings) {
      expect(digitsOf(dcResistance!.maximumOhm)).toBeLessThanOrEqual(3)
      expect(dcResistance!.maximumOhm).toBeLessThanOrEqual(1.2 * dcResistance!.nominalOhm + 1e-12)
    }
    for (const row of rowsOf(document, 'leakage')) expect(digitsOf(row.maximum!)).toBeLessThanOrEqual(2)
    for (const row of rowsOf(document, 'inductance-at-bias')) expect(digitsOf(row.minimum!)).toBeLessThanOrEqual(3)
  })

  it('state one limit at bias: the share of the least inductance, rounded up', () => {
    for (const row of rowsOf(document, 'inductance-at-bias')) {
      const exact = 0.9 * nominalH * (1 + lowerTolerance!)
      expect(row.minimum! / exact).toBeGreaterThanOrEqual(1 - 1e-12)
      expect(row.minimum! / exact).toBeLessThan(1.01)
      expect(row.method).toContain('of the least inductance without bias')
    }
  })

  it('measure insulation resistance wherever people are protected, the core included', () => {
    const protective = specification.insulation.boundaries.filter(({ insulation }) => insulation !== 'functional').map(({ id }) => id)
    expect(rowsOf(document, 'insulation-resistance').map(({ boundaryId }) => boundaryId)).toEqual(expect.arrayContaining(protective))
  })

  it('name both ends of every withstand test', () => {
    for (const row of rowsOf(document, 'hipot')) {
      expect(row.shortedTerminals).toHaveLength(2)
      expect(row.shortedTerminals[0]).toEqual(row.drivenTerminals)
      expect(row.shortedTerminals[1]!.length).toBeGreaterThan(0)
    }
  })
})

describe('the test rows', () => {
  it('of the harbour supply read as a person would write them', () => {
    const [inductance] = rowsOf(documentOf('harbour supply'), 'inductance')
    expect([inductance!.minimum, inductance!.nominal, inductance!.maximum]).toEqual([657e-6, 730e-6, 803e-6])
    expect(rowsOf(documentOf('harbour supply'), 'inductance-at-bias').map(({ minimum }) => minimum)).toEqual([592e-6, 592e-6])
  })

  it('drive a ratio at the winding with more turns', () => {
    const document = documentOf('step-up')
    const [row] = rowsOf(document, 'turns-ratio')
    const driven = document.specification.windings.reduce((most, winding) => (winding.turns > most.turns ? winding : most))
    expect(driven.name).toBe('S1')
    expect(row!.drivenTerminals).toEqual([driven.startTerminal, driven.finishTerminal])
    expect(row!.openTerminals).not.toContain(driven.startTerminal)
  })
})

describe('the rated mains voltage', () => {
  const ratedV = (minimumV: number, nominalV: number, maximumV: number) => {
    const sheet: RequirementSheet = { ...HARBOUR_SUPPLY, duty: { ...flyback(HARBOUR_SUPPLY), supply: { ...flyback(HARBOUR_SUPPLY).supply, minimumV, nominalV, maximumV } as FlybackDuty['supply'] } }
    return propose(sheet, library).document.specification.insulation.mainsVoltageV.value
  }

  it('is the greatest one without its tolerance, and never below the nominal', () => {
    expect(ratedV(85, 230, 264)).toBe(240)
    expect(ratedV(230, 230, 230)).toBe(230)
  })
})

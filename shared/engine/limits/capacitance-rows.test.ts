import { describe, expect, it } from 'vitest'
import { blankSpecification } from '../propose'
import type { Evaluation } from '../evaluation'
import type { Winding, WindingSpecification } from '../specification'
import { interwindingRows, resonanceRows } from './capacitance-rows'
import { SHORTED_TURN_ID } from './faults'
import { rowValue } from './row-value'
import type { BuiltPart } from './row-value'

const stated = { status: 'mandatory' as const, origin: { kind: 'entered' as const } }

const winding = (id: string, startTerminal: string, finishTerminal: string): Winding => ({
  ...stated, id, name: id.toUpperCase(), role: 'secondary', side: 'secondary', outputId: null, startTerminal, finishTerminal, turns: 10,
  wire: { wire: { kind: 'wire', id: 'x', version: 1 }, parallel: 1, thermalClassC: 155, insulation: 'enamel-grade-1', certificate: null, lay: null },
  rmsCurrentA: null, peakCurrentA: null, dcCurrentA: null, dcResistance: null,
})

function specification(): WindingSpecification {
  const blank = blankSpecification()
  return {
    ...blank,
    windings: [winding('p', '1', '2'), winding('s', '5', '6'), winding('a', '3', '4')],
    electrical: {
      ...blank.electrical,
      interwindingCapacitance: [{ ...stated, id: 'c1', windingIds: ['p', 's'], maximumF: 40e-12, frequencyHz: 1e5, terminalsTied: '3 and 4 open' }],
      selfResonance: { ...stated, value: { minimumHz: 1e6, windingId: 'p', terminalsTied: '' } },
    },
  }
}

describe('rows of stated capacitance and resonance', () => {
  it('short each winding on itself and leave the others open', () => {
    expect(interwindingRows(specification())).toMatchObject([
      { characteristic: 'interwinding-capacitance', symbol: 'C P–S', drivenTerminals: ['1', '2'], shortedTerminals: [['1', '2'], ['5', '6']], openTerminals: ['3', '4'], maximum: 40e-12, unit: 'F', frequencyHz: 1e5 },
    ])
  })

  it('state the least frequency with the other windings open', () => {
    expect(resonanceRows(specification())).toMatchObject([{ characteristic: 'self-resonance', symbol: 'SRF P', minimum: 1e6, maximum: null, unit: 'Hz', openTerminals: ['5', '6', '3', '4'] }])
  })

  it('ask nothing where a limit names a winding that does not exist', () => {
    const broken = specification()
    broken.electrical.interwindingCapacitance[0]!.windingIds = ['p', 'none']
    expect(interwindingRows(broken)).toEqual([])
  })
})

describe('what the rows read', () => {
  const document = { specification: specification(), requirement: null }
  const part = (change: Partial<Evaluation> = {}): BuiltPart => ({
    document,
    evaluation: {
      capacitances: [{ windingIds: ['p'], capacitanceF: 5e-12, model: '' }, { windingIds: ['p', 'a'], capacitanceF: 20e-12, model: '' }, { windingIds: ['p', 's'], capacitanceF: 30e-12, model: '' }],
      selfResonance: [{ windingId: 'p', frequencyHz: 2e6, model: '' }],
      leakages: [],
      magnetics: { inductanceH: 1e-3 },
      ...change,
    } as unknown as Evaluation,
  })

  it('is the capacitance between the windings whose pins are shorted', () => {
    expect(rowValue(part(), document, interwindingRows(document.specification)[0]!)).toEqual({ kind: 'reading', value: 30e-12 })
  })

  it('is the resonance, which a shorted turn raises by the root of the inductance it takes away', () => {
    const row = resonanceRows({ ...document.specification, windings: document.specification.windings.map((one) => (one.id === 'p' ? { ...one, role: 'primary' as const } : one)) })[0]!
    const built = { ...part(), document: { ...document, specification: { ...document.specification, windings: document.specification.windings.map((one) => (one.id === 'p' ? { ...one, role: 'primary' as const } : one)) } } }
    expect(rowValue(built, document, row)).toEqual({ kind: 'reading', value: 2e6 })
    const shorted = { ...built, evaluation: { ...built.evaluation, leakages: [{ windingId: 'p', shortedWindingIds: [SHORTED_TURN_ID], inductanceH: 1e-5, oneDimensionalH: null, model: '' }] } }
    expect((rowValue(shorted, document, row) as { value: number }).value).toBeCloseTo(2e7, 0)
  })
})

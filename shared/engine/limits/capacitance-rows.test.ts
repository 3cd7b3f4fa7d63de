import { describe, expect, it } from 'vitest'
import { blankSpecification } from '../propose'
import type { Winding, WindingSpecification } from '../specification'
import { interwindingRows, resonanceRows } from './capacitance-rows'

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

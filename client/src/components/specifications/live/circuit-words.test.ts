import { describe, expect, it } from 'vitest'
import type { Evaluation } from '#shared/engine/evaluation'
import { circuitRows, figureWord } from './circuit-words'

const corner = (name: string, more: object) => ({ name, frequencyHz: 100e3, outputs: [], rectifiers: [], figures: [], commutationS: null, ...more })
const evaluation = (...corners: object[]) => ({ corners }) as unknown as Evaluation

describe('the rows of the circuit', () => {
  it('have one cell per working point, also where a point lacks the output', () => {
    const output = { outputId: 'o1', voltageV: 12, mode: 'continuous', rippleA: 2, capacitorRmsA: 0.6, rippleChargeC: 1e-6 }
    const rows = circuitRows(evaluation(corner('minimum-input', {}), corner('maximum-input', { outputs: [output], rectifiers: [{ outputId: 'o1', reversePeakV: 60 }] })), () => '12 V')
    expect(rows.map(({ label }) => label)).toEqual(['Frequency', '12 V: voltage', '12 V: ripple current', '12 V: capacitor, rms', '12 V: charge of the ripple', '12 V: rectifier, reverse'])
    expect(rows[2]!.cells).toEqual([{ value: null, why: 'corners.0.outputs.0.rippleA' }, { value: 2, why: 'corners.1.outputs.0.rippleA' }])
    expect(rows[5]!.cells[1]).toEqual({ value: 60, why: 'corners.1.rectifiers.0.reversePeakV' })
  })

  it('say what only one topology has, and the commutation where it is known', () => {
    const rows = circuitRows(evaluation(corner('nominal-input', { commutationS: 2e-8, figures: [{ code: 'zero-voltage-margin', value: 3, unit: '' }] })), String)
    expect(rows.map(({ label }) => label)).toEqual(['Frequency', 'Commutation at an edge', 'Charge available over charge needed'])
    expect(rows[2]!.cells).toEqual([{ value: 3, why: 'corners.0.figures.0' }])
    expect(figureWord('a-new-figure')).toBe('a new figure')
  })

  it('read evaluations that were stored before there were outputs', () => {
    const old = { name: 'nominal-input', mode: 'continuous', dutyRatio: 0.4 }
    expect(circuitRows(evaluation(old), String).map(({ label }) => label)).toEqual(['Frequency'])
  })
})

import { describe, expect, it } from 'vitest'
import { CHANGE_CLASSES, classesOf } from './change-classes'
import { CHANGE_EFFECTS, judgeChanges } from './change-effects'
import type { DocumentChange } from './compare-documents'

const stated = (value: unknown, status = 'mandatory') => ({ value, status, origin: { kind: 'entered' } })
const changed = (path: string, before: unknown, after: unknown): DocumentChange => ({ kind: 'changed', path, key: path, before, after })
const inductance = (nominalH: number, tolerance: number, frequencyHz = 100e3) => stated({ nominalH, lowerTolerance: -tolerance, upperTolerance: tolerance, frequencyHz })

describe('the kind of a change', () => {
  it.each([
    ['a wider inductance', changed('electrical.inductance', inductance(1e-3, 0.1), inductance(1e-3, 0.2)), ['limit-widened']],
    ['a narrower inductance', changed('electrical.inductance', inductance(1e-3, 0.2), inductance(1e-3, 0.1)), ['limit-tightened']],
    ['a shifted inductance, which lets some in and keeps some out', changed('electrical.inductance', inductance(1e-3, 0.1), inductance(1.05e-3, 0.1)), ['limit-tightened']],
    ['another test frequency', changed('electrical.inductance', inductance(1e-3, 0.1), inductance(1e-3, 0.1, 10e3)), ['test-method']],
    ['an inductance no longer stated', changed('electrical.inductance', inductance(1e-3, 0.1), stated(null)), ['limit-widened']],
    ['a lower maximum of leakage', changed('electrical.leakage.0.maximumH', 2e-6, 1e-6), ['limit-tightened']],
    ['a higher maximum of leakage', changed('electrical.leakage.0.maximumH', 1e-6, 2e-6), ['limit-widened']],
    ['other windings shorted', changed('electrical.leakage.0.shortedWindingIds', ['w2'], ['w2', 'w3']), ['test-method']],
    ['more bias', changed('electrical.saturation.0.currentA', 1, 2), ['limit-tightened']],
    ['a new lower limit in the test table', changed('tests.3.minimum', null, 5), ['limit-tightened']],
    ['the nominal value of a test row', changed('tests.3.nominal', 4, 5), ['clarification']],
    ['turns', changed('windings.0.turns', 10, 11), ['turns-gap']],
    ['gap length', changed('core.gap.lengthMm', stated(0.2), stated(0.3)), ['turns-gap']],
    ['strands', changed('windings.0.wire.parallel', 1, 2), ['wire']],
    ['a resistance limit', changed('windings.0.dcResistance.maximumOhm', 0.2, 0.1), ['limit-tightened']],
    ['a pin', changed('windings.0.startTerminal', '1', '2'), ['former-pins']],
    ['a margin', changed('sequence.2.marginLeftMm', 3, 4), ['construction']],
    ['the order of the sequence', { kind: 'moved', path: 'sequence.2', key: 'sequence.[s3]', before: 1, after: 3 } as const, ['construction']],
    ['a varnish step', { kind: 'added', path: 'sequence.9', key: 'sequence.[s9]', before: undefined, after: { kind: 'varnish' } } as const, ['process-material']],
    ['the material', changed('core.material', stated({ kind: 'material', id: 'a', version: 1 }), stated({ kind: 'material', id: 'b', version: 1 })), ['core']],
    ['adhesive', changed('core.assembly.adhesive', stated('a'), stated('b')), ['process-material']],
    ['creepage', changed('insulation.boundaries.0.creepageMm', 6, 8), ['insulation-demand']],
    ['packing', changed('packing.piecesPerPack', stated(50), stated(60)), ['marking-packing']],
    ['a title', changed('title.title', stated('a'), stated('b')), ['clarification']],
    ['only how a field binds', changed('packing.form', stated('tray', 'reference'), stated('tray')), ['limit-tightened']],
    ['a field set free', changed('core.core', stated('x'), stated('x', 'vendor-choice')), ['limit-widened']],
    ['a row set free', changed('tests.1.status', 'mandatory', 'reference'), ['limit-widened']],
    ['the revision block', changed('revisions.0.reason', 'a', 'b'), []],
  ])('%s', (_, change, classes) => {
    expect(classesOf(change)).toEqual(classes)
  })
})

describe('what changes ask for', () => {
  it('asks nothing when nothing changed', () => {
    expect(judgeChanges([])).toEqual({ classes: [], total: { requote: 'no', samples: 'no', certification: 'no', retest: 'no', stock: 'use' } })
  })

  it('asks the most of everything that changed', () => {
    const { classes, total } = judgeChanges([changed('windings.0.turns', 10, 11), changed('marking.position', stated('top'), stated('side')), changed('sequence.1.marginLeftMm', 3, 4)])
    expect(classes.map((one) => [one.class, one.keys])).toEqual([['turns-gap', ['windings.0.turns']], ['construction', ['sequence.1.marginLeftMm']], ['marking-packing', ['marking.position']]])
    expect(total).toEqual({ requote: 'yes', samples: 'new-with-section', certification: 'yes', retest: 'yes', stock: 'scrap-rework' })
  })

  it('judges the data that is there before it asks for new, when a limit is tightened alone', () => {
    expect(judgeChanges([changed('electrical.leakage.0.maximumH', 2e-6, 1e-6)]).total).toMatchObject({ requote: 'yes', samples: 'judge-old-data', certification: 'no', stock: 'sort' })
  })

  it('has an answer for every kind of change', () => {
    expect(Object.keys(CHANGE_EFFECTS).sort()).toEqual([...CHANGE_CLASSES].sort())
  })
})

import { describe, expect, it } from 'vitest'
import { evaluate } from '../evaluate'
import { blankSpecification } from '../propose'
import { releaseRecordChecks } from './documentation'
import { atLeast, atMost, marginOf } from './outcome'
import { CHECKS } from './run'

const library = { cores: [], formers: [], materials: [], wires: [], tapes: [], sleeves: [] }

describe('a check’s outcome', () => {
  it.each([
    { name: 'below an upper limit', outcome: atMost({ value: 0.25, limit: 0.312, unit: 'T', path: '' }), state: 'met', margin: 0.1987 },
    { name: 'above an upper limit', outcome: atMost({ value: 0.39, limit: 0.312, unit: 'T', path: '' }), state: 'not-met', margin: -0.25 },
    { name: 'below a lower limit', outcome: atLeast({ value: 4, limit: 5, unit: 'mm', path: '' }), state: 'not-met', margin: -0.2 },
    { name: 'just on a limit', outcome: atLeast({ value: 0.1 + 0.2, limit: 0.3, unit: 'mm', path: '' }), state: 'met', margin: 0 },
    { name: 'without a value', outcome: atMost({ value: null, limit: 5, unit: 'mm', path: '' }), state: 'not-checkable', margin: null },
    { name: 'without a limit', outcome: atMost({ value: 4, limit: null, unit: 'mm', path: '' }), state: 'not-checkable', margin: null },
    { name: 'of a value that is no number', outcome: atMost({ value: Number.NaN, limit: 4, unit: 'mm', path: '' }), state: 'not-checkable', margin: null },
  ])('is $state $name', ({ outcome, state, margin }) => {
    expect(outcome.state).toBe(state)
    if (margin === null) expect(marginOf(outcome)).toBeNull()
    else expect(marginOf(outcome)).toBeCloseTo(margin, 3)
  })
})

describe('the checks of an empty specification', () => {
  const { checks } = evaluate({ specification: blankSpecification(), requirement: null }, library)

  it('never take missing data for met', () => {
    const needData = ['E02', 'E07', 'E09', 'E31', 'E33', 'T07', 'T08', 'T11', 'T12', 'W03', 'W04']
    for (const code of needData) {
      const own = checks.filter((check) => check.code === code)
      expect(own.length, code).toBeGreaterThan(0)
      expect(own.map(({ state }) => state), code).not.toContain('met')
    }
  })

  it('stop release at title block, standard, boundaries and routine tests', () => {
    const stopping = new Set(checks.filter(({ severity, state }) => severity === 'S' && state === 'not-met').map(({ code }) => code))
    for (const code of ['D01', 'I01', 'I02', 'I14', 'Q14']) expect(stopping).toContain(code)
  })

  it('name their source and a place of the document', () => {
    for (const check of checks) {
      expect(check.source, check.code).not.toBe('')
      expect(check.path, check.code).not.toBe('')
    }
    expect(Object.keys(CHECKS).every((code) => /^[ETIWPDQL]\d\d$/.test(code))).toBe(true)
  })
})

describe('releaseRecordChecks', () => {
  it.each([
    { name: 'three people', record: { createdBy: 'a', checkedBy: 'b', approvedBy: 'c' }, state: 'met' },
    { name: 'a second person who checks and approves', record: { createdBy: 'a', checkedBy: 'b', approvedBy: 'b' }, state: 'met' },
    { name: 'someone who checks what they made', record: { createdBy: 'a', checkedBy: 'a', approvedBy: 'c' }, state: 'not-met' },
    { name: 'someone who approves what they made', record: { createdBy: 'a', checkedBy: 'b', approvedBy: 'a' }, state: 'not-met' },
    { name: 'a missing name', record: { createdBy: 'a', checkedBy: '', approvedBy: 'c' }, state: 'not-checkable' },
  ])('is $state for $name', ({ record, state }) => {
    expect(releaseRecordChecks(record).map((check) => check.state)).toEqual([state])
  })
})

import { describe, expect, it } from 'vitest'
import { placeOfCheck } from '#shared/contracts/specifications'
import type { CheckResult } from '#shared/engine/evaluation'
import { checkSummary, flagsByPlace, flagsWithin, groupChecks, stoppingChecks, stoppingCodes } from './check-groups'

const check = (code: string, severity: CheckResult['severity'], state: CheckResult['state']): CheckResult => ({ code, severity, state, value: null, limit: null, unit: '', margin: null, source: '', path: 'former.former', values: {} })

const checks = [check('E01', 'S', 'not-met'), check('I04', 'S', 'not-checkable'), check('T01', 'M', 'not-met'), check('T03', 'M', 'not-checkable'), check('W07', 'N', 'not-met'), check('D01', 'S', 'met')]
const at = (...codes: string[]) => new Set(codes.map((code) => placeOfCheck({ code, path: 'former.former' })))
const codes = (overridden: string[] = []) => Object.fromEntries(groupChecks(checks, at(...overridden)).map(({ key, results }) => [key, results.map(({ code }) => code)]))

describe('groupChecks', () => {
  it('puts every result into exactly one group', () => {
    expect(codes()).toEqual({ stops: ['E01'], unknown: ['I04', 'T03'], answer: ['T01'], notes: ['W07'], passed: [], met: ['D01'] })
  })

  it('moves what a second person let pass, and never counts it as met', () => {
    expect(codes(['E01', 'I04'])).toMatchObject({ stops: [], unknown: ['T03'], passed: ['E01', 'I04'], met: ['D01'] })
  })
})

describe('stoppingCodes', () => {
  it('counts what could not be checked among what stops release', () => {
    expect(stoppingCodes(checks, new Set())).toEqual(['E01', 'I04'])
    expect(stoppingCodes(checks, at('E01'))).toEqual(['I04'])
  })

  it('lets a check pass only at the place that was answered for', () => {
    const elsewhere = [...checks, { ...check('E01', 'S', 'not-met'), path: 'core.core' }]
    expect(stoppingCodes(elsewhere, at('E01'))).toEqual(['I04', 'E01'])
    expect(stoppingChecks(elsewhere, at('E01', 'I04')).map(({ path }) => path)).toEqual(['core.core'])
  })
})

it('says in one line how much stops release, also by what nobody could check', () => {
  expect(checkSummary(checks)).toBe('2 stop release (1 not met, 1 that could not be checked), 1 other could not be checked, 1 wants an answer, 1 met')
  expect(checkSummary([])).toBe('0 stop release (0 not met, 0 that could not be checked), 0 others could not be checked, 0 want an answer, 0 met')
})

describe('flags', () => {
  const flag = (code: string, path: string, state: CheckResult['state'] = 'not-met') => ({ ...check(code, 'S', state), path })
  const flags = flagsByPlace([flag('W01', 'sequence.1'), flag('W01', 'sequence.1'), flag('E14', 'sequence.1.turns'), flag('E14', 'sequence.10.turns'), flag('D01', 'title.title', 'met')])

  it('stand at the place that is not met, each code once', () => {
    expect(flags.get('sequence.1')).toEqual(['W01'])
    expect(flags.has('title.title')).toBe(false)
  })

  it('of a row are those of its fields too, and not of a row whose number begins alike', () => {
    expect(flagsWithin(flags, 'sequence.1')).toEqual(['W01', 'E14'])
  })
})

import { describe, expect, it } from 'vitest'
import type { CheckResult, Evaluation } from '../evaluation'
import { judge } from '../propose/judge'
import { rejectingCheck } from './candidates'

const check = (code: string, severity: CheckResult['severity'] = 'S'): CheckResult => ({ code, severity, state: 'not-met', value: null, limit: null, unit: '', margin: null, source: '', path: '', values: {} })
const evaluation = (checks: CheckResult[], buildRatio = 0.5) => ({ checks, findings: [], layout: { buildRatio } }) as unknown as Evaluation

describe('the check that rejected a design', () => {
  it.each([
    { name: 'a core loss density that needs a reason', checks: [check('T07', 'M')], expected: 'T07' },
    { name: 'a hot winding beside an insulation system of too high a class', checks: [check('T12'), check('T11')], expected: 'T11' },
    { name: 'a flux too high beside a current stated wrongly', checks: [check('E17'), check('E18'), check('E01')], expected: 'E01' },
    { name: 'a factor that stops release', checks: [check('T03'), check('T02', 'M')], expected: 'T03' },
    { name: 'a clearance, of all checks of insulation', checks: [check('I01'), check('I33'), check('I05')], expected: 'I05' },
  ])('is that which the judgement broke on: $name', ({ checks, expected }) => {
    const rejection = judge(evaluation(checks), { buildLimit: 0.85 })!
    expect(rejectingCheck(rejection, evaluation(checks))).toBe(expected)
  })

  it('is that of the height of the coil, where the layout alone says it', () => {
    const overfull = evaluation([check('W17')], 0.9)
    expect(rejectingCheck(judge(overfull, { buildLimit: 0.85 })!, overfull)).toBe('W03')
  })

  it('is none where the broken checks are questions or notes', () => {
    expect(judge(evaluation([check('T03', 'M'), check('E01', 'N'), check('W06', 'M')]), { buildLimit: 0.85 })).toBeNull()
  })

  it('says of pins that are too few that there are not enough terminals', () => {
    expect(rejectingCheck('pins', evaluation([check('P02')]))).toBe('P01')
  })
})

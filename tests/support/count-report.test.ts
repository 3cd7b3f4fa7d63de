import { describe, expect, it } from 'vitest'
import { countReport, projectOf } from './count-report'

describe('countReport', () => {
  const file = (name: string, status: string, ...tests: string[]) => ({ name: `/clone/${name}`, status, assertionResults: tests.map((test) => ({ status: test })) })

  it('counts by project, everything that neither passed nor failed as skipped', () => {
    const testResults = [file('shared/units.test.ts', 'failed', 'passed', 'failed'), file('tests/api/rfqs.test.ts', 'passed', 'passed', 'pending', 'todo')]
    expect(countReport({ testResults }, '/clone')).toEqual({
      unit: { passed: 1, failed: 1, skipped: 0 },
      api: { passed: 1, failed: 0, skipped: 2 },
    })
  })

  it('counts a file that could not be loaded as one failure', () => {
    expect(countReport({ testResults: [file('client/src/App.test.ts', 'failed')] }, '/clone')).toEqual({ client: { passed: 0, failed: 1, skipped: 0 } })
  })

  it('counts a file whose tests passed before its clean-up failed as one failure more', () => {
    expect(countReport({ testResults: [file('tests/e2e/walk.test.ts', 'failed', 'passed')] }, '/clone')).toEqual({ e2e: { passed: 1, failed: 1, skipped: 0 } })
  })
})

it.each([
  ['tests/drawings/sheet.test.ts', 'api'],
  ['tests/reference/cores.test.ts', 'unit'],
  ['fake-services/mail/mail-fake.test.ts', 'unit'],
])('puts %s into %s', (file, project) => {
  expect(projectOf(file)).toBe(project)
})

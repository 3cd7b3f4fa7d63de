import path from 'node:path'

export const PROJECTS = ['unit', 'client', 'api', 'e2e'] as const
export type Project = (typeof PROJECTS)[number]

export interface Counts {
  passed: number
  failed: number
  skipped: number
}

/** The part of Vitest's JSON report that is read here. */
export interface Report {
  testResults: { name: string; status: string; assertionResults: { status: string }[] }[]
}

/** The project that a test file belongs to, by its place. */
export function projectOf(file: string): Project {
  if (file.startsWith('tests/e2e/')) return 'e2e'
  if (file.startsWith('tests/api/') || file.startsWith('tests/drawings/')) return 'api'
  return file.startsWith('client/') ? 'client' : 'unit'
}

/** Counts by project. A file that could not be loaded, or whose set-up failed, counts as one failure. */
export function countReport(report: Report, root: string): Partial<Record<Project, Counts>> {
  const counts: Partial<Record<Project, Counts>> = {}
  for (const { name, status, assertionResults } of report.testResults) {
    const count = (counts[projectOf(path.relative(root, name))] ??= { passed: 0, failed: 0, skipped: 0 })
    const failed = assertionResults.filter((test) => test.status === 'failed').length
    const passed = assertionResults.filter((test) => test.status === 'passed').length
    count.passed += passed
    count.skipped += assertionResults.length - passed - failed
    count.failed += failed === 0 && status === 'failed' ? 1 : failed
  }
  return counts
}

/** Tests that were listed and not run. */
export function countSkipped(list: unknown[]): Counts {
  return { passed: 0, failed: 0, skipped: list.length }
}

import { notCheckable, yesNo } from './outcome'
import type { Check, CheckInput, Outcome } from './outcome'

/**
 * A row that nobody's data sheet stands behind carries a release only when a person replaces it by values with
 * their source (an own version of the row), or a second person says in writing why it may pass.
 */
function rowsWithSource({ context }: CheckInput): Outcome[] {
  const generic = context.findings.filter(({ code, severity }) => code === 'generic-row-used' && severity === 'warning')
  if (generic.length === 0) return [yesNo(true, 'core.core')]
  return generic.map(({ path, values }) => notCheckable(path, values))
}

/** Rows with a source of which single fields are not vouched for. */
function fieldsWithSource({ context }: CheckInput): Outcome[] {
  const partly = context.findings.filter(({ code, severity }) => code === 'generic-row-used' && severity === 'note')
  if (partly.length === 0) return [yesNo(true, 'core.core')]
  return partly.map(({ path, values }) => notCheckable(path, values))
}

export const LIBRARY_CHECKS: Readonly<Record<string, Check>> = {
  L01: { severity: 'S', source: 'source named in the library row', run: rowsWithSource },
  L02: { severity: 'M', source: 'source named in the library row', run: fieldsWithSource },
}

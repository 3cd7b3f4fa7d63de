import { rowUses, unverifiedFields } from '../evaluate/library-use'
import { notCheckable, yesNo } from './outcome'
import type { Check, CheckInput, Outcome } from './outcome'

/**
 * A row that nobody's data sheet stands behind, or a field in use that no source gives, carries a release only when a
 * person replaces it by values with their source (an own version of the row, or a value of the document with its
 * reason), or a second person says in writing why it may pass.
 */
function figuresWithSource({ context }: CheckInput): Outcome[] {
  const open = rowUses(context).flatMap((use) => {
    const unverified = unverifiedFields(use).join(', ')
    const generic = use.row.confidence === 'generic'
    return generic || unverified !== '' ? [notCheckable(use.path, { row: use.row.name, source: use.row.source, ...(unverified === '' ? {} : { unverified }) })] : []
  })
  return open.length > 0 ? open : [yesNo(true, 'core.core')]
}

/** Rows in use whose source is there but not sure. */
function sureSources({ context }: CheckInput): Outcome[] {
  const unsure = rowUses(context).filter(({ row }) => row.confidence === 'low')
  return unsure.length > 0 ? unsure.map(({ row, path }) => notCheckable(path, { row: row.name, source: row.source })) : [yesNo(true, 'core.core')]
}

export const LIBRARY_CHECKS: Readonly<Record<string, Check>> = {
  L01: { severity: 'S', source: 'source named in the library row', run: figuresWithSource },
  L02: { severity: 'M', source: 'source named in the library row', run: sureSources },
}

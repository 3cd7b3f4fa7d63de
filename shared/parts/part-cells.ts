import { canonicalJson } from '#shared/canonical-json'
import type { AnyLibraryRow } from '#shared/engine/library'
import type { PartDraft } from '#shared/contracts/part-rows'

/** What a row says in the column of a path; null where it says nothing. Read again it gives the same value. */
export function partCell(row: AnyLibraryRow | PartDraft, path: string): string | number | null {
  const value = path.split('.').reduce<unknown>((inner, key) => (inner as Record<string, unknown> | null | undefined)?.[key], row)
  if (value === undefined || value === null || value === '') return null
  if (typeof value === 'number' || typeof value === 'string') return value
  if (!Array.isArray(value)) throw new RangeError(`${path} holds no value of a cell`)
  if (value.length === 0) return null
  return typeof value[0] === 'object' ? canonicalJson(value) : value.join(' ')
}

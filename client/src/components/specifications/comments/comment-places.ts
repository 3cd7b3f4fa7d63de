import type { SpecificationComment } from '#shared/contracts/specifications'
import type { WindingSpecification } from '#shared/engine/specification'
import { isTree, rowKey } from '#shared/workflow/document-rows'

/** `windings.0.turns` as `windings.[w1].turns`: a place that stays with its row. */
export function keptPlace(path: string, specification: WindingSpecification): string {
  let value: unknown = specification
  return path
    .split('.')
    .map((part) => {
      const row = Array.isArray(value) && /^\d+$/.test(part) ? rowKey(value[Number(part)]) : null
      value = isTree(value) || Array.isArray(value) ? (value as Record<string, unknown>)[part] : undefined
      return row === null ? part : `[${row}]`
    })
    .join('.')
}

/** And back; null when the row is gone. */
export function pathOfPlace(place: string, specification: WindingSpecification): string | null {
  let value: unknown = specification
  const parts: string[] = []
  for (const part of place.split('.')) {
    const id = /^\[(.*)\]$/.exec(part)?.[1]
    const index = id === undefined ? part : Array.isArray(value) ? String(value.findIndex((row) => rowKey(row) === id)) : '-1'
    if (index === '-1') return null
    parts.push(index)
    value = isTree(value) || Array.isArray(value) ? (value as Record<string, unknown>)[index] : undefined
  }
  return parts.join('.')
}

/** How many open comments stand at each place of the document as it is now. */
export function openByPlace(comments: readonly SpecificationComment[], specification: WindingSpecification): ReadonlyMap<string, number> {
  const counts = new Map<string, number>()
  for (const { place, settled } of comments) {
    const path = settled === null && place !== '' ? pathOfPlace(place, specification) : null
    if (path !== null) counts.set(path, (counts.get(path) ?? 0) + 1)
    // A figure inside a row shows on the row too, which may be folded.
    const row = path && /^(.*?\.\d+)\./.exec(path)?.[1]
    if (row) counts.set(row, (counts.get(row) ?? 0) + 1)
  }
  return counts
}

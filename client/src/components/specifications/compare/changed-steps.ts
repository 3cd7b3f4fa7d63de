import type { WindingSpecification } from '#shared/engine/specification'
import type { DocumentChange } from '#shared/workflow/compare-documents'

const idIn = (table: string, key: string) => new RegExp(`(?:^|\\.)${table}\\.\\[([^\\]]+)\\]`).exec(key)?.[1]

/** Steps of the winding sequence that a comparison touches, by themselves or by the winding that they wind. */
export function changedSteps(changes: readonly DocumentChange[], { sequence }: WindingSpecification): ReadonlySet<string> {
  const steps = new Set(changes.map(({ key }) => idIn('sequence', key)))
  const windings = new Set(changes.map(({ key }) => idIn('windings', key)))
  return new Set(sequence.filter((step) => steps.has(step.id) || ('windingId' in step && windings.has(step.windingId))).map(({ id }) => id))
}

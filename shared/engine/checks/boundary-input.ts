import { insulationOf } from '../evaluate/insulation-paths'
import type { ProvidedInsulation } from '../evaluate/insulation-paths'
import type { BoundaryResult } from '../evaluation'
import type { InsulationBoundary } from '../specification'
import type { CheckInput } from './outcome'

/** A boundary with what the evaluation says of it and what the build provides. */
export interface Judged {
  boundary: InsulationBoundary
  result: BoundaryResult
  provided: ProvidedInsulation | null
  path: string
}

/** Every boundary of the document. */
export function boundaries({ document, evaluation, context, coil }: CheckInput): Judged[] {
  return document.specification.insulation.boundaries.map((boundary, index) => ({
    boundary,
    result: evaluation.boundaries[index]!,
    provided: insulationOf({ ...context, coil }, boundary),
    path: `insulation.boundaries.${index}`,
  }))
}

/** Whether a boundary protects a person. */
export const protective = ({ boundary }: Pick<Judged, 'boundary'>): boolean => boundary.insulation !== 'functional'

/** Double and reinforced insulation protect alike. */
export const reinforced = ({ boundary }: Pick<Judged, 'boundary'>): boolean => boundary.insulation === 'reinforced' || boundary.insulation === 'double'

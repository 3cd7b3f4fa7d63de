import type { Shape } from '#shared/drawing/model'
import { stepWords } from '#shared/drawing/sheets/words'
import type { WindingSpecification } from '#shared/engine/specification'

export interface CoilGroup {
  /** Null for what belongs to no step: former, core, axis. */
  stepId: string | null
  shapes: Shape[]
  label: string
}

const STEP = /step:(\S+)/

/** Shapes of a coil section gathered by the step of the winding sequence that they belong to, outermost last. */
export function coilGroups(shapes: readonly Shape[], specification: WindingSpecification): CoilGroup[] {
  const rest: CoilGroup = { stepId: null, shapes: [], label: '' }
  const groups = new Map<string, CoilGroup>()
  let last: CoilGroup = rest
  for (const shape of shapes) {
    const stepId = STEP.exec(shape.tag ?? '')?.[1]
    // Hatching carries no tag: it belongs to the outline before it.
    if (stepId !== undefined) last = groupOf(groups, stepId, specification)
    else if (shape.tag !== undefined || last.stepId === null) last = rest
    last.shapes.push(shape)
  }
  return [rest, ...groups.values()]
}

function groupOf(groups: Map<string, CoilGroup>, stepId: string, specification: WindingSpecification): CoilGroup {
  const known = groups.get(stepId)
  if (known) return known
  const index = specification.sequence.findIndex(({ id }) => id === stepId)
  const step = specification.sequence[index]
  const group = { stepId, shapes: [], label: step ? `Step ${index + 1}: ${stepWords(specification, step)}` : stepId }
  groups.set(stepId, group)
  return group
}

import type { SpecificationDocument, WindingStep } from '#shared/engine/specification'

type Changes = Readonly<Record<string, unknown>>

const WINDING_FIELD = /^windings\.(\d+)\.(turns|startTerminal|finishTerminal)$/

/**
 * A winding stands in the winding table and in the sequence. A change of its turns or terminals is carried over to its
 * steps where both said the same before; where they differed, somebody means it so.
 */
export function keepInStep({ specification }: SpecificationDocument, changes: Changes): Changes {
  const carried: Record<string, unknown> = {}
  for (const [place, value] of Object.entries(changes)) {
    const [, index, field] = WINDING_FIELD.exec(place) ?? []
    const winding = index === undefined ? undefined : specification.windings[Number(index)]
    if (!winding) continue
    const steps = specification.sequence.flatMap((step, position) => (step.kind === 'winding' && step.windingId === winding.id ? [{ step, position }] : []))
    for (const { step, position } of touched(steps, field as keyof typeof TOUCHES)) {
      const key = field as 'turns' | 'startTerminal' | 'finishTerminal'
      if (step[key] === winding[key]) carried[`sequence.${position}.${key}`] = value
    }
  }
  return { ...carried, ...changes }
}

interface Placed {
  step: WindingStep
  position: number
}

const TOUCHES = {
  turns: (steps: readonly Placed[]) => (steps.length === 1 ? steps : []),
  startTerminal: (steps: readonly Placed[]) => steps.slice(0, 1),
  finishTerminal: (steps: readonly Placed[]) => steps.slice(-1),
}
const touched = (steps: readonly Placed[], field: keyof typeof TOUCHES) => TOUCHES[field](steps)

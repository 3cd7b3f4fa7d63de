import type { WindingSpecification } from '../specification'
import { report } from './context'
import type { Context } from './context'

/** Terminals that windings, steps and tests may name: pins that are fitted, and flying leads. */
export function namedTerminals({ former }: WindingSpecification): Set<string> {
  return new Set([...former.pins.filter(({ state }) => state !== 'missing').map(({ number }) => number), ...former.flyingLeads.map(({ name }) => name)])
}

/** Turns that the sequence lays of each winding. */
export function sequenceTurns({ sequence }: WindingSpecification): Map<string, number> {
  const turns = new Map<string, number>()
  for (const step of sequence) {
    if (step.kind === 'winding') turns.set(step.windingId, (turns.get(step.windingId) ?? 0) + step.turns)
  }
  return turns
}

/** Where the document contradicts itself; each finding leads to one place and names the other. */
export function reportContradictions(context: Context): void {
  const { specification } = context
  const laid = sequenceTurns(specification)
  const terminals = namedTerminals(specification)
  specification.windings.forEach((winding, index) => {
    const turns = laid.get(winding.id)
    const shielded = specification.sequence.some((step) => step.kind === 'shield' && step.windingId === winding.id)
    if (turns === undefined && !shielded) report(context, 'winding-not-in-sequence', 'error', `windings.${index}`, { winding: winding.name, other: 'sequence' })
    else if (turns !== undefined && turns !== winding.turns) {
      report(context, 'sequence-turns-differ', 'error', `windings.${index}.turns`, { winding: winding.name, turns: winding.turns, sequenceTurns: turns, other: 'sequence' })
    }
    for (const end of ['startTerminal', 'finishTerminal'] as const) {
      const terminal = winding[end]
      if (terminal !== '' && !terminals.has(terminal)) report(context, 'terminal-does-not-exist', 'error', `windings.${index}.${end}`, { winding: winding.name, terminal, other: 'former.pins' })
    }
  })
  reportGapControl(context)
}

/** A_L and gap length cannot both be inspected limits: one controls, the other is for reference. */
function reportGapControl(context: Context): void {
  const { gap } = context.specification.core
  const both = gap.alH.value !== null && gap.lengthMm.value !== null && gap.alH.status === 'mandatory' && gap.lengthMm.status === 'mandatory'
  if (both) report(context, 'gap-and-al-both-control', 'error', 'core.gap.lengthMm', { other: 'core.gap.alH' })
}

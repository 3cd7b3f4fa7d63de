import { windingsAt } from '../evaluate/insulation-paths'
import type { BoundaryEnd, Winding, WindingSpecification } from '../specification'

/** Name under which test rows speak of the core. */
export const CORE_TERMINAL = 'core'

export const terminalsOf = ({ startTerminal, finishTerminal }: Winding): string[] => [startTerminal, finishTerminal].filter((terminal) => terminal !== '')

/** Terminals of every winding but the named ones. */
export const terminalsBut = ({ windings }: WindingSpecification, ids: readonly string[]): string[] => windings.filter(({ id }) => !ids.includes(id)).flatMap(terminalsOf)

/** All terminals at one end of a boundary, tied together for a withstand test. */
export function terminalsAt(specification: WindingSpecification, end: BoundaryEnd): string[] {
  if (end.kind === 'core') return [CORE_TERMINAL]
  return [...new Set(windingsAt(specification, end).flatMap(terminalsOf))]
}

import type { Pin, Winding, WindingSpecification } from '../../engine/specification'

/** One winding end at a terminal. */
export interface TerminalUse {
  winding: Winding
  end: 'start' | 'finish' | 'tap'
}

/** One terminal of the part: a pin of the former or a flying lead. */
export interface Terminal {
  name: string
  pin: Pin | null
  /** Named by a winding or a test, but neither a pin nor a flying lead. */
  unknown: boolean
  uses: readonly TerminalUse[]
  core: boolean
}

/**
 * The one model of the terminals, from which schematic, pin views and tables are drawn: pins in the order of the
 * former, then flying leads, then names that the windings use without there being such a terminal.
 */
export function terminals(specification: WindingSpecification): Terminal[] {
  const pins = specification.former.pins
  const known = [...pins.map((pin) => pin.number), ...specification.former.flyingLeads.map((lead) => lead.name)]
  const used = specification.windings.flatMap((winding) => terminalsOf(specification, winding).map(([name]) => name))
  const names = [...new Set([...known, ...used])]
  return names.map((name) => ({
    name,
    pin: pins.find((pin) => pin.number === name) ?? null,
    unknown: !known.includes(name),
    uses: usesOf(specification, name),
    core: isCoreTerminal(specification, name),
  }))
}

function usesOf(specification: WindingSpecification, name: string): TerminalUse[] {
  return specification.windings.flatMap((winding) =>
    terminalsOf(specification, winding).flatMap(([terminal, end]) => (terminal === name ? [{ winding, end }] : [])),
  )
}

/** Terminals of a winding from start to finish, with those at which a split winding can be reached between. */
export function terminalsOf(specification: WindingSpecification, winding: Winding): [string, TerminalUse['end']][] {
  const ends: [string, TerminalUse['end']][] = [[winding.startTerminal, 'start']]
  if (winding.role === 'shield' && (winding.finishTerminal === '' || winding.finishTerminal === winding.startTerminal)) return ends
  const taps = tapsOf(specification, winding).map((tap): [string, TerminalUse['end']] => [tap.terminal, 'tap'])
  return [...ends, ...taps, [winding.finishTerminal, 'finish']]
}

export interface Tap {
  terminal: string
  /** Turns between the start and the tap. */
  turns: number
}

/** Terminals in the middle of a winding, in electrical order from its start. */
export function tapsOf(specification: WindingSpecification, winding: Winding): Tap[] {
  const steps = specification.sequence.filter((step) => step.kind === 'winding' && step.windingId === winding.id)
  const taps: Tap[] = []
  let at = winding.startTerminal
  let turns = 0
  const left = new Set(steps)
  for (;;) {
    const next = [...left].find((step) => step.kind === 'winding' && step.startTerminal === at)
    if (!next || next.kind !== 'winding') return taps
    left.delete(next)
    turns += next.turns
    at = next.finishTerminal
    if (at === winding.finishTerminal) return taps
    if (at !== '') taps.push({ terminal: at, turns })
  }
}

function isCoreTerminal(specification: WindingSpecification, name: string): boolean {
  const potential = specification.core.potential.value
  return potential?.connection === 'pin' && potential.pin === name
}

import { namedTerminals } from '../evaluate/document-findings'
import { terminalNames } from '../evaluate/insulation-paths'
import type { Pin, Winding, WindingSpecification } from '../specification'
import { atMost, notCheckable, yesNo } from './outcome'
import type { Check, CheckInput, Outcome } from './outcome'

/** Every terminal that a winding, a step or the core's potential needs. */
function neededTerminals({ document }: CheckInput): Set<string> {
  const { windings, sequence, core } = document.specification
  const names = [
    ...windings.flatMap(({ startTerminal, finishTerminal }) => [startTerminal, finishTerminal]),
    ...sequence.flatMap((step) => (step.kind === 'winding' ? [step.startTerminal, step.finishTerminal] : step.kind === 'shield' ? [step.connectedTerminal] : [])),
    core.potential.value?.pin ?? '',
  ]
  return new Set(names.filter((name) => name !== ''))
}

function enoughTerminals(input: CheckInput): Outcome[] {
  const available = namedTerminals(input.document.specification).size
  return [atMost({ value: neededTerminals(input).size, limit: available, unit: '', path: 'former.pins' })]
}

function endsNamed({ document }: CheckInput): Outcome[] {
  const terminals = namedTerminals(document.specification)
  return document.specification.windings.map((winding, index) => {
    // A shield has one end connected, the other insulated.
    const ends = winding.role === 'shield' ? [winding.startTerminal] : [winding.startTerminal, winding.finishTerminal]
    return yesNo(ends.every((end) => terminals.has(end)), `windings.${index}.startTerminal`, { winding: winding.name, ends: ends.join(', ') })
  })
}

/** Current that one pin carries, A rms: lower end of the usual range. Source: common practice, to be confirmed with the former's maker. */
const PIN_CURRENT_A: readonly (readonly [upToMm: number, currentA: number])[] = [[0.55, 2.5], [0.65, 3], [0.85, 5], [1.05, 8], [1.3, 10]]

function pinCurrents({ document, evaluation, context }: CheckInput): Outcome[] {
  const sizeMm = document.specification.former.pinSection.value?.sizeMm ?? context.former?.pinSection.sizeMm ?? null
  const limit = sizeMm === null ? null : (PIN_CURRENT_A.find(([upToMm]) => sizeMm <= upToMm)?.[1] ?? 10)
  const pins = new Set(document.specification.former.pins.map(({ number }) => number))
  return document.specification.windings.flatMap(({ name, role, startTerminal }, index) => {
    if (role === 'shield' || !pins.has(startTerminal)) return []
    return [atMost({ value: evaluation.windings[index]?.rmsA, limit, unit: 'A', path: `windings.${index}.startTerminal`, values: { winding: name, pin: startTerminal } })]
  })
}

const pinsOf = ({ document }: CheckInput, windings: readonly Winding[]): Pin[] => {
  const names = terminalNames(document.specification, windings)
  return document.specification.former.pins.filter(({ number }) => names.has(number))
}

/** The axis across the rows: that of which the pins take two places, the row spacing apart. */
function rowAxis({ document, context }: CheckInput): 'xMm' | 'yMm' {
  const { former } = document.specification
  const pins = context.former && context.former.pins.length > 0 ? context.former.pins : former.pins
  const spacingMm = context.former?.pinRowSpacingMm ?? former.rowSpacingMm.value ?? 0
  const places = (axis: 'xMm' | 'yMm') => [...new Set(pins.map((pin) => Math.round(pin[axis] * 100) / 100))]
  const misfit = (axis: 'xMm' | 'yMm') => {
    const at = places(axis)
    return at.length === 2 ? Math.abs(Math.abs(at[0]! - at[1]!) - spacingMm) : 1e6 * at.length
  }
  return misfit('xMm') <= misfit('yMm') ? 'xMm' : 'yMm'
}

/** Pins of two protected sides lie in opposite rows. */
function oppositeRows(input: CheckInput): Outcome[] {
  const { insulation, windings } = input.document.specification
  return insulation.boundaries.flatMap(({ between: [a, b], insulation: kind, name }, index) => {
    if (kind === 'functional' || a.kind !== 'side' || b.kind !== 'side') return []
    const path = `insulation.boundaries.${index}`
    const one = pinsOf(input, windings.filter(({ side }) => side === a.side))
    const other = pinsOf(input, windings.filter(({ side }) => side === b.side))
    if (one.length === 0 || other.length === 0) return [notCheckable(path, { boundary: name })]
    const axis = rowAxis(input)
    const apart = (a: readonly Pin[], b: readonly Pin[]) => Math.max(...a.map((pin) => pin[axis])) < Math.min(...b.map((pin) => pin[axis]))
    return [yesNo(apart(one, other) || apart(other, one), path, { boundary: name })]
  })
}

/** All windings in one direction, and each begins at its dotted terminal. */
function dotsAgree({ document }: CheckInput): Outcome[] {
  const { windings, sequence } = document.specification
  const steps = sequence.filter((step) => step.kind === 'winding')
  const directions = new Set(steps.map(({ direction }) => direction))
  const ends = windings.flatMap((winding, index) => {
    const own = steps.filter(({ windingId }) => windingId === winding.id)
    if (own.length === 0) return []
    const met = own[0]!.startTerminal === winding.startTerminal && own[own.length - 1]!.finishTerminal === winding.finishTerminal
    return [yesNo(met, `windings.${index}.startTerminal`, { winding: winding.name, terminal: winding.startTerminal, stepTerminal: own[0]!.startTerminal })]
  })
  return [yesNo(directions.size <= 1, 'sequence', { directions: [...directions].join(', ') }), ...ends]
}

/** One winding runs from its start through its steps to its finish, and no other closes a loop with it. */
function continuity({ document: { specification } }: CheckInput): Outcome[] {
  const { windings } = specification
  return windings.flatMap((winding, index) => {
    if (winding.role === 'shield') return []
    const joined = windings.slice(index + 1).filter((other) => other.role !== 'shield' && isJoined(specification, winding, other))
    return [
      yesNo(isOneConductor(specification, winding), `windings.${index}`, { winding: winding.name }),
      ...joined.map((other) => yesNo(false, `windings.${windings.indexOf(other)}.startTerminal`, { winding: `${winding.name}, ${other.name}` })),
    ]
  })
}

/** Each step begins where the one before it ended, and none ends where it began. */
function isOneConductor({ sequence }: WindingSpecification, { id, startTerminal, finishTerminal }: Winding): boolean {
  const steps = sequence.flatMap((step) => (step.kind === 'winding' && step.windingId === id ? [step] : []))
  const chained = steps.every((step, position) => step.startTerminal !== step.finishTerminal && (position === 0 || steps[position - 1]!.finishTerminal === step.startTerminal))
  return chained && startTerminal !== finishTerminal
}

/** Two windings joined at two terminals close a loop; of different sides they may not even meet at one. */
function isJoined(specification: WindingSpecification, one: Winding, other: Winding): boolean {
  const own = terminalNames(specification, [one])
  const common = [...terminalNames(specification, [other])].filter((terminal) => own.has(terminal)).length
  return common > (one.side === other.side ? 1 : 0)
}

export const TERMINATION_CHECKS: Readonly<Record<string, Check>> = {
  P01: { severity: 'S', source: 'common practice', run: enoughTerminals },
  P02: { severity: 'S', source: 'common practice', run: endsNamed },
  P03: { severity: 'M', source: 'current by pin section: common practice, to be confirmed with the former’s maker', run: pinCurrents },
  P11: { severity: 'S', source: 'common practice', run: oppositeRows },
  P22: { severity: 'S', source: 'one conductor from start to finish: circuit of the part', run: continuity },
  P14: { severity: 'S', source: 'a dot marks the start of a winding', run: dotsAgree },
}

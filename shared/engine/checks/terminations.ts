import { namedTerminals } from '../evaluate/document-findings'
import type { Pin, Winding } from '../specification'
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
  const names = new Set(windings.flatMap(({ startTerminal, finishTerminal }) => [startTerminal, finishTerminal]))
  return document.specification.former.pins.filter(({ number }) => names.has(number))
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
    const apart = (axis: 'xMm' | 'yMm') => Math.max(...one.map((pin) => pin[axis])) < Math.min(...other.map((pin) => pin[axis])) || Math.max(...other.map((pin) => pin[axis])) < Math.min(...one.map((pin) => pin[axis]))
    return [yesNo(apart('xMm') || apart('yMm'), path, { boundary: name })]
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

export const TERMINATION_CHECKS: Readonly<Record<string, Check>> = {
  P01: { severity: 'S', source: 'common practice', run: enoughTerminals },
  P02: { severity: 'S', source: 'common practice', run: endsNamed },
  P03: { severity: 'M', source: 'current by pin section: common practice, to be confirmed with the former’s maker', run: pinCurrents },
  P11: { severity: 'S', source: 'common practice', run: oppositeRows },
  P14: { severity: 'S', source: 'a dot marks the start of a winding', run: dotsAgree },
}

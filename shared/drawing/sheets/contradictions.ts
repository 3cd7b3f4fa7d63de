import { CORE_TERMINAL } from '../../engine/limits/terminals'
import type { WindingSpecification } from '../../engine/specification'
import { plain } from './figures'
import { terminalsOf } from './terminals'
import { SIDE_WORDS } from './words'

/** What cannot be right in a document, each with both places that contradict each other; for the face of a draft. */
export function contradictions(specification: WindingSpecification): string[] {
  return [
    ...doubledPins(specification),
    ...unknownTerminals(specification),
    ...sharedAcrossSides(specification),
    ...specification.windings.flatMap((winding) => turnsContradiction(winding, specification.sequence)),
    ...unknownWindings(specification),
    ...gapContradiction(specification),
    ...boundaryContradictions(specification),
    ...pinGeometry(specification),
  ]
}

const repeated = (names: readonly string[]) => [...new Set(names.filter((name, index) => names.indexOf(name) !== index))]

function doubledPins({ former, tests }: WindingSpecification): string[] {
  return [
    ...repeated([...former.pins.map(({ number }) => number), ...former.flyingLeads.map(({ name }) => name)]).map((name) => `Pins: ${name} is there twice; each terminal needs a name of its own.`),
    ...repeated(former.pins.map(({ xMm, yMm }) => `x ${plain(xMm)} mm, y ${plain(yMm)} mm`)).map((place) => `Pins: two lie at ${place}.`),
    ...repeated(tests.map(({ symbol }) => symbol)).map((symbol) => `Tests: the symbol ${symbol} is there twice.`),
  ]
}

/** Who names a terminal that is not there, gathered by terminal. */
function unknownTerminals({ windings, former, sequence, tests }: WindingSpecification): string[] {
  const state = new Map([...former.pins.map((pin) => [pin.number, pin.state] as const), ...former.flyingLeads.map(({ name }) => [name, 'fitted'] as const)])
  const named: [where: string, name: string][] = [
    ...windings.flatMap((winding): [string, string][] => [[`Winding ${winding.name}`, winding.startTerminal], ...(winding.role === 'shield' ? [] : [[`Winding ${winding.name}`, winding.finishTerminal] as [string, string]])]),
    ...sequence.flatMap((step, index): [string, string][] => (step.kind === 'shield' ? [[`Step ${index + 1}`, step.connectedTerminal]] : [])),
    ...tests.flatMap((test) => [...new Set([...test.drivenTerminals, ...test.shortedTerminals.flat(), ...test.openTerminals])].map((name): [string, string] => [`Test ${test.number}`, name])),
  ]
  const wrong = named.filter(([, name]) => name !== '' && name !== CORE_TERMINAL && state.get(name) !== 'fitted' && state.get(name) !== 'no-connection')
  const absent = [...new Set(wrong.map(([, name]) => name))].map((name) => {
    const where = [...new Set(wrong.filter((use) => use[1] === name).map(([place]) => place))].join(', ')
    return state.has(name) ? `${where}: pin ${name} is marked as missing among the pins.` : `${where}: there is no terminal ${name} among the pins and flying leads.`
  })
  const closed = windings.filter(({ role, startTerminal, finishTerminal }) => role !== 'shield' && startTerminal !== '' && startTerminal === finishTerminal)
  return [...absent, ...closed.map(({ name, startTerminal }) => `Winding ${name}: start and finish are both ${startTerminal}.`)]
}

/** A pin that two sides share joins what the insulation keeps apart. */
function sharedAcrossSides(specification: WindingSpecification): string[] {
  const uses = specification.windings.flatMap((winding) => terminalsOf(specification, winding).map(([name]) => ({ name, winding })))
  return [...new Set(uses.map(({ name }) => name))].flatMap((name) => {
    const here = uses.filter((use) => use.name === name && name !== '').map(({ winding }) => winding)
    const other = here.find(({ side }) => side !== here[0]!.side)
    return other ? [`Pin ${name} is used twice: by ${here[0]!.name} (${SIDE_WORDS[here[0]!.side]}) and by ${other.name} (${SIDE_WORDS[other.side]}).`] : []
  })
}

function turnsContradiction(winding: WindingSpecification['windings'][number], sequence: WindingSpecification['sequence']): string[] {
  const steps = sequence.filter((step) => (step.kind === 'winding' || step.kind === 'shield') && step.windingId === winding.id)
  if (steps.length === 0) return [`Winding ${winding.name} is not in the winding sequence.`]
  if (winding.role === 'shield') return []
  const laid = steps.reduce((sum, step) => sum + (step.kind === 'winding' ? step.turns : 0), 0)
  return laid === winding.turns ? [] : [`Winding ${winding.name} has ${plain(winding.turns)} turns, the winding sequence lays ${plain(laid)}.`]
}

function unknownWindings({ windings, sequence }: WindingSpecification): string[] {
  const known = new Set(windings.map(({ id }) => id))
  return sequence.flatMap((step, index) => ((step.kind === 'winding' || step.kind === 'shield') && !known.has(step.windingId) ? [`Step ${index + 1} lays a winding that the table of windings does not have.`] : []))
}

function gapContradiction({ core: { gap } }: WindingSpecification): string[] {
  const both = gap.alH.value !== null && gap.lengthMm.value !== null && gap.alH.status === 'mandatory' && gap.lengthMm.status === 'mandatory'
  return both ? ['Gap: AL and length are both mandatory; one controls, the other is for reference.'] : []
}

function boundaryContradictions({ insulation, tests, windings }: WindingSpecification): string[] {
  const sides = new Set(windings.map(({ side }) => side))
  const known = new Set(windings.map(({ id }) => id))
  return [
    ...insulation.boundaries.flatMap((boundary) =>
      boundary.between.flatMap((end) => {
        if (end.kind === 'side' && !sides.has(end.side)) return [`Boundary ${boundary.name} ends at the ${SIDE_WORDS[end.side]} side, where no winding lies.`]
        return end.kind === 'winding' && !known.has(end.windingId) ? [`Boundary ${boundary.name} ends at a winding that is not in the table of windings.`] : []
      }),
    ),
    ...tests.flatMap((test) => (test.boundaryId === null || insulation.boundaries.some(({ id }) => id === test.boundaryId) ? [] : [`Test ${test.number}: there is no boundary ${test.boundaryId}.`])),
  ]
}

/** Pitch and row spacing as stated and as the places of the pins have them. */
function pinGeometry({ former }: WindingSpecification): string[] {
  const places = (index: 'xMm' | 'yMm') => [...new Set(former.pins.map((pin) => Number(pin[index].toFixed(3))))].sort((a, b) => a - b)
  const steps = [places('xMm'), places('yMm')].flatMap((values) => values.slice(1).map((value, index) => value - values[index]!))
  const among = (stated: number | null) => stated === null || steps.length === 0 || steps.some((step) => Math.abs(step - stated) < 0.01)
  return [
    ...(among(former.pinPitchMm.value) ? [] : [`Pin pitch ${plain(former.pinPitchMm.value)} mm is stated, but no two pins lie that far apart.`]),
    ...(among(former.rowSpacingMm.value) ? [] : [`Row spacing ${plain(former.rowSpacingMm.value)} mm is stated, but no two pins lie that far apart.`]),
  ]
}

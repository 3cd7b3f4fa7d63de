import { CORE_TERMINAL } from '../../engine/limits/terminals'
import type { WindingSpecification } from '../../engine/specification'
import { STATUS_LETTERS } from './figures'
import type { DrawingInput } from './input'
import { anyFromMemory } from './insulation-table'
import { fieldGroups, titleFields } from './stated-fields'

/** Numbered notes with how each binds. */
export const noteLines = ({ notes }: WindingSpecification): string[] =>
  notes.map((note) => `${note.number}  [${STATUS_LETTERS[note.status]}]  ${note.text}`)

const STANDING_CAUTIONS = [
  'High-voltage (hipot) testing is done only by qualified persons, at a guarded station, with the core and all terminals that are not under test connected as the test row says.',
  'After a d.c. withstand or insulation-resistance test the part is charged: discharge all windings, shields and the core to each other before touching it.',
  'Distances and test voltages on this drawing do not replace the standard. The edition in force and the certification body decide.',
]

const MEMORY_CAUTION =
  'Values marked † were taken from memory or from a secondary copy of the standard. Each must be confirmed against the standard in force before the part is used as a safety component.'

/** Cautions of every sheet set, then those of this part. */
export function cautionLines(input: DrawingInput): string[] {
  const own = input.specification.insulation.cautions.value ?? []
  return [...STANDING_CAUTIONS, ...(anyFromMemory(input) ? [MEMORY_CAUTION] : []), ...own]
}

/** Labels of the fields that nobody has filled, by group; fields without sense for the part are left out. */
export function notStated(input: DrawingInput): string[] {
  const groups = [...fieldGroups(input), { title: 'Title block and electrical data', fields: titleFields(input.specification) }]
  return groups.flatMap(({ title, fields }) => {
    const missing = fields.filter(({ text, applies }) => text === null && applies).map(({ label }) => label)
    return missing.length === 0 ? [] : [`${title}: ${missing.join('; ')}.`]
  })
}

/** What cannot be right in this document, for the face of a draft. */
export function contradictions({ windings, sequence, former, tests, insulation }: WindingSpecification): string[] {
  const known = new Set([...former.pins.filter(({ state }) => state !== 'missing').map(({ number }) => number), ...former.flyingLeads.map(({ name }) => name)])
  const terminal = (where: string, name: string) => (known.has(name) || name === '' || name === CORE_TERMINAL ? [] : [`${where}: there is no terminal ${name}.`])
  return [
    ...windings.flatMap((winding) => [
      ...terminal(`Winding ${winding.name}`, winding.startTerminal),
      ...(winding.role === 'shield' ? [] : terminal(`Winding ${winding.name}`, winding.finishTerminal)),
      ...turnsContradiction(winding, sequence),
    ]),
    ...tests.flatMap((test) => [...new Set([...test.drivenTerminals, ...test.shortedTerminals.flat(), ...test.openTerminals])].flatMap((name) => terminal(`Test ${test.number}`, name))),
    ...tests.flatMap((test) => (test.boundaryId === null || insulation.boundaries.some(({ id }) => id === test.boundaryId) ? [] : [`Test ${test.number}: there is no boundary ${test.boundaryId}.`])),
  ]
}

function turnsContradiction(winding: WindingSpecification['windings'][number], sequence: WindingSpecification['sequence']): string[] {
  const steps = sequence.filter((step) => (step.kind === 'winding' || step.kind === 'shield') && step.windingId === winding.id)
  if (steps.length === 0) return [`Winding ${winding.name} is not in the winding sequence.`]
  if (winding.role === 'shield') return []
  const laid = steps.reduce((sum, step) => sum + (step.kind === 'winding' ? step.turns : 0), 0)
  return laid === winding.turns ? [] : [`Winding ${winding.name} has ${winding.turns} turns, the winding sequence lays ${laid}.`]
}

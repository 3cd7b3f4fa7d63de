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

import { boundaryEndWords } from '#shared/drawing/sheets/words'
import type { Library } from '#shared/engine/library'
import type { BoundaryEnd, LibraryReference, RevisionChange, SpecificationDocument } from '#shared/engine/specification'
import { formatNumber, formatQuantity } from '#shared/number-format'
import { shownUnit } from '#shared/shown-units'
import { referenceKey, rowsOf } from '../entries/choice-sources'
import type { FieldSpec } from '../field-types'
import { changeText, impedanceText, terminalGroupsText } from '../line-texts'
import { valueAt } from '../document-paths'

/** What the words for a value depend on: the document that holds it. */
export interface WordSource {
  document: SpecificationDocument
  library: Library
}

export const NOT_STATED = 'not stated'

/** A drawing states what the record holds: twelve digits hide only binary noise. */
const EXACT = { significant: 12 }

type Writer = (value: never, field: never, source: WordSource) => string

const WRITERS = {
  text: (value: string) => value,
  date: (value: string) => value,
  terminal: (value: string) => value,
  figure: (value: number, { unit, suffix }: { unit: string; suffix?: string }) => (suffix ? `${formatNumber(value, EXACT)}\u00a0${suffix}` : formatQuantity(value, shownUnit(unit), EXACT)),
  choice: (value: unknown, { choices }: { choices: readonly { value: unknown; label: string }[] }) => choices.find((one) => one.value === value)?.label ?? String(value),
  'yes-no': (value: boolean) => (value ? 'yes' : 'no'),
  lines: (value: string[]) => value.join('; '),
  changes: (value: RevisionChange[]) => value.map(changeText).join('; '),
  impedance: (value: { frequencyHz: number; minimumOhm: number }[]) => value.map(impedanceText).join('; '),
  terminals: (value: string[]) => value.join(', '),
  'terminal-groups': (value: string[][]) => terminalGroupsText(value),
  winding: (value: string, _: never, source: WordSource) => windingWords(value, source),
  windings: (value: string[], _: never, source: WordSource) => value.map((id) => windingWords(id, source)).join(', '),
  boundary: (value: string, _: never, { document }: WordSource) => document.specification.insulation.boundaries.find(({ id }) => id === value)?.name ?? value,
  output: (value: string, _: never, { document }: WordSource) => outputName(document, value),
  end: (value: BoundaryEnd, _: never, { document }: WordSource) => boundaryEndWords(document.specification, value),
  reference: (value: LibraryReference, _: never, source: WordSource) => referenceWords(value, source),
  group: (value: object, { fields }: { fields: readonly FieldSpec[] }, source: WordSource) =>
    fields.map((field) => `${field.label} ${valueWords(field, valueAt(value, field.path), source)}`).join(', '),
} satisfies Record<FieldSpec['type'], Writer>

function outputName({ requirement }: SpecificationDocument, id: string): string {
  const duty = requirement?.duty
  return (duty && 'outputs' in duty ? duty.outputs.find((output) => output.id === id)?.name : undefined) ?? id
}

const windingWords = (id: string, { document }: WordSource) => document.specification.windings.find((winding) => winding.id === id)?.name ?? `${id} (not there)`

/** With its version, since two versions of a row bear one name. */
function referenceWords(reference: LibraryReference, { library }: WordSource): string {
  const row = rowsOf(library, reference.kind).find((one) => referenceKey(one) === referenceKey(reference))
  return `${row?.name ?? reference.id}${reference.version > 1 ? `, version ${reference.version}` : ''}`
}

/** A value of the document as people read it, with its unit. */
export function valueWords(field: FieldSpec, value: unknown, source: WordSource): string {
  if (value === null || value === undefined || value === '' || (Array.isArray(value) && value.length === 0)) return NOT_STATED
  return (WRITERS[field.type] as (value: unknown, field: FieldSpec, source: WordSource) => string)(value, field, source)
}

/** A value that no field of the form describes. */
export function plainWords(value: unknown): string {
  if (value === null || value === undefined || value === '') return NOT_STATED
  if (typeof value === 'number') return formatNumber(value, EXACT)
  if (typeof value === 'boolean') return value ? 'yes' : 'no'
  return typeof value === 'string' ? value : JSON.stringify(value)
}

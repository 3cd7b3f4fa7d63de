import type { DocumentChange } from '#shared/workflow/compare-documents'
import { compareDocuments } from '#shared/workflow/compare-documents'
import { isTree, same } from '#shared/workflow/document-rows'
import { stepWords } from '#shared/drawing/sheets/words'
import type { FieldStatus, SequenceStep, SpecificationDocument } from '#shared/engine/specification'
import type { Library } from '#shared/engine/library'
import { isWithin, placeOf, valueAt } from '../document-paths'
import { allDutyFields } from '../duty/duty-fields'
import type { FieldSpec, Row, RowsSpec } from '../field-types'
import { STATUS_MARKS } from '../fields/marks'
import { SECTIONS, sectionOf } from '../sections'
import { NOT_STATED, plainWords, valueWords, type WordSource } from './value-words'

/** One line of a comparison. */
export interface ChangeLine {
  key: string
  /** Place as the form names it, in the newer document, or in the older one of what was removed. */
  path: string
  section: string
  /** Field, with its row by name and id: `winding S1 [w2], turns`. */
  what: string
  kind: DocumentChange['kind']
  before: string
  after: string
}

const TABLES = SECTIONS.flatMap(({ parts }) => parts.flatMap((part) => (part.kind === 'rows' ? [part.rows] : [])))
const FIELDS = [...SECTIONS.flatMap(({ parts }) => parts.flatMap((part) => (part.kind === 'stated' || part.kind === 'plain' ? part.fields : []))), ...allDutyFields()]

const rowFields = (table: RowsSpec, row: Row): FieldSpec[] => [...table.columns.flatMap(({ field }) => field(row) ?? []), ...table.more(row)]

/** A row by its name and by the id that stays through edits. */
export function rowWords(table: Pick<RowsSpec, 'path' | 'one'>, row: Row, { document }: Pick<WordSource, 'document'>): string {
  const id = row.id ?? row.number ?? row.revision
  const name = table.path === 'sequence' ? stepWords(document.specification, row as unknown as SequenceStep) : (row.symbol ?? row.name ?? '')
  return `${table.one}${name ? ` ${String(name)}` : ''} [${String(id)}]`
}

interface Compared {
  before: WordSource
  after: WordSource
}

/** Everything that differs between two documents, in the order of the form. */
export function changeLines(before: SpecificationDocument, after: SpecificationDocument, library: Library): ChangeLine[] {
  const sources: Compared = { before: { document: before, library }, after: { document: after, library } }
  const lines = compareDocuments(before, after).flatMap((change) => linesOfChange({ ...change, path: placeOf(change.path), key: placeOf(change.key) }, sources))
  const order = (line: ChangeLine) => SECTIONS.findIndex(({ title }) => title === line.section)
  return lines.map((line, index) => ({ line, index })).sort((a, b) => order(a.line) - order(b.line) || a.index - b.index).map(({ line }) => line)
}

function linesOfChange(change: DocumentChange, sources: Compared): ChangeLine[] {
  if (change.path === 'former.pins' || isWithin(change.path, 'former.pins')) return pinLines(change)
  const table = TABLES.find(({ path }) => isWithin(change.path, path))
  if (table && change.path !== table.path) return rowLines(table, change, sources)
  const field = FIELDS.find(({ path }) => isWithin(change.path, path))
  return field ? fieldLines(field, change, sources) : [line(change, wordsOfPath(change.path), plainWords(change.before), plainWords(change.after))]
}

const line = ({ key, path, kind }: DocumentChange, what: string, before: string, after: string): ChangeLine => ({ key, path, kind, section: sectionOf(path).title, what, before, after })

/** `requirement.duty.outputs.0.voltageV` where no field of the form is known. */
const wordsOfPath = (path: string) => path.split('.').slice(1).join(' › ') || path

const isStated = (value: unknown): value is { value: unknown; status: FieldStatus } => isTree(value) && 'value' in value && 'status' in value

function fieldLines(field: FieldSpec, change: DocumentChange, sources: Compared): ChangeLine[] {
  const { before, after } = change
  if (!isStated(before) || !isStated(after)) return valueLines(field, field.label, change, sources)
  const values = same(before.value, after.value) ? [] : valueLines(field, field.label, { ...change, before: before.value, after: after.value }, sources)
  return [...values, ...statusLines(field.label, change, before.status, after.status)]
}

function statusLines(of: string, change: DocumentChange, before: FieldStatus, after: FieldStatus): ChangeLine[] {
  if (before === after) return []
  return [line({ ...change, key: `${change.key} status` }, `${of}, status`, STATUS_MARKS[before].word, STATUS_MARKS[after].word)]
}

/** Of a whole that both state, the figures in it that differ. */
function valueLines(field: FieldSpec, label: string, change: DocumentChange, { before, after }: Compared): ChangeLine[] {
  if (field.type === 'group' && isTree(change.before) && isTree(change.after)) {
    return field.fields.flatMap((inner) => {
      const [older, newer] = [valueAt(change.before, inner.path), valueAt(change.after, inner.path)]
      if (same(older, newer)) return []
      return [line({ ...change, key: `${change.key}.${inner.path}` }, `${label}, ${inner.label}`, valueWords(inner, older, before), valueWords(inner, newer, after))]
    })
  }
  return [line(change, label, valueWords(field, change.before, before), valueWords(field, change.after, after))]
}

function rowLines(table: RowsSpec, change: DocumentChange, sources: Compared): ChangeLine[] {
  const [position = '', ...rest] = change.path.slice(table.path.length + 1).split('.')
  if (change.kind === 'added') return [line(change, `${rowWords(table, change.after as Row, sources.after)} added`, '', rowText(table, change.after as Row, sources.after))]
  if (change.kind === 'removed') return [line(change, `${rowWords(table, change.before as Row, sources.before)} removed`, rowText(table, change.before as Row, sources.before), '')]
  const row = valueAt(sources.after.document.specification, `${table.path}.${position}`) as Row
  const of = rowWords(table, row, sources.after)
  if (change.kind === 'moved') return [line({ ...change, key: `${change.key} moved` }, `${of} moved`, `position ${String(change.before)}`, `position ${String(change.after)}`)]
  const path = rest.join('.')
  if (path === 'status') return statusLines(of, change, change.before as FieldStatus, change.after as FieldStatus)
  return insideRow(rowFields(table, row), path, of, change, sources)
}

/** A whole inside a row is compared figure by figure; a figure inside of it is found by its full path. */
function insideRow(fields: readonly FieldSpec[], path: string, of: string, change: DocumentChange, sources: Compared): ChangeLine[] {
  const field = fields.find((one) => isWithin(path, one.path))
  if (field?.type === 'group' && path !== field.path) {
    const inner = field.fields.find((one) => isWithin(path, `${field.path}.${one.path}`))
    if (inner) return valueLines(inner, `${of}, ${field.label}, ${inner.label}`, change, sources)
  }
  if (field) return valueLines(field, `${of}, ${field.label}`, change, sources)
  return [line(change, `${of}, ${path}`, plainWords(change.before), plainWords(change.after))]
}

/** What a row says, field by field, without what it does not state. */
function rowText(table: RowsSpec, row: Row, source: WordSource): string {
  return rowFields(table, row)
    .map((field) => ({ label: field.label, text: valueWords(field, valueAt(row, field.path), source) }))
    .filter(({ text }) => text !== NOT_STATED)
    .map(({ label, text }) => `${label} ${text}`)
    .join(', ')
}

interface PinLike {
  number: string
  xMm: number
  yMm: number
  state: string
}

const pinText = (pin: PinLike) => `x ${plainWords(pin.xMm)}\u00a0mm, y ${plainWords(pin.yMm)}\u00a0mm, ${pin.state.replaceAll('-', ' ')}`
const PIN_FIELDS: Readonly<Record<string, string>> = { xMm: 'x', yMm: 'y', state: 'state' }

function pinLines(change: DocumentChange): ChangeLine[] {
  const number = /\[(.+?)\]/.exec(change.key)?.[1] ?? ''
  if (change.kind === 'added') return [line(change, `pin ${number} added`, '', pinText(change.after as PinLike))]
  if (change.kind === 'removed') return [line(change, `pin ${number} removed`, pinText(change.before as PinLike), '')]
  if (change.kind === 'moved') return []
  const name = change.path.split('.').at(-1)!
  const write = (value: unknown) => (name.endsWith('Mm') ? `${plainWords(value)}\u00a0mm` : plainWords(value))
  return [line(change, `pin ${number}, ${PIN_FIELDS[name] ?? name}`, write(change.before), write(change.after))]
}

import type { WindingSpecification } from '../../engine/specification'
import type { Column, TableContent } from '../table'
import { millimetres, plain, STATUS_LETTERS, yesNo } from './figures'
import { terminals } from './terminals'
import { useText } from '../figures/pin-view'
import type { FieldGroup } from './stated-fields'

const FIELD_COLUMNS: readonly Column[] = [
  { key: 'label', header: 'Field', always: true },
  { key: 'value', header: 'Value', always: true },
  { key: 'status', header: 'M/R/V', align: 'middle', always: true },
]

/** The stated fields of a group as a table of label, value and how the value binds. */
export const fieldTable = ({ title, fields }: FieldGroup): TableContent => ({
  title,
  columns: FIELD_COLUMNS,
  headerless: true,
  rows: fields.filter(({ text }) => text !== null).map(({ label, text, status }) => ({ cells: { label, value: text!, status: STATUS_LETTERS[status] } })),
})

const PIN_COLUMNS: readonly Column[] = [
  { key: 'name', header: 'Terminal', align: 'middle', font: 'sans-bold', always: true },
  { key: 'use', header: 'Use', always: true },
  { key: 'x', header: 'x in mm', group: 'Top view, from the centre', align: 'decimal' },
  { key: 'y', header: 'y in mm', group: 'Top view, from the centre', align: 'decimal' },
]

/** Each terminal with what it carries and its place. */
export function terminalTable(specification: WindingSpecification): TableContent {
  const rows = terminals(specification).map((terminal) => ({
    tag: `pin:${terminal.name}`,
    cells: {
      name: terminal.name,
      use: terminal.unknown ? `${useText(terminal)} – NO SUCH TERMINAL` : terminalUse(terminal),
      x: plain(terminal.pin?.xMm),
      y: plain(terminal.pin?.yMm),
    },
  }))
  return { title: 'Terminals', columns: PIN_COLUMNS, rows }
}

function terminalUse(terminal: ReturnType<typeof terminals>[number]): string {
  const uses = terminal.uses.map(({ winding, end }) => `${winding.name} ${end === 'start' ? 'start (dot)' : end}`)
  if (terminal.core) uses.push('core')
  return uses.length > 0 ? uses.join(', ') : ({ NC: 'no connection', missing: 'missing (keying)', free: 'free' }[useText(terminal)] ?? useText(terminal))
}

/** Flying leads with their lengths and ends. */
export const flyingLeadTable = ({ former }: WindingSpecification): TableContent => ({
  title: 'Flying leads',
  columns: [
    { key: 'name', header: 'Lead', font: 'sans-bold' },
    { key: 'wire', header: 'Wire style' },
    { key: 'length', header: 'Length' },
    { key: 'from', header: 'Measured from' },
    { key: 'strip', header: 'Strip length' },
    { key: 'tinned', header: 'Tinned' },
    { key: 'colour', header: 'Colour' },
    { key: 'sleeve', header: 'Sleeve' },
    { key: 'termination', header: 'Termination' },
    { key: 'status', header: 'M/R/V', align: 'middle' },
  ],
  rows: former.flyingLeads.map((lead) => ({
    cells: {
      name: lead.name,
      wire: lead.wireStyle,
      length: millimetres(lead.lengthMm),
      from: lead.measuredFrom,
      strip: millimetres(lead.stripLengthMm),
      tinned: yesNo(lead.tinned),
      colour: lead.colour,
      sleeve: lead.sleeve,
      termination: lead.termination,
      status: STATUS_LETTERS[lead.status],
    },
  })),
})

/** Documents that belong to the drawing. */
export const relatedTable = ({ title }: WindingSpecification): TableContent => ({
  title: 'Related documents',
  columns: [
    { key: 'kind', header: 'Kind' },
    { key: 'number', header: 'Number', font: 'mono' },
    { key: 'title', header: 'Title' },
    { key: 'status', header: 'M/R/V', align: 'middle' },
  ],
  rows: title.relatedDocuments.map((row) => ({ cells: { kind: row.kind.replace('-', ' '), number: row.number, title: row.title, status: STATUS_LETTERS[row.status] } })),
})

/** Revision block: every change with its old and its new value. */
export function revisionTable({ revisions }: WindingSpecification): TableContent {
  const rows = revisions.flatMap((entry) => {
    const changes = entry.changes.length > 0 ? entry.changes : [{ field: 'first issue', before: '', after: '' }]
    return changes.map((change, index) => ({
      cells: {
        field: change.field,
        before: change.before,
        after: change.after,
        ...(index === 0 && {
          revision: entry.revision,
          date: entry.date,
          zones: entry.zones,
          reason: entry.reason,
          effect: entry.effect,
          by: entry.by,
          checked: entry.checkedBy,
          approved: entry.approvedBy,
        }),
      },
    }))
  })
  return {
    title: 'Revisions',
    columns: [
      { key: 'revision', header: 'Rev.', font: 'sans-bold', align: 'middle' },
      { key: 'date', header: 'Date' },
      { key: 'zones', header: 'Zones' },
      { key: 'field', header: 'What changed' },
      { key: 'before', header: 'Old' },
      { key: 'after', header: 'New' },
      { key: 'reason', header: 'Reason' },
      { key: 'effect', header: 'Effect' },
      { key: 'by', header: 'By' },
      { key: 'checked', header: 'Checked' },
      { key: 'approved', header: 'Approved' },
    ],
    rows,
  }
}

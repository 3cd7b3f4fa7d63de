import { count, text, type FieldSpec, type SectionSpec } from '../field-types'
import { enteredRow } from './origins'

const places: FieldSpec = { type: 'lines', path: 'fields', label: 'belongs to the fields', help: 'One place per line, such as core.gap.' }

export const notesSection: SectionSpec = {
  key: 'notes',
  title: 'Notes, tolerances',
  places: ['notes', 'tolerances', 'revisions'],
  parts: [
    {
      kind: 'rows',
      rows: {
        path: 'notes',
        title: 'Notes',
        one: 'note',
        stated: true,
        ordered: true,
        empty: 'No note.',
        columns: [
          { header: 'No.', field: () => count('number', 'Number', { min: 1, max: 999 }), figure: true },
          { header: 'Text', field: () => text('text', 'Text', { long: true, maximum: 4000 }), wide: true },
        ],
        more: () => [places],
        add: [{ label: 'Add a note', row: ({ freeId, rows }) => ({ ...enteredRow(freeId('n')), number: rows.length + 1, text: '', fields: [] }) }],
      },
    },
    {
      kind: 'stated',
      title: 'Tolerance block',
      fields: [
        text('tolerances.general', 'General'),
        text('tolerances.angular', 'Angular'),
        text('tolerances.pins', 'Pins'),
        text('tolerances.electrical', 'Electrical rows without a tolerance'),
      ],
    },
    {
      kind: 'rows',
      rows: {
        path: 'revisions',
        title: 'Revision block, old → new',
        one: 'revision entry',
        stated: false,
        empty: 'The first release has no predecessor.',
        columns: [
          { header: 'Revision', field: () => text('revision', 'Revision') },
          { header: 'Date', field: () => text('date', 'Date') },
          { header: 'Reason', field: () => text('reason', 'Reason'), wide: true },
        ],
        more: () => [
          { type: 'changes', path: 'changes', label: 'what changed', help: 'One change per line: field: old → new.' },
          text('effect', 'effect on stock and samples'),
          text('zones', 'zones'),
          text('by', 'by'),
          text('checkedBy', 'checked by'),
          text('approvedBy', 'approved by'),
        ],
        add: [{ label: 'Add an entry', row: () => ({ revision: '', date: '', zones: '', changes: [], reason: '', effect: '', by: '', checkedBy: '', approvedBy: '' }) }],
      },
    },
  ],
}

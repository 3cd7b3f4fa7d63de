import { STATUS_WORDS } from '#shared/drawing/sheets/words'
import { choice, plainly, text, words, type SectionSpec } from '../field-types'
import { enteredRow } from './origins'

const { draft: _draft, 'in-check': _inCheck, ...documentStatuses } = STATUS_WORDS

export const titleSection: SectionSpec = {
  key: 'title',
  title: 'Title block',
  places: ['title', 'contract'],
  parts: [
    {
      kind: 'plain',
      title: 'Contract',
      fields: [choice('contract', 'The vendor builds', [{ value: 'build-to-print', label: 'to print: this drawing fixes the construction' }, { value: 'build-to-performance', label: 'to performance: this drawing fixes the limits' }])],
    },
    {
      kind: 'stated',
      title: 'Identification (ISO 7200)',
      fields: [
        text('title.legalOwner', 'Legal owner'),
        text('title.partNumber', 'Part number', { help: 'ISO 7200 recommends at most 16 characters.', maximum: 40 }),
        text('title.drawingNumber', 'Drawing number', { help: 'Where it differs from the part’s.' }),
        text('title.title', 'Title', { maximum: 200 }),
        text('title.supplementaryTitle', 'Supplementary title'),
        text('title.documentType', 'Document type'),
        choice('title.documentStatus', 'Document status', words(documentStatuses)),
        text('title.responsibleDepartment', 'Responsible department'),
        text('title.technicalReference', 'Technical reference'),
        text('title.classification', 'Classification'),
        text('title.languageCode', 'Language', { help: 'ISO 639-1, such as en.' }),
        text('title.confidentiality', 'Confidentiality line', { long: true }),
      ],
    },
    {
      kind: 'stated',
      title: 'Sheet',
      fields: [
        choice('title.paperSize', 'Sheet size (ISO 5457)', plainly('A3', 'A4')),
        choice('title.projection', 'Projection (ISO 5456-2)', plainly('first-angle', 'third-angle')),
      ],
    },
    {
      kind: 'rows',
      rows: {
        path: 'title.relatedDocuments',
        title: 'Related documents',
        one: 'related document',
        stated: true,
        rare: true,
        empty: 'None named: footprint, safety report, test fixture.',
        columns: [
          { header: 'Kind', field: () => choice('kind', 'Kind', plainly('footprint', 'safety-report', 'test-fixture', 'other')) },
          { header: 'Number', field: () => text('number', 'Number') },
          { header: 'Title', field: () => text('title', 'Title'), wide: true },
        ],
        more: () => [],
        add: [{ label: 'Add a document', row: ({ freeId }) => ({ ...enteredRow(freeId('d')), kind: 'footprint', number: '', title: '' }) }],
      },
    },
  ],
}

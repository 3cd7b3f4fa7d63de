import { CHARACTERISTIC_WORDS, EXTENT_WORDS } from '#shared/drawing/sheets/words'
import { choice, count, figure, plainly, text, words, yesNo, type FieldSpec, type Row, type SectionSpec } from '../field-types'
import { enteredRow } from './origins'

/** Limits are entered in the unit people say; ratios and millimetres as they are. */
const ENTRY_UNITS: Readonly<Record<string, string>> = { H: 'µH', Ω: 'mΩ', V: 'V', A: 'mA', Hz: 'kHz', F: 'pF', mm: 'mm', '1': '' }
const entryUnit = ({ unit, characteristic }: Row) => (characteristic === 'insulation-resistance' ? 'MΩ' : (ENTRY_UNITS[String(unit)] ?? ''))
const limit = (path: string, label: string) => (row: Row) => figure(path, label, entryUnit(row), { optional: true })

const terminals = (path: string, label: string): FieldSpec => ({ type: 'terminals', path, label })

export const testsSection: SectionSpec = {
  key: 'tests',
  title: 'Tests',
  places: ['tests'],
  parts: [
    {
      kind: 'rows',
      rows: {
        path: 'tests',
        title: 'Test table',
        one: 'test row',
        stated: true,
        ordered: true,
        empty: 'No test row yet.',
        columns: [
          { header: 'Characteristic', field: () => choice('characteristic', 'Characteristic', words(CHARACTERISTIC_WORDS)), wide: true },
          { header: 'Symbol', field: () => text('symbol', 'Symbol', { maximum: 40 }) },
          { header: 'Minimum', field: limit('minimum', 'Minimum'), figure: true },
          { header: 'Nominal', field: limit('nominal', 'Nominal'), figure: true },
          { header: 'Maximum', field: limit('maximum', 'Maximum'), figure: true },
          { header: 'Extent', field: () => choice('extent', 'Extent', words(EXTENT_WORDS)) },
        ],
        more: () => [
          count('number', 'number', { min: 1, max: 999 }),
          choice('unit', 'unit of the limits', plainly('H', 'Ω', 'V', 'A', 'Hz', 'F', 'mm', '1')),
          { type: 'winding', path: 'windingId', label: 'winding', optional: true },
          { type: 'boundary', path: 'boundaryId', label: 'boundary', optional: true },
          terminals('drivenTerminals', 'driven terminals'),
          { type: 'terminal-groups', path: 'shortedTerminals', label: 'shorted together', help: 'Groups apart by a semicolon: 3, 4; 7, 8.' },
          terminals('openTerminals', 'open terminals'),
          text('method', 'method'),
          text('instrumentClass', 'instrument class'),
          figure('frequencyHz', 'frequency', 'kHz', { optional: true, min: 0 }),
          figure('levelV', 'level', 'V', { optional: true, min: 0 }),
          figure('biasA', 'd.c. bias', 'A', { optional: true }),
          figure('temperatureC', 'temperature', '°C', { optional: true }),
          figure('acceptableQualityLimit', 'acceptable quality limit', '', { suffix: '%', optional: true }),
          yesNo('criticalToQuality', 'critical to quality'),
          choice('record', 'record', [{ value: 'reading', label: 'the reading' }, { value: 'pass-fail', label: 'pass or fail' }]),
          text('reaction', 'reaction on failure'),
        ],
        add: [
          {
            label: 'Add a test row',
            row: ({ freeId, rows, windingIds }) => ({
              ...enteredRow(freeId('t')), number: rows.length + 1, characteristic: 'inductance', symbol: `X${rows.length + 1}`, windingId: windingIds[0] ?? null, boundaryId: null,
              drivenTerminals: [], shortedTerminals: [], openTerminals: [], method: '', instrumentClass: '', frequencyHz: null, levelV: null, biasA: null, temperatureC: 25,
              minimum: null, nominal: null, maximum: null, unit: 'H', extent: 'every-part', acceptableQualityLimit: null, criticalToQuality: false, reaction: 'Reject the part', record: 'reading',
            }),
          },
        ],
      },
    },
  ],
}

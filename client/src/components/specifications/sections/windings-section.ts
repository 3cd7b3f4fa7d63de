import { SIDE_WORDS, WIRE_INSULATION_WORDS } from '#shared/drawing/sheets/words'
import { choice, count, figure, group, plainly, reference, text, words, yesNo, type SectionSpec } from '../field-types'
import { enteredRow } from './origins'

export const windingsSection: SectionSpec = {
  key: 'windings',
  title: 'Windings',
  places: ['windings'],
  parts: [
    {
      kind: 'rows',
      rows: {
        path: 'windings',
        title: 'Windings, each from its dotted start',
        one: 'winding',
        stated: true,
        ordered: true,
        empty: 'No winding yet.',
        columns: [
          { header: 'Name', field: () => text('name', 'Name', { maximum: 60 }) },
          { header: 'Start •', field: () => ({ type: 'terminal', path: 'startTerminal', label: 'Start terminal' }), narrow: true },
          { header: 'Finish', field: () => ({ type: 'terminal', path: 'finishTerminal', label: 'Finish terminal' }), narrow: true },
          { header: 'Turns', field: () => figure('turns', 'Turns', '', { min: 0.5, max: 20_000 }), figure: true },
          { header: 'Wire', field: () => reference('wire.wire', 'Wire', 'wire'), wide: true },
          { header: 'Parallel', field: () => count('wire.parallel', 'Wires in parallel', { min: 1, max: 200 }), figure: true },
        ],
        more: () => [
          choice('role', 'role', plainly('primary', 'secondary', 'auxiliary', 'shield', 'reset')),
          choice('side', 'side of the insulation', words(SIDE_WORDS)),
          { type: 'output', path: 'outputId', label: 'feeds output', optional: true },
          choice('wire.insulation', 'wire insulation', words(WIRE_INSULATION_WORDS)),
          figure('wire.thermalClassC', 'wire thermal class', '°C'),
          figure('rmsCurrentA', 'current, rms', 'A', { optional: true, min: 0 }),
          figure('peakCurrentA', 'current, peak', 'A', { optional: true, min: 0 }),
          figure('dcCurrentA', 'current, d.c.', 'A', { optional: true }),
          group('dcResistance', 'DC resistance', [figure('nominalOhm', 'nominal', 'mΩ'), figure('maximumOhm', 'maximum', 'mΩ'), figure('minimumOhm', 'minimum', 'mΩ', { optional: true }), choice('temperatureC', 'at °C', plainly(20, 25)), yesNo('fourTerminal', 'four-terminal')], () => ({ nominalOhm: 0.1, maximumOhm: 0.115, minimumOhm: null, temperatureC: 20, fourTerminal: true })),
          group('wire.certificate', 'Wire certificate', [text('standard', 'standard'), text('number', 'number'), figure('peakVoltageV', 'peak voltage', 'V', { optional: true }), figure('maximumFrequencyHz', 'up to frequency', 'kHz', { optional: true })], () => ({ standard: 'IEC 62368-1, Annex J', number: '', peakVoltageV: null, maximumFrequencyHz: null })),
          group('wire.lay', 'Lay of the litz', [figure('lengthMm', 'length', 'mm'), choice('direction', 'direction', plainly('S', 'Z'))], () => ({ lengthMm: 20, direction: 'S' })),
        ],
        add: [
          {
            label: 'Add a winding',
            row: ({ freeId, rows, first }) => {
              const wire = first('wire')
              const isFirst = rows.length === 0
              return wire && {
                ...enteredRow(freeId('w')), name: isFirst ? 'P' : `S${rows.length}`, role: isFirst ? 'primary' : 'secondary', side: isFirst ? 'primary' : 'secondary', outputId: null,
                startTerminal: '', finishTerminal: '', turns: 10, wire: { wire, parallel: 1, thermalClassC: 155, insulation: 'enamel-grade-1', certificate: null, lay: null },
                rmsCurrentA: null, peakCurrentA: null, dcCurrentA: null, dcResistance: null,
              }
            },
          },
        ],
      },
    },
  ],
}

import { choice, figure, group, plainly, reference, text, yesNo, type SectionSpec } from '../field-types'
import { enteredRow } from './origins'

export const formerSection: SectionSpec = {
  key: 'former',
  title: 'Former & pins',
  places: ['former'],
  parts: [
    {
      kind: 'stated',
      title: 'Coil former',
      fields: [
        reference('former.former', 'Coil former', 'former'),
        text('former.toolNumber', 'Tool number'),
        text('former.material', 'Material'),
        choice('former.plastic', 'Plastic', plainly('thermoset', 'thermoplastic')),
        text('former.flammability', 'Flammability'),
        choice('former.materialGroup', 'Material group', plainly('I', 'II', 'IIIa', 'IIIb')),
        figure('former.relativeTemperatureIndexC', 'Relative temperature index', '°C'),
        text('former.fileNumber', 'File number'),
        choice('former.mounting', 'Mounting', plainly('vertical', 'horizontal')),
      ],
    },
    { kind: 'pins' },
    {
      kind: 'stated',
      title: 'Pins',
      fields: [
        choice('former.pinView', 'View that governs', [{ value: 'top', label: 'top view' }, { value: 'bottom', label: 'bottom view' }], { help: 'Bottom and top confused mirror the part.' }),
        text('former.pinOneMark', 'Pin-1 mark'),
        figure('former.pinPitchMm', 'Pin pitch', 'mm'),
        figure('former.rowSpacingMm', 'Row spacing', 'mm'),
        group('former.pinSection', 'Pin section', [choice('shape', 'shape', plainly('round', 'square')), figure('sizeMm', 'size', 'mm')], () => ({ shape: 'round', sizeMm: 0.6 })),
        figure('former.pinLengthMm', 'Length below seating plane', 'mm'),
        figure('former.standoffMm', 'Standoff', 'mm', { min: 0 }),
        figure('former.truePositionMm', 'True position Ø', 'mm'),
        figure('former.recommendedHoleMm', 'Recommended hole Ø', 'mm'),
        figure('former.coplanarityMm', 'Coplanarity', 'mm'),
      ],
    },
    {
      kind: 'stated',
      title: 'Mechanics',
      fields: [
        group('former.envelope', 'Envelope, maximum', [figure('lengthMm', 'length', 'mm'), figure('widthMm', 'width', 'mm'), figure('heightMm', 'height', 'mm')], () => ({ lengthMm: 30, widthMm: 30, heightMm: 25 }), { help: 'Over solder bumps, tape, varnish and label.' }),
        figure('former.leadSlotWidthMm', 'Lead slot width', 'mm'),
        figure('former.massG', 'Mass of the part', 'g', { help: 'For vibration and for pick and place.' }),
        text('former.fixing', 'Fixing'),
      ],
    },
    {
      kind: 'rows',
      rows: {
        path: 'former.flyingLeads',
        title: 'Flying leads',
        one: 'flying lead',
        stated: true,
        rare: true,
        empty: 'None.',
        columns: [
          { header: 'Name', field: () => text('name', 'Name', { maximum: 12 }) },
          { header: 'Wire style', field: () => text('wireStyle', 'Wire style'), wide: true },
          { header: 'Length', field: () => figure('lengthMm', 'Length', 'mm'), figure: true },
        ],
        more: () => [text('measuredFrom', 'measured from'), figure('stripLengthMm', 'strip length', 'mm', { min: 0 }), yesNo('tinned', 'tinned'), text('colour', 'colour'), text('sleeve', 'sleeve'), text('termination', 'termination')],
        add: [{ label: 'Add a lead', row: ({ freeId, rows }) => ({ ...enteredRow(freeId('fl')), name: `FL${rows.length + 1}`, wireStyle: '', lengthMm: 100, measuredFrom: 'the former’s edge', stripLengthMm: 5, tinned: true, colour: '', sleeve: '', termination: '' }) }],
      },
    },
  ],
}

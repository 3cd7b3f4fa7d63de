import { choice, count, figure, group, plainly, text, yesNo, type FieldSpec, type SectionSpec } from '../field-types'

const EXTENTS = [{ value: 'coil-only', label: 'coil only' }, { value: 'coil-and-core', label: 'coil and core' }]
const asWritten = (...values: readonly string[]) => values.map((value) => ({ value, label: value }))

export const impregnationSection: SectionSpec = {
  key: 'impregnation',
  title: 'Impregnation',
  places: ['impregnation'],
  parts: [
    {
      kind: 'stated',
      title: 'Impregnation, encapsulation: say “none” when none',
      fields: [
        choice('impregnation.process', 'Process', plainly('none', 'dip', 'vacuum', 'potting')),
        text('impregnation.resin', 'Resin'),
        figure('impregnation.thermalClassC', 'Thermal class', '°C'),
        text('impregnation.compatibility', 'Compatibility with the wire'),
        text('impregnation.pressureCycle', 'Pressure cycle'),
        group('impregnation.bake', 'Bake', [figure('temperatureC', 'temperature', '°C'), figure('durationS', 'duration', 's')], () => ({ temperatureC: 120, durationS: 7200 })),
        choice('impregnation.extent', 'Extent', EXTENTS),
        yesNo('impregnation.pinsMasked', 'Pins masked and clean'),
        figure('impregnation.fillLevelMm', 'Fill level', 'mm'),
      ],
    },
  ],
}

const marking: readonly FieldSpec[] = [
  { type: 'lines', path: 'marking.content', label: 'Content', help: 'One item per line.' },
  text('marking.position', 'Position'),
  choice('marking.dateCode', 'Date code', asWritten('YYWW', 'IEC 60062')),
  yesNo('marking.revisionOnPart', 'Revision on the part'),
  text('marking.safetyMark', 'Safety mark'),
  choice('marking.machineReadable', 'Machine-readable', asWritten('none', 'ISO/IEC 16022', 'ISO/IEC 18004')),
  text('marking.legibleAfter', 'Legible after'),
]

const packing: readonly FieldSpec[] = [
  choice('packing.form', 'Form', plainly('tray', 'tube', 'tape-and-reel', 'box')),
  count('packing.piecesPerPack', 'Pieces per pack', { min: 1 }),
  count('packing.piecesPerCarton', 'Pieces per carton', { min: 1 }),
  text('packing.pinProtection', 'Pin protection'),
  text('packing.orientation', 'Orientation'),
  text('packing.cartonLabel', 'Carton label'),
  text('packing.moistureLevel', 'Moisture level'),
  text('packing.storage', 'Storage'),
  text('packing.solderability', 'Solderability'),
  choice('packing.solderProfile', 'Solder profile', plainly('wave', 'reflow', 'hand')),
  yesNo('packing.washable', 'Washable'),
]

const compliance: readonly FieldSpec[] = [
  text('compliance.rohs', 'RoHS'),
  group('compliance.rohsExemption', 'RoHS exemption', [text('exemption', 'exemption'), { type: 'date', path: 'expiresOn', label: 'expires on' }], () => ({ exemption: '', expiresOn: '2030-12-31' })),
  text('compliance.reachListDate', 'REACH candidate list of', { help: 'Date of the list that was looked at.' }),
  yesNo('compliance.halogenFree', 'Halogen-free'),
  text('compliance.conflictMinerals', 'Conflict minerals'),
  text('compliance.pfas', 'PFAS'),
  text('compliance.packagingMarks', 'Packaging marks'),
  text('compliance.traceability', 'Traceability'),
  figure('compliance.retentionYears', 'Records kept', '', { suffix: 'years', whole: true, min: 1, max: 100 }),
]

export const deliverySection: SectionSpec = {
  key: 'delivery',
  title: 'Marking, packing',
  places: ['marking', 'packing', 'compliance'],
  parts: [
    { kind: 'stated', title: 'Marking', fields: marking },
    { kind: 'stated', title: 'Packing, storage, soldering', fields: packing },
    { kind: 'stated', title: 'Compliance, traceability', fields: compliance },
  ],
}

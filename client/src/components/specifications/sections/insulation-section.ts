import { INSULATION_WORDS } from '#shared/drawing/sheets/words'
import { choice, count, figure, group, plainly, text, words, yesNo, type SectionSpec } from '../field-types'
import { enteredRow } from './origins'

const polymer = { use: '', material: '', flammability: 'UL 94 V-0', fileNumber: '' }

export const insulationSection: SectionSpec = {
  key: 'insulation',
  title: 'Insulation',
  places: ['insulation'],
  parts: [
    {
      kind: 'stated',
      title: 'Standard and surroundings',
      fields: [
        choice('insulation.productStandard', 'Product standard', ['IEC 62368-1', 'IEC 61558-1', 'IEC 60335-1', 'IEC 60601-1', 'IEC 60664-1'].map((value) => ({ value, label: value }))),
        text('insulation.standardEdition', 'Edition', { help: 'As printed on the copy in use, such as 2018.' }),
        figure('insulation.mainsVoltageV', 'Mains voltage, line to neutral', 'V'),
        choice('insulation.overvoltageCategory', 'Overvoltage category', plainly('I', 'II', 'III', 'IV')),
        choice('insulation.pollutionDegree', 'Pollution degree', plainly(1, 2, 3)),
        figure('insulation.altitudeM', 'Altitude up to', '', { suffix: 'm', min: 0, max: 20_000 }),
        choice('insulation.materialGroup', 'Material group', plainly('I', 'II', 'IIIa', 'IIIb')),
      ],
    },
    {
      kind: 'rows',
      rows: {
        path: 'insulation.boundaries',
        title: 'Boundaries: every pair of sides, and each side with the core',
        one: 'boundary',
        stated: true,
        empty: 'No boundary. The vendor then has to ask what is kept apart, and how.',
        columns: [
          { header: 'Name', field: () => text('name', 'Name', { maximum: 60 }) },
          { header: 'Between', field: () => ({ type: 'end', path: 'between.0', label: 'Between' }) },
          { header: 'and', field: () => ({ type: 'end', path: 'between.1', label: 'and' }) },
          { header: 'Insulation', field: () => choice('insulation', 'Insulation', words(INSULATION_WORDS)) },
          { header: 'Clearance', field: () => figure('clearanceMm', 'Clearance', 'mm', { optional: true, min: 0 }), figure: true },
          { header: 'Creepage', field: () => figure('creepageMm', 'Creepage', 'mm', { optional: true, min: 0 }), figure: true },
        ],
        more: () => [
          choice('meansOfProtection', 'means of protection', [{ value: 'MOOP', label: 'operator (MOOP)' }, { value: 'MOPP', label: 'patient (MOPP)' }], { optional: true, help: 'IEC 60601-1 only.' }),
          figure('workingVoltageVRms', 'working voltage, rms', 'V', { optional: true, min: 0 }),
          figure('recurringPeakV', 'recurring peak', 'V', { optional: true, min: 0 }),
          figure('frequencyHz', 'frequency', 'kHz', { optional: true, min: 0 }),
          figure('distanceThroughInsulationMm', 'distance through insulation', 'mm', { optional: true, min: 0 }),
          count('insulationLayers', 'insulation layers', { optional: true }),
          group(
            'test',
            'Dielectric (hipot) test',
            [figure('voltageV', 'voltage', 'V'), choice('kind', 'kind', [{ value: 'ac-rms', label: 'a.c., rms' }, { value: 'dc', label: 'd.c.' }]), figure('frequencyHz', 'frequency', 'Hz', { min: 0 }), figure('rampS', 'ramp', 's', { min: 0 }), figure('dwellS', 'dwell', 's'), figure('tripA', 'trip current', 'mA'), figure('routineVoltageV', 'on every part: voltage', 'V'), figure('routineDwellS', 'on every part: dwell', 's')],
            () => ({ voltageV: 3000, kind: 'ac-rms', frequencyHz: 50, rampS: 2, dwellS: 60, tripA: 0.005, routineDwellS: 1, routineVoltageV: 3000 }),
          ),
        ],
        add: [{ label: 'Add a boundary', row: ({ freeId }) => ({ ...enteredRow(freeId('i')), name: 'PRI–SEC', between: [{ kind: 'side', side: 'primary' }, { kind: 'side', side: 'secondary' }], insulation: 'reinforced', workingVoltageVRms: null, recurringPeakV: null, frequencyHz: null, clearanceMm: null, creepageMm: null, distanceThroughInsulationMm: null, insulationLayers: null, test: null }) }],
      },
    },
    {
      kind: 'stated',
      title: 'Temperature',
      fields: [
        figure('insulation.systemThermalClassC', 'Class of the insulation system', '°C', { help: 'IEC 60085: as good as the weakest member.' }),
        text('insulation.systemFileNumber', 'System file number'),
        figure('insulation.maximumAmbientC', 'Maximum ambient', '°C'),
        group('insulation.maximumWindingC', 'Maximum winding temperature', [figure('temperatureC', 'temperature', '°C'), choice('method', 'method', plainly('resistance', 'thermocouple'))], () => ({ temperatureC: 110, method: 'resistance' })),
      ],
    },
    {
      kind: 'stated',
      title: 'Further tests and cautions',
      fields: [
        group('insulation.partialDischarge', 'Partial discharge', [yesNo('required', 'required'), figure('extinctionVPeak', 'extinction, peak', 'V', { optional: true }), figure('limitC', 'limit', 'pC', { optional: true }), text('method', 'method')], () => ({ required: false, extinctionVPeak: null, limitC: null, method: 'not required' })),
        group('insulation.impulse', 'Impulse 1.2/50 µs', [figure('voltageV', 'voltage, peak', 'V'), count('shots', 'shots', { min: 1, max: 1000 }), choice('polarity', 'polarity', plainly('both', 'positive', 'negative')), text('where', 'between')], () => ({ voltageV: 4000, shots: 5, polarity: 'both', where: '' })),
        { type: 'lines', path: 'insulation.cautions', label: 'Cautions', help: 'One per line.' },
      ],
    },
    {
      kind: 'rows',
      rows: {
        path: 'insulation.criticalMaterials',
        title: 'Critical materials, for the safety laboratory',
        one: 'critical material',
        stated: true,
        rare: true,
        empty: 'None listed: what the certificate of the part rests on, with maker and certificate.',
        columns: [
          { header: 'Part', field: () => text('part', 'Part'), wide: true },
          { header: 'Maker', field: () => text('maker', 'Maker') },
          { header: 'Type', field: () => text('type', 'Type') },
          { header: 'Rating', field: () => text('rating', 'Rating') },
        ],
        more: () => [text('standard', 'standard'), text('certificate', 'certificate'), { type: 'date', path: 'expiresOn', label: 'certificate expires on', optional: true, help: 'Empty where it has no end.' }],
        add: [{ label: 'Add a critical material', row: ({ freeId }) => ({ ...enteredRow(freeId('cm')), part: '', maker: '', type: '', rating: '', standard: '', certificate: '', expiresOn: null }) }],
      },
    },
    {
      kind: 'rows',
      rows: {
        path: 'insulation.polymers',
        title: 'Polymers',
        one: 'polymer',
        stated: true,
        empty: 'None listed: former, tapes, sleeves, potting.',
        columns: [
          { header: 'Use', field: () => text('use', 'Use') },
          { header: 'Material', field: () => text('material', 'Material') },
          { header: 'Flammability', field: () => text('flammability', 'Flammability') },
          { header: 'File number', field: () => text('fileNumber', 'File number') },
        ],
        more: () => [],
        add: [{ label: 'Add a polymer', row: ({ freeId }) => ({ ...enteredRow(freeId('m')), ...polymer }) }],
      },
    },
  ],
}

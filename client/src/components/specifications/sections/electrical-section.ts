import { TOPOLOGY_WORDS } from '#shared/drawing/sheets/words'
import { choice, figure, group, plainly, text, words, type FieldSpec, type SectionSpec } from '../field-types'
import { enteredRow } from './origins'

const range = (path: string, label: string, unit: string) =>
  group(path, label, [figure('minimum', 'minimum', unit), figure('maximum', 'maximum', unit)], () => ({ minimum: 0, maximum: 0 }))

const winding = (path: string, label: string): FieldSpec => ({ type: 'winding', path, label })
const windings = (path: string, label: string): FieldSpec => ({ type: 'windings', path, label })

const condition: readonly FieldSpec[] = [
  figure('frequencyHz', 'at frequency', 'kHz'),
  figure('levelV', 'level, rms', 'V'),
  figure('temperatureC', 'temperature', '°C'),
  choice('model', 'model', plainly('series', 'parallel')),
]
const newCondition = { frequencyHz: 100e3, levelV: 0.25, temperatureC: 25, model: 'series' }

const capacitance = (path: string, title: string) => ({
  kind: 'rows' as const,
  rows: {
    path,
    title,
    one: 'capacitance limit',
    stated: true,
    rare: true,
    empty: 'No limit.',
    columns: [
      { header: 'Windings', field: () => windings('windingIds', 'Windings'), wide: true },
      { header: 'Maximum', field: () => figure('maximumF', 'Maximum', 'pF'), figure: true },
      { header: 'At', field: () => figure('frequencyHz', 'Frequency', 'kHz'), figure: true },
      { header: 'Terminals tied', field: () => text('terminalsTied', 'Terminals tied'), wide: true },
    ],
    more: () => [],
    add: [{ label: 'Add a limit', row: ({ freeId }: { freeId: (prefix: string) => string }) => ({ ...enteredRow(freeId('c')), windingIds: [], maximumF: 100e-12, frequencyHz: 100e3, terminalsTied: '' }) }],
  },
})

export const electricalSection: SectionSpec = {
  key: 'electrical',
  title: 'Electrical',
  places: ['electrical'],
  parts: [
    {
      kind: 'stated',
      title: 'Use',
      fields: [
        choice('electrical.topology', 'Topology', words(TOPOLOGY_WORDS)),
        range('electrical.switchingFrequencyHz', 'Switching frequency', 'kHz'),
        range('electrical.dutyRatio', 'Duty ratio', ''),
        choice('electrical.polarity', 'Polarity', [{ value: 'as-dotted', label: 'as dotted' }]),
      ],
    },
    {
      kind: 'stated',
      title: 'Inductance',
      fields: [
        group(
          'electrical.inductance',
          'Inductance',
          [winding('windingId', 'of winding'), figure('nominalH', 'nominal', 'µH'), figure('lowerTolerance', 'lower side', '%', { optional: true, min: -1, max: 0 }), figure('upperTolerance', 'upper side', '%', { optional: true, min: 0, max: 10 }), ...condition],
          () => ({ ...newCondition, windingId: 'w1', nominalH: 100e-6, lowerTolerance: -0.1, upperTolerance: 0.1 }),
        ),
      ],
    },
    {
      kind: 'rows',
      rows: {
        path: 'electrical.leakage',
        title: 'Leakage inductance',
        one: 'leakage limit',
        stated: true,
        empty: 'No limit. State which windings are shorted; “the secondary” is ambiguous as soon as there are two.',
        columns: [
          { header: 'Measured at', field: () => winding('windingId', 'Measured at') },
          { header: 'Shorted', field: () => windings('shortedWindingIds', 'Shorted'), wide: true },
          { header: 'Maximum', field: () => figure('maximumH', 'Maximum', 'µH'), figure: true },
        ],
        more: () => [figure('minimumH', 'minimum', 'µH', { optional: true }), ...condition],
        add: [{ label: 'Add a limit', row: ({ freeId, windingIds: [first, ...others] }) => ({ ...enteredRow(freeId('k')), ...newCondition, windingId: first ?? 'w1', shortedWindingIds: others, maximumH: 10e-6, minimumH: null }) }],
      },
    },
    {
      kind: 'rows',
      rows: {
        path: 'electrical.saturation',
        title: 'Inductance at d.c. bias',
        one: 'bias point',
        stated: true,
        empty: 'No bias point. A part that stores energy needs one cold and one hot.',
        columns: [
          { header: 'Winding', field: () => winding('windingId', 'Winding') },
          { header: 'Bias', field: () => figure('currentA', 'Bias', 'A'), figure: true },
          { header: 'At', field: () => figure('temperatureC', 'Temperature', '°C'), figure: true },
          { header: 'Share left', field: () => figure('remainingShare', 'Share of the inductance left', '%', { min: 0, max: 1 }), figure: true },
        ],
        more: () => [choice('method', 'method', [{ value: 'dc-superposition', label: 'd.c. superposition' }, { value: 'pulse', label: 'pulse' }])],
        add: [{ label: 'Add a bias point', row: ({ freeId, windingIds }) => ({ ...enteredRow(freeId('b')), windingId: windingIds[0] ?? 'w1', currentA: 1, temperatureC: 25, remainingShare: 0.9, method: 'dc-superposition' }) }],
      },
    },
    {
      kind: 'rows',
      rows: {
        path: 'electrical.turnsRatios',
        title: 'Turns ratios',
        one: 'turns ratio',
        stated: true,
        empty: 'No ratio stated.',
        columns: [
          { header: 'Winding', field: () => winding('numeratorWindingId', 'Winding') },
          { header: 'to winding', field: () => winding('denominatorWindingId', 'to winding') },
          { header: 'Tolerance ±', field: () => figure('tolerance', 'Tolerance', '%', { min: 0, max: 1 }), figure: true },
        ],
        more: () => [figure('frequencyHz', 'at frequency', 'kHz'), figure('levelV', 'level, rms', 'V')],
        add: [{ label: 'Add a ratio', row: ({ freeId, windingIds: [a, b] }) => ({ ...enteredRow(freeId('r')), numeratorWindingId: a ?? 'w1', denominatorWindingId: b ?? a ?? 'w1', tolerance: 0.01, frequencyHz: 100e3, levelV: 1 }) }],
      },
    },
    {
      kind: 'stated',
      title: 'Further limits',
      fields: [
        group('electrical.selfResonance', 'Self-resonant frequency', [figure('minimumHz', 'minimum', 'kHz'), winding('windingId', 'of winding'), text('terminalsTied', 'terminals tied')], () => ({ minimumHz: 1e6, windingId: 'w1', terminalsTied: '' })),
        group('electrical.voltSecondProduct', 'Volt-second product', [figure('minimumVs', 'minimum', 'µVs'), winding('windingId', 'of winding'), choice('waveform', 'waveform', plainly('unipolar-pulse', 'bipolar-pulse', 'sine')), figure('temperatureC', 'temperature', '°C')], () => ({ windingId: 'w1', minimumVs: 100e-6, waveform: 'unipolar-pulse', temperatureC: 100 })),
      ],
    },
    capacitance('electrical.interwindingCapacitance', 'Interwinding capacitance'),
    capacitance('electrical.windingCapacitance', 'Winding capacitance'),
    {
      kind: 'stated',
      title: 'Kinds of part',
      rare: true,
      fields: [
        group('electrical.currentSense', 'Current sense', [figure('burdenOhm', 'burden', 'Ω'), figure('ratioError', 'ratio error', '%', { min: 0, max: 1 }), figure('droop', 'droop', '%', { min: 0, max: 1 }), figure('bandwidthHz.minimum', 'bandwidth from', 'Hz'), figure('bandwidthHz.maximum', 'bandwidth to', 'kHz'), figure('maximumPrimaryCurrentA', 'primary current, maximum', 'A'), figure('maximumDcA', 'd.c., maximum', 'A', { min: 0 })], () => ({ burdenOhm: 10, ratioError: 0.02, droop: 0.02, bandwidthHz: { minimum: 100, maximum: 500e3 }, maximumPrimaryCurrentA: 10, maximumDcA: 0 })),
        group('electrical.commonMode', 'Common-mode choke', [figure('ratedCurrentA', 'rated current', 'A'), figure('ratedVoltageV', 'rated voltage', 'V'), figure('ratedTemperatureC', 'at', '°C'), figure('differentialLeakageH', 'differential leakage', 'µH', { optional: true }), { type: 'impedance', path: 'impedance', label: 'impedance, at least', help: 'One point per line: 150 kHz: 1000 Ω.' }], () => ({ impedance: [{ frequencyHz: 150e3, minimumOhm: 1000 }, { frequencyHz: 1e6, minimumOhm: 5000 }], differentialLeakageH: null, ratedCurrentA: 1, ratedVoltageV: 250, ratedTemperatureC: 40 })),
        group('electrical.gateDrive', 'Gate drive', [figure('dvDtImmunityVPerS', 'dv/dt immunity', 'V/ns'), figure('propagationDelayS', 'propagation delay', 'ns', { optional: true }), figure('isolationCapacitanceF', 'capacitance across the insulation', 'pF')], () => ({ dvDtImmunityVPerS: 50e9, propagationDelayS: null, isolationCapacitanceF: 10e-12 })),
      ],
    },
  ],
}


import { SIDE_WORDS } from '#shared/drawing/sheets/words'
import type { GateDriveDuty } from '#shared/engine/duties/gate-drive'
import { choice, figure, text, words } from '../../field-types'
import { D, frequency, type DutyForm, type OutputColumn } from './fields'

const DRIVES = [{ value: 'unipolar-dc-restored', label: 'unipolar behind a capacitor' }, { value: 'bipolar', label: 'bipolar' }]

const gateColumns: readonly OutputColumn[] = [
  { header: 'Name', field: text('name', 'Name', { maximum: 60 }) },
  { header: 'Gate voltage', field: figure('gateVoltageV', 'Step of the gate voltage', 'V'), figure: true },
  { header: 'Gate charge', field: figure('gateChargeC', 'Gate charge for that step', 'nC', { min: 0 }), figure: true },
  { header: 'Side', field: choice('side', 'Side of the insulation', words(SIDE_WORDS)) },
]

export const GATE_DRIVE_FORM: DutyForm<GateDriveDuty> = {
  title: 'gate-drive transformer',
  text: 'Pulses across an insulation: volt-seconds, magnetising current, droop and coupling capacitor.',
  supplies: ['dc'],
  outputs: { columns: gateColumns, make: (id, number) => ({ id, name: `G${number}`, side: 'secondary', gateVoltageV: 12, gateChargeC: 50e-9 }) },
  kinds: ({ drive }) => [{ label: 'Drive', place: `${D}.drive`, choices: DRIVES, value: drive, write: (kind) => ({ [`${D}.drive`]: kind, ...(kind === 'bipolar' ? { [`${D}.dutyRatio`]: { minimum: 0.1, maximum: 0.45 } } : {}) }) }],
  fields: ({ drive }) => [
    frequency,
    figure(`${D}.dutyRatio.minimum`, 'Shortest pulse over the period', '%', { min: 0.005, max: drive === 'bipolar' ? 0.5 : 0.995 }),
    figure(`${D}.dutyRatio.maximum`, 'Longest pulse over the period', '%', { min: 0.005, max: drive === 'bipolar' ? 0.5 : 0.995 }),
    figure(`${D}.driverResistanceOhm`, 'Resistance of the driver', 'Ω', { min: 0, help: 'With what stands in series with the primary.' }),
    figure(`${D}.couplingCapacitanceF`, 'Coupling capacitor', 'nF', { optional: true, help: 'In series with the primary.' }),
    figure(`${D}.transitionS`, 'Gate charged within', 'ns'),
    figure(`${D}.magnetisingCurrentA`, 'Magnetising current permitted, peak', 'mA'),
  ],
  start: {
    topology: 'gate-drive', drive: 'unipolar-dc-restored', supply: { kind: 'dc', minimumV: 11, nominalV: 12, maximumV: 13 }, switchingFrequencyHz: 100e3, dutyRatio: { minimum: 0.05, maximum: 0.6 },
    outputs: [{ id: 'o1', name: 'G1', side: 'secondary', gateVoltageV: 12, gateChargeC: 50e-9 }], driverResistanceOhm: 5, couplingCapacitanceF: 220e-9, transitionS: 50e-9, magnetisingCurrentA: 0.05,
  },
}

import type { CurrentSenseDuty } from '#shared/engine/duties/current-sense'
import { figure } from '../../field-types'
import { D, frequency, type DutyForm } from './fields'

const WAVEFORMS = [{ value: 'unipolar-pulse', label: 'pulses of one sign, reset between' }, { value: 'bipolar-pulse', label: 'pulses of either sign' }, { value: 'sine', label: 'sine' }]

export const CURRENT_SENSE_FORM: DutyForm<CurrentSenseDuty> = {
  title: 'current-sense transformer',
  text: 'Ratio, burden, droop, magnetising error, reset and direct component.',
  supplies: [],
  outputs: null,
  kinds: ({ waveform }) => [{ label: 'Current measured', place: `${D}.waveform`, choices: WAVEFORMS, value: waveform, write: (kind) => ({ [`${D}.waveform`]: kind, ...(kind === 'bipolar-pulse' ? { [`${D}.dutyRatio`]: 0.45 } : {}) }) }],
  fields: ({ waveform }) => [
    frequency,
    figure(`${D}.nominalCurrentA`, 'Primary current, nominal peak', 'A'),
    figure(`${D}.maximumCurrentA`, 'Primary current, greatest peak', 'A'),
    ...(waveform === 'sine' ? [] : [figure(`${D}.dutyRatio`, 'Longest pulse over the period', '%', { min: 0.005, max: waveform === 'bipolar-pulse' ? 0.5 : 0.995 })]),
    figure(`${D}.ratio`, 'Secondary over primary turns', ''),
    figure(`${D}.burdenOhm`, 'Burden', 'Ω'),
    figure(`${D}.rectifierDropV`, 'Rectifier drop', 'V', { min: 0, help: '0 without a rectifier.' }),
    ...(waveform === 'unipolar-pulse'
      ? [figure(`${D}.resetVoltageV`, 'Reset voltage at the secondary', 'V', { optional: true, help: 'Empty: nothing resets but the rectifier’s drop.' })]
      : [figure(`${D}.directCurrentA`, 'Direct component of the primary current', 'A', { min: 0 })]),
    figure(`${D}.permittedDroop`, 'Droop permitted over the longest pulse', '%', { min: 0.0001, max: 0.5 }),
    figure(`${D}.permittedError`, 'Magnetising error permitted', '%', { min: 0.0001, max: 0.5 }),
  ],
  start: {
    topology: 'current-sense', waveform: 'unipolar-pulse', switchingFrequencyHz: 100e3, nominalCurrentA: 5, maximumCurrentA: 10, dutyRatio: 0.45, ratio: 100, burdenOhm: 10,
    rectifierDropV: 0.6, resetVoltageV: 10, directCurrentA: 0, permittedDroop: 0.02, permittedError: 0.02,
  },
}

import type { CommonModeChokeDuty } from '#shared/engine/duties/common-mode-choke'
import { figure, type FieldSpec } from '../../field-types'
import { D, frequency, type DutyForm } from './fields'

export const COMMON_MODE_FORM: DutyForm<CommonModeChokeDuty> = {
  title: 'common-mode choke',
  text: 'Two equal windings: impedance against noise, flux of the line current in the leakage.',
  supplies: [],
  outputs: null,
  kinds: () => [],
  fields: () => [
    figure(`${D}.ratedVoltageV`, 'Rated voltage', 'V', { help: 'Rms between the lines; of a d.c. line its voltage.' }),
    figure(`${D}.lineCurrentA`, 'Line current, rms', 'A'),
    figure(`${D}.linePeakA`, 'Line current, peak', 'A', { help: 'Behind a rectifier with a capacitor it lies far above √2 times the rms value.' }),
    figure(`${D}.lineFrequencyHz`, 'Line frequency', 'Hz', { min: 0, max: 1000, help: '0 for d.c.' }),
    frequency,
    { type: 'impedance', path: `${D}.impedance`, label: 'Least impedance against common mode' } satisfies FieldSpec,
  ],
  start: {
    topology: 'common-mode-choke', ratedVoltageV: 230, lineCurrentA: 1, linePeakA: 3, lineFrequencyHz: 50, switchingFrequencyHz: 100e3,
    impedance: [{ frequencyHz: 100e3, minimumOhm: 2000 }, { frequencyHz: 1e6, minimumOhm: 1000 }],
  },
}

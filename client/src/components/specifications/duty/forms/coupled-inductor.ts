import type { CoupledInductorDuty } from '#shared/engine/specification'
import { figure } from '../../field-types'
import { currentLimit, D, efficiency, frequency, switchDrop, type DutyForm } from './fields'

export const COUPLED_INDUCTOR_FORM: DutyForm<CoupledInductorDuty> = {
  title: 'coupled inductor',
  text: 'Two windings on one core that carry direct current.',
  supplies: ['dc'],
  outputs: null,
  kinds: () => [],
  fields: () => [
    figure(`${D}.outputVoltageV`, 'Output voltage', 'V'),
    figure(`${D}.outputDropV`, 'Rectifier drop', 'V', { min: 0 }),
    figure(`${D}.outputCurrentA`, 'Output current', 'A'),
    figure(`${D}.ratio`, 'Second over first winding', '', { help: '1 for a 1:1 part.' }),
    frequency,
    figure(`${D}.rippleRatio`, 'Ripple over mean current', '%', { min: 0.01, max: 2, help: 'Peak to peak, first winding, at minimum input.' }),
    efficiency,
    switchDrop,
    currentLimit,
  ],
  start: { topology: 'coupled-inductor', supply: { kind: 'dc', minimumV: 9, nominalV: 12, maximumV: 18 }, outputVoltageV: 12, outputDropV: 0.5, outputCurrentA: 1, ratio: 1, switchingFrequencyHz: 200e3, rippleRatio: 0.4, efficiency: 0.9, switchDropV: 0.1, currentLimit: null },
}

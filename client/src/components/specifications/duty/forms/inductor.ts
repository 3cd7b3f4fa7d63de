import type { InductorDuty } from '#shared/engine/duties/inductor'
import { figure } from '../../field-types'
import { currentLimit, D, dcSupply, efficiency, frequency, switchDrop, type DutyForm } from './fields'

const USES = [{ value: 'buck', label: 'buck' }, { value: 'boost', label: 'boost' }, { value: 'line-boost', label: 'boost from the line, power factor corrected' }]
const lineSupply = { kind: 'line', minimumV: 85, nominalV: 230, maximumV: 265, lineFrequencyHz: 50 } as const
const NEW_USES = {
  'buck': { supply: dcSupply, outputVoltageV: 5 },
  'boost': { supply: dcSupply, outputVoltageV: 48 },
  'line-boost': { supply: lineSupply, outputVoltageV: 400 },
} as const

export const INDUCTOR_FORM: DutyForm<InductorDuty> = {
  title: 'inductor',
  text: 'One winding that stores energy: buck, boost, or the boost of a power-factor corrector over the half-wave.',
  supplies: ['dc'],
  outputs: null,
  kinds: ({ use }) => [
    { label: 'Use', place: `${D}.use`, choices: USES, value: use, write: (kind) => ({ [`${D}.use`]: kind, ...Object.fromEntries(Object.entries(NEW_USES[kind as keyof typeof NEW_USES]).map(([key, value]) => [`${D}.${key}`, value])) }) },
  ],
  fields: () => [
    figure(`${D}.outputVoltageV`, 'Output voltage', 'V'),
    figure(`${D}.outputDropV`, 'Rectifier drop', 'V', { min: 0 }),
    figure(`${D}.outputCurrentA`, 'Output current at full load', 'A'),
    figure(`${D}.lightLoadCurrentA`, 'Output current at light load', 'A', { min: 0, help: '0 leaves light load out.' }),
    frequency,
    figure(`${D}.rippleRatio`, 'Ripple over mean current', '%', { min: 0.01, max: 2, help: 'Peak to peak, where it is greatest; on the line over the crest’s current.' }),
    efficiency,
    switchDrop,
    currentLimit,
  ],
  start: { topology: 'inductor', use: 'buck', supply: dcSupply, outputVoltageV: 5, outputDropV: 0.5, outputCurrentA: 3, lightLoadCurrentA: 0.3, switchingFrequencyHz: 200e3, rippleRatio: 0.4, efficiency: 0.92, switchDropV: 0.1, currentLimit: null },
}

import type { LlcDuty, ResonantOutput } from '#shared/engine/duties/llc'
import { figure } from '../../field-types'
import { clampSpike, currentLimit, D, efficiency, newOutput, outputColumns, switchDrop, switchRating, type DutyForm } from './fields'
import { rectifierColumn } from './forced'

const newResonant = (id: string, number: number): ResonantOutput => ({ ...newOutput(id, number), rectifier: 'centre-tapped' })

export const LLC_FORM: DutyForm<LlcDuty> = {
  title: 'LLC resonant half-bridge',
  text: 'Series resonance with the magnetising inductance as the third reactance; the frequency regulates.',
  supplies: ['dc', 'mains'],
  outputs: { columns: [...outputColumns, rectifierColumn], make: newResonant },
  kinds: ({ resonantInductor }) => [
    {
      label: 'Resonant inductance', place: `${D}.resonantInductor`, value: resonantInductor,
      choices: [{ value: 'leakage', label: 'leakage of the transformer' }, { value: 'separate', label: 'choke beside it' }],
      write: (kind) => ({ [`${D}.resonantInductor`]: kind }),
    },
  ],
  fields: () => [
    figure(`${D}.resonantInductanceH`, 'Resonant inductance', 'µH'),
    figure(`${D}.resonantCapacitanceF`, 'Resonant capacitor', 'nF'),
    figure(`${D}.minimumFrequencyHz`, 'Least frequency of the controller', 'kHz', { min: 1e3, max: 10e6 }),
    figure(`${D}.maximumFrequencyHz`, 'Greatest frequency of the controller', 'kHz', { min: 1e3, max: 10e6 }),
    efficiency,
    figure(`${D}.deadTimeS`, 'Dead time', 'ns', { min: 0, optional: true }),
    figure(`${D}.bridgeCapacitanceF`, 'Capacitance of the switched node', 'pF', { optional: true, help: 'Both switches and the winding; decides whether they close at zero voltage.' }),
    switchDrop,
    clampSpike,
    switchRating,
    currentLimit,
  ],
  start: {
    topology: 'llc', supply: { kind: 'dc', minimumV: 360, nominalV: 390, maximumV: 410 }, outputs: [{ ...newResonant('o1', 1), voltageV: 24, rectifierDropV: 0.6, fullLoadCurrentA: 10, lightLoadCurrentA: 1 }],
    resonantInductanceH: 60e-6, resonantCapacitanceF: 42e-9, resonantInductor: 'separate', minimumFrequencyHz: 60e3, maximumFrequencyHz: 250e3, efficiency: 0.95, deadTimeS: 300e-9, bridgeCapacitanceF: 300e-12,
    switchDropV: 0.2, currentLimit: null, clampSpikeV: null, switchRatingV: null,
  },
}

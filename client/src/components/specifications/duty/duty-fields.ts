import { SIDE_WORDS } from '#shared/drawing/sheets/words'
import type { Duty, RequirementSheet } from '#shared/engine/specification'
import { choice, figure, group, text, words, type FieldSpec } from '../field-types'

const D = 'requirement.duty'
const frequency = figure(`${D}.switchingFrequencyHz`, 'Switching frequency', 'kHz', { min: 1e3, max: 10e6 })
const efficiency = figure(`${D}.efficiency`, 'Efficiency at full load', '%', { min: 0.06, max: 1 })
const switchDrop = figure(`${D}.switchDropV`, 'Drop of the closed switch', 'V', { min: 0, help: 'With its sense resistor, at full load.' })
const currentLimit = group(
  `${D}.currentLimit`,
  'Current limit',
  [figure('nominalA', 'nominal', 'A'), figure('tolerance', 'tolerance ±', '%', { min: 0, max: 1 }), figure('delayS', 'delay', 'ns', { min: 0 })],
  () => ({ nominalA: 2, tolerance: 0.08, delayS: 200e-9 }),
  { optional: true, help: 'With its tolerance and delay it decides the peak flux.' },
)

const volts = (of: string): FieldSpec[] => [
  figure(`${D}.supply.minimumV`, `${of}, minimum`, 'V'),
  figure(`${D}.supply.nominalV`, `${of}, nominal`, 'V'),
  figure(`${D}.supply.maximumV`, `${of}, maximum`, 'V'),
]

/** The input side, by the kind of supply. */
export function supplyFields(duty: Duty): FieldSpec[] {
  if (duty.supply.kind === 'dc') return volts('Input, d.c.')
  return [
    ...volts('Mains, rms'),
    figure(`${D}.supply.lineFrequencyHz`, 'Line frequency', 'Hz', { min: 16, max: 400 }),
    figure(`${D}.supply.bulkCapacitanceF`, 'Bulk capacitor', 'µF', { help: 'The least that is left by tolerance and age.' }),
    figure(`${D}.supply.conductionTimeS`, 'Bridge conducts for', 'ms', { min: 0, help: 'In each half cycle.' }),
  ]
}

export function converterFields(duty: Duty): FieldSpec[] {
  if (duty.topology === 'coupled-inductor') {
    return [
      figure(`${D}.outputVoltageV`, 'Output voltage', 'V'),
      figure(`${D}.outputDropV`, 'Rectifier drop', 'V', { min: 0 }),
      figure(`${D}.outputCurrentA`, 'Output current', 'A'),
      figure(`${D}.ratio`, 'Second over first winding', '', { help: '1 for a 1:1 part.' }),
      frequency,
      figure(`${D}.rippleRatio`, 'Ripple over mean current', '%', { min: 0.01, max: 2, help: 'Peak to peak, first winding, at minimum input.' }),
      efficiency,
      switchDrop,
      currentLimit,
    ]
  }
  return [
    frequency,
    ...conductionFields(duty.conduction.kind),
    efficiency,
    figure(`${D}.maximumDutyRatio`, 'Largest duty ratio', '%', { min: 0.03, max: 0.97, help: 'At minimum input; gives the ratio unless the reflected voltage is stated.' }),
    figure(`${D}.reflectedVoltageV`, 'Reflected voltage', 'V', { optional: true }),
    switchDrop,
    figure(`${D}.clampSpikeV`, 'Turn-off spike over input and reflected voltage', 'V', { optional: true, min: 0 }),
    figure(`${D}.switchRatingV`, 'Rated voltage of the switch', 'V', { optional: true }),
    currentLimit,
  ]
}

function conductionFields(kind: 'discontinuous' | 'boundary' | 'continuous'): FieldSpec[] {
  if (kind === 'boundary') return []
  if (kind === 'discontinuous') return [figure(`${D}.conduction.idleShare`, 'Share of the period without current', '%', { min: 0, max: 0.9 })]
  return [figure(`${D}.conduction.rippleRatio`, 'Ripple over mean on-time current', '%', { min: 0.01, max: 2 })]
}

export const surroundingFields: readonly FieldSpec[] = [
  figure('requirement.ambientC', 'Air around the part', '°C', { min: -60, max: 200, help: 'Neighbours’ heat included.' }),
  figure('requirement.permittedRiseK', 'Permitted temperature rise', 'K', { optional: true, help: 'Empty leaves it to the thermal class.' }),
  choice('requirement.insulationMethod', 'Primary kept from secondary by', [{ value: 'margin-tape', label: 'margin tape' }, { value: 'triple-insulated-wire', label: 'triple-insulated wire' }, { value: 'functional', label: 'functional insulation only' }]),
  figure('requirement.maximumHeightMm', 'Height over the board', 'mm', { optional: true }),
  figure('requirement.fluxUtilisation', 'Share of saturation that may be used', '%', { min: 0.06, max: 1 }),
  figure('requirement.targetCurrentDensityAPerMm2', 'Current density aimed at', '', { suffix: 'A/mm²', min: 0.2, max: 50 }),
]

/** One output of a flyback. */
export const outputColumns: readonly { header: string; field: FieldSpec; figure?: boolean }[] = [
  { header: 'Name', field: text('name', 'Name', { maximum: 60 }) },
  { header: 'Voltage', field: figure('voltageV', 'Voltage, signed', 'V'), figure: true },
  { header: 'Rectifier', field: figure('rectifierDropV', 'Rectifier drop', 'V', { min: 0 }), figure: true },
  { header: 'Full load', field: figure('fullLoadCurrentA', 'Current at full load', 'A'), figure: true },
  { header: 'Light load', field: figure('lightLoadCurrentA', 'Current at light load', 'A', { min: 0 }), figure: true },
  { header: 'Role', field: choice('role', 'Role', [{ value: 'main', label: 'main' }, { value: 'auxiliary', label: 'auxiliary' }]) },
  { header: 'Side', field: choice('side', 'Side of the insulation', words(SIDE_WORDS)) },
]

export const newOutput = (id: string, number: number) => ({ id, name: `S${number}`, role: 'main', voltageV: 12, rectifierDropV: 0.7, fullLoadCurrentA: 1, lightLoadCurrentA: 0.1, side: 'secondary' })

const surroundings: Omit<RequirementSheet, 'duty'> = { ambientC: 60, permittedRiseK: null, fluxUtilisation: 0.8, targetCurrentDensityAPerMm2: 4.5, insulationMethod: 'functional', maximumHeightMm: null }

export const dcSupply = { kind: 'dc', minimumV: 18, nominalV: 24, maximumV: 32 } as const
export const mainsSupply = { kind: 'mains', minimumV: 90, nominalV: 230, maximumV: 264, lineFrequencyHz: 50, bulkCapacitanceF: 100e-6, conductionTimeS: 3e-3 } as const

/** What a duty sheet begins with; everything is to be overwritten. */
export const newRequirement = (topology: Duty['topology']): RequirementSheet =>
  topology === 'flyback'
    ? {
        ...surroundings,
        duty: {
          topology, supply: dcSupply, outputs: [{ id: 'o1', name: 'S1', role: 'main', voltageV: 5, rectifierDropV: 0.5, fullLoadCurrentA: 1, lightLoadCurrentA: 0.1, side: 'secondary' }],
          switchingFrequencyHz: 100e3, conduction: { kind: 'continuous', rippleRatio: 0.5 }, efficiency: 0.85, maximumDutyRatio: 0.45, reflectedVoltageV: null, switchDropV: 0.2,
          currentLimit: null, clampSpikeV: null, switchRatingV: null,
        },
      }
    : {
        ...surroundings,
        duty: { topology, supply: { kind: 'dc', minimumV: 9, nominalV: 12, maximumV: 18 }, outputVoltageV: 12, outputDropV: 0.5, outputCurrentA: 1, ratio: 1, switchingFrequencyHz: 200e3, rippleRatio: 0.4, efficiency: 0.9, switchDropV: 0.1, currentLimit: null },
      }


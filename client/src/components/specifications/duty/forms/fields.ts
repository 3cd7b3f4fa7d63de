import { SIDE_WORDS } from '#shared/drawing/sheets/words'
import type { Duty, RequirementSheet, Supply } from '#shared/engine/specification'
import { choice, figure, group, text, words, type Choice, type FieldSpec } from '../../field-types'

/** Where the duty lies in the document. */
export const D = 'requirement.duty'

/** A choice of kinds, each with what it writes; the fields below it may change with it. */
export interface KindChoice {
  label: string
  place: string
  choices: readonly Choice[]
  value: string
  write: (kind: string) => Readonly<Record<string, unknown>>
}

export interface OutputColumn {
  header: string
  field: FieldSpec
  figure?: boolean
}

/** How the duty of one topology is entered. */
export interface DutyForm<T extends Duty> {
  /** As it stands in the list of ways in. */
  title: string
  text: string
  /** Kinds of supply to choose between; one kind needs no choice, and none hides the input. */
  supplies: readonly Supply['kind'][]
  outputs: { columns: readonly OutputColumn[]; make: (id: string, number: number) => object } | null
  kinds: (duty: T) => KindChoice[]
  fields: (duty: T) => FieldSpec[]
  /** What a duty sheet begins with; everything is to be overwritten. */
  start: T
  /** Surroundings that begin otherwise than usual. */
  surroundings?: Partial<Omit<RequirementSheet, 'duty'>>
}

export const frequency = figure(`${D}.switchingFrequencyHz`, 'Switching frequency', 'kHz', { min: 1e3, max: 10e6 })
export const efficiency = figure(`${D}.efficiency`, 'Efficiency at full load', '%', { min: 0.06, max: 1 })
export const switchDrop = figure(`${D}.switchDropV`, 'Drop of the closed switch', 'V', { min: 0, help: 'With its sense resistor, at full load.' })
export const clampSpike = figure(`${D}.clampSpikeV`, 'Turn-off spike over the ideal voltage of the open switch', 'V', { optional: true, min: 0 })
export const switchRating = figure(`${D}.switchRatingV`, 'Rated voltage of the switch', 'V', { optional: true })
export const currentLimit = group(
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
export function supplyFields(kind: Supply['kind'] | 'line'): FieldSpec[] {
  if (kind === 'dc') return volts('Input, d.c.')
  if (kind === 'line') return [...volts('Line, rms'), figure(`${D}.supply.lineFrequencyHz`, 'Line frequency', 'Hz', { min: 16, max: 400 })]
  return [
    ...volts('Mains, rms'),
    figure(`${D}.supply.lineFrequencyHz`, 'Line frequency', 'Hz', { min: 16, max: 400 }),
    figure(`${D}.supply.bulkCapacitanceF`, 'Bulk capacitor', 'µF', { help: 'The least that is left by tolerance and age.' }),
    figure(`${D}.supply.conductionTimeS`, 'Bridge conducts for', 'ms', { min: 0, help: 'In each half cycle.' }),
  ]
}

export const outputColumns: readonly OutputColumn[] = [
  { header: 'Name', field: text('name', 'Name', { maximum: 60 }) },
  { header: 'Voltage', field: figure('voltageV', 'Voltage, signed', 'V'), figure: true },
  { header: 'Rectifier', field: figure('rectifierDropV', 'Rectifier drop', 'V', { min: 0 }), figure: true },
  { header: 'Full load', field: figure('fullLoadCurrentA', 'Current at full load', 'A'), figure: true },
  { header: 'Light load', field: figure('lightLoadCurrentA', 'Current at light load', 'A', { min: 0 }), figure: true },
  { header: 'Role', field: choice('role', 'Role', [{ value: 'main', label: 'main' }, { value: 'auxiliary', label: 'auxiliary' }]) },
  { header: 'Side', field: choice('side', 'Side of the insulation', words(SIDE_WORDS)) },
]

export const newOutput = (id: string, number: number) => ({ id, name: `S${number}`, role: 'main' as const, voltageV: 12, rectifierDropV: 0.7, fullLoadCurrentA: 1, lightLoadCurrentA: 0.1, side: 'secondary' as const })

export const dcSupply = { kind: 'dc', minimumV: 18, nominalV: 24, maximumV: 32 } as const
export const mainsSupply = { kind: 'mains', minimumV: 90, nominalV: 230, maximumV: 264, lineFrequencyHz: 50, bulkCapacitanceF: 100e-6, conductionTimeS: 3e-3 } as const

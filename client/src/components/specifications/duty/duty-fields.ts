import type { Duty, RequirementSheet } from '#shared/engine/specification'
import { choice, figure, type FieldSpec } from '../field-types'
import { DUTY_FORMS, DUTY_TOPOLOGIES, formOf } from './forms'
import { D, dcSupply, mainsSupply, supplyFields, type KindChoice } from './forms/fields'

export const surroundingFields: readonly FieldSpec[] = [
  figure('requirement.ambientC', 'Air around the part', '°C', { min: -60, max: 200, help: 'Neighbours’ heat included.' }),
  figure('requirement.permittedRiseK', 'Permitted temperature rise', 'K', { optional: true, help: 'Empty leaves it to the thermal class.' }),
  choice('requirement.insulationMethod', 'Primary kept from secondary by', [{ value: 'margin-tape', label: 'margin tape' }, { value: 'triple-insulated-wire', label: 'triple-insulated wire' }, { value: 'functional', label: 'functional insulation only' }]),
  figure('requirement.maximumHeightMm', 'Height over the board', 'mm', { optional: true }),
  figure('requirement.fluxUtilisation', 'Share of saturation that may be used', '%', { min: 0.06, max: 1 }),
  figure('requirement.targetCurrentDensityAPerMm2', 'Current density aimed at', '', { suffix: 'A/mm²', min: 0.2, max: 50 }),
]

const surroundings: Omit<RequirementSheet, 'duty'> = { ambientC: 60, permittedRiseK: null, fluxUtilisation: 0.8, targetCurrentDensityAPerMm2: 4.5, insulationMethod: 'functional', maximumHeightMm: null }

/** What a requirement sheet of a topology begins with; everything is to be overwritten. */
export function newRequirement(topology: Duty['topology']): RequirementSheet {
  const { start, surroundings: own } = DUTY_FORMS[topology]
  return { ...surroundings, ...own, duty: start }
}

const SUPPLY_LABELS = { dc: 'd.c. range', mains: 'mains with bulk capacitor' } as const
const NEW_SUPPLIES = { dc: dcSupply, mains: mainsSupply } as const

/** The choice of the kind of supply; null where there is none to choose. Into the mains belongs an insulation that protects; a person may still choose otherwise. */
export function supplyChoice({ duty, insulationMethod }: RequirementSheet): KindChoice | null {
  const { supplies } = formOf(duty)
  if (supplies.length < 2 || !('supply' in duty)) return null
  return {
    label: 'Supply',
    place: `${D}.supply`,
    choices: supplies.map((kind) => ({ value: kind, label: SUPPLY_LABELS[kind] })),
    value: duty.supply.kind,
    write: (kind) => ({
      [`${D}.supply`]: NEW_SUPPLIES[kind as keyof typeof NEW_SUPPLIES],
      ...(kind === 'mains' && insulationMethod === 'functional' ? { 'requirement.insulationMethod': 'triple-insulated-wire' } : {}),
    }),
  }
}

/** Fields of the input side. */
export const inputFields = (duty: Duty): FieldSpec[] => ('supply' in duty ? supplyFields(duty.supply.kind) : [])

/** Every field that the duty of any topology can have, for the words of its place. */
export const allDutyFields = (): FieldSpec[] => [
  ...supplyFields('mains'),
  ...DUTY_TOPOLOGIES.flatMap((topology) => {
    const { start } = DUTY_FORMS[topology]
    return formOf(start as Duty).fields(start as Duty)
  }),
  ...surroundingFields,
]

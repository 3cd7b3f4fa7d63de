import { blankSpecification, DEFAULT_PREFERENCES, type ProposalPreferences } from '#shared/engine/index'
import type { Duty, RequirementSheet, SpecificationDocument, Stated } from '#shared/engine/specification'
import { newRequirement } from './duty-fields'
import { DUTY_TOPOLOGIES } from './forms'

/** What is typed before there is a document. */
export interface NewSpecification {
  partNumber: string
  title: string
  way: Duty['topology'] | 'direct'
  /** One sheet per topology, so that looking at another one loses nothing. */
  sheets: Record<Duty['topology'], RequirementSheet>
  productStandard: ProposalPreferences['productStandard']
  standardEdition: string
  wireSystem: ProposalPreferences['wireSystem']
  surroundings: NonNullable<ProposalPreferences['surroundings']>
}

export const newSpecification = (): NewSpecification => ({
  partNumber: '',
  title: '',
  way: 'flyback',
  sheets: Object.fromEntries(DUTY_TOPOLOGIES.map((topology) => [topology, newRequirement(topology)])) as NewSpecification['sheets'],
  productStandard: DEFAULT_PREFERENCES.productStandard,
  standardEdition: DEFAULT_PREFERENCES.standardEdition,
  wireSystem: DEFAULT_PREFERENCES.wireSystem,
  surroundings: { overvoltageCategory: 'II', pollutionDegree: 2, altitudeM: 2000 },
})

/** The sheet of the way chosen; a draft kept from before a topology existed has none of it yet. */
export const requirementOf = ({ way, sheets }: NewSpecification): RequirementSheet | null => (way === 'direct' ? null : (sheets?.[way] ?? newRequirement(way)))

export const preferencesOf = ({ productStandard, standardEdition, wireSystem, surroundings }: NewSpecification): Partial<ProposalPreferences> => ({ productStandard, standardEdition, wireSystem, surroundings })

const entered = (field: Stated<string>, value: string): Stated<string> => ({ ...field, value, origin: { kind: 'entered' } })

/** The document with who owns it and what it is called. */
export function named(document: SpecificationDocument, { partNumber, title }: Pick<NewSpecification, 'partNumber' | 'title'>, legalOwner: string): SpecificationDocument {
  const block = document.specification.title
  return {
    ...document,
    specification: {
      ...document.specification,
      title: { ...block, legalOwner: entered(block.legalOwner, legalOwner), partNumber: entered(block.partNumber, partNumber.trim()), title: entered(block.title, title.trim()) },
    },
  }
}

export const blankDocument = (): SpecificationDocument => ({ specification: blankSpecification(), requirement: null })

import { isWithin } from '../document-paths'
import type { SectionSpec } from '../field-types'
import { coreSection } from './core-section'
import { electricalSection } from './electrical-section'
import { deliverySection, impregnationSection } from './finish-sections'
import { formerSection } from './former-section'
import { insulationSection } from './insulation-section'
import { notesSection } from './notes-section'
import { sequenceSection } from './sequence-section'
import { testsSection } from './tests-section'
import { titleSection } from './title-section'
import { windingsSection } from './windings-section'

const requirementSection: SectionSpec = { key: 'requirement', title: 'Requirement', places: ['requirement'], parts: [{ kind: 'requirement' }] }

/** Everything that a winding specification says, in the order in which it is thought out. */
export const SECTIONS: readonly SectionSpec[] = [
  titleSection,
  requirementSection,
  electricalSection,
  coreSection,
  formerSection,
  windingsSection,
  sequenceSection,
  insulationSection,
  impregnationSection,
  deliverySection,
  testsSection,
  notesSection,
]

/** The section that a place belongs to. */
export const sectionOf = (place: string): SectionSpec => SECTIONS.find(({ places }) => places.some((beginning) => isWithin(place, beginning))) ?? titleSection

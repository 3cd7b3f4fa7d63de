import { isWithin } from './document-paths'
import type { FieldSpec, SectionPart } from './field-types'
import { allDutyFields } from './duty/duty-fields'
import { SECTIONS, sectionOf } from './sections'


const fieldsOf = (part: SectionPart): readonly FieldSpec[] => (part.kind === 'stated' || part.kind === 'plain' ? part.fields : [])
const FIELDS = [...SECTIONS.flatMap(({ parts }) => parts.flatMap(fieldsOf)), ...allDutyFields()]
const TABLES = SECTIONS.flatMap(({ parts }) => parts.flatMap((part) => (part.kind === 'rows' ? [part.rows] : [])))

/** Where a place lies, in the words of the form: `Windings › winding 2`. */
export function placeWords(place: string): string {
  const section = sectionOf(place).title
  const field = FIELDS.find(({ path }) => isWithin(place, path))
  if (field) return `${section} › ${field.label}`
  const table = TABLES.find(({ path }) => isWithin(place, path))
  const index = table && Number(place.slice(table.path.length + 1).split('.')[0])
  if (!table) return section
  if (Number.isInteger(index) && place !== table.path) return `${section} › ${table.one} ${index! + 1}`
  return sectionOf(place).parts.length === 1 ? section : `${section} › ${table.title.split(/[,:]/)[0]}`
}

import { describe, expect, it } from 'vitest'
import { windingSpecificationSchema } from '#shared/contracts/specification-document'
import { blankSpecification } from '#shared/engine/index'
import { fullSpecification } from '../../../../../tests/support/full-specification'
import { mainsFlyback, sampleLibrary } from '../../../../../tests/support/sample-specification'
import { freeId, valueAt, withValue } from '../document-paths'
import { firstReference } from '../entries/choice-sources'
import type { FieldSpec, Row, RowsSpec } from '../field-types'
import { placeWords } from '../place-words'
import { SECTIONS } from '.'

type Tree = Record<string, unknown>
const isTree = (value: unknown): value is Tree => typeof value === 'object' && value !== null && !Array.isArray(value)

/** Places of all fields that carry a status, and of all tables. */
function placesIn(tree: Tree, path = ''): { stated: string[]; tables: string[] } {
  const found = { stated: [] as string[], tables: [] as string[] }
  for (const [key, value] of Object.entries(tree)) {
    const place = path === '' ? key : `${path}.${key}`
    if (Array.isArray(value)) found.tables.push(place)
    else if (isTree(value) && 'status' in value && 'origin' in value) found.stated.push(place)
    else if (isTree(value)) {
      const inner = placesIn(value, place)
      found.stated.push(...inner.stated)
      found.tables.push(...inner.tables)
    }
  }
  return found
}

const parts = SECTIONS.flatMap((section) => section.parts)
const fields = parts.flatMap((part) => (part.kind === 'stated' ? [...part.fields] : []))
const tables = parts.flatMap((part) => (part.kind === 'rows' ? [part.rows] : []))
// A document in use has every table, also those that a blank one leaves out.
const document = { ...placesIn(blankSpecification() as unknown as Tree), tables: placesIn(fullSpecification().specification as unknown as Tree).tables.filter((path) => !path.startsWith('revisions.')) }

describe('the sections of the workbench', () => {
  it('have an entry for every field of the document, and only for those', () => {
    expect(fields.map(({ path }) => path).sort()).toEqual(document.stated.sort())
  })

  it('have a table for every table of the document', () => {
    expect([...tables.map(({ path }) => path), 'former.pins'].sort()).toEqual(document.tables.sort())
  })

  it('lead back to a field by its own words', () => {
    expect(placeWords('core.gap.alH')).toBe('Core & gap › AL')
    expect(placeWords('windings.1.turns')).toBe('Windings › winding 2')
    expect(placeWords('requirement.duty.currentLimit')).toBe('Requirement › Current limit')
  })
})

/** Fields in the table and below the row, with the places inside of wholes. */
function leaves(field: FieldSpec, row: Row): string[] {
  if (field.type !== 'group') return [field.path]
  return valueAt(row, field.path) === null ? [field.path] : field.fields.map((inner) => `${field.path}.${inner.path}`)
}
const rowFields = (spec: RowsSpec, row: Row) => [...spec.columns.flatMap(({ field }) => field(row) ?? []), ...spec.more(row)].flatMap((field) => leaves(field, row))

const specification = mainsFlyback().specification as unknown as Tree

describe('rows', () => {
  const filled = tables.flatMap((spec) => ((valueAt(specification, spec.path) ?? []) as Row[]).map((row, index) => ({ spec, row, name: `${spec.path} ${index + 1}` })))

  it.each(filled)('$name: every field of the row can be entered', ({ spec, row }) => {
    const known = new Set(rowFields(spec, row))
    const unreachable = leavesOf(row).filter((place) => !['id', 'status', 'origin', 'kind'].includes(place.split('.')[0]!) && ![...known].some((field) => place === field || place.startsWith(`${field}.`) || field.startsWith(`${place}.`)))
    expect(unreachable).toEqual([])
  })

  const adding = tables.flatMap((spec) => spec.add.map((choice) => ({ spec, choice, name: `${spec.path}: ${choice.label}` })))

  it.each(adding)('$name adds a row that fits the schema', ({ spec, choice }) => {
    const rows = (valueAt(specification, spec.path) ?? []) as Row[]
    const row = choice.row({ rows, freeId: (prefix) => freeId(rows as unknown as { id: string }[], prefix), windingIds: ['w1', 'w2'], boundaryIds: [], first: (kind) => firstReference(sampleLibrary, kind) })
    const next = withValue(structuredClone(specification), spec.path, [...rows, row])
    expect(windingSpecificationSchema.safeParse(next).error?.issues ?? []).toEqual([])
  })
})

function leavesOf(value: unknown, path = ''): string[] {
  if (!isTree(value)) return [path]
  // References and boundary ends are chosen as a whole.
  if ('version' in value || (Object.keys(value)[0] === 'kind' && path !== '')) return [path]
  return Object.entries(value).flatMap(([key, inner]) => leavesOf(inner, path === '' ? key : `${path}.${key}`))
}

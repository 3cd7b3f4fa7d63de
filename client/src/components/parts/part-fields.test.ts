import { describe, expect, it } from 'vitest'
import { PART_KINDS } from '#shared/contracts/part-rows'
import { coreDraftSchema, formerDraftSchema, materialDraftSchema, sleeveDraftSchema, tapeDraftSchema, wireDraftSchema } from '#shared/contracts/part-rows'
import { shownUnit } from '#shared/shown-units'
import type { PlainField } from './field-types'
import { markableFields, partFields } from './part-fields'

const SCHEMAS = { core: coreDraftSchema, former: formerDraftSchema, material: materialDraftSchema, wire: wireDraftSchema, tape: tapeDraftSchema, sleeve: sleeveDraftSchema }
const ENTERED_APART = ['kind', 'id', 'name', 'source', 'edition', 'confidence', 'unverified', 'note']

describe.each(PART_KINDS)('the fields of a %s', (kind) => {
  it('cover the whole row: nothing is stored that no screen shows', () => {
    const shown = new Set([...partFields(kind).map((field) => field.path.split('.')[0]!), ...ENTERED_APART])
    expect(Object.keys(SCHEMAS[kind].shape).filter((key) => !shown.has(key))).toEqual([])
  })

  it('carry units that are known', () => {
    const plain = partFields(kind).flatMap((field): PlainField[] => {
      if (field.type === 'list') return [...field.columns]
      if (field.type === 'variant') return field.forms.flatMap((form) => form.fields)
      return field.type === 'figures' ? [{ type: 'figure', path: field.path, label: field.label, unit: field.unit }] : [field]
    })
    for (const field of plain) if (field.type === 'figure') expect(() => shownUnit(field.unit)).not.toThrow()
  })

  it('are markable once each', () => {
    const paths = markableFields(kind).map((field) => field.path)
    expect(new Set(paths).size).toBe(paths.length)
  })
})

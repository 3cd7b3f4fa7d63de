import { describe, expect, it } from 'vitest'
import { RELEASED_SCHEMA } from '#shared/engine/released'
import { SPECIFICATION_SCHEMA } from '#shared/engine/specification'
import { fullSpecification } from '../../../../../tests/support/full-specification'
import { sampleLibrary } from '../../../../../tests/support/sample-specification'
import { readSpecificationFile } from './read-specification-file'

const FULL = fullSpecification()
const read = (value: unknown) => readSpecificationFile(typeof value === 'string' ? value : JSON.stringify(value), sampleLibrary)
const edited = (change: (specification: typeof FULL.specification) => void): unknown => {
  const copy = structuredClone(FULL.specification)
  change(copy)
  return copy
}
const sentences = (value: unknown) => {
  const result = read(value)
  return result.kind === 'misfits' ? result.misfits.map(({ path, sentence }) => `${path}: ${sentence}`) : ['fits']
}

describe('a specification read from a file', () => {
  it('comes back whole, bare or with its requirement sheet or from a release', () => {
    expect(read(FULL.specification)).toMatchObject({ kind: 'fits', document: { specification: FULL.specification, requirement: null } })
    expect(read(FULL)).toMatchObject({ kind: 'fits', document: FULL })
    expect(read({ schema: RELEASED_SCHEMA, release: {}, engine: '1', library: {}, specification: FULL.specification })).toMatchObject({ kind: 'fits', document: { specification: FULL.specification } })
    expect(read(`\uFEFF${JSON.stringify(FULL.specification)}`).kind).toBe('fits')
  })

  it.each([
    ['an empty file', '  ', /^: The file is empty/],
    ['text', 'Lp 612uH', /^: The file is not JSON: /],
    ['a number', '12', /^: The file holds no object/],
    ['a list', '[]', /^: The file holds no object/],
  ])('says what is wrong with %s', (_, text, expected) => {
    expect(sentences(text)).toEqual([expect.stringMatching(expected)])
  })

  it('lists what does not fit by its path, in sentences, and takes nothing of it', () => {
    const value = edited((it) => {
      Object.assign(it.windings[0]!, { turns: 'ten' })
      Object.assign(it.core, { colour: 'grey' })
      Object.assign(it.former, { massG: undefined })
      Object.assign(it.packing.form, { value: 'bucket' })
      it.windings[1]!.wire.parallel = -3
    })
    expect(sentences(value).sort()).toEqual([
      'core: This program knows no field “colour” here.',
      'former.massG: The field is missing.',
      expect.stringMatching(/^packing\.form\.value: Must be one of “tray”, .*, but “bucket” stands there\.$/),
      'windings.0.turns: Expected a number, but “ten” stands there.',
      'windings.1.wire.parallel: At least one wire; “-3” stands there.',
    ])
  })

  it('tells an older or foreign schema, and what else would not fit', () => {
    const older = edited((it) => { Object.assign(it, { schema: 'dotside/winding-specification/0', tolerances: undefined }) })
    expect(sentences(older)).toEqual([
      `schema: This file follows the schema “dotside/winding-specification/0”; this program reads “${SPECIFICATION_SCHEMA}”.`,
      'tolerances: The field is missing.',
    ])
    expect(sentences({ foo: 1 })[0]).toBe(`schema: This file names no schema; this program reads “${SPECIFICATION_SCHEMA}”.`)
  })

  it('refuses two rows of one id', () => {
    const value = edited((it) => { it.windings[1]!.id = it.windings[0]!.id })
    expect(sentences(value)).toEqual([`windings.1.id: “${FULL.specification.windings[0]!.id}” is the id of row 1 too; each row needs its own.`])
  })

  it('names the library rows that are not there', () => {
    const value = edited((it) => { it.core.core.value = { kind: 'core', id: 'elsewhere-42', version: 3 } })
    expect(read(value)).toMatchObject({ kind: 'fits', missing: ['core elsewhere-42, version 3'] })
  })
})

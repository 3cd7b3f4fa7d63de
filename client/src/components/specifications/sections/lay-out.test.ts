import { describe, expect, it } from 'vitest'
import { windingSpecificationSchema } from '#shared/contracts/specification-document'
import { mainsFlyback, sampleLibrary } from '../../../../../tests/support/sample-specification'
import { BEGINNINGS, plainSequence } from './lay-out'

describe('beginnings of tables', () => {
  const document = mainsFlyback()
  document.specification.sequence = []

  it('lay every winding once, in order, with tape between and outside, in rows that fit the schema', () => {
    const sequence = plainSequence(document, sampleLibrary)!
    const wound = document.specification.windings.filter(({ role }) => role !== 'shield').map(({ id }) => id)
    expect(sequence.flatMap((step) => (step.kind === 'winding' ? [step.windingId] : []))).toEqual(wound)
    expect(sequence).toHaveLength(2 * wound.length)
    expect(sequence.at(-1)).toMatchObject({ kind: 'tape', purpose: 'outer', layers: 2 })
    expect(windingSpecificationSchema.safeParse({ ...document.specification, sequence }).error?.issues ?? []).toEqual([])
  })

  it('ask for windings where there are none', () => {
    expect(BEGINNINGS.sequence!.changes({ ...document, specification: { ...document.specification, windings: [] } }, sampleLibrary)).toBeNull()
  })

  it('propose test rows without taking those that a person entered', () => {
    const [first] = document.specification.tests
    const own = { ...first!, id: 'own', symbol: 'own row', origin: { kind: 'entered' as const } }
    const { tests } = BEGINNINGS.tests!.changes({ ...document, specification: { ...document.specification, tests: [own] } }, sampleLibrary) as { tests: { symbol: string }[] }
    expect(tests.map(({ symbol }) => symbol)).toContain('own row')
    expect(tests.length).toBeGreaterThan(3)
  })
})

import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { shippedLibrary } from '#server/db/seed/parts/library'
import { BUOY_SUPPLY, COUPLED_INDUCTOR, HARBOUR_SUPPLY } from '#server/db/seed/specifications/requirements'
import { requirementSheetSchema, specificationDocumentSchema } from '#shared/contracts/specification-document'
import { evaluate, propose, refresh } from '#shared/engine/index'
import type { Evaluation } from '#shared/engine/evaluation'
import type { RequirementSheet, SpecificationDocument } from '#shared/engine/specification'
import { TRANSFORMER_SHEETS } from './topology-sheets'

/** The same documents in every run; `PROPERTY_SEED` looks at others. */
const SEED = Number(process.env.PROPERTY_SEED ?? 20261201)

const library = shippedLibrary()
const samples = [BUOY_SUPPLY, HARBOUR_SUPPLY, COUPLED_INDUCTOR, ...TRANSFORMER_SHEETS].map((sheet) => propose(sheet, library).document)

type Json = null | boolean | number | string | Json[] | { [key: string]: Json }

/** Paths of everything that a person could change: leaves, and lists to shorten. */
function places(value: Json, path: (string | number)[] = []): (string | number)[][] {
  if (Array.isArray(value)) return [...(value.length > 0 ? [path] : []), ...value.flatMap((entry, index) => places(entry, [...path, index]))]
  if (value !== null && typeof value === 'object') return Object.entries(value).flatMap(([key, entry]) => (key === 'origin' || key === 'status' ? [] : places(entry, [...path, key])))
  return [path]
}

function changed(value: Json, path: readonly (string | number)[], change: (old: Json) => Json): Json {
  const [first, ...rest] = path
  if (first === undefined) return change(value)
  if (Array.isArray(value)) return value.map((entry, index) => (index === first ? changed(entry, rest, change) : entry))
  if (value !== null && typeof value === 'object') return { ...value, [first]: changed(value[first] ?? null, rest, change) }
  return value
}

const NUMBERS = [0, 1, -1, 0.5, 2, 3.7, 17, 1e-300, 1e-12, 1e-3, 1e3, 1e9, 9e14, -9e14]

function mutate(old: Json, choice: number): Json {
  if (Array.isArray(old)) return choice % 3 === 0 ? [] : choice % 3 === 1 ? old.slice(1) : [...old, ...old.slice(0, 1)]
  if (typeof old === 'number') return choice % 20 === 19 ? null : choice % 2 === 0 ? NUMBERS[(choice / 2) % NUMBERS.length]! : old * NUMBERS[choice % NUMBERS.length]!
  if (typeof old === 'string') return ['', 'x', '1', 'w1', 'w2', null][choice % 6]!
  if (typeof old === 'boolean') return !old
  return NUMBERS[choice % NUMBERS.length]!
}

/** The path of the first number that is none, or null. */
function notFinite(value: unknown, path = ''): string | null {
  if (typeof value === 'number') return Number.isFinite(value) ? null : path
  if (value === null || typeof value !== 'object') return null
  for (const [key, entry] of Object.entries(value)) {
    const found = notFinite(entry, `${path}.${key}`)
    if (found !== null) return found
  }
  return null
}

const edit = fc.record({ place: fc.nat(), choice: fc.nat({ max: 10_000 }) })
const edits = fc.record({ sample: fc.nat({ max: samples.length - 1 }), steps: fc.array(edit, { minLength: 1, maxLength: 4 }) })

function edited({ sample, steps }: { sample: number; steps: { place: number; choice: number }[] }): SpecificationDocument | null {
  let document = samples[sample] as unknown as Json
  for (const { place, choice } of steps) {
    const all = places(document)
    document = changed(document, all[place % all.length]!, (old) => mutate(old, choice))
  }
  const parsed = specificationDocumentSchema.safeParse(document)
  return parsed.success ? (parsed.data as SpecificationDocument) : null
}

describe('evaluate on whatever a document may hold', () => {
  it('answers every admitted document with finite figures and never throws', () => {
    let admitted = 0
    fc.assert(
      fc.property(edits, (change) => {
        const document = edited(change)
        if (!document) return
        admitted += 1
        const evaluation: Evaluation = evaluate(document, library, { working: admitted % 4 === 0 })
        expect(notFinite(evaluation)).toBeNull()
      }),
      { numRuns: 300, seed: SEED },
    )
    // A property that admits next to nothing would prove nothing.
    expect(admitted).toBeGreaterThan(80)
  }, 120_000)

  it('refreshes every admitted document into an admitted document', () => {
    fc.assert(
      fc.property(edits, (change) => {
        const document = edited(change)
        if (!document) return
        const again = specificationDocumentSchema.safeParse(refresh(document, library))
        expect(again.success ? [] : again.error.issues.slice(0, 3)).toEqual([])
      }),
      { numRuns: 50, seed: SEED },
    )
  }, 120_000)

  it('proposes for every admitted requirement sheet, or says why not', () => {
    const sheets = [BUOY_SUPPLY, HARBOUR_SUPPLY, COUPLED_INDUCTOR, ...TRANSFORMER_SHEETS]
    fc.assert(
      fc.property(edits, ({ sample, steps }) => {
        let sheet = sheets[sample] as unknown as Json
        for (const { place, choice } of steps) {
          const all = places(sheet)
          sheet = changed(sheet, all[place % all.length]!, (old) => mutate(old, choice))
        }
        const parsed = requirementSheetSchema.safeParse(sheet)
        if (!parsed.success) return
        const { document, findings } = propose(parsed.data as RequirementSheet, library)
        const admitted = specificationDocumentSchema.safeParse(document)
        expect(admitted.success ? [] : admitted.error.issues.slice(0, 3)).toEqual([])
        if (document.specification.windings.length === 0) expect(findings.some(({ severity }) => severity === 'error')).toBe(true)
      }),
      { numRuns: 60, seed: SEED },
    )
  }, 120_000)

  it('answers a library without any row', () => {
    const empty = { cores: [], formers: [], materials: [], wires: [], tapes: [], sleeves: [] }
    for (const document of samples) {
      const evaluation = evaluate(document, empty)
      expect(notFinite(evaluation)).toBeNull()
      expect(evaluation.findings.map(({ code }) => code)).toContain('core-not-in-library')
      expect(evaluation.checks.filter(({ code, state }) => code === 'E01' && state === 'met')).toEqual([])
    }
  })

  it('gives the same answer with and without its working', () => {
    for (const document of samples) {
      const plain = evaluate(document, library)
      const explained = evaluate(document, library, { working: true })
      expect({ ...explained, working: {} }).toEqual(plain)
      expect(Object.keys(explained.working).length).toBeGreaterThan(20)
    }
  })
})

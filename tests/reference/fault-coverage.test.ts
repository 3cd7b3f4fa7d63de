import { shippedLibrary } from '#server/db/seed/parts/library'
import { BUOY_SUPPLY, HARBOUR_SUPPLY } from '#server/db/seed/specifications/requirements'
import { propose, testCoverage } from '#shared/engine/index'
import type { RequirementSheet, SpecificationDocument, TestRow } from '#shared/engine/specification'
import { describe, expect, it } from 'vitest'
import { expectWithin } from './relative'

const library = shippedLibrary()
const drawn = (sheet: RequirementSheet) => propose(sheet, library).document
const buoy = drawn(BUOY_SUPPLY)
const harbour = drawn(HARBOUR_SUPPLY)
const coverages = new Map([[buoy, testCoverage(buoy, library)], [harbour, testCoverage(harbour, library)]])

const edited = (document: SpecificationDocument, edit: (tests: TestRow[]) => TestRow[]): SpecificationDocument => {
  const copy = structuredClone(document)
  copy.specification.tests = edit(copy.specification.tests)
  return copy
}
const without = (characteristic: TestRow['characteristic']) => (tests: TestRow[]) => tests.filter((row) => row.characteristic !== characteristic)
const kindsIn = (coverage: ReturnType<typeof testCoverage>, state: string) => coverage.faults.filter((fault) => fault.state === state).map(({ kind, values }) => `${kind} ${values.winding ?? ''}`.trim())

describe('the proposed test table', () => {
  it.each([['buoy', buoy], ['harbour', harbour]] as const)('finds on every part of the %s supply what a winder gets wrong most', (_, document) => {
    const { faults } = coverages.get(document)!
    const missed = faults.filter(({ kind, state }) => ['one-turn-more', 'one-turn-less', 'reversed-dot', 'missing-gap', 'shorted-turn'].includes(kind) && state !== 'every-part')
    expect(missed.map(({ kind, values }) => [kind, values])).toEqual([])
  })

  it('leaves named what none of its rows finds', () => {
    // Two windings of equal turns and wire on each other's pins are the same part, and a layer of tape less still holds the test voltage.
    expect(kindsIn(coverages.get(buoy)!, 'never')).toEqual(expect.arrayContaining(['swapped-windings S2', 'missing-tape-layer']))
  })

  it('expects readings in the middle of its limits', () => {
    const row = (symbol: string) => coverages.get(buoy)!.rows.find((one) => one.symbol === symbol)!
    const limit = buoy.specification.electrical.inductance.value!
    expectWithin(row('L P').mean!, limit.nominalH, 0.01)
    expect(row('L P').ppk).toBeGreaterThan(1.33)
    expect(row('L P').refusedShare).toBeLessThan(1e-6)
  })
})

describe('what finds a fault', () => {
  it('a turn more or less is the ratio’s, and without ratio rows the secondaries’ turns are found by nothing sure', () => {
    const byRatio = coverages.get(harbour)!.faults.find(({ kind, values }) => kind === 'one-turn-more' && values.winding === 'S1')!
    expect(byRatio.foundBy[0]).toMatchObject({ symbol: 'P:S1', share: 1 })
    const blind = testCoverage(edited(harbour, without('turns-ratio')), library, { kinds: ['one-turn-less'] })
    expect(blind.faults.find(({ kind, values }) => kind === 'one-turn-less' && values.winding === 'AUX')!.state).not.toBe('every-part')
  })

  it('a reversed dot is found by the polarity row alone', () => {
    const blind = testCoverage(edited(harbour, without('polarity')), library, { kinds: ['reversed-dot'] })
    expect(kindsIn(blind, 'never')).toEqual(expect.arrayContaining(['reversed-dot P', 'reversed-dot S1', 'reversed-dot AUX']))
  })

  it('a missing gap is found by the inductance row, and by none without an upper limit', () => {
    const open = testCoverage(edited(harbour, (tests) => tests.map((row) => (row.characteristic === 'inductance' ? { ...row, maximum: null } : row))), library, { kinds: ['missing-gap'] })
    expect(open.faults.find(({ kind }) => kind === 'missing-gap')!.state).not.toBe('every-part')
  })

  it('a wider limit finds no more than a tighter one', () => {
    const share = (factor: number) => {
      const document = edited(buoy, (tests) => tests.map((row) => (row.characteristic === 'inductance' ? { ...row, minimum: row.nominal! * (1 - factor), maximum: row.nominal! * (1 + factor) } : row)))
      const found = testCoverage(document, library, { kinds: ['core-not-seated'] }).faults[0]!.foundBy.find(({ symbol }) => symbol === 'L P')
      return found?.share ?? 0
    }
    expect(share(0.06)).toBeGreaterThan(share(0.1))
    expect(share(0.1)).toBeGreaterThan(share(0.2))
  })

  it('a row that only samples are measured by makes no fault found on every part', () => {
    const sampled = testCoverage(edited(harbour, (tests) => tests.map((row) => ({ ...row, extent: 'sample' as const }))), library, { kinds: ['one-turn-more', 'reversed-dot', 'missing-gap'] })
    expect(sampled.faults.filter(({ state }) => state === 'every-part')).toEqual([])
  })
})

describe('one turn', () => {
  // Source: arithmetic; 1/N for the ratio and (1 + 1/N)² for the inductance.
  it('moves the forecast of ratio and inductance by what arithmetic says', () => {
    const turns = harbour.specification.windings[0]!.turns
    const { rows } = coverages.get(harbour)!
    const ratio = rows.find(({ symbol }) => symbol === 'P:S1')!
    expectWithin(ratio.mean!, turns / harbour.specification.windings.find(({ name }) => name === 'S1')!.turns, 1e-9)
    expect(ratio.deviation! / ratio.mean!).toBeCloseTo(0.001 / 3, 12)
  })
})

it('answers about a document without anything in it', () => {
  const empty = structuredClone(harbour)
  empty.specification.windings = []
  empty.specification.sequence = []
  const { rows, faults } = testCoverage(empty, library)
  expect(rows.every(({ mean }) => mean === null)).toBe(true)
  expect(faults.every(({ foundBy }) => foundBy.every(({ share }) => share >= 0 && share <= 1))).toBe(true)
})

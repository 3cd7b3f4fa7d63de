import { describe, expect, it } from 'vitest'
import type { SpecificationDocument } from '#shared/engine/specification'
import { mainsFlyback, sampleLibrary } from '../../../../../tests/support/sample-specification'
import { changeLines } from './change-words'

const BEFORE = mainsFlyback()
type Specification = SpecificationDocument['specification']

function lines(change: (specification: Specification) => void) {
  const after = structuredClone(BEFORE)
  change(after.specification)
  return changeLines(BEFORE, after, sampleLibrary).map(({ section, what, before, after: now }) => `${section}: ${what}: ${before} → ${now}`)
}

describe('a comparison in words', () => {
  it('names rows by name and id, and figures with their unit', () => {
    const [winding] = BEFORE.specification.windings
    expect(lines((it) => { it.windings[0]!.turns = 41 })).toEqual([`Windings: winding ${winding!.name} [${winding!.id}], Turns: ${winding!.turns} → 41`])
  })

  it('tells which figure inside of a whole changed', () => {
    const before = BEFORE.specification.electrical.inductance.value!
    expect(lines((it) => { it.electrical.inductance.value = { ...before, nominalH: 612e-6, upperTolerance: 0.05 } })).toEqual([
      expect.stringMatching(/^Electrical: Inductance, nominal: .*µH → 612\u00a0µH$/),
      expect.stringMatching(/^Electrical: Inductance, upper side: .*% → 5\u00a0%$/),
    ])
  })

  it('tells a change of how a field binds apart from a change of its value', () => {
    expect(lines((it) => { it.core.gap.alH.status = 'reference'; it.core.gap.alH.origin = { kind: 'entered' } }).map((text) => text.replace(/: mandatory|: reference/, ': x'))).toHaveLength(BEFORE.specification.core.gap.alH.status === 'reference' ? 0 : 1)
  })

  it('tells moved, added and removed rows', () => {
    const sequence = BEFORE.specification.sequence
    const found = lines((it) => {
      const [first, ...rest] = it.sequence
      it.sequence = [...rest.slice(0, -1), first!]
      it.notes.push({ id: 'n99', status: 'mandatory', origin: { kind: 'entered' }, number: 99, text: 'No change without approval.', fields: [] })
    })
    expect(found).toEqual([
      expect.stringContaining(`[${sequence[0]!.id}] moved: position 1 → position ${sequence.length - 1}`),
      expect.stringContaining(`[${sequence.at(-1)!.id}] removed: `),
      expect.stringContaining('note [n99] added:  → Number 99, Text No change without approval.'),
    ])
  })

  it('finds a pin by its number', () => {
    const pin = BEFORE.specification.former.pins[0]!
    expect(lines((it) => { it.former.pins[0] = { ...pin, state: 'missing' } })).toEqual([`Former & pins: pin ${pin.number}, state: ${pin.state} → missing`])
  })

  it('says nothing about equal documents', () => {
    expect(changeLines(BEFORE, structuredClone(BEFORE), sampleLibrary)).toEqual([])
  })
})

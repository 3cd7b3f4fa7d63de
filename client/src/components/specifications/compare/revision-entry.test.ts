import { expect, it } from 'vitest'
import { mainsFlyback, sampleLibrary } from '../../../../../tests/support/sample-specification'
import { withEntry } from './revision-entry'

const BEFORE = mainsFlyback()
const after = structuredClone(BEFORE)
after.specification.windings[0]!.turns = 41
after.requirement!.ambientC = 55

it('writes what changed, old and new, and what it asks, and nothing of the circuit', () => {
  const [entry, ...others] = withEntry([], 'B', BEFORE, after, sampleLibrary)
  const { name, id, turns } = BEFORE.specification.windings[0]!
  expect(others).toEqual([])
  expect(entry).toMatchObject({ revision: 'B', changes: [{ field: `Windings: winding ${name} [${id}], Turns`, before: String(turns), after: '41' }] })
  expect(entry!.effect).toBe('Re-quote: yes; Samples: new samples, first-article report; Safety certification: if volt-seconds or insulation are concerned; Power-supply re-test: yes; Stock: scrap or rework')
})

it('renews its own entry and keeps what was entered by hand beside it', () => {
  const earlier = withEntry([], 'A', BEFORE, BEFORE, sampleLibrary)
  const typed = withEntry(earlier, 'B', BEFORE, after, sampleLibrary).map((entry) => (entry.revision === 'B' ? { ...entry, reason: 'ECO 12', zones: 'B3' } : entry))
  const again = structuredClone(after)
  again.specification.windings[0]!.turns = 42
  const entries = withEntry(typed, 'B', BEFORE, again, sampleLibrary)
  expect(entries.map(({ revision }) => revision)).toEqual(['A', 'B'])
  expect(entries[1]).toMatchObject({ reason: 'ECO 12', zones: 'B3', changes: [{ after: '42' }] })
})

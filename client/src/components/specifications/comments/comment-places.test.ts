import { expect, it } from 'vitest'
import { mainsFlyback } from '../../../../../tests/support/sample-specification'
import { keptPlace, openByPlace, pathOfPlace } from './comment-places'

const { specification } = mainsFlyback()
const [first, second] = specification.windings

it.each(['core.gap.alH', `windings.1.wire.parallel`, 'former.pins.0.state', ''])('keeps “%s” by its row and finds it again', (path) => {
  expect(pathOfPlace(keptPlace(path, specification), specification)).toBe(path)
})

it('finds a place after its row moved, and none when the row is gone', () => {
  const place = keptPlace('windings.1.turns', specification)
  expect(place).toBe(`windings.[${second!.id}].turns`)
  expect(pathOfPlace(place, { ...specification, windings: [second!, first!] })).toBe('windings.0.turns')
  expect(pathOfPlace(place, { ...specification, windings: [first!] })).toBeNull()
})

it('counts open comments at the field and at its row', () => {
  const by = { id: '1', name: 'Eve' }
  const comment = (settled: boolean) => ({ id: '1', place: `windings.[${first!.id}].turns`, text: 'x', by, at: '', settled: settled ? { by, at: '' } : null })
  expect([...openByPlace([comment(false), comment(true)], specification)]).toEqual([['windings.0.turns', 1], ['windings.0', 1]])
})

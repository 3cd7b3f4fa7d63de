import { describe, expect, it } from 'vitest'
import { compareDocuments, movedKeys } from './compare-documents'

const stated = (value: unknown, status = 'mandatory', kind = 'entered') => ({ value, status, origin: { kind } })
const row = (id: string, turns: number) => ({ id, status: 'mandatory', origin: { kind: 'entered' }, turns })

describe('compareDocuments', () => {
  it('names what changed by the identity of the row, wherever it stands', () => {
    expect(compareDocuments({ windings: [row('w1', 1), row('w2', 2)] }, { windings: [row('w3', 3), row('w1', 1), row('w2', 5)] })).toEqual([
      { kind: 'added', path: 'windings.0', key: 'windings.[w3]', before: undefined, after: row('w3', 3) },
      { kind: 'changed', path: 'windings.2.turns', key: 'windings.[w2].turns', before: 2, after: 5 },
    ])
  })

  it('keeps a field with its status together, and does not count where a value came from', () => {
    expect(compareDocuments({ a: stated(1, 'mandatory', 'proposed'), b: stated(1) }, { a: stated(1), b: stated(1, 'reference') })).toEqual([
      { kind: 'changed', path: 'b', key: 'b', before: stated(1), after: stated(1, 'reference') },
    ])
  })

  it('tells a removed row by its old place and a moved one by both positions', () => {
    const changes = compareDocuments({ s: [row('a', 1), row('b', 1), row('c', 1), row('d', 1)] }, { s: [row('d', 1), row('a', 1), row('c', 1)] })
    expect(changes).toMatchObject([{ kind: 'moved', key: 's.[d]', before: 4, after: 1 }, { kind: 'removed', path: 's.1', key: 's.[b]', after: undefined }])
  })

  it('takes a table that one of both does not have as empty', () => {
    expect(compareDocuments({}, { t: [row('a', 1)] })).toMatchObject([{ kind: 'added', key: 't.[a]' }])
  })

  it('finds nothing in equal documents, whatever the order of their keys', () => {
    expect(compareDocuments({ a: { x: 1, y: [2] }, b: 3 }, { b: 3, a: { y: [2], x: 1 } })).toEqual([])
  })
})

it.each([
  ['abc', 'abc', ''],
  ['abc', 'cab', 'c'],
  ['abcd', 'acbd', 'c'],
  ['abcde', 'edcba', 'dcba'],
  ['abc', 'xaybzc', ''],
])('from %s to %s the fewest rows move', (older, newer, moved) => {
  expect(movedKeys([...older], [...newer]).length).toBe(moved.length)
})

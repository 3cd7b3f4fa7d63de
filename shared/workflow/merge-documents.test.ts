import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { mergeDocuments } from './merge-documents'

const stated = (value: unknown, kind = 'entered') => ({ value, status: 'mandatory', origin: { kind } })
const winding = (id: string, turns: number, wire = 'a') => ({ id, status: 'mandatory', origin: { kind: 'entered' }, turns, wire: { wire: { kind: 'wire', id: wire, version: 1 }, parallel: 1 } })
const step = (id: string, windingId: string) => ({ id, kind: 'winding', windingId, turns: 1 })

const BASE = {
  title: { title: stated('T'), owner: stated('O') },
  windings: [winding('w1', 10), winding('w2', 20)],
  sequence: [step('s1', 'w1'), step('s2', 'w2'), step('s3', 'w1')],
  tests: [] as { id: string; windingId: string }[],
}
type Doc = typeof BASE
const edit = (change: (document: Doc) => void): Doc => {
  const copy = structuredClone(BASE)
  change(copy)
  return copy
}
const merge = (mine: Doc, theirs: Doc, choices: [string, 'mine' | 'theirs'][] = []) => mergeDocuments(BASE, mine, theirs, new Map(choices))
const ids = (rows: readonly { id: string }[]) => rows.map(({ id }) => id).join()

describe('mergeDocuments', () => {
  it('takes both when they touch different fields, also of one row', () => {
    const mine = edit((it) => { it.windings[0]!.turns = 11 })
    const theirs = edit((it) => { it.windings[0]!.wire.parallel = 2; it.title.owner = stated('P') })
    const { document, conflicts } = merge(mine, theirs)
    expect(document.windings[0]).toEqual({ ...winding('w1', 11), wire: { ...winding('w1', 11).wire, parallel: 2 } })
    expect(document.title.owner.value).toBe('P')
    expect(conflicts).toEqual([])
  })

  it('asks where both changed one field, and keeps mine until there is an answer', () => {
    const mine = edit((it) => { it.title.title = stated('M') })
    const theirs = edit((it) => { it.title.title = stated('Y') })
    const asked = merge(mine, theirs)
    expect(asked.conflicts).toEqual([{ key: 'title.title', path: 'title.title', kind: 'value', base: stated('T'), mine: stated('M'), theirs: stated('Y') }])
    expect(asked.document.title.title.value).toBe('M')
    expect(merge(mine, theirs, [['title.title', 'theirs']]).document.title.title.value).toBe('Y')
  })

  it('does not mix the fields of rows that moved', () => {
    const mine = edit((it) => { it.windings.reverse() })
    const theirs = edit((it) => { it.windings[1]!.turns = 21 })
    const { document, conflicts } = merge(mine, theirs)
    expect(document.windings).toEqual([winding('w2', 21), winding('w1', 10)])
    expect(conflicts).toEqual([])
  })

  it('never asks for half of a library reference', () => {
    const mine = edit((it) => { it.windings[0]!.wire.wire = { kind: 'wire', id: 'b', version: 1 } })
    const theirs = edit((it) => { it.windings[0]!.wire.wire = { kind: 'wire', id: 'a', version: 2 } })
    expect(merge(mine, theirs).conflicts.map(({ key }) => key)).toEqual(['windings.[w1].wire.wire'])
  })

  it('asks about a row that one removed and the other changed', () => {
    const mine = edit((it) => { it.windings.splice(0, 1) })
    const theirs = edit((it) => { it.windings[0]!.turns = 12 })
    const asked = merge(mine, theirs)
    expect(asked.conflicts).toMatchObject([{ key: 'windings.[w1]', kind: 'row', mine: undefined, theirs: { turns: 12 } }])
    expect(ids(asked.document.windings)).toBe('w2')
    expect(ids(merge(mine, theirs, [['windings.[w1]', 'theirs']]).document.windings)).toBe('w1,w2')
  })

  it('lets a row go that one removed and nobody else touched', () => {
    const mine = edit((it) => { it.sequence.splice(1, 1) })
    const theirs = edit((it) => { it.sequence.push(step('s4', 'w2')) })
    expect(ids(merge(mine, theirs).document.sequence)).toBe('s1,s3,s4')
    expect(ids(merge(theirs, mine).document.sequence)).toBe('s1,s3,s4')
  })

  it('keeps both rows that were added under one id, and what names mine follows it', () => {
    const mine = edit((it) => {
      it.windings.push(winding('w3', 5))
      it.sequence.push(step('s4', 'w3'))
    })
    const theirs = edit((it) => { it.windings.push(winding('w3', 7)) })
    const { document, conflicts } = merge(mine, theirs)
    expect(conflicts).toEqual([])
    expect(document.windings.map(({ id, turns }) => [id, turns])).toEqual(expect.arrayContaining([['w3', 7], ['w4', 5]]))
    expect(document.sequence.at(-1)).toEqual(step('s4', 'w4'))
  })

  it('does not stumble over a field that only one of both has', () => {
    const mine = edit((it) => { it.windings[0]!.turns = 11 })
    const theirs = edit((it) => { Object.assign(it.title, { note: 'theirs' }); Object.assign(it, { extra: [{ id: 'x1' }] }) })
    const { document, conflicts } = merge(mine, theirs)
    expect(conflicts).toEqual([])
    expect(document).toMatchObject({ title: { note: 'theirs' }, extra: [{ id: 'x1' }], windings: [{ turns: 11 }, {}] })
  })

  it('asks for the order when both reordered, and puts new rows behind the row that they followed', () => {
    const mine = edit((it) => { it.sequence = [it.sequence[2]!, it.sequence[0]!, it.sequence[1]!] })
    const theirs = edit((it) => { it.sequence = [it.sequence[1]!, it.sequence[0]!, it.sequence[2]!, step('s9', 'w1')] })
    const asked = merge(mine, theirs)
    expect(asked.conflicts.map(({ key, kind }) => [key, kind])).toEqual([['sequence.[order]', 'order']])
    expect(ids(asked.document.sequence)).toBe('s3,s9,s1,s2')
    expect(ids(merge(mine, theirs, [['sequence.[order]', 'theirs']]).document.sequence)).toBe('s2,s1,s3,s9')
  })
})

// Any two ways of editing: nothing that only one of both did is lost.
const editor = fc.record({
  title: fc.option(fc.string(), { nil: undefined }),
  turns: fc.dictionary(fc.constantFrom('w1', 'w2'), fc.integer({ min: 1, max: 9 })),
  removed: fc.subarray(['s1', 's2', 's3']),
  added: fc.uniqueArray(fc.constantFrom('s7', 's8'), { maxLength: 2 }),
  shuffled: fc.shuffledSubarray([0, 1, 2], { minLength: 3, maxLength: 3 }),
})
type Edits = typeof editor extends fc.Arbitrary<infer T> ? T : never
const apply = ({ title, turns, removed, added, shuffled }: Edits) => edit((it) => {
  if (title !== undefined) it.title.title = stated(title)
  for (const row of it.windings) row.turns = turns[row.id] ?? row.turns
  it.sequence = [...shuffled.map((index) => it.sequence[index]!).filter(({ id }) => !removed.includes(id)), ...added.map((id) => step(id, 'w2'))]
})

describe('whatever two people did', () => {
  it('one of them alone is simply taken', () => {
    fc.assert(fc.property(editor, (edits) => {
      const changed = apply(edits)
      expect(merge(changed, BASE).document).toEqual(changed)
      expect(merge(BASE, changed).document).toEqual(changed)
      expect([...merge(changed, BASE).conflicts, ...merge(BASE, changed).conflicts]).toEqual([])
    }))
  })

  it('each choice gives that side, and rows are neither lost nor doubled', () => {
    fc.assert(fc.property(editor, editor, (a, b) => {
      const [mine, theirs] = [apply(a), apply(b)]
      const { conflicts } = merge(mine, theirs)
      for (const side of ['mine', 'theirs'] as const) {
        const { document } = merge(mine, theirs, conflicts.map(({ key }) => [key, side]))
        expect(new Set(document.sequence.map(({ id }) => id)).size).toBe(document.sequence.length)
        for (const id of ['s7', 's8']) {
          const wanted = Number(mine.sequence.some((row) => row.id === id) || theirs.sequence.some((row) => row.id === id))
          expect(document.sequence.filter((row) => row.id === id)).toHaveLength(wanted)
        }
        const [own, other] = side === 'mine' ? [a, b] : [b, a]
        expect(document.title.title.value).toBe(own.title !== undefined && own.title !== 'T' ? own.title : (other.title ?? 'T'))
      }
    }))
  })
})

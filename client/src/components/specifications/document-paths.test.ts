import { describe, expect, it } from 'vitest'
import { documentPath, freeId, isWithin, movedTo, placeOf, valueAt, withValue } from './document-paths'

const tree = { windings: [{ id: 'w1', turns: 20 }, { id: 'w2', turns: 5 }], core: { gap: { lengthMm: { value: 0.4 } } } }

describe('withValue', () => {
  it('changes the value behind the path and nothing of the original', () => {
    const next = withValue(tree, 'windings.1.turns', 6)
    expect(valueAt(next, 'windings.1.turns')).toBe(6)
    expect(tree.windings[1]!.turns).toBe(5)
  })

  it('keeps everything beside the way as the same object', () => {
    const next = withValue(tree, 'windings.1.turns', 6)
    expect(next.core).toBe(tree.core)
    expect(next.windings[0]).toBe(tree.windings[0])
    expect(Array.isArray(next.windings)).toBe(true)
  })

  it('leaves a tree alone whose way ends before the path does', () => {
    expect(withValue(tree, 'core.gap.lengthMm.value.deeper', 1).core.gap.lengthMm.value).toBe(0.4)
  })
})

describe('places', () => {
  it.each([
    ['windings.0.turns', 'specification.windings.0.turns'],
    ['requirement.ambientC', 'requirement.ambientC'],
    ['requirement', 'requirement'],
  ])('%s lies in a document at %s', (place, path) => {
    expect(documentPath(place)).toBe(path)
    expect(placeOf(`document.${path}`)).toBe(place)
  })

  it('tells a row from the row whose number begins alike', () => {
    expect(isWithin('windings.1.turns', 'windings.1')).toBe(true)
    expect(isWithin('windings.10.turns', 'windings.1')).toBe(false)
  })
})

describe('rows', () => {
  it('get an id that no row has', () => {
    expect(freeId([{ id: 'w1' }, { id: 'w3' }], 'w')).toBe('w4')
    expect(freeId([], 's')).toBe('s1')
  })

  it('move by one place and stay at the ends', () => {
    expect(movedTo(['a', 'b', 'c'], 1, 0)).toEqual(['b', 'a', 'c'])
    expect(movedTo(['a', 'b', 'c'], 2, 3)).toEqual(['a', 'b', 'c'])
  })
})

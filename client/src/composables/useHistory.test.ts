import { describe, expect, it } from 'vitest'
import { useHistory } from './useHistory'

describe('useHistory', () => {
  it('goes back and forth by steps', () => {
    const { current, commit, undo, redo, canUndo, canRedo } = useHistory('a')
    commit('b', 'title')
    commit('c', 'core')
    undo()
    expect(current.value).toBe('b')
    redo()
    expect([current.value, canUndo.value, canRedo.value]).toEqual(['c', true, false])
  })

  it('takes quick changes at one place as one step, and slow ones as several', () => {
    let at = 0
    const { current, commit, undo } = useHistory('', () => at)
    commit('1', 'turns')
    at = 500
    commit('12', 'turns')
    at = 5000
    commit('13', 'turns')
    undo()
    expect(current.value).toBe('12')
    undo()
    expect(current.value).toBe('')
  })

  it('forgets what was undone when something else is typed', () => {
    const { commit, undo, redo, current } = useHistory('a')
    commit('b', 'title')
    undo()
    commit('c', 'core')
    redo()
    expect(current.value).toBe('c')
  })
})

import { describe, expect, it } from 'vitest'
import { noWishes, wishedPreferences } from './search-wishes'

describe('the wishes of a search', () => {
  it('leave everything open that nothing is said about', () => {
    expect(wishedPreferences(noWishes())).toEqual({})
  })

  it('hold the search to the store when asked to', () => {
    expect(wishedPreferences({ ...noWishes(), onlyStocked: true, shapes: ['ETD'] })).toEqual({ onlyStocked: true, shapes: ['ETD'] })
  })
})

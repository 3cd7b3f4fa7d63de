import { describe, expect, it } from 'vitest'
import { inWords } from './failure-words'

describe('inWords', () => {
  it('names the checks that stop a release', () => {
    const { fields } = inWords({ message: 'Release is stopped by I01.', code: 'release-stopped', fields: { I01: 'Not met.' } })!
    expect(fields).toEqual({ I01: 'I01: Product standard and edition are named. Not met.' })
  })

  it('names the place of text that cannot be printed', () => {
    expect(inWords({ message: 'x', fields: { 'title.legalOwner.value': 'Cannot be printed: 磁' } })!.fields).toEqual({ 'title.legalOwner.value': 'Title block › Legal owner: Cannot be printed: 磁' })
  })

  it('leaves a failure without places alone', () => {
    const failure = { message: 'The server could not be reached.' }
    expect(inWords(failure)).toBe(failure)
    expect(inWords(null)).toBeNull()
  })
})

import { describe, expect, it } from 'vitest'
import { optionalText, requiredText, TEXT_LIMITS } from './common'

describe('text that is entered', () => {
  it('is one line where it is a name: none of its own in a mail', () => {
    expect(requiredText('The name', TEXT_LIMITS.name).parse(' Quillon\r\n\r\nPay here: http://evil.example ')).toBe('Quillon Pay here: http://evil.example')
    expect(optionalText('The place').parse('Dock 3\nGate 1')).toBe('Dock 3 Gate 1')
  })

  it('keeps its paragraphs where it may have some', () => {
    expect(optionalText('The note', TEXT_LIMITS.note).parse('one\n\ntwo\tthree')).toBe('one\n\ntwo\tthree')
  })

  it('holds no character that turns the direction of writing, and no control character', () => {
    expect(requiredText('The name').parse('Zell\u202emark\u0007')).toBe('Zellmark')
    expect(() => requiredText('The name').parse('\u202e\u0001')).toThrow('The name is missing.')
  })
})

import { AppError } from '#server/errors'
import { describe, expect, it } from 'vitest'
import { z } from 'zod'
import { parseForm, parseInput } from './parse-input'

describe('parseInput', () => {
  it('brings text into normalization form C and replaces lone surrogates', () => {
    expect(parseInput(z.string(), 'u\u0308')).toBe('ü')
    expect(parseInput(z.string(), 'a\ud800b')).toBe('a\ufffdb')
    expect(parseInput(z.string(), 'Ω 😀')).toBe('Ω 😀')
  })

  it('names the dotted path of each fault', () => {
    const schema = z.strictObject({ lines: z.array(z.strictObject({ quantity: z.int('A whole number is needed.') })) })
    expect(() => parseInput(schema, { lines: [{ quantity: 1 }, { quantity: 1.5 }] })).toThrow(
      expect.objectContaining({ code: 'invalid-input', fields: { 'lines.1.quantity': 'A whole number is needed.' } }),
    )
  })

  it('refuses U+0000 anywhere, also in a key', () => {
    expect(() => parseInput(z.unknown(), { a: ['x\u0000'] })).toThrow(expect.objectContaining({ code: 'invalid-input', fields: { 'a.0': expect.any(String) } }))
    expect(() => parseInput(z.unknown(), { 'a\u0000': 1 })).toThrow(expect.objectContaining({ code: 'invalid-input' }))
  })

  it('refuses what is nested without end, and names no more than a hundred faults', () => {
    const nested = Array.from({ length: 5000 }).reduce<unknown>((inner) => [inner], 'x')
    expect(() => parseInput(z.unknown(), { a: nested })).toThrow(expect.objectContaining({ code: 'invalid-input', message: expect.stringContaining('nested deeper') }))
    const many = Array.from({ length: 5000 }, () => 'x')
    const faults = captured(() => parseInput(z.array(z.int()), many))
    expect(Object.keys(faults.fields ?? {})).toHaveLength(100)
  })
})

function captured(work: () => unknown): AppError {
  try {
    work()
  } catch (error) {
    if (error instanceof AppError) return error
  }
  throw new Error('Nothing was refused.')
}

describe('parseForm', () => {
  const schema = z.strictObject({ note: z.string(), count: z.int(), serials: z.array(z.string()).optional() })

  it('reads numbers and lists as JSON and leaves text that looks like a number', () => {
    expect(parseForm(schema, { note: '0012', count: '3', serials: '["a"]' })).toEqual({ note: '0012', count: 3, serials: ['a'] })
  })

  it('refuses what is neither', () => {
    expect(() => parseForm(schema, { note: 'x', count: 'three' })).toThrow(expect.objectContaining({ code: 'invalid-input' }))
  })
})

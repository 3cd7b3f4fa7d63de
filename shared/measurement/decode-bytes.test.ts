import { describe, expect, it } from 'vitest'
import { decodeBytes } from './decode-bytes'

const utf8 = (text: string) => new TextEncoder().encode(text)
const utf16 = (text: string, mark: boolean) => {
  const units = [...(mark ? '\ufeff' : ''), ...text].map((each) => each.charCodeAt(0))
  return Uint8Array.from(units.flatMap((unit) => [unit & 0xff, unit >> 8]))
}

describe('decodeBytes', () => {
  it('reads UTF-8 with and without its mark', () => {
    expect(decodeBytes(utf8('Lp (µH)'))).toEqual({ text: 'Lp (µH)', encoding: 'UTF-8', repaired: false })
    expect(decodeBytes(utf8('\ufeffRdc (mΩ) 合格 𝛀'))?.text).toBe('Rdc (mΩ) 合格 𝛀')
  })

  it('reads UTF-16LE with its mark and by its zero bytes', () => {
    expect(decodeBytes(utf16('Serial;Lp (µH)\r\n1;600', true))).toMatchObject({ text: 'Serial;Lp (µH)\r\n1;600', encoding: 'UTF-16LE' })
    expect(decodeBytes(utf16('Serial;Lp (µH)\r\n1;600', false))).toMatchObject({ text: 'Serial;Lp (µH)\r\n1;600', encoding: 'UTF-16LE' })
  })

  it('falls back to Windows-1252 where the bytes are no UTF-8', () => {
    expect(decodeBytes(Uint8Array.of(0x4c, 0x70, 0x20, 0xb5, 0x48, 0x80, 0x96))).toEqual({ text: 'Lp µH€–', encoding: 'Windows-1252', repaired: false })
  })

  it('puts right what an earlier wrong reading has broken, and says so', () => {
    expect(decodeBytes(utf8('Lp (ÂµH)'))).toEqual({ text: 'Lp (µH)', encoding: 'UTF-8', repaired: true })
  })

  it.each([
    { name: 'overlong', bytes: [0xc0, 0xaf] },
    { name: 'cut off', bytes: [0x61, 0xe2, 0x84] },
    { name: 'a surrogate', bytes: [0xed, 0xa0, 0x80] },
  ])('takes $name bytes for Windows-1252', ({ bytes }) => {
    expect(decodeBytes(Uint8Array.from(bytes))?.encoding).toBe('Windows-1252')
  })

  it.each([
    { name: 'a zip archive', bytes: [0x50, 0x4b, 3, 4, 0x14, 0, 6, 0] },
    { name: 'zero bytes', bytes: [0x61, 0, 0, 0, 0, 0x62] },
  ])('does not take $name for text', ({ bytes }) => {
    expect(decodeBytes(Uint8Array.from(bytes))).toBeNull()
  })
})

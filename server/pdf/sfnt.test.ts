import { expect, it } from 'vitest'
import { fontBytes } from './fonts'
import { unpackWoff } from './sfnt'

it('unpacks a WOFF into tables that lie where its directory says', () => {
  const sfnt = fontBytes('sans')
  const count = sfnt.readUInt16BE(4)
  const tags = Array.from({ length: count }, (_, index) => sfnt.toString('latin1', 12 + index * 16, 16 + index * 16))
  const head = 12 + tags.indexOf('head') * 16
  // OpenType specification, `head` table: magicNumber at offset 12.
  expect(sfnt.readUInt32BE(sfnt.readUInt32BE(head + 8) + 12)).toBe(0x5f0f3cf5)
  expect(sfnt.readUInt32BE(head + 8) + sfnt.readUInt32BE(head + 12)).toBeLessThanOrEqual(sfnt.length)
})

it('refuses what is no WOFF', () => {
  expect(() => unpackWoff(Buffer.from('wOF2 and more'))).toThrow(RangeError)
})

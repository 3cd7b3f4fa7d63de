export interface DecodedText {
  text: string
  encoding: 'UTF-8' | 'UTF-16LE' | 'UTF-16BE' | 'Windows-1252'
  /** Whether characters were put right that an earlier wrong reading had broken (`Âµ`). */
  repaired: boolean
}

/** Code points of the bytes 0x80 to 0x9F. Source: WHATWG Encoding Standard, index windows-1252. */
const WINDOWS_1252_HIGH = '€\u0081‚ƒ„…†‡ˆ‰Š‹Œ\u008dŽ\u008f\u0090‘’“”•–—˜™š›œ\u009džŸ'

/** UTF-8 characters that were once read as Windows-1252 and saved again. */
const BROKEN: readonly (readonly [string, string])[] = [
  ['Âµ', 'µ'],
  ['Î¼', 'µ'],
  ['Î©', 'Ω'],
  ['â„¦', 'Ω'],
  ['Â°', '°'],
  ['Â±', '±'],
  ['â€“', '–'],
]

/**
 * Decodes the bytes of a text file without asking its name: byte order mark first, then UTF-16 by its zero
 * bytes, then UTF-8 when the bytes are valid UTF-8 (RFC 3629), else Windows-1252.
 * Answers null when the bytes are no text: zero bytes elsewhere, or control characters.
 */
export function decodeBytes(bytes: Uint8Array): DecodedText | null {
  const decoded = decodeMarked(bytes) ?? decodeUnmarked(bytes)
  // Text files hold no control characters beside tab, line feed, form feed and carriage return.
  if (/[\0-\x08\x0b\x0e-\x1f]/.test(decoded.text)) return null
  const text = BROKEN.reduce((whole, [broken, right]) => whole.replaceAll(broken, right), decoded.text)
  return { text, encoding: decoded.encoding, repaired: text !== decoded.text }
}

type Decoded = Pick<DecodedText, 'text' | 'encoding'>

function decodeMarked(bytes: Uint8Array): Decoded | null {
  const [a, b, c] = bytes
  if (a === 0xef && b === 0xbb && c === 0xbf) {
    const text = decodeUtf8(bytes.subarray(3))
    return text === null ? null : { text, encoding: 'UTF-8' }
  }
  if (a === 0xff && b === 0xfe) return { text: decodeUtf16(bytes.subarray(2), 0), encoding: 'UTF-16LE' }
  if (a === 0xfe && b === 0xff) return { text: decodeUtf16(bytes.subarray(2), 1), encoding: 'UTF-16BE' }
  return null
}

function decodeUnmarked(bytes: Uint8Array): Decoded {
  const head = bytes.subarray(0, 512)
  const zerosAt = (parity: number) => head.filter((byte, index) => index % 2 === parity && byte === 0).length
  const enough = head.length / 5
  if (zerosAt(1) > enough && zerosAt(0) === 0) return { text: decodeUtf16(bytes, 0), encoding: 'UTF-16LE' }
  if (zerosAt(0) > enough && zerosAt(1) === 0) return { text: decodeUtf16(bytes, 1), encoding: 'UTF-16BE' }
  const utf8 = decodeUtf8(bytes)
  return utf8 === null ? { text: decodeWindows1252(bytes), encoding: 'Windows-1252' } : { text: utf8, encoding: 'UTF-8' }
}

function decodeUtf16(bytes: Uint8Array, low: 0 | 1): string {
  const parts: string[] = []
  for (let at = 0; at + 1 < bytes.length; at += 2) parts.push(String.fromCharCode(bytes[at + low]! | (bytes[at + 1 - low]! << 8)))
  return parts.join('')
}

function decodeWindows1252(bytes: Uint8Array): string {
  return Array.from(bytes, (byte) => (byte >= 0x80 && byte <= 0x9f ? WINDOWS_1252_HIGH[byte - 0x80] : String.fromCharCode(byte))).join('')
}

/** Lead byte ranges with the number of bytes that follow and the smallest code point of that length. */
function leadByte(byte: number): { more: number; bits: number; least: number } | null {
  if (byte < 0x80) return { more: 0, bits: byte, least: 0 }
  if (byte >= 0xc2 && byte < 0xe0) return { more: 1, bits: byte & 0x1f, least: 0x80 }
  if (byte >= 0xe0 && byte < 0xf0) return { more: 2, bits: byte & 0x0f, least: 0x800 }
  if (byte >= 0xf0 && byte < 0xf5) return { more: 3, bits: byte & 0x07, least: 0x10000 }
  return null
}

/** Null when the bytes are not valid UTF-8. */
function decodeUtf8(bytes: Uint8Array): string | null {
  const parts: string[] = []
  for (let at = 0; at < bytes.length; ) {
    const lead = leadByte(bytes[at]!)
    if (!lead) return null
    let point = lead.bits
    for (let step = 1; step <= lead.more; step++) {
      const byte = bytes[at + step]
      if (byte === undefined || (byte & 0xc0) !== 0x80) return null
      point = (point << 6) | (byte & 0x3f)
    }
    const surrogate = point >= 0xd800 && point <= 0xdfff
    if (point < lead.least || point > 0x10ffff || surrogate) return null
    parts.push(String.fromCodePoint(point))
    at += lead.more + 1
  }
  return parts.join('')
}

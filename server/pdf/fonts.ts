import { readFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import PDFDocument from 'pdfkit'
import type { FontRole } from '#shared/drawing/model'
import { unpackWoff } from './sfnt'

const resolve = createRequire(import.meta.url).resolve

/** The complete files: those split by script lack signs such as ≤ and →. */
const FILES: Record<FontRole, string> = {
  sans: '@ibm/plex-sans/fonts/complete/woff/IBMPlexSans-Regular.woff',
  'sans-bold': '@ibm/plex-sans/fonts/complete/woff/IBMPlexSans-SemiBold.woff',
  mono: '@ibm/plex-mono/fonts/complete/woff/IBMPlexMono-Regular.woff',
}

const unpacked = new Map<FontRole, Buffer>()

/** Bytes of a shipped font, unpacked once per process. */
export function fontBytes(role: FontRole): Buffer {
  let bytes = unpacked.get(role)
  if (!bytes) unpacked.set(role, (bytes = unpackWoff(readFileSync(resolve(FILES[role])))))
  return bytes
}

interface FontFile {
  characterSet: number[]
  unitsPerEm: number
  capHeight: number
  glyphForCodePoint(codePoint: number): { advanceWidth: number }
}

/** The font as pdfkit reads it, for its coverage and widths. */
export function openFont(role: FontRole): FontFile {
  const doc = new PDFDocument({ font: fontBytes(role) as unknown as string })
  return (doc as unknown as { _font: { font: FontFile } })._font.font
}

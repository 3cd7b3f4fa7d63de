import type { FontRole } from '#shared/drawing/model'
import type { GlyphTable } from '#shared/drawing/glyph-widths'
import { openFont } from './fonts'

/** Advance widths in thousandths of the em of every character that the font covers, in runs of neighbours. */
export function measureGlyphs(role: FontRole): GlyphTable {
  const font = openFont(role)
  const table: [number, number[]][] = []
  for (const codePoint of [...font.characterSet].sort((a, b) => a - b)) {
    const width = Math.round((font.glyphForCodePoint(codePoint).advanceWidth * 1000) / font.unitsPerEm)
    const run = table.at(-1)
    if (run && run[0] + run[1].length === codePoint) run[1].push(width)
    else table.push([codePoint, [width]])
  }
  return table
}

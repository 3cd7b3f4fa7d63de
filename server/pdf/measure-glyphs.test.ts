import { describe, expect, it } from 'vitest'
import { GLYPH_WIDTHS } from '#shared/drawing/glyph-widths'
import { CAPITAL_HEIGHT_EM } from '#shared/drawing/text-metrics'
import { openFont } from './fonts'
import { measureGlyphs } from './measure-glyphs'

describe.each(['sans', 'sans-bold', 'mono'] as const)('the table of glyph widths for %s', (role) => {
  it('equals the font file', () => {
    expect(GLYPH_WIDTHS[role]).toEqual(measureGlyphs(role))
  })

  it('has the height of capitals that lettering is scaled by', () => {
    const font = openFont(role)
    expect(font.capHeight / font.unitsPerEm).toBe(CAPITAL_HEIGHT_EM)
  })
})

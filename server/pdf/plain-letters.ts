/** The parts of pdfkit's embedded font that set a line of text. */
interface EmbeddedFont {
  font: { glyphForCodePoint(codePoint: number): Glyph }
  scale: number
  layout(text: string, features?: unknown, onlyWidth?: boolean): LineOfGlyphs
}

interface Glyph {
  advanceWidth: number
}

interface LineOfGlyphs {
  glyphs: unknown[]
  positions: { xAdvance: number; yAdvance: number; xOffset: number; yOffset: number; advanceWidth: number }[]
  advanceWidth: number
}

/**
 * Makes the current font set one glyph per character at its advance width, without kerning or ligatures: what the
 * width table says and what the screen shows. The shaping that this replaces takes most of the time of a sheet.
 */
export function setPlainLetters(doc: PDFKit.PDFDocument): void {
  const current = (doc as unknown as { _font: EmbeddedFont })._font
  const known = new Map<string, Glyph>()
  const glyphOf = (character: string): Glyph => {
    let glyph = known.get(character)
    if (!glyph) known.set(character, (glyph = current.font.glyphForCodePoint(character.codePointAt(0)!)))
    return glyph
  }
  current.layout = (text) => {
    const glyphs = [...text].map(glyphOf)
    const positions = glyphs.map((glyph) => {
      const advanceWidth = glyph.advanceWidth * current.scale
      return { xAdvance: advanceWidth, yAdvance: 0, xOffset: 0, yOffset: 0, advanceWidth }
    })
    return { glyphs, positions, advanceWidth: positions.reduce((sum, each) => sum + each.advanceWidth, 0) }
  }
}

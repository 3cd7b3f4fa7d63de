import { describe, expect, it } from 'vitest'
import { GLYPH_WIDTHS } from './glyph-widths'
import { labelBox, missingGlyphs, shortenedText, textRuns, textWidthMm, unprintable, wrapText } from './text-metrics'
import { label } from './shapes'

describe('textWidthMm', () => {
  it.each([
    // Plex Sans digits are 600/1000 em wide; 0.698 em is the height of capitals.
    { name: 'ten digits', text: '0123456789', font: 'sans', widthMm: (10 * 0.6 * 2.5) / 0.698 },
    { name: 'a mono word', text: 'abcd', font: 'mono', widthMm: (4 * 0.6 * 2.5) / 0.698 },
    { name: 'nothing', text: '', font: 'sans', widthMm: 0 },
  ] as const)('adds advance widths: $name', ({ text, font, widthMm }) => {
    expect(textWidthMm(text, font, 2.5)).toBeCloseTo(widthMm, 9)
  })

  it('takes from Sans what Mono lacks', () => {
    expect(textRuns('5 Ω', 'mono', 2.5).map(({ font, text }) => [font, text])).toEqual([['mono', '5 '], ['sans', 'Ω']])
  })
})

describe('wrapText', () => {
  it('breaks at blanks and loses nothing', () => {
    const text = 'one two three four five six seven'
    const lines = wrapText(text, 'sans', 2.5, 20)
    expect(lines.length).toBeGreaterThan(1)
    expect(lines.join(' ')).toBe(text)
    expect(lines.every((line) => textWidthMm(line, 'sans', 2.5) <= 20)).toBe(true)
  })

  it('breaks a word that is too long by itself', () => {
    const lines = wrapText('Streuinduktivitätsmessvorrichtung', 'sans', 2.5, 15)
    expect(lines.join('')).toBe('Streuinduktivitätsmessvorrichtung')
    expect(lines.every((line) => textWidthMm(line, 'sans', 2.5) <= 15)).toBe(true)
  })

  it('keeps line feeds', () => {
    expect(wrapText('a\nb', 'sans', 2.5, 50)).toEqual(['a', 'b'])
  })

  it('does not part a figure from its unit', () => {
    expect(wrapText('Length 12\u00a0mm', 'sans', 2.5, 18)).toEqual(['Length', '12\u00a0mm'])
  })
})

describe('shortenedText', () => {
  it('leaves what fits and marks what does not', () => {
    expect(shortenedText('S1', 'sans', 1.8, 10)).toBe('S1')
    expect(shortenedText('Überwachungswicklung', 'sans', 1.8, 10)).toMatch(/^Ü.*…$/)
  })
})

describe('labelBox', () => {
  it('turns with the label', () => {
    const flat = labelBox(label([0, 0], 'abc'))
    const upright = labelBox(label([0, 0], 'abc', { rotationDeg: 90 }))
    expect(upright.topMm).toBeCloseTo(flat.rightMm, 9)
    expect(upright.leftMm).toBeCloseTo(-flat.topMm, 9)
  })
})

describe('missingGlyphs', () => {
  it.each([
    { name: 'signs of the trade', text: 'µ Ω ± ≤ ≥ → ° × Δ Ø − – † ² ³ ½', missing: [] },
    { name: 'Greek, Cyrillic and accented letters', text: 'λ θ Щ ё Ü é ő ž', missing: [] },
    { name: 'letters written with a combining accent', text: 'U\u0308', missing: [] },
    { name: 'Chinese letters, each once', text: '变压器变', missing: ['变', '压', '器'] },
    { name: 'the diameter sign', text: '⌀ 5', missing: ['⌀'] },
    { name: 'a picture', text: 'ok 🙂', missing: ['🙂'] },
    { name: 'a control character, but not a line feed', text: 'a\u0007b\nc', missing: ['\u0007'] },
  ])('of $name', ({ text, missing }) => {
    expect(missingGlyphs(text)).toEqual(missing)
  })

  it('need look at one font only: SemiBold covers what Regular does', () => {
    const covered = (role: 'sans' | 'sans-bold') => GLYPH_WIDTHS[role].flatMap(([first, widths]) => widths.map((_, index) => first + index))
    const bold = new Set(covered('sans-bold'))
    expect(covered('sans').filter((codePoint) => !bold.has(codePoint))).toEqual([])
  })
})

describe('unprintable', () => {
  it('names each text by its path', () => {
    const document = { title: { title: { value: '变 T' } }, notes: [{ text: 'fine' }, { text: '⌀' }] }
    expect(unprintable(document)).toEqual([
      { path: 'title.title.value', text: '变 T', glyphs: ['变'] },
      { path: 'notes.1.text', text: '⌀', glyphs: ['⌀'] },
    ])
  })
})

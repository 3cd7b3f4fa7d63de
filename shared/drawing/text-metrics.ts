import { GLYPH_WIDTHS, type GlyphTable } from './glyph-widths'
import type { BoxMm, FontRole, LabelShape } from './model'

/** Height of capitals over the em of IBM Plex, all shipped weights. Source: OS/2 table of the font files. */
export const CAPITAL_HEIGHT_EM = 0.698

/** Distance of baselines over the height of capitals. Source: ISO 3098-1, lettering type B (22/14 h). */
export const LINE_PITCH = 22 / 14

/** How far letters reach below the baseline, over the height of capitals. */
const DESCENT = 0.3

/** Plex Mono has no Greek, so its capitals Ω and Δ come from Plex Sans. */
const FALLBACK: Record<FontRole, FontRole | null> = { sans: null, 'sans-bold': null, mono: 'sans' }

const tables = new Map<FontRole, Map<number, number>>()

function widthsOf(font: FontRole): Map<number, number> {
  let widths = tables.get(font)
  if (!widths) tables.set(font, (widths = unpack(GLYPH_WIDTHS[font])))
  return widths
}

function unpack(table: GlyphTable): Map<number, number> {
  return new Map(table.flatMap(([first, widths]) => widths.map((width, index) => [first + index, width] as const)))
}

const has = (font: FontRole, codePoint: number) => widthsOf(font).has(codePoint)

function fontFor(codePoint: number, font: FontRole): FontRole {
  const other = FALLBACK[font]
  return other && !has(font, codePoint) && has(other, codePoint) ? other : font
}

export interface TextRun {
  font: FontRole
  text: string
  widthMm: number
}

/** Size of the em for a height of capitals, mm. */
export const fontSizeMm = (heightMm: number) => heightMm / CAPITAL_HEIGHT_EM

const NO_GLYPH_EM = 600

/** Splits text where the font has to change. Widths are advance widths without kerning or ligatures. */
export function textRuns(text: string, font: FontRole, heightMm: number): TextRun[] {
  const runs: TextRun[] = []
  for (const character of text) {
    const codePoint = character.codePointAt(0)!
    const role = fontFor(codePoint, font)
    const widthMm = ((widthsOf(role).get(codePoint) ?? NO_GLYPH_EM) / 1000) * fontSizeMm(heightMm)
    const last = runs.at(-1)
    if (last?.font === role) {
      last.text += character
      last.widthMm += widthMm
    } else runs.push({ font: role, text: character, widthMm })
  }
  return runs
}

/** Advances in thousandths of the em; tables are laid out by measuring the same words again and again. */
const measured: Record<FontRole, Map<string, number>> = { sans: new Map(), 'sans-bold': new Map(), mono: new Map() }
const MOST_MEASURED = 20_000

function advance(text: string, font: FontRole): number {
  const known = measured[font].get(text)
  if (known !== undefined) return known
  let sum = 0
  for (const character of text) {
    const codePoint = character.codePointAt(0)!
    sum += widthsOf(fontFor(codePoint, font)).get(codePoint) ?? NO_GLYPH_EM
  }
  if (measured[font].size >= MOST_MEASURED) measured[font].clear()
  measured[font].set(text, sum)
  return sum
}

/** Width of one line of text, mm. */
export const textWidthMm = (text: string, font: FontRole, heightMm: number): number => (advance(text, font) / 1000) * fontSizeMm(heightMm)

/** Where a label's text starts: its anchor moved by the alignment, mm along the line. */
export function alignmentShiftMm(label: Pick<LabelShape, 'align' | 'text' | 'font' | 'heightMm'>): number {
  if (label.align === 'start') return 0
  const widthMm = textWidthMm(label.text, label.font, label.heightMm)
  return label.align === 'end' ? -widthMm : -widthMm / 2
}

/** Space that a label takes, mm. Rotated labels: multiples of 90°, others as their bounding box. */
export function labelBox(label: LabelShape): BoxMm {
  const left = alignmentShiftMm(label)
  const right = left + textWidthMm(label.text, label.font, label.heightMm)
  const bottom = -DESCENT * label.heightMm
  const angle = (label.rotationDeg * Math.PI) / 180
  const corners = [left, right].flatMap((x) => [bottom, label.heightMm].map((y) => rotate(x, y, angle)))
  const xs = corners.map(([x]) => x + label.anchor[0])
  const ys = corners.map(([, y]) => y + label.anchor[1])
  return { leftMm: Math.min(...xs), rightMm: Math.max(...xs), bottomMm: Math.min(...ys), topMm: Math.max(...ys) }
}

const rotate = (x: number, y: number, angle: number) =>
  [x * Math.cos(angle) - y * Math.sin(angle), x * Math.sin(angle) + y * Math.cos(angle)] as const

/**
 * Breaks text into lines no wider than `widthMm`. Breaks at blanks, after `/`, `,`, `;`, `–`, `-` inside long
 * words, and inside a word only when nothing else helps. Keeps line feeds of the text.
 */
export function wrapText(text: string, font: FontRole, heightMm: number, widthMm: number): string[] {
  const fits = (line: string) => textWidthMm(line, font, heightMm) <= widthMm + 1e-6
  return text.split('\n').flatMap((paragraph) => wrapParagraph(paragraph, fits))
}

function wrapParagraph(paragraph: string, fits: (line: string) => boolean): string[] {
  const lines: string[] = []
  let line = ''
  for (const word of paragraph.split(' ')) {
    const longer = line === '' ? word : `${line} ${word}`
    if (fits(longer)) line = longer
    else {
      if (line !== '') lines.push(line)
      const pieces = breakWord(word, fits)
      lines.push(...pieces.slice(0, -1))
      line = pieces.at(-1)!
    }
  }
  return [...lines, line]
}

function breakWord(word: string, fits: (line: string) => boolean): string[] {
  if (fits(word)) return [word]
  const pieces: string[] = []
  let piece = ''
  for (const part of word.split(/(?<=[/,;–\-_.])/)) {
    if (fits(piece + part)) piece += part
    else {
      if (piece !== '') pieces.push(piece)
      const cut = cutHard(part, fits)
      pieces.push(...cut.slice(0, -1))
      piece = cut.at(-1)!
    }
  }
  return [...pieces, piece]
}

function cutHard(part: string, fits: (line: string) => boolean): string[] {
  const pieces = ['']
  for (const character of part) {
    const longer = pieces.at(-1)! + character
    if (fits(longer) || pieces.at(-1) === '') pieces[pieces.length - 1] = longer
    else pieces.push(character)
  }
  return pieces
}

/** The text, or as much of its beginning as fits with `…` behind it; for marks whose full text stands elsewhere. */
export function shortenedText(text: string, font: FontRole, heightMm: number, widthMm: number): string {
  if (textWidthMm(text, font, heightMm) <= widthMm) return text
  const characters = [...text]
  while (characters.length > 1 && textWidthMm(`${characters.join('')}…`, font, heightMm) > widthMm) characters.pop()
  return `${characters.join('')}…`
}

/** Width of the widest piece of text that is not broken unless it must be, mm. */
export const longestWordMm = (text: string, font: FontRole, heightMm: number): number =>
  Math.max(0, ...text.split(/[ \n]/).map((word) => textWidthMm(word, font, heightMm)))

const CONTROL = /[\u0000-\u0009\u000b-\u001f\u007f-\u009f]/

/**
 * Characters of a text that no shipped font can print, each once, in order. Text is compared in NFC, as it is
 * stored. A line feed is printable, other control characters are not.
 */
export function missingGlyphs(text: string): string[] {
  const missing = new Set<string>()
  for (const character of text.normalize('NFC')) {
    if (character === '\n') continue
    if (CONTROL.test(character) || !has('sans', character.codePointAt(0)!)) missing.add(character)
  }
  return [...missing]
}

export interface Unprintable {
  /** Dotted path of the text, e.g. `notes.2.text`. */
  path: string
  text: string
  glyphs: string[]
}

/** Every text of a document that holds a character no shipped font has; asked before any PDF is made. */
export function unprintable(document: unknown, path = ''): Unprintable[] {
  if (typeof document === 'string') {
    const glyphs = missingGlyphs(document)
    return glyphs.length === 0 ? [] : [{ path, text: document, glyphs }]
  }
  if (document === null || typeof document !== 'object') return []
  return Object.entries(document).flatMap(([key, value]) => unprintable(value, path === '' ? key : `${path}.${key}`))
}

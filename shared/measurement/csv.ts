export const SEPARATORS = [';', '\t', ',', '|'] as const
export type Separator = (typeof SEPARATORS)[number]

export type ParsedCsv = { kind: 'records'; records: string[][] } | { kind: 'broken-quotes'; line: number }

/**
 * Splits delimited text into records of fields. Quoted fields may hold the separator, doubled quotes and
 * line ends; any of LF, CRLF and CR ends a record. Source: RFC 4180, 2.
 */
export function parseCsv(text: string, separator: Separator): ParsedCsv {
  const records: string[][] = []
  let fields: string[] = []
  let at = 0
  while (at <= text.length) {
    const field = text[at] === '"' ? quotedField(text, at, separator) : plainField(text, at, separator)
    if (field === null) return { kind: 'broken-quotes', line: text.slice(0, at).split(/\r\n|\r|\n/).length }
    fields.push(field.value)
    at = field.end
    if (text[at] === separator) {
      at++
      continue
    }
    records.push(fields)
    fields = []
    if (at >= text.length) break
    at += text.startsWith('\r\n', at) ? 2 : 1
    if (at === text.length) break
  }
  return { kind: 'records', records }
}

interface Field {
  value: string
  /** Index of the separator or line end behind it, or the length of the text. */
  end: number
}

function plainField(text: string, start: number, separator: Separator): Field {
  let end = start
  while (end < text.length && text[end] !== separator && text[end] !== '\n' && text[end] !== '\r') end++
  return { value: text.slice(start, end), end }
}

/** Null when the quotes never close or something follows them. */
function quotedField(text: string, start: number, separator: Separator): Field | null {
  const parts: string[] = []
  for (let at = start + 1; ; ) {
    const quote = text.indexOf('"', at)
    if (quote < 0) return null
    parts.push(text.slice(at, quote))
    if (text[quote + 1] === '"') {
      parts.push('"')
      at = quote + 2
      continue
    }
    let end = quote + 1
    while (text[end] === ' ') end++
    const next = text[end]
    const closed = next === undefined || next === separator || next === '\n' || next === '\r'
    return closed ? { value: parts.join(''), end } : null
  }
}

/**
 * The separator that cuts the most lines of the file's head into the same number of fields, at least two.
 * A semicolon or a tab wins a tie, since a comma may be a decimal sign.
 */
export function detectSeparator(text: string): Separator {
  const lines = text
    .slice(0, 50_000)
    .split(/\r\n|\r|\n/)
    .filter((line) => line.trim() !== '')
    .slice(0, 100)
  const scores = SEPARATORS.map((separator) => ({ separator, score: evenness(lines, separator) }))
  return scores.reduce((best, next) => (next.score > best.score ? next : best)).separator
}

/** Lines that share the commonest field count above one, weighted by that count. */
function evenness(lines: readonly string[], separator: Separator): number {
  const counts = new Map<number, number>()
  for (const line of lines) {
    const fields = line.replace(/"[^"]*"/g, '').split(separator).length
    if (fields > 1) counts.set(fields, (counts.get(fields) ?? 0) + 1)
  }
  return Math.max(0, ...[...counts].map(([fields, times]) => times * Math.sqrt(fields - 1)))
}

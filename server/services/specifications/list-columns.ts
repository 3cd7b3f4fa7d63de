import type { KeyFigures } from '#shared/contracts/specifications'
import type { SpecificationDocument } from '#shared/engine/specification'

const MOST_CHARACTERS = 20_000

/** Marks of the program, which nobody searches for. */
const SILENT = new Set(['id', 'status', 'origin', 'kind', 'schema', 'windingId', 'boundaryId'])

/** What a list shows of a document. */
export function keyFigures({ specification }: SpecificationDocument): KeyFigures {
  const { core, electrical, windings } = specification
  return {
    ...(core.core.value && { core: core.core.value.id }),
    ...(electrical.inductance.value && { inductanceH: electrical.inductance.value.nominalH }),
    ...(windings[0] && { turns: windings[0].turns }),
    windings: windings.length,
    ...(electrical.switchingFrequencyHz.value && { frequencyHz: electrical.switchingFrequencyHz.value.maximum }),
  }
}

/** What a person types, as words: small letters and figures, without marks. */
export const searchWords = (text: string): string[] => text.normalize('NFKC').toLowerCase().match(/[\p{L}\p{N}.]+/gu) ?? []

/** The words of a document, each once with a blank before it, for searching by their beginnings; the requirement sheet is not among them. */
export function searchText({ specification }: SpecificationDocument): string {
  const words = new Set<string>()
  const visit = (value: unknown, key: string): void => {
    if (typeof value === 'string') searchWords(value).forEach((word) => words.add(word))
    else if (Array.isArray(value)) value.forEach((entry: unknown) => visit(entry, key))
    else if (typeof value === 'object' && value !== null) for (const [name, inner] of Object.entries(value)) if (!SILENT.has(name) || isReference(value)) visit(inner, name)
  }
  visit(specification, '')
  return [...words].map((word) => ` ${word}`).join('').slice(0, MOST_CHARACTERS)
}

/** The id of a library row is what people know a core or wire by. */
const isReference = (value: object) => 'version' in value && 'id' in value

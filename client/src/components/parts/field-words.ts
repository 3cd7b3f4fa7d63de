import { PART_KINDS } from '#shared/contracts/part-rows'
import { markableFields } from './part-fields'

const LABELS: ReadonlyMap<string, string> = new Map(PART_KINDS.flatMap((kind) => markableFields(kind).map(({ path, label }) => [path, label] as const)))

/** A label within a sentence: symbols such as µi and Ae keep their letters. */
const inSentence = (label: string) => (/^\p{Lu}[\p{Ll} ]/u.test(label) ? label.charAt(0).toLowerCase() + label.slice(1) : label)

/** What the form calls a field of a library row, within a sentence; null where it has no word for it. */
export function fieldWord(path: string): string | null {
  const label = LABELS.get(path)
  return label === undefined ? null : inSentence(label)
}

import type { Library } from '#shared/engine/library'
import type { SpecificationDocument } from '#shared/engine/specification'
import type { MergeConflict, Side } from '#shared/workflow/merge-documents'
import { placeOf } from '../document-paths'
import { placeWords } from '../place-words'
import { changeLines, type ChangeLine } from './change-words'

/** One field that two people changed in different ways, in words. */
export interface ConflictLine {
  key: string
  /** Place of the field in the form. */
  path: string
  what: string
  before: string
  mine: string
  theirs: string
  choice: Side | null
}

interface Versions {
  base: SpecificationDocument
  mine: SpecificationDocument
  theirs: SpecificationDocument
}

const within = (key: string, of: string) => key === of || key.startsWith(`${of}.`) || key.startsWith(`${of} `)

export function conflictLines(conflicts: readonly MergeConflict[], { base, mine, theirs }: Versions, choices: ReadonlyMap<string, Side>, library: Library): ConflictLine[] {
  const [own, other] = [changeLines(base, mine, library), changeLines(base, theirs, library)]
  return conflicts.map((conflict) => {
    const key = placeOf(conflict.key)
    const found = (lines: readonly ChangeLine[]) => lines.filter((line) => (conflict.kind === 'order' ? line.kind === 'moved' && line.key.startsWith(key.replace('[order]', '')) : within(line.key, key)))
    return { key: conflict.key, path: placeOf(conflict.path), choice: choices.get(conflict.key) ?? null, ...inWords(found(own), found(other), placeWords(placeOf(conflict.path))) }
  })
}

/** Where both sides say the same one thing about it, its name is the field's; else each side says what it did. */
function inWords(own: readonly ChangeLine[], other: readonly ChangeLine[], place: string): Pick<ConflictLine, 'what' | 'before' | 'mine' | 'theirs'> {
  const [mine, theirs] = [own[0], other[0]]
  if (own.length === 1 && other.length === 1 && mine!.what === theirs!.what) return { what: `${mine!.section} › ${mine!.what}`, before: mine!.before, mine: mine!.after, theirs: theirs!.after }
  const text = (lines: readonly ChangeLine[]) => lines.map(({ what, after }) => (after === '' ? what : `${what}: ${after}`)).join('; ')
  return { what: place, before: [...new Set([...own, ...other].filter(({ before }) => before !== '').map(({ what, before }) => `${what}: ${before}`))].join('; '), mine: text(own), theirs: text(other) }
}

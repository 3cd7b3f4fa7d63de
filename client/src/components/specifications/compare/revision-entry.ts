import { compareDocuments } from '#shared/workflow/compare-documents'
import { judgeChanges, type ChangeVerdict } from '#shared/workflow/change-effects'
import type { Library } from '#shared/engine/library'
import type { RevisionChange, RevisionEntry, SpecificationDocument } from '#shared/engine/specification'
import { changeLines, type ChangeLine } from '../changes/change-words'
import { effectLine } from './effect-words'

/** The revision block neither tells about itself nor about what stays in the company. */
const isTold = ({ path }: ChangeLine) => !path.startsWith('revisions') && !path.startsWith('requirement')

const MOST_CHANGES = 500

export const blockChanges = (lines: readonly ChangeLine[]): RevisionChange[] =>
  lines.filter(isTold).slice(0, MOST_CHANGES).map(({ what, section, before, after }) => ({ field: `${section}: ${what}`, before: before || '–', after: after || '–' }))

export const judgeDocuments = (before: SpecificationDocument, after: SpecificationDocument): ChangeVerdict => judgeChanges(compareDocuments(before.specification, after.specification))

/**
 * The revision block with the entry of the coming revision written from a comparison with the last one. What a person
 * entered beside the changes stays.
 */
export function withEntry(entries: readonly RevisionEntry[], revision: string, before: SpecificationDocument, after: SpecificationDocument, library: Library): RevisionEntry[] {
  const kept = entries.find((entry) => entry.revision === revision)
  const blank: RevisionEntry = { revision, date: '', zones: '', changes: [], reason: '', effect: '', by: '', checkedBy: '', approvedBy: '' }
  const entry = { ...(kept ?? blank), changes: blockChanges(changeLines(before, after, library)), effect: effectLine(judgeDocuments(before, after).total) }
  return [...entries.filter((one) => one !== kept), entry]
}

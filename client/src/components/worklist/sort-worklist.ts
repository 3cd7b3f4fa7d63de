import type { WorklistItem } from '#shared/contracts/worklist'

const byDue = (a: WorklistItem, b: WorklistItem) =>
  (a.dueAt ?? '9').localeCompare(b.dueAt ?? '9') || a.since.localeCompare(b.since) || a.id.localeCompare(b.id)

/** Overdue first, then by due time, what waits longest before what came later; the latest done first. */
export function sortWorklist(items: readonly WorklistItem[], now: string) {
  const open = items.filter(({ state }) => state === 'open').sort(byDue)
  const isOverdue = ({ dueAt }: WorklistItem) => dueAt !== null && Date.parse(dueAt) < Date.parse(now)
  return {
    overdue: open.filter(isOverdue),
    open: open.filter((item) => !isOverdue(item)),
    done: items.filter(({ state }) => state === 'done').sort((a, b) => b.since.localeCompare(a.since)),
  }
}

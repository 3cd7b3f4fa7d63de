import type { Actor, Transaction } from '#server/db/as-actor'
import type { WorklistItem } from '#shared/contracts/worklist'

export interface WorklistMoment {
  now: Date
  /** What was done before this is no longer shown. */
  doneSince: Date
}

/** What one feature has waiting for the actor, and what was done lately. Only what the actor may open. */
export type WorklistProvider = (tx: Transaction, actor: Actor, moment: WorklistMoment) => Promise<WorklistItem[]>

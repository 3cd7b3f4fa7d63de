import type { Context } from './context'
import { sendOutbox } from './mail/send-outbox'
import { chainAudit } from './services/audit/chain-audit'
import { purgeStaging } from './services/files/purge-staging'
import { noteOutboxHealth } from './services/mail/note-outbox-health'
import { closeDueRfqs } from './services/rfqs/close-due'
import { remindVendors } from './services/rfqs/remind-vendors'
import { purgeSignIn } from './services/people/purge-sign-in'

export interface WorkerTask {
  name: string
  everySeconds: number
  /** Runs alone in its process, but perhaps beside the same task of another worker: lock what it decides about. */
  run(ctx: Context): Promise<unknown>
}

/** One line per thing that happens without a person. */
export const WORKER_TASKS: readonly WorkerTask[] = [
  { name: 'send-outbox', everySeconds: 1, run: sendOutbox },
  { name: 'chain-audit', everySeconds: 1, run: chainAudit },
  { name: 'close-due-rfqs', everySeconds: 2, run: closeDueRfqs },
  { name: 'remind-vendors', everySeconds: 60, run: remindVendors },
  { name: 'note-outbox-health', everySeconds: 10, run: noteOutboxHealth },
  { name: 'purge-sign-in', everySeconds: 3600, run: purgeSignIn },
  { name: 'purge-staging', everySeconds: 3600, run: purgeStaging },
]

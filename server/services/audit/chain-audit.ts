import type { Context } from '#server/context'
import { asWorker } from '#server/db/as-actor'
import { chainEntries } from './chain'

const caughtUp = new WeakSet<Context>()

/** Chains what has been committed; the first run of a process looks at every entry. */
export async function chainAudit(ctx: Context): Promise<void> {
  const everything = !caughtUp.has(ctx)
  while ((await asWorker(ctx, (tx) => chainEntries(tx, everything))) > 0);
  caughtUp.add(ctx)
}

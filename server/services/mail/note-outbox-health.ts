import type { Context } from '#server/context'
import { asWorker } from '#server/db/as-actor'
import { sql } from 'drizzle-orm'

/** Leaves word of the outbox for those who may not read it. */
export async function noteOutboxHealth(ctx: Context): Promise<void> {
  await asWorker(ctx, (tx) =>
    tx.execute(sql`
      update outbox_health set
        seen_at = app_now(),
        waiting = (select count(*) from outbox_mails where state = 'waiting') + (select count(*) from mail_events where expanded_at is null),
        sent = (select count(*) from outbox_mails where state = 'sent'),
        undeliverable = (select count(*) from outbox_mails where state = 'undeliverable'),
        oldest_waiting_since = least(
          (select min(created_at) from outbox_mails where state = 'waiting'),
          (select min(created_at) from mail_events where expanded_at is null))`),
  )
}

import { appNow, type Actor, type Transaction } from '#server/db/as-actor'
import type { ResponseOf } from '#shared/contracts/endpoint'
import type { listWorklist as contract } from '#shared/contracts/worklist'
import { awardItems } from './award-items'
import { peopleItems } from './people-items'
import type { WorklistProvider } from './provider'
import { quoteItems } from './quote-items'
import { rfqItems } from './rfq-items'
import { sampleItems } from './sample-items'
import { specificationItems } from './specification-items'

/** One line per feature. */
const PROVIDERS: readonly WorklistProvider[] = [peopleItems, specificationItems, rfqItems, quoteItems, sampleItems, awardItems]

const DONE_SHOWN_MS = 7 * 24 * 3_600_000

/** One provider after the other: they share the transaction's one connection. */
export async function listWorklist(tx: Transaction, actor: Actor): Promise<ResponseOf<typeof contract>> {
  const now = await appNow(tx)
  const moment = { now, doneSince: new Date(now.getTime() - DONE_SHOWN_MS) }
  const items = []
  for (const provide of PROVIDERS) items.push(...(await provide(tx, actor, moment)))
  return { items, now: now.toISOString() }
}

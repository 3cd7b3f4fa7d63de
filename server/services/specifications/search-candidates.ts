import type { Context } from '#server/context'
import { asActor, type Actor } from '#server/db/as-actor'
import { AppError } from '#server/errors'
import { currentLibrary } from '#server/services/parts/library-for'
import type { SearchOutcome, SearchPreferences } from '#shared/engine/index'
import type { RequirementSheet } from '#shared/engine/specification'
import { Worker } from 'node:worker_threads'
import type { SearchOrder } from './search-thread'

const MOST_MS = 30_000
/** For a thread that no longer answers at all. */
const GIVE_UP_MS = MOST_MS + 30_000

/** A thread of Node 20 takes no TypeScript by itself, and no loader by its arguments. */
const LOADER = `import('tsx/esm/api').then(({ register }) => { register(); return import(${JSON.stringify(new URL('./search-thread.ts', import.meta.url).href)}) })`

/** Searches under way in this process, by person: each has one, so that nobody takes the whole machine. */
const searching = new Set<string>()

/** The engine's search over the company's library, in a thread of its own and outside any transaction. */
export async function searchCandidates(ctx: Context, actor: Actor, { requirement, preferences }: { requirement: RequirementSheet; preferences: SearchPreferences }): Promise<SearchOutcome> {
  if (searching.has(actor.personId)) throw new AppError('busy', 'A search of yours is still running. Wait until it has ended, then search again.')
  searching.add(actor.personId)
  try {
    const library = await asActor(ctx, actor, (tx) => currentLibrary(tx, actor))
    return await inThread({ requirement, library, preferences, mostMs: MOST_MS })
  } finally {
    searching.delete(actor.personId)
  }
}

/** @throws the thread's own error, or one that says that it did not answer */
export function inThread(order: SearchOrder): Promise<SearchOutcome> {
  return new Promise((resolve, reject) => {
    const worker = new Worker(LOADER, { eval: true, workerData: order })
    const timer = setTimeout(() => {
      reject(new Error(`The search did not answer within ${GIVE_UP_MS} ms.`))
      void worker.terminate()
    }, GIVE_UP_MS)
    worker.once('message', resolve)
    worker.once('error', reject)
    worker.once('exit', () => {
      clearTimeout(timer)
      reject(new Error('The search ended without an answer.'))
    })
  })
}

import { setTimeout as sleep } from 'node:timers/promises'
import type { Context } from './context'
import { WORKER_TASKS, type WorkerTask } from './worker-tasks'

/** Repeats a task until told to stop; a failure is logged and the next turn comes all the same. */
async function repeat(ctx: Context, { name, everySeconds, run }: WorkerTask, signal: AbortSignal): Promise<void> {
  while (!signal.aborted) {
    await run(ctx).catch((error: unknown) => ctx.logger.error('Task failed', { task: name, error }))
    await sleep(everySeconds * 1000, undefined, { signal }).catch(() => undefined)
  }
}

/** Starts every task; what it gives back ends them all and waits for those under way. */
export function runWorker(ctx: Context): () => Promise<void> {
  const stopping = new AbortController()
  const tasks = WORKER_TASKS.map((task) => repeat(ctx, task, stopping.signal))
  ctx.logger.info('Working', { tasks: WORKER_TASKS.length })
  return async () => {
    stopping.abort()
    await Promise.all(tasks)
  }
}

import { setTimeout as sleep } from 'node:timers/promises'
import { parseConfig } from './config'
import { closeContext, createContext, type Context } from './context'
import { onShutdown } from './shutdown'
import { WORKER_TASKS, type WorkerTask } from './worker-tasks'

/** Repeats a task until told to stop; a failure is logged and the next turn comes all the same. */
async function repeat(ctx: Context, { name, everySeconds, run }: WorkerTask, signal: AbortSignal): Promise<void> {
  while (!signal.aborted) {
    await run(ctx).catch((error: unknown) => ctx.logger.error('Task failed', { task: name, error }))
    await sleep(everySeconds * 1000, undefined, { signal }).catch(() => undefined)
  }
}

const ctx = createContext(parseConfig(process.env))
const stopping = new AbortController()
const tasks = WORKER_TASKS.map((task) => repeat(ctx, task, stopping.signal))
ctx.logger.info('Working', { tasks: WORKER_TASKS.length })

onShutdown(ctx.logger, async () => {
  stopping.abort()
  await Promise.all(tasks)
  await closeContext(ctx)
})

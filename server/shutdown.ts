import type { Logger } from './logger'

/** Runs `close` once when the process is told to end, or when the process that started it is gone. */
export function onShutdown(logger: Logger, close: () => Promise<void>): void {
  let closing = false
  const end = (why: string) => {
    if (closing) return
    closing = true
    logger.info('Ending', { why })
    // A connection that does not end in time is cut.
    setTimeout(() => process.exit(1), 10_000).unref()
    close().then(
      () => process.exit(0),
      (error: unknown) => {
        logger.error('Ending failed', { error })
        process.exit(1)
      },
    )
  }
  for (const signal of ['SIGTERM', 'SIGINT'] as const) process.on(signal, () => end(signal))
  if (process.channel) process.on('disconnect', () => end('parent gone'))
}

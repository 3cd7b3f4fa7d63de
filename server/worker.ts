import { parseConfig } from './config'
import { closeContext, createContext } from './context'
import { runWorker } from './run-worker'
import { onShutdown } from './shutdown'

const ctx = createContext(parseConfig(process.env))
const stopWorker = runWorker(ctx)

onShutdown(ctx.logger, async () => {
  await stopWorker()
  await closeContext(ctx)
})

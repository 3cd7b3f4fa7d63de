import { createServer } from 'node:http'
import { createApp } from './app'
import { parseConfig } from './config'
import { closeContext, createContext } from './context'
import { onShutdown } from './shutdown'

const config = parseConfig(process.env)
const ctx = createContext(config)
const server = createServer(createApp(ctx))
// A browser stays quiet while a person thinks; a proxy in front keeps connections a minute.
server.keepAliveTimeout = 65_000

server.listen(config.PORT, '127.0.0.1', () => ctx.logger.info('Listening', { port: config.PORT }))

onShutdown(ctx.logger, async () => {
  server.closeIdleConnections()
  await new Promise((resolve) => server.close(resolve))
  await closeContext(ctx)
})

import { createServer } from 'node:net'
import { Refusal, say } from './report'

const given = new Set<number>()

/** The reason why a port cannot be listened to, if there is one. */
function obstacle(port: number, host: string): Promise<string | undefined> {
  return new Promise((resolve) => {
    const probe = createServer()
    probe.once('error', (error: NodeJS.ErrnoException) => resolve(error.code))
    probe.listen({ port, host, exclusive: true }, () => probe.close(() => resolve(undefined)))
  })
}

/** The wanted port, or the next one that is free. Says so when it steps over one. */
export async function freePort(name: string, wanted: number): Promise<number> {
  for (let port = wanted; port < Math.min(wanted + 200, 65_536); port++) {
    if (given.has(port)) continue
    const obstacles = [await obstacle(port, '0.0.0.0'), await obstacle(port, '127.0.0.1'), await obstacle(port, '::')]
    if (obstacles.includes('EACCES')) throw new Refusal(`${name}=${port} may only be used by an administrator. Set ${name} to a port above 1023.`)
    if (obstacles.includes('EADDRINUSE')) continue
    if (port !== wanted) say(`Port ${wanted} (${name}) is taken; using ${port}.`)
    given.add(port)
    return port
  }
  throw new Refusal(`No free port from ${wanted} on for ${name}.`)
}

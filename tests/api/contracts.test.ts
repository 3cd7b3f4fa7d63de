import { createApp } from '#server/app'
import { createContext, closeContext } from '#server/context'
import { parseConfig } from '#server/config'
import { allEndpoints } from '#shared/contracts/index'
import { tmpdir } from 'node:os'
import { expect, it } from 'vitest'

interface Layer {
  route?: { path: string; methods: Record<string, boolean> }
  handle?: { stack?: Layer[] }
}

/** Addresses that are mounted, through routers within routers. */
function mounted(stack: readonly Layer[]): string[] {
  return stack.flatMap(({ route, handle }) => {
    if (route) return Object.keys(route.methods).map((method) => `${method.toUpperCase()} ${route.path}`)
    return handle?.stack ? mounted(handle.stack) : []
  })
}

it('mounts every endpoint of the contracts, and nothing else under /api', async () => {
  const url = 'postgres://nobody@127.0.0.1:1/dotside_test'
  const ctx = createContext(parseConfig({ DATABASE_AUTH_URL: url, DATABASE_APP_URL: url, DATABASE_WORKER_URL: url, DATA_DIR: tmpdir() }))
  const app = createApp(ctx) as unknown as { router: { stack: Layer[] } }
  const found = new Set(mounted(app.router.stack).filter((address) => address.includes(' /api/')))
  expect([...found].sort()).toEqual(allEndpoints.map(({ endpoint }) => `${endpoint.method} ${endpoint.path}`).sort())
  await closeContext(ctx)
})

it('gives no two endpoints the same address', () => {
  const addresses = allEndpoints.map(({ endpoint }) => `${endpoint.method} ${endpoint.path.replace(/:\w+/g, ':x')}`)
  expect(addresses.filter((address, index) => addresses.indexOf(address) !== index)).toEqual([])
})

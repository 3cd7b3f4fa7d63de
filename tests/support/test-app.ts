import { createApp } from '#server/app'
import { parseConfig, type Config } from '#server/config'
import { closeContext, createContext, type Context } from '#server/context'
import { createLogger } from '#server/logger'
import { endpointPath, type Endpoint } from '#shared/contracts/endpoint'
import type { Express } from 'express'
import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import supertest, { type Test } from 'supertest'
import { createTestDatabase, type TestDatabase } from './database'

const PUBLIC_URL = 'http://dotside.test'

export interface TestApp {
  app: Express
  ctx: Context
  database: TestDatabase
  /** Lines the application logged. */
  log: string[]
  stop(): Promise<void>
}

/** The real application on a database and a file store of its own. */
export async function startTestApp(own: Partial<Config> = {}, parts: Partial<Omit<Context, 'config'>> = {}): Promise<TestApp> {
  const database = await createTestDatabase()
  const dataDir = await mkdtemp(path.join(tmpdir(), 'dotside-test-'))
  const config = { ...parseConfig({ ...database.urls, DATA_DIR: dataDir, PUBLIC_URL, MAIL_FROM: 'Dotside <dotside@dotside.test>' }), ...own }
  const log: string[] = []
  const ctx = createContext(config, { logger: createLogger((line) => log.push(line)), ...parts })
  return {
    app: createApp(ctx),
    ctx,
    database,
    log,
    async stop() {
      await closeContext(ctx)
      await database.drop()
      await rm(dataDir, { recursive: true, force: true })
    },
  }
}

export interface CallParts {
  params?: Record<string, string>
  query?: Record<string, unknown>
  body?: unknown
  /** For an endpoint with `upload`. */
  file?: { name: string; content: Buffer | string }
  /** Cookie of `signInAs`. */
  as?: string | null
  origin?: string | null
}

/** Calls an endpoint of the contract as a browser would: from our own page, with the session's cookie. */
export function request(app: Express, endpoint: Endpoint, { params, query, body, file, as, origin = PUBLIC_URL }: CallParts = {}): Test {
  const method = endpoint.method.toLowerCase() as Lowercase<Endpoint['method']>
  let test = supertest(app)[method](endpointPath(endpoint, params))
  if (origin) test = test.set('origin', origin)
  if (as) test = test.set('cookie', as)
  if (query) test = test.query(query)
  if (endpoint.upload) return withForm(test, endpoint.upload.field, body, file)
  return endpoint.method === 'GET' ? test : test.send((body ?? {}) as object)
}

function withForm(test: Test, field: string, body: unknown, file: CallParts['file']): Test {
  for (const [key, value] of Object.entries((body ?? {}) as Record<string, unknown>)) {
    test.field(key, typeof value === 'string' ? value : JSON.stringify(value))
  }
  if (file) test.attach(field, Buffer.from(file.content), file.name)
  return test
}

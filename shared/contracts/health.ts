import { z } from 'zod'
import { defineEndpoint } from './endpoint'

const part = z.enum(['ok', 'late', 'failed'])

export const readHealth = defineEndpoint({
  method: 'GET',
  path: '/api/health',
  summary: 'Whether database, outbox and file store work',
  access: 'public',
  response: z.object({ status: z.enum(['ok', 'degraded']), database: part, outbox: part, files: part }),
})

export const readOpenApi = defineEndpoint({
  method: 'GET',
  path: '/api/openapi.json',
  summary: 'This interface, described (OpenAPI 3.1)',
  access: 'public',
  response: z.looseObject({ openapi: z.string() }),
})

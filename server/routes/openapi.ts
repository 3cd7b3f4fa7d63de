import { allEndpoints, type NamedEndpoint } from '#shared/contracts/index'
import { ERROR_STATUS, errorBodySchema } from '#shared/contracts/errors'
import type { Endpoint } from '#shared/contracts/endpoint'
import { z } from 'zod'

type Json = Record<string, unknown>

/** The interface in OpenAPI 3.1, whose schemas are JSON Schema 2020-12, from the contracts alone. */
export function openApiDocument(publicUrl: string): { openapi: string } & Json {
  const paths: Record<string, Json> = {}
  for (const named of allEndpoints) {
    const path = named.endpoint.path.replace(/:(\w+)/g, '{$1}')
    paths[path] = { ...paths[path], [named.endpoint.method.toLowerCase()]: operation(named) }
  }
  return {
    openapi: '3.1.0',
    info: { title: 'Dotside', version: '1', description: 'Custom wound magnetics: specified, quoted, sampled, ordered.' },
    servers: [{ url: publicUrl }],
    paths,
    components: {
      schemas: { Error: schemaOf(errorBodySchema, 'output') },
      securitySchemes: { session: { type: 'apiKey', in: 'cookie', name: 'dotside_session' } },
    },
  }
}

function operation({ name, feature, endpoint }: NamedEndpoint): Json {
  const { access } = endpoint
  return {
    operationId: name,
    tags: [feature],
    summary: endpoint.summary,
    'x-access': access,
    security: access === 'public' ? [] : [{ session: [] }],
    parameters: [...parametersOf(endpoint.params, 'path'), ...parametersOf(endpoint.query, 'query')],
    ...(endpoint.method !== 'GET' && { requestBody: requestBody(endpoint) }),
    responses: { 200: success(endpoint), default: failure },
  }
}

const failure = {
  description: `Refused. Codes: ${Object.keys(ERROR_STATUS).join(', ')}.`,
  content: { 'application/json': { schema: { $ref: '#/components/schemas/Error' } } },
}

function success({ download, response }: Endpoint): Json {
  if (!download) return { description: 'Done', content: { 'application/json': { schema: schemaOf(response, 'output') } } }
  const bytes = { schema: { type: 'string', format: 'binary' } }
  return { description: 'The file', content: Object.fromEntries(download.map((mediaType) => [mediaType, bytes])) }
}

function requestBody({ upload, body }: Endpoint): Json {
  const schema = schemaOf(body, 'input')
  if (!upload) return { required: true, content: { 'application/json': { schema } } }
  const properties = { ...(schema.properties as Json | undefined), [upload.field]: { type: 'string', format: 'binary' } }
  return { required: true, content: { 'multipart/form-data': { schema: { ...schema, type: 'object', properties } } } }
}

function parametersOf(schema: z.ZodType, place: 'path' | 'query'): Json[] {
  const { properties = {}, required = [] } = schemaOf(schema, 'input') as { properties?: Json; required?: string[] }
  return Object.entries(properties).map(([name, parameter]) => ({ name, in: place, required: place === 'path' || required.includes(name), schema: parameter }))
}

function schemaOf(schema: z.ZodType, io: 'input' | 'output'): Json {
  const { $schema: _dialect, ...rest } = z.toJSONSchema(schema, { io, unrepresentable: 'any', reused: 'inline' }) as Json
  return rest
}

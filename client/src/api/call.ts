import type { z } from 'zod'
import { endpointPath, type Endpoint, type ResponseOf } from '#shared/contracts/endpoint'
import { errorBodySchema } from '#shared/contracts/errors'
import { answerUnreadable, ApiError, noConnection, stopped } from './api-error'
import { passSessionGate } from './session-gate'

type Part<K extends string, T> = {} extends T ? { [P in K]?: T } : { [P in K]: T }

/** What one endpoint asks for; `params`, `query` and `body` may be left out where they are empty. */
export type CallInput<E extends Endpoint> = Part<'params', z.input<E['params']>> &
  Part<'query', z.input<E['query']>> &
  Part<'body', z.input<E['body']>> & { signal?: AbortSignal }

export type CallArguments<E extends Endpoint> = {} extends CallInput<E> ? [input?: CallInput<E>] : [input: CallInput<E>]

/** The same parts without their types, as the functions below pass them on. */
export interface LooseInput {
  params?: unknown
  query?: unknown
  body?: unknown
  signal?: AbortSignal
}

export function callAddress(endpoint: Endpoint, { params, query }: LooseInput): string {
  const search = new URLSearchParams()
  for (const [key, value] of Object.entries((query ?? {}) as Record<string, unknown>)) {
    if (value !== undefined && value !== null) search.set(key, String(value))
  }
  const address = endpointPath(endpoint, (params ?? {}) as Record<string, string>)
  return search.size > 0 ? `${address}?${search}` : address
}

/** Reads the body of an answer that is not a success; a proxy's page in between is a failed connection. */
export function readFailure(text: string): ApiError {
  try {
    return new ApiError(errorBodySchema.parse(JSON.parse(text)))
  } catch {
    return noConnection()
  }
}

async function request(endpoint: Endpoint, input: LooseInput): Promise<Response> {
  const sendsBody = endpoint.method !== 'GET'
  try {
    return await fetch(callAddress(endpoint, input), {
      method: endpoint.method,
      credentials: 'same-origin',
      signal: input.signal,
      ...(sendsBody && { body: JSON.stringify(input.body ?? {}), headers: { 'content-type': 'application/json' } }),
    })
  } catch {
    throw input.signal?.aborted ? stopped() : noConnection()
  }
}

async function send(endpoint: Endpoint, input: LooseInput): Promise<Response> {
  const response = await request(endpoint, input)
  if (response.ok) return response

  const failure = readFailure(await response.text())
  if (failure.code !== 'not-signed-in' || !(await passSessionGate())) throw failure
  const repeated = await request(endpoint, input)
  if (!repeated.ok) throw readFailure(await repeated.text())
  return repeated
}

export function readAnswer<E extends Endpoint>(endpoint: E, answer: unknown): ResponseOf<E> {
  const parsed = endpoint.response.safeParse(answer)
  if (!parsed.success) throw answerUnreadable()
  return parsed.data as ResponseOf<E>
}

/**
 * Calls one endpoint of the contract. When the session has ended, the person is asked to sign in again and the
 * call is repeated, so that nothing typed is lost.
 */
export async function call<E extends Endpoint>(endpoint: E, ...[input]: CallArguments<E>): Promise<ResponseOf<E>> {
  const response = await send(endpoint, input ?? {})
  const answer: unknown = await response.json().catch(() => {
    throw answerUnreadable()
  })
  return readAnswer(endpoint, answer)
}

/** Fetches the file that an endpoint with `download` answers, with the name the server gave it. */
export async function callForFile<E extends Endpoint>(endpoint: E, ...[input]: CallArguments<E>): Promise<{ name: string; content: Blob }> {
  const response = await send(endpoint, input ?? {})
  const content = await response.blob().catch(() => {
    throw noConnection()
  })
  return { name: fileNameOf(response.headers.get('content-disposition')), content }
}

/** The file name of a Content-Disposition header (RFC 6266); the encoded form wins. */
export function fileNameOf(disposition: string | null): string {
  const encoded = /filename\*=UTF-8''([^;]+)/i.exec(disposition ?? '')?.[1]
  const quoted = /filename="([^"]*)"/i.exec(disposition ?? '')?.[1]
  try {
    return encoded ? decodeURIComponent(encoded) : quoted || 'file'
  } catch {
    return quoted || 'file'
  }
}

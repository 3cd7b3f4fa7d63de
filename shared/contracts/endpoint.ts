import { z } from 'zod'

/** Roles in a buying company, in a vendor company and of the installation's operator. */
export const BUYING_ROLES = ['engineer', 'checker', 'quality', 'buyer', 'approver', 'admin'] as const
export const ROLES = [...BUYING_ROLES, 'vendor', 'operator'] as const
export type Role = (typeof ROLES)[number]

export const COMPANY_KINDS = ['buying', 'vendor', 'operator'] as const
export type CompanyKind = (typeof COMPANY_KINDS)[number]

/** Who may call: anybody, anybody signed in, or a person who holds at least one of the roles. */
export type Access = 'public' | 'signed-in' | readonly Role[]

export type Method = 'GET' | 'POST' | 'PUT' | 'DELETE'

/** Kinds of file that can be recognised by their content. */
export const FILE_KINDS = ['pdf', 'docx', 'xlsx', 'pptx', 'odt', 'ods', 'doc-xls-ppt', 'csv', 'txt', 'png', 'jpeg', 'step', 'zip'] as const
export type FileKind = (typeof FILE_KINDS)[number]

/** One file in a multipart form, beside the text fields of `body` (each a JSON value or plain text). */
export interface Upload {
  field: string
  kinds: readonly FileKind[]
  required: boolean
  /** Defaults to the server's limit (25 MB). */
  maxBytes?: number
}

export interface Endpoint<
  A extends Access = Access,
  P extends z.ZodType = z.ZodType,
  Q extends z.ZodType = z.ZodType,
  B extends z.ZodType = z.ZodType,
  R extends z.ZodType = z.ZodType,
> {
  readonly method: Method
  /** Express path; parameters as `:name`, the same names as the keys of `params`. */
  readonly path: `/api/${string}`
  readonly summary: string
  readonly access: A
  readonly params: P
  readonly query: Q
  readonly body: B
  readonly response: R
  readonly upload?: Upload
  /** The answer is a file (attachment) of one of these media types, not JSON. */
  readonly download?: readonly string[]
}

const nothing = z.strictObject({})
type Nothing = typeof nothing

interface EndpointInput<A extends Access, P extends z.ZodType, Q extends z.ZodType, B extends z.ZodType, R extends z.ZodType> {
  method: Method
  path: `/api/${string}`
  summary: string
  access: A
  params?: P
  query?: Q
  body?: B
  response?: R
  upload?: Upload
  download?: readonly string[]
}

/**
 * Describes one endpoint for both ends: the server mounts it, the client calls it, the documentation and the
 * access tests are generated from it. What is left out is an empty object.
 */
export function defineEndpoint<
  const A extends Access,
  P extends z.ZodType = Nothing,
  Q extends z.ZodType = Nothing,
  B extends z.ZodType = Nothing,
  R extends z.ZodType = z.ZodObject<Record<never, never>>,
>(input: EndpointInput<A, P, Q, B, R>): Endpoint<A, P, Q, B, R> {
  return {
    ...input,
    params: input.params ?? (nothing as unknown as P),
    query: input.query ?? (nothing as unknown as Q),
    body: input.body ?? (nothing as unknown as B),
    response: input.response ?? (z.object({}) as unknown as R),
  }
}

/** True for what `defineEndpoint` returned; used to collect the endpoints of a contract file. */
export function isEndpoint(value: unknown): value is Endpoint {
  return typeof value === 'object' && value !== null && 'method' in value && 'path' in value && 'access' in value && 'response' in value
}

/** The address of an endpoint with its parameters filled in and percent-encoded. */
export function endpointPath(endpoint: Pick<Endpoint, 'path'>, params: Readonly<Record<string, string>> = {}): string {
  return endpoint.path.replace(/:(\w+)/g, (_, key: string) => encodeURIComponent(params[key] ?? ''))
}

export type ParamsOf<E extends Endpoint> = z.infer<E['params']>
export type QueryOf<E extends Endpoint> = z.infer<E['query']>
export type BodyOf<E extends Endpoint> = z.infer<E['body']>
/** What the client receives. */
export type ResponseOf<E extends Endpoint> = z.infer<E['response']>

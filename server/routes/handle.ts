import type { Actor } from '#server/db/as-actor'
import { AppError } from '#server/errors'
import { stageUpload } from '#server/middleware/stage-upload'
import type { FileDownload } from '#server/services/files/download'
import { discardStaged, type StagedFile } from '#server/services/files/staged-file'
import type { OpenSession } from '#server/services/people/sessions'
import type { Access, Endpoint } from '#shared/contracts/endpoint'
import type { Request, Response, Router } from 'express'
import type { z } from 'zod'
import { parseForm, parseInput } from './parse-input'
import { actorOf, contextOf, stateOf } from './request-state'
import { sendDownload } from './send-download'

/** A signed-in person, or possibly nobody where the contract says `public`. */
type ActorFor<A extends Access> = A extends 'public' ? Actor | null : Actor

export interface Call<E extends Endpoint> {
  actor: ActorFor<E['access']>
  session: OpenSession | null
  params: z.output<E['params']>
  query: z.output<E['query']>
  body: z.output<E['body']>
  /** The file of an endpoint with `upload`, recognised by its content; null when it is optional and was left out. */
  file: StagedFile | null
  /** Address of the caller, for limiting attempts. */
  ip: string
  setCookie(cookie: string): void
}

/**
 * Binds a contract to a handler. Input that does not fit is the caller's error; output that does not fit is ours.
 * An endpoint with `download` answers a `FileDownload`.
 */
export function handle<E extends Endpoint>(router: Router, endpoint: E, respond: (call: Call<E>) => Promise<z.input<E['response']> | FileDownload>): void {
  const method = endpoint.method.toLowerCase() as Lowercase<Endpoint['method']>
  router[method](endpoint.path, async (req: Request, res: Response) => {
    const actor = admit(endpoint.access, stateOf(res).session)
    const params = parseInput(endpoint.params, req.params)
    const query = parseInput(endpoint.query, req.query)
    const { body, file } = await readBody(endpoint, req, res)
    try {
      const setCookie = (cookie: string) => res.append('set-cookie', cookie)
      const answer = await respond({ actor, session: stateOf(res).session, params, query, body, file, ip: req.ip ?? '', setCookie } as Call<E>)
      await send(endpoint, res, answer)
    } finally {
      await discardStaged(file)
    }
  })
}

/** Refuses whoever the contract does not name. Whether the person may touch this very object is the policy's to say. */
function admit(access: Access, session: OpenSession | null): Actor | null {
  const actor = session && actorOf(session.person)
  if (access === 'public') return actor
  if (!actor) throw new AppError('not-signed-in', 'Please sign in.')
  if (access !== 'signed-in' && !actor.roles.some((role) => access.includes(role))) {
    throw new AppError('not-allowed', 'Your role does not do this.')
  }
  return actor
}

async function readBody(endpoint: Endpoint, req: Request, res: Response): Promise<{ body: unknown; file: StagedFile | null }> {
  if (!endpoint.upload) return { body: endpoint.method === 'GET' ? {} : parseInput(endpoint.body, req.body ?? {}), file: null }
  const file = await stageUpload(contextOf(req), endpoint.upload, req, res)
  try {
    return { body: parseForm(endpoint.body, { ...(req.body as Record<string, unknown>) }), file }
  } catch (error) {
    await discardStaged(file)
    throw error
  }
}

async function send(endpoint: Endpoint, res: Response, answer: unknown): Promise<void> {
  if (endpoint.download) return sendDownload(res, answer as FileDownload)
  res.json(endpoint.response.parse(answer))
}

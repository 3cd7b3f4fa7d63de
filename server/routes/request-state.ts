import type { Context } from '#server/context'
import type { Actor } from '#server/db/as-actor'
import type { OpenSession } from '#server/services/people/sessions'
import type { SessionPerson } from '#shared/contracts/people'
import type { Request, Response } from 'express'

export interface RequestState {
  requestId: string
  session: OpenSession | null
}

/** What the middleware has found out about this request. */
export const stateOf = (res: Response): RequestState => res.locals as RequestState

export const contextOf = (req: Request): Context => req.app.locals.ctx as Context

export const actorOf = (person: SessionPerson): Actor => ({
  personId: person.id,
  companyId: person.company.id,
  companyKind: person.company.kind,
  roles: person.roles,
})
